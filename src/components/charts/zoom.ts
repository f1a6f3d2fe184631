import { MS_PER_DAY } from '@shared/domain/days.ts';

/** A stretch of time, epoch ms. */
export type Span = readonly [from: number, to: number];

/** Nothing of a farm's water happens faster than can be seen in half a day. */
export const SHORTEST_SPAN = MS_PER_DAY / 2;

/** The span moved, and where it must be cut, so that it lies inside of the bounds and is not too short to read. */
export function clampSpan([from, to]: Span, [first, last]: Span, shortest: number = SHORTEST_SPAN): Span {
  const whole = last - first;
  const length = Math.min(whole, Math.max(Math.min(shortest, whole), to - from));
  const middle = (from + to) / 2;
  const start = Math.min(Math.max(first, length === to - from ? from : middle - length / 2), last - length);
  return [start, start + length];
}

/** The span made longer or shorter by a factor; the instant `around` stays where it is seen. */
export function zoomSpan([from, to]: Span, bounds: Span, factor: number, around: number = (from + to) / 2): Span {
  return clampSpan([around - (around - from) * factor, around + (to - around) * factor], bounds);
}

/** The span moved by a part of its own length; later for parts above zero. */
export function panSpan([from, to]: Span, bounds: Span, part: number): Span {
  const by = (to - from) * part;
  return clampSpan([from + by, to + by], bounds);
}

/**
 * The span under two fingers: each instant stays under the finger that took hold of it.
 *
 * @param held the instants that the fingers took hold of
 * @param fingers where the fingers are now, px
 * @param range where the drawing starts and ends, px
 */
export function pinchSpan(held: Span, fingers: Span, range: Span, bounds: Span): Span {
  const apart = fingers[1] - fingers[0];
  // Fingers that meet or cross say nothing about a length.
  if (Math.abs(apart) < 1 || Math.sign(apart) !== Math.sign(held[1] - held[0])) return clampSpan(bounds, bounds);
  const msPerPx = (held[1] - held[0]) / apart;
  return clampSpan([held[0] + (range[0] - fingers[0]) * msPerPx, held[0] + (range[1] - fingers[0]) * msPerPx], bounds);
}

/** Whether two spans look the same: within a thousandth of their length. */
export function isSameSpan(a: Span, b: Span): boolean {
  const slack = (b[1] - b[0]) / 1000;
  return Math.abs(a[0] - b[0]) <= slack && Math.abs(a[1] - b[1]) <= slack;
}
