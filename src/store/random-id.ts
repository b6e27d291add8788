import { randomBytes } from 'node:crypto';

/** Sixteen random hexadecimal digits: names a record or a draft, and points to nothing. */
export function randomId(): string {
  return randomBytes(8).toString('hex');
}
