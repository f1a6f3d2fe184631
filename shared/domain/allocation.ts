import { DomainError } from '../errors.ts';
import type { Day } from './days.ts';

/** What a batch can give to an order line. */
export interface FreeBatch {
  batchId: string;
  /** Saleable pieces that nobody holds. */
  free: number;
  /** The day its pieces became saleable; the oldest go first. */
  readyDay: Day;
}

export interface Allocation {
  picks: { batchId: string; pieces: number }[];
  /** Pieces wanted that no batch has. */
  short: number;
}

/**
 * Fills an order line from batches, oldest first, batches of one day in the order of their ids. Never more than is free,
 * never more than is wanted.
 *
 * @throws {DomainError} `input.invalid` unless `wanted` is a whole number of zero or more
 */
export function allocate(wanted: number, batches: readonly FreeBatch[]): Allocation {
  if (!(Number.isSafeInteger(wanted) && wanted >= 0)) {
    throw new DomainError('input.invalid', 'Order a whole number of pieces.', { details: { wanted } });
  }
  let short = wanted;
  const picks: Allocation['picks'] = [];
  for (const { batchId, free } of [...batches].sort(oldestFirst)) {
    const pieces = Math.min(short, Math.max(0, Math.floor(free)));
    if (pieces === 0) continue;
    picks.push({ batchId, pieces });
    short -= pieces;
  }
  return { picks, short };
}

function oldestFirst(a: FreeBatch, b: FreeBatch): number {
  if (a.readyDay !== b.readyDay) return a.readyDay < b.readyDay ? -1 : 1;
  if (a.batchId === b.batchId) return 0;
  return a.batchId < b.batchId ? -1 : 1;
}
