import { InvalidInputError } from '../errors/index.js';
import { commonPasswords } from './commonPasswords.js';

const repeatedUnit = /^(.{1,4})\1+.{0,3}$/s;
const sequences = [
  '01234567890123456789',
  '98765432109876543210',
  'abcdefghijklmnopqrstuvwxyz',
  'qwertyuiopasdfghjklzxcvbnm',
];

/** True for what is guessed first: the list, a short unit repeated, one long run of keys, or the account's own names. */
export function isCommonPassword(password: string, account: { email: string; name: string }): boolean {
  const plain = password.toLowerCase();
  const ownWords = [account.email, account.email.split('@')[0] ?? '', account.name, 'overfold'];
  const stripped = plain.replace(/[\d\s!?.#*_-]+$/, '');
  return (
    commonPasswords.has(plain) ||
    repeatedUnit.test(plain) ||
    sequences.some((sequence) => sequence.includes(plain)) ||
    ownWords.some((word) => word !== '' && (plain === word.toLowerCase() || stripped === word.toLowerCase()))
  );
}

/** @throws InvalidInputError `PASSWORD_TOO_COMMON` */
export function requireUncommonPassword(
  password: string,
  account: { email: string; name: string },
  path: string,
): void {
  if (!isCommonPassword(password, account)) return;
  const message = 'This password is among the first that are guessed. Choose another; several words together are good.';
  throw new InvalidInputError('PASSWORD_TOO_COMMON', message, { details: [{ path, message }] });
}
