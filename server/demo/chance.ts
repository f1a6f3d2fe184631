import { createHash } from 'node:crypto';

/** Repeatable chance: the same seed and name give the same numbers for ever. */
export interface Chance {
  /** From 0 up to, not including, 1. */
  next(): number;
  /** A whole number from 0 up to, not including, `max`. */
  int(max: number): number;
  between(low: number, high: number): number;
  normal(mean: number, sd: number): number;
  happens(probability: number): boolean;
  pick<T>(list: readonly T[]): T;
  uuid(): string;
}

/**
 * A stream of chance of its own. Each part of the simulation has one, so that a change in one part leaves the others
 * as they were.
 */
export function chanceOf(seed: number, name: string): Chance {
  const next = smallFastCounter(seed, name);
  const int = (max: number) => Math.floor(next() * max);
  return {
    next,
    int,
    between: (low, high) => low + (high - low) * next(),
    // Box-Muller; 1 - next() is never zero.
    normal: (mean, sd) => mean + sd * Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next()),
    happens: (probability) => next() < probability,
    pick: (list) => {
      const item = list[int(list.length)];
      if (item === undefined) throw new Error('There is nothing to pick from.');
      return item;
    },
    uuid: () => uuidFrom(next),
  };
}

/** sfc32 of PractRand (Chris Doty-Humphrey, public domain), seeded by a hash. */
function smallFastCounter(seed: number, name: string): () => number {
  const digest = createHash('sha256').update(`${seed} ${name}`).digest();
  let [a, b, c, counter] = [0, 4, 8, 12].map((offset) => digest.readInt32LE(offset)) as [
    number,
    number,
    number,
    number,
  ];
  return () => {
    const sum = (a + b + counter) | 0;
    counter = (counter + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = ((c << 21) | (c >>> 11)) + sum;
    c |= 0;
    return (sum >>> 0) / 4_294_967_296;
  };
}

/** A random UUID of version 4 (RFC 9562). */
function uuidFrom(next: () => number): string {
  const hex = Array.from({ length: 4 }, () =>
    Math.floor(next() * 4_294_967_296)
      .toString(16)
      .padStart(8, '0'),
  ).join('');
  const variant = '89ab'.charAt(Number.parseInt(hex.charAt(16), 16) % 4);
  return [
    hex.slice(0, 8),
    hex.slice(8, 12),
    `4${hex.slice(13, 16)}`,
    `${variant}${hex.slice(17, 20)}`,
    hex.slice(20),
  ].join('-');
}
