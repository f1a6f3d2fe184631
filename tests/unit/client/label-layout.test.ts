import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { layoutLabels, spreadHeights } from '../../../src/components/charts/label-layout.ts';
import { timeTicks } from '../../../src/components/charts/time-ticks.ts';

const WIDTH = 320;
const labels = fc.array(
  fc.record({ at: fc.integer({ min: 0, max: WIDTH }), width: fc.integer({ min: 5, max: 160 }) }),
  { maxLength: 25 },
);

describe('layoutLabels', () => {
  it('whatever the labels, none overlaps another of its row and none leaves the space', () => {
    fc.assert(
      fc.property(labels, (wanted) => {
        const placed = layoutLabels(wanted, { width: WIDTH, gap: 4 });
        const boxes = placed.map(({ start, row }, index) => ({ start, row, end: start + (wanted[index]?.width ?? 0) }));
        for (const [index, box] of boxes.entries()) {
          expect(box.start).toBeGreaterThanOrEqual(0);
          expect(box.end).toBeLessThanOrEqual(WIDTH);
          for (const other of boxes.slice(index + 1).filter(({ row }) => row === box.row)) {
            expect(box.end + 4 <= other.start || other.end + 4 <= box.start).toBe(true);
          }
        }
      }),
    );
  });

  it('when there is room, each label stands centred at its place in the first row', () => {
    const placed = layoutLabels(
      [
        { at: 200, width: 40 },
        { at: 50, width: 40 },
      ],
      { width: WIDTH },
    );

    expect(placed).toEqual([
      { start: 180, row: 0 },
      { start: 30, row: 0 },
    ]);
  });

  it('when a label is wider than the space, it starts at the edge and the layout ends', () => {
    expect(layoutLabels([{ at: 10, width: 500 }], { width: WIDTH })).toEqual([{ start: 0, row: 0 }]);
  });
});

describe('spreadHeights', () => {
  it('when line ends meet, keeps their order and a gap between their labels', () => {
    expect(spreadHeights([50, 48, 52], 10, 100)).toEqual([58, 48, 68]);
  });

  it('when they meet at the bottom, moves them up instead of out', () => {
    expect(spreadHeights([98, 99], 10, 100)).toEqual([90, 100]);
  });
});

describe('timeTicks', () => {
  it('starts each at midnight of the farm, also across a change of the clocks', () => {
    const from = Date.parse('2026-03-27T12:00:00Z');
    const to = Date.parse('2026-03-31T12:00:00Z');

    const ticks = timeTicks(from, to, 9, 'Europe/Berlin');

    expect(ticks.map(({ text }) => text)).toEqual(['28 Mar', '29 Mar', '30 Mar', '31 Mar']);
    expect(new Date(ticks[2]?.at ?? 0).toISOString()).toBe('2026-03-29T22:00:00.000Z');
  });

  it('when the span is long, takes wider steps and stays within the count', () => {
    const to = Date.parse('2026-12-01T12:00:00Z');

    expect(timeTicks(to - 540 * 86_400_000, to, 6, 'UTC').length).toBeLessThanOrEqual(6);
  });
});
