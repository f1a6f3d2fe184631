import { area, curveMonotoneX, line } from 'd3-shape';
import { textWidth } from '@/components/charts/label-layout.ts';
import { type Bar, type LinePoint, type Series, type SeriesPoint, visible } from '@/components/charts/series.ts';
import type { Span } from '@/components/charts/zoom.ts';

type Scale = (value: number) => number;

export interface Plot {
  x: Scale;
  y: Scale;
  span: Span;
  /** Where the drawing starts and ends across, and its height, px. */
  left: number;
  right: number;
  height: number;
}

/** A reading that stands apart, with its word. */
export interface FlagMark {
  at: number;
  cx: number;
  cy: number;
  /** Left out where the word before it would be written over; the read-out says it too. */
  word: string | null;
}

export interface DrawnSeries {
  line: string;
  band: string;
  ahead: string;
  aheadBand: string;
  /** The areas under the bars, and their upper edges. */
  bars: string;
  barTops: string;
  dots: string;
  /** Readings that a control chart points at. */
  signals: string;
  errors: string;
  flags: FlagMark[];
}

const FLAG_FONT = 12;
const FLAG_WORD_GAP = 12;
const RADIUS = 2.6;
const DENSE_RADIUS = 1.5;
/** Error bars that stand closer than this, px, would only make a grey cloud. */
const LEAST_BAR_GAP = 5;

/** Everything of a series as a few paths: a thousand dots cost one element. */
export function drawSeries(series: Series, plot: Plot): DrawnSeries {
  const seen = visible(series.points ?? [], plot.span);
  const plain = seen.filter(({ flag }) => flag === undefined);
  const dense = plain.length > (plot.right - plot.left) / LEAST_BAR_GAP;
  const dotsOf = (fits: (point: SeriesPoint) => boolean) =>
    plain
      .filter(fits)
      .map((point) => dotPath(point, dense ? DENSE_RADIUS : RADIUS, plot))
      .join('');
  const known = visible(series.line ?? [], plot.span);
  const ahead = visible(series.ahead ?? [], plot.span);
  const bars = (series.bars ?? []).filter(({ from, to }) => to >= plot.span[0] && from <= plot.span[1]);
  return {
    ...{ line: linePath(known, plot), band: bandPath(known, plot) },
    ...{ ahead: linePath(ahead, plot), aheadBand: bandPath(ahead, plot) },
    bars: bars.map((bar) => barPath(bar, plot)).join(''),
    barTops: bars.map((bar) => barTop(bar, plot)).join(''),
    dots: dotsOf(({ signal }) => signal === undefined),
    signals: dotsOf(({ signal }) => signal !== undefined),
    errors: dense ? '' : plain.map((point) => errorPath(point, plot)).join(''),
    flags: flagMarks(seen, plot),
  };
}

function linePath(points: readonly LinePoint[], { x, y }: Plot): string {
  const draw = line<LinePoint>(
    (each) => x(each.at),
    (each) => y(each.value),
  ).curve(curveMonotoneX);
  return draw([...points]) ?? '';
}

function bandPath(points: readonly LinePoint[], { x, y }: Plot): string {
  const draw = area<LinePoint>(
    (each) => x(each.at),
    (each) => y(each.low ?? each.value),
    (each) => y(each.high ?? each.value),
  ).curve(curveMonotoneX);
  return draw(points.filter(({ low, high }) => low !== undefined && high !== undefined)) ?? '';
}

function barPath(bar: Bar, plot: Plot): string {
  return `${barTop(bar, plot)}V${round(plot.y(0))}H${sidesOf(bar, plot)[0]}Z`;
}

function barTop(bar: Bar, plot: Plot): string {
  const [start, end] = sidesOf(bar, plot);
  return `M${start} ${round(plot.y(bar.value))}H${end}`;
}

/** Where a bar starts and ends across, as far as it is in sight. */
function sidesOf({ from, to }: Bar, { x, span }: Plot): [number, number] {
  return [round(x(Math.max(from, span[0]))), round(x(Math.min(to, span[1])))];
}

function dotPath({ at, value }: SeriesPoint, radius: number, { x, y }: Plot): string {
  return `M${round(x(at) - radius)} ${round(y(value))}a${radius} ${radius} 0 1 0 ${2 * radius} 0a${radius} ${radius} 0 1 0 ${-2 * radius} 0`;
}

function errorPath({ at, value, error }: SeriesPoint, { x, y }: Plot): string {
  return error === undefined ? '' : `M${round(x(at))} ${round(y(value + error))}V${round(y(value - error))}`;
}

/** Readings that stand apart; one far off the scale stands at its edge. */
function flagMarks(points: readonly SeriesPoint[], { x, y, height }: Plot): FlagMark[] {
  let free = -Infinity;
  return points.flatMap(({ at, value, flag }) => {
    if (flag === undefined) return [];
    const cx = x(at);
    const word = cx >= free ? flag : null;
    if (word !== null) free = cx + FLAG_WORD_GAP + textWidth(word, FLAG_FONT);
    return [{ at, word, cx, cy: Math.min(Math.max(y(value), 5), height - 5) }];
  });
}

function round(px: number): number {
  return Math.round(px * 10) / 10;
}
