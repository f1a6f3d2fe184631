import type { ScaleLinear } from 'd3-scale';
import { formatNumber } from '@/formatting/format-number.ts';

export interface ValueTick {
  /** Where it stands, px from the top. */
  at: number;
  text: string;
}

/** Beyond this nothing more is asked for: a scale without two round values shows none. */
const MOST_ASKED = 8;

/** Round values beside a scale: two or more, else nobody can tell how far one is from the next. */
export function valueTicks(y: ScaleLinear<number, number>, wanted: number): ValueTick[] {
  let values = y.ticks(wanted);
  for (let more = wanted + 1; values.length < 2 && more <= MOST_ASKED; more += 1) values = y.ticks(more);
  const [first, second] = values;
  if (first === undefined || second === undefined) return [];
  const decimals = Math.max(0, -Math.floor(Math.log10(second - first) + 1e-9));
  return values.map((value) => ({ at: y(value), text: formatNumber(value, { decimals }) }));
}
