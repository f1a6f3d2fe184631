import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  SHORTEST_SPAN,
  type Span,
  clampSpan,
  isSameSpan,
  panSpan,
  pinchSpan,
  zoomSpan,
} from '../../../src/components/charts/zoom.ts';

const DAY = 86_400_000;
const YEAR: Span = [0, 365 * DAY];

const inside = fc
  .tuple(fc.integer({ min: 0, max: 364 }), fc.integer({ min: 1, max: 365 }))
  .map(([start, days]): Span => [start * DAY, Math.min(365, start + days) * DAY]);

function expectInside([from, to]: Span, [first, last]: Span) {
  expect(from).toBeGreaterThanOrEqual(first - 1);
  expect(to).toBeLessThanOrEqual(last + 1);
  expect(to - from).toBeGreaterThanOrEqual(SHORTEST_SPAN - 1);
}

describe('the part of a chart that is shown', () => {
  it('stays inside of the bounds and long enough to read, whatever is asked for', () => {
    const wild = fc.double({ min: -1e12, max: 1e12, noNaN: true });
    fc.assert(
      fc.property(wild, wild, (a, b) => {
        expectInside(clampSpan([Math.min(a, b), Math.max(a, b)], YEAR), YEAR);
      }),
    );
    fc.assert(
      fc.property(inside, fc.double({ min: 0.01, max: 100, noNaN: true }), (span, factor) => {
        expectInside(zoomSpan(span, YEAR, factor), YEAR);
      }),
    );
    fc.assert(
      fc.property(inside, fc.double({ min: -5, max: 5, noNaN: true }), (span, part) => {
        expectInside(panSpan(span, YEAR, part), YEAR);
      }),
    );
  });

  it('when zoomed, keeps the instant that was looked at where it is seen', () => {
    const [from, to] = zoomSpan([100 * DAY, 200 * DAY], YEAR, 0.5, 125 * DAY);

    expect([from / DAY, to / DAY]).toEqual([112.5, 162.5]);
    expect((125 * DAY - from) / (to - from)).toBeCloseTo(0.25, 12);
  });

  it('when zoomed in and out again by the same factor, is what it was', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 100, max: 200 }),
        fc.integer({ min: 10, max: 60 }),
        fc.double({ min: 0.2, max: 1, noNaN: true }),
        (start, days, factor) => {
          const span: Span = [start * DAY, (start + days) * DAY];
          expect(isSameSpan(zoomSpan(zoomSpan(span, YEAR, factor), YEAR, 1 / factor), span)).toBe(true);
        },
      ),
    );
  });

  it('when moved, keeps its length; at the end it stays there', () => {
    expect(panSpan([0, 30 * DAY], YEAR, 0.5)).toEqual([15 * DAY, 45 * DAY]);
    expect(panSpan([0, 30 * DAY], YEAR, -0.5)).toEqual([0, 30 * DAY]);
    expect(panSpan([330 * DAY, 360 * DAY], YEAR, 1)).toEqual([335 * DAY, 365 * DAY]);
  });

  it('when two fingers move, each keeps the instant that it took hold of', () => {
    const range: Span = [44, 344];
    const held: Span = [100 * DAY, 150 * DAY];
    const span = pinchSpan(held, [94, 294], range, YEAR);
    const px = (at: number) => range[0] + ((at - span[0]) / (span[1] - span[0])) * (range[1] - range[0]);

    expect(px(held[0])).toBeCloseTo(94, 9);
    expect(px(held[1])).toBeCloseTo(294, 9);
  });

  it('when two fingers meet or cross, shows the whole rather than nonsense', () => {
    expect(pinchSpan([10 * DAY, 20 * DAY], [100, 100.5], [44, 344], YEAR)).toEqual(YEAR);
    expect(pinchSpan([10 * DAY, 20 * DAY], [200, 100], [44, 344], YEAR)).toEqual(YEAR);
  });
});
