import { createHash } from 'node:crypto';
import bcrypt from 'bcryptjs';

/** What does the slow part: bcrypt in this thread (commands, tests) or in another (the server). */
export interface BcryptEngine {
  hash: (text: string, cost: number) => Promise<string>;
  compare: (text: string, hash: string) => Promise<boolean>;
}

/** bcrypt reads 72 bytes and no further; a digest of fixed length lets every byte of a long password count. */
const digest = (password: string): string => createHash('sha256').update(password, 'utf8').digest('base64');

export class PasswordHasher {
  private dummyHash: Promise<string> | null = null;

  constructor(
    private readonly cost: number,
    private readonly engine: BcryptEngine = bcrypt,
  ) {}

  /** Makes the hash that unknown users are compared with, so that the first of them takes no longer than the others. */
  async prepare(): Promise<void> {
    this.dummyHash ??= this.hash('no account has this password');
    await this.dummyHash;
  }

  hash(password: string): Promise<string> {
    return this.engine.hash(digest(password), this.cost);
  }

  /** Without a hash (unknown user, invitation not accepted) it takes the same time and answers false. */
  async matches(password: string, hash: string | null): Promise<boolean> {
    await this.prepare();
    const isEqual = await this.engine.compare(digest(password), hash ?? (await this.dummyHash) ?? '');
    return isEqual && hash !== null;
  }
}
