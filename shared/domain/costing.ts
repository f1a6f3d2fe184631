import { daysBetween, monthBounds, monthOf, type Day, type Month } from './days.ts';
import { splitByWeights } from './split.ts';

/** Pieces of a batch that joined (positive) or left (negative) a system on a day. */
export interface StockChange {
  batchId: string;
  systemId: string;
  day: Day;
  pieces: number;
}

/** A number of pieces of a batch that stood in a system from a day up to and without another. */
export interface Stay {
  batchId: string;
  systemId: string;
  pieces: number;
  from: Day;
  to: Day;
}

/** One piece in a system for one day is one frag-day. */
export interface FragDays {
  batchId: string;
  systemId: string;
  month: Month;
  fragDays: number;
}

/**
 * The stays that changes make up. A piece counts for the day it came and no longer for the day it left.
 *
 * @param until first day that is not counted any more
 */
export function staysOf(changes: readonly StockChange[], until: Day): Stay[] {
  const standing = new Map<string, Stay>();
  const stays: Stay[] = [];
  const close = (stay: Stay, to: Day) => {
    if (stay.pieces > 0 && stay.from < to) stays.push({ ...stay, to });
  };
  for (const { batchId, systemId, day, pieces } of [...changes].sort(byDay)) {
    if (day >= until) break;
    const key = JSON.stringify([batchId, systemId]);
    const stay = standing.get(key);
    if (stay) close(stay, day);
    standing.set(key, { batchId, systemId, pieces: (stay?.pieces ?? 0) + pieces, from: day, to: until });
  }
  for (const stay of standing.values()) close(stay, until);
  return stays;
}

/** Frag-days by month, system and batch, in that order. */
export function fragDays(stays: readonly Stay[]): FragDays[] {
  const sums = new Map<string, FragDays>();
  for (const stay of stays) {
    for (const { month, days } of monthsOf(stay)) {
      const key = JSON.stringify([month, stay.systemId, stay.batchId]);
      const known = sums.get(key)?.fragDays ?? 0;
      const { batchId, systemId } = stay;
      sums.set(key, { batchId, systemId, month, fragDays: known + days * stay.pieces });
    }
  }
  return [...sums].sort(([a], [b]) => (a < b ? -1 : 1)).map(([, sum]) => sum);
}

export interface MonthShares {
  shares: { batchId: string; costMicro: number }[];
  /** Cost of a month in which nothing stood in the system: it stays with the farm. */
  unsharedMicro: number;
}

/**
 * Shares the cost of a system's month to the batches that stood in it, by frag-days; the parts add up exactly.
 *
 * @param poolMicro cost of the month, micro-units
 */
export function shareMonth(poolMicro: number, batches: readonly { batchId: string; fragDays: number }[]): MonthShares {
  const present = batches.filter(({ fragDays: days }) => days > 0);
  if (present.length === 0) return { shares: [], unsharedMicro: poolMicro };
  const parts = splitByWeights(
    poolMicro,
    present.map(({ fragDays: days }) => days),
  );
  return { shares: present.map(({ batchId }, index) => ({ batchId, costMicro: parts[index] ?? 0 })), unsharedMicro: 0 };
}

/**
 * What one living piece of a batch has cost so far: all cost of the batch over those still alive or sold, so that the
 * survivors carry the pieces that were lost.
 *
 * @param costMicro all cost of the batch, micro-units
 * @param survivors pieces alive, picked or sold
 * @returns micro-units, rounded; null where none is left
 */
export function costPerLivingFrag(costMicro: number, survivors: number): number | null {
  return survivors > 0 ? Math.round(costMicro / survivors) : null;
}

function monthsOf({ from, to }: Stay): { month: Month; days: number }[] {
  const parts: { month: Month; days: number }[] = [];
  for (let start = from; start < to;) {
    const month = monthOf(start);
    const { to: nextMonth } = monthBounds(month);
    const end = nextMonth < to ? nextMonth : to;
    parts.push({ month, days: daysBetween(start, end) });
    start = end;
  }
  return parts;
}

function byDay(a: StockChange, b: StockChange): number {
  return a.day < b.day ? -1 : a.day > b.day ? 1 : 0;
}
