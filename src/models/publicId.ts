import { randomBytes } from 'node:crypto';

const ALPHABET = '0123456789abcdefghijklmnopqrstuvwxyz';

/** A new opaque identifier: 16 characters of base 36, about 82 random bits; bytes that would bias it are dropped. */
export function newPublicId(): string {
  let id = '';
  while (id.length < 16) {
    for (const byte of randomBytes(24)) {
      if (byte < 252 && id.length < 16) id += ALPHABET[byte % 36];
    }
  }
  return id;
}
