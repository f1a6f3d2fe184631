import { MS_PER_DAY } from '../days.ts';
import type { Estimate } from './track-demand.ts';

/** How demand stands to what it was, beside what stock and growth explain. */
export interface DemandChange {
  direction: 'up' | 'down' | 'none';
  before: number;
  now: number;
  /** What demand would be now by the pieces that came and went; as before where stock is not known. */
  expected: number;
  /** Half of the 95 % interval of now − expected. */
  half: number;
  since: number;
}

export interface ChangeFacts {
  before: Estimate;
  now: Estimate;
  since: number;
  until: number;
  /** Pieces that stood in the system then and now, where it has any. */
  stock?: { before: number; now: number };
}

const Z_975 = 1.96;
/** Pieces differ in size, so what came or went is known to half of itself (no source). */
const STOCK_ERROR = 0.5;
/** Corals may grow by so much of themselves in a week and demand with them (common practice, no source). */
const GROWTH_PER_WEEK = 0.02;

/**
 * Whether demand went up or down by more than the tests, the stock and growth explain: half a change of stock's own size
 * and two hundredths of growth a week count as not known.
 */
export function demandChange({ before, now, since, until, stock }: ChangeFacts): DemandChange {
  const ratio = stock && stock.before > 0 ? stock.now / stock.before : 1;
  const expected = before.value * ratio;
  const byStock = STOCK_ERROR * before.value * (ratio - 1);
  const byGrowth = (before.value * GROWTH_PER_WEEK * (until - since)) / (7 * MS_PER_DAY);
  const half = Z_975 * Math.hypot(before.sd * ratio, now.sd, byStock, byGrowth);
  const off = now.value - expected;
  const direction = Math.abs(off) <= half ? 'none' : off > 0 ? 'up' : 'down';
  return { direction, before: before.value, now: now.value, expected, half, since };
}
