import { createHash } from 'node:crypto';

/** Tokens carry 128 bits and more of chance, so that a plain hash keeps them safe in the table. 64 hexadecimal digits. */
export function hashToken(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}
