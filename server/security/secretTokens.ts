import { createHash, randomBytes } from 'node:crypto';

/** 256 random bits, safe in an address. */
export const randomSecret = (): string => randomBytes(32).toString('base64url');

/** What is stored of a secret: enough to recognise it, useless to whoever reads the table. */
export const hashSecret = (secret: string): string => createHash('sha256').update(secret).digest('hex');
