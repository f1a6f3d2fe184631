import type { Tone } from '@/components/tone.ts';
import type { Span } from '@/components/charts/zoom.ts';

/** A measured value with its error, drawn as a ringed dot with a bar. */
export interface SeriesPoint {
  at: number;
  value: number;
  error?: number;
  /** Words for the read-out, such as the method. */
  note?: string;
  /** A word for a reading that stands apart; it is drawn apart and does not stretch the scale. */
  flag?: string;
  /** What a control chart says of it; it is drawn filled. */
  signal?: string;
}

/** An estimate with its 95 % band. */
export interface LinePoint {
  at: number;
  value: number;
  low?: number;
  high?: number;
}

/** An amount that holds over a stretch of time, such as litres a day. */
export interface Bar {
  from: number;
  to: number;
  value: number;
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
  /** A line that goes on beyond what is known. */
  ahead?: readonly LinePoint[];
  bars?: readonly Bar[];
}

/** A level across the whole picture, such as a control limit, named at its end. */
export interface Rule {
  value: number;
  label: string;
  /** A centre is drawn whole, a limit dashed. */
  kind: 'centre' | 'limit';
}

/** Series that share a scale, one panel above another over the same days. */
export interface Panel {
  key: string;
  series: readonly Series[];
  /** The target band. */
  band?: { min: number; max: number };
  rules?: readonly Rule[];
  height?: number;
  /** The scale starts at zero: for rates and amounts. */
  fromZero?: boolean;
}

/** Something that was done at an instant. */
export interface Mark {
  at: number;
  /** More about this one, for the read-out. */
  note?: string;
}

export type MarkShape = 'triangle' | 'diamond' | 'post';

/** Acts of one kind, marked along the days. */
export interface Lane {
  key: string;
  label: string;
  tone: Tone;
  shape: MarkShape;
  marks: readonly Mark[];
}

const within = ([from, to]: Span, at: number) => at >= from && at <= to;

/** The least and greatest value that a panel must show between two instants. */
export function rangeOf(panel: Panel, span: Span): [number, number] {
  const values = panel.series.flatMap((series) => valuesOf(series, span));
  if (panel.band) values.push(panel.band.min, panel.band.max);
  values.push(...(panel.rules ?? []).map(({ value }) => value));
  if (panel.fromZero) values.push(0);
  if (values.length === 0) return [0, 1];
  const [least, greatest] = [Math.min(...values), Math.max(...values)];
  const room = (greatest - least || Math.abs(greatest) || 1) * 0.08;
  return [panel.fromZero && least >= 0 ? 0 : least - room, greatest + room];
}

function valuesOf({ points = [], line = [], ahead = [], bars = [] }: Series, span: Span): number[] {
  return [
    ...points
      .filter(({ at, flag }) => flag === undefined && within(span, at))
      .flatMap(({ value, error = 0 }) => [value - error, value + error]),
    ...[...visible(line, span), ...visible(ahead, span)].flatMap(({ value, low = value, high = value }) => [low, high]),
    ...bars.filter(({ from, to }) => to >= span[0] && from <= span[1]).map(({ value }) => value),
  ];
}

/** What lies in a span, with the neighbour at each side, so that lines reach the edges. Items in order of time. */
export function visible<Item extends { at: number }>(items: readonly Item[], [from, to]: Span): readonly Item[] {
  let first = items.findIndex(({ at }) => at >= from);
  if (first < 0) first = items.length;
  let end = items.findIndex(({ at }) => at > to);
  if (end < 0) end = items.length;
  return items.slice(Math.max(0, first - 1), end + 1);
}

/** Every moment that has something to read out, in order: tests and acts, and estimates where nobody tested. */
export function momentsOf(panels: readonly Panel[], lanes: readonly Lane[] = []): number[] {
  const all = panels.flatMap(({ series }) => series);
  const tested = all.flatMap(({ points = [] }) => points.map(({ at }) => at));
  const acts = lanes.flatMap(({ marks }) => marks.map(({ at }) => at));
  const last = Math.max(...tested);
  const estimated = all
    .flatMap(({ line = [], ahead = [] }) => [...line, ...ahead].map(({ at }) => at))
    .filter((at) => tested.length === 0 || at > last);
  const drawn = tested.length === 0 ? all.flatMap(({ bars = [] }) => bars.map(({ to }) => to)) : [];
  return [...new Set([...tested, ...acts, ...estimated, ...drawn])].sort((a, b) => a - b);
}

/** The estimate at an instant, between its two neighbours; null outside of the line. */
export function estimateAt(line: readonly LinePoint[], at: number): LinePoint | null {
  const next = line.findIndex((each) => each.at >= at);
  const after = line[next];
  if (!after) return null;
  const before = line[next - 1];
  if (after.at === at || !before) return after.at === at ? after : null;
  const part = (at - before.at) / (after.at - before.at);
  const between = (a: number, b: number) => a + (b - a) * part;
  return {
    ...{ at, value: between(before.value, after.value) },
    ...(before.low === undefined || after.low === undefined ? {} : { low: between(before.low, after.low) }),
    ...(before.high === undefined || after.high === undefined ? {} : { high: between(before.high, after.high) }),
  };
}

/** The index of the moment that is nearest to an instant; -1 when there is none. Moments are in order. */
export function nearestIndex(moments: readonly number[], instant: number): number {
  let best = -1;
  for (const [index, moment] of moments.entries()) {
    if (best < 0 || Math.abs(moment - instant) < Math.abs((moments[best] ?? 0) - instant)) best = index;
  }
  return best;
}
