import { createHash } from 'node:crypto';
import bcrypt from 'bcryptjs';

/** bcrypt reads 72 bytes and no further; a digest of fixed length lets every byte of a long password count. */
const digest = (password: string): string => createHash('sha256').update(password, 'utf8').digest('base64');

export class PasswordHasher {
  private readonly dummyHash: Promise<string>;

  constructor(private readonly cost: number) {
    this.dummyHash = this.hash('no account has this password');
  }

  hash(password: string): Promise<string> {
    return bcrypt.hash(digest(password), this.cost);
  }

  /** Without a hash (unknown user, invitation not accepted) it takes the same time and answers false. */
  async matches(password: string, hash: string | null): Promise<boolean> {
    const isEqual = await bcrypt.compare(digest(password), hash ?? (await this.dummyHash));
    return isEqual && hash !== null;
  }
}
