import { randomInt } from 'node:crypto';

const ALPHABET = '0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz';

/** A new random identifier such as `re_9fQ…`. */
export function newId(prefix: string, length = 24): string {
  return `${prefix}_${Array.from({ length }, () => ALPHABET.charAt(randomInt(ALPHABET.length))).join('')}`;
}
