import type { Tone } from '@/components/tone.ts';

/** A measured value with its error, drawn as a ringed dot with a bar. */
export interface SeriesPoint {
  at: number;
  value: number;
  error?: number;
  /** Words for the read-out, such as the method. */
  note?: string;
}

/** An estimate with its 95 % band. */
export interface LinePoint {
  at: number;
  value: number;
  low?: number;
  high?: number;
}

/** One thing over time. Values are in the unit that is shown. */
export interface Series {
  key: string;
  label: string;
  unit: string;
  tone: Tone;
  decimals: number;
  points?: readonly SeriesPoint[];
  line?: readonly LinePoint[];
}

/** Series that share a scale, one panel above another over the same days. */
export interface Panel {
  key: string;
  series: readonly Series[];
  /** The target band. */
  band?: { min: number; max: number };
  height?: number;
  /** The scale starts at zero: for rates and amounts. */
  fromZero?: boolean;
}

/** Something that was done: a dose, a water change. */
export interface Mark {
  at: number;
  /** Its kind, named once in the picture. */
  label: string;
  /** More about this one, for the read-out. */
  note?: string;
  tone?: Tone;
}

/** The least and greatest value that a panel must show. */
export function rangeOf(panel: Panel): [number, number] {
  const values = panel.series.flatMap(({ points = [], line = [] }) => [
    ...points.flatMap(({ value, error = 0 }) => [value - error, value + error]),
    ...line.flatMap(({ value, low = value, high = value }) => [low, high]),
  ]);
  if (panel.band) values.push(panel.band.min, panel.band.max);
  if (panel.fromZero) values.push(0);
  if (values.length === 0) return [0, 1];
  const [least, greatest] = [Math.min(...values), Math.max(...values)];
  const room = (greatest - least || Math.abs(greatest) || 1) * 0.08;
  return [panel.fromZero && least >= 0 ? 0 : least - room, greatest + room];
}

/** Every moment that has something to read out, in order. */
export function momentsOf(panels: readonly Panel[], marks: readonly Mark[] = []): number[] {
  const moments = panels.flatMap(({ series }) =>
    series.flatMap(({ points = [], line = [] }) => [...points, ...line].map(({ at }) => at)),
  );
  return [...new Set([...moments, ...marks.map(({ at }) => at)])].sort((a, b) => a - b);
}

/** A mark in words, "water change, 130 L". */
export function markWords({ label, note }: Mark): string {
  return note === undefined ? label : `${label}, ${note}`;
}

/** The index of the moment that is nearest to an instant; -1 when there is none. */
export function nearestIndex(moments: readonly number[], instant: number): number {
  let best = -1;
  for (const [index, moment] of moments.entries()) {
    if (best < 0 || Math.abs(moment - instant) < Math.abs((moments[best] ?? 0) - instant)) best = index;
  }
  return best;
}
