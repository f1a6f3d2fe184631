import { MS_PER_DAY } from '../days.ts';
import type { LevelReading } from './inputs.ts';

/** A demand of now stands on tests of so many days before it. */
export const TOLD_BY_DAYS = 28;
const FEWEST_READINGS = 3;
const SHORTEST_DAYS = 2;

/** Whether tests tell a demand, and which ones it stands on. */
export interface Told {
  from: number;
  to: number;
  readings: number;
  /** Null where they tell it. */
  lacks: 'too_few_readings' | 'too_short' | null;
}

/**
 * Whether there are tests enough to tell a demand at an instant: three or more in the four weeks before it, over two days
 * or more. With fewer the estimate is mostly what was assumed at the start, or long out of date.
 *
 * @param readings that count: those that are flagged are to be left out
 */
export function toldBy(readings: readonly Pick<LevelReading, 'at'>[], now: number): Told {
  const used = readings.map(({ at }) => at).filter((at) => at >= now - TOLD_BY_DAYS * MS_PER_DAY && at <= now);
  const from = used.length > 0 ? Math.min(...used) : now - TOLD_BY_DAYS * MS_PER_DAY;
  const to = used.length > 0 ? Math.max(...used) : now;
  const told = { from, to, readings: used.length };
  if (used.length < FEWEST_READINGS) return { ...told, lacks: 'too_few_readings' };
  return { ...told, lacks: to - from < SHORTEST_DAYS * MS_PER_DAY ? 'too_short' : null };
}
