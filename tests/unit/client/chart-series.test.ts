import { scaleLinear } from 'd3-scale';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dayRows, tableHeads } from '../../../src/components/charts/chart-table.ts';
import {
  type Lane,
  type Panel,
  type Series,
  estimateAt,
  momentsOf,
  rangeOf,
  visible,
} from '../../../src/components/charts/series.ts';
import { stackOf } from '../../../src/components/charts/stack.ts';
import { valueTicks } from '../../../src/components/charts/value-ticks.ts';
import { timeTicks } from '../../../src/components/charts/time-ticks.ts';

const DAY = 86_400_000;
const START = Date.UTC(2026, 2, 1);
const at = (days: number) => START + days * DAY;

const aSeries = (fields: Partial<Series> = {}): Series => ({
  ...{ key: 'alkalinity', label: 'alkalinity', unit: 'dKH', tone: 'plum', decimals: 1 },
  ...fields,
});
const aPanel = (fields: Partial<Series> = {}, panel: Partial<Panel> = {}): Panel => ({
  ...{ key: 'alkalinity', series: [aSeries(fields)] },
  ...panel,
});
const aLane = (marks: Lane['marks']): Lane => ({
  ...{ key: 'changes', label: 'water change', tone: 'slate', shape: 'triangle', marks },
});

describe('the scale of a panel', () => {
  it('holds every shown value with its error and the target band', () => {
    const panel = aPanel({ points: [{ at: at(0), value: 8, error: 0.3 }] }, { band: { min: 7.5, max: 9 } });

    const [least, greatest] = rangeOf(panel, [at(-1), at(1)]);

    expect(least).toBeLessThan(7.5);
    expect(greatest).toBeGreaterThan(9);
  });

  it('when a reading is flagged, is not stretched by it', () => {
    const plain = aPanel({ points: [{ at: at(0), value: 8 }] });
    const flagged = aPanel({
      points: [
        { at: at(0), value: 8 },
        { at: at(1), value: 83, flag: 'flagged' },
      ],
    });

    expect(rangeOf(flagged, [at(0), at(2)])).toEqual(rangeOf(plain, [at(0), at(2)]));
  });

  it('when zoomed, follows the values that are in sight', () => {
    const panel = aPanel({
      points: [
        { at: at(0), value: 2 },
        { at: at(10), value: 8 },
      ],
    });

    expect(rangeOf(panel, [at(9), at(11)])[0]).toBeGreaterThan(7);
  });

  it('when nothing is in sight, is still a scale', () => {
    expect(rangeOf(aPanel({ points: [] }), [at(0), at(1)])).toEqual([0, 1]);
  });
});

describe('the words beside a scale', () => {
  it('are round, two or more, and told apart by their decimals, whatever the scale', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -5000, max: 5000, noNaN: true }),
        fc.double({ min: 0.001, max: 3000, noNaN: true }),
        fc.integer({ min: 2, max: 4 }),
        (least, length, wanted) => {
          const ticks = valueTicks(scaleLinear([least, least + length], [96, 0]), wanted);
          expect(ticks.length).toBeGreaterThan(1);
          expect(new Set(ticks.map(({ text }) => text)).size).toBe(ticks.length);
        },
      ),
    );
  });
});

describe('what is drawn and read out', () => {
  it('keeps one neighbour at each side, so that lines reach the edges', () => {
    const points = [0, 1, 2, 3, 4, 5].map((day) => ({ at: at(day) }));

    expect(visible(points, [at(1.5), at(3.5)]).map((each) => (each.at - START) / DAY)).toEqual([1, 2, 3, 4]);
    expect(visible(points, [at(8), at(9)])).toEqual([points.at(-1)]);
  });

  it('an estimate between two points lies between their values', () => {
    fc.assert(
      fc.property(
        ...([fc.double({ min: -9, max: 9, noNaN: true }), fc.double({ min: -9, max: 9, noNaN: true })] as const),
        fc.double({ min: 0.01, max: 0.99, noNaN: true }),
        (a, b, part) => {
          const line = [
            { at: at(0), value: a, low: a - 1, high: a + 1 },
            { at: at(1), value: b, low: b - 1, high: b + 1 },
          ];
          const found = estimateAt(line, at(part));
          expect(found?.value).toBeGreaterThanOrEqual(Math.min(a, b) - 1e-9);
          expect(found?.value).toBeLessThanOrEqual(Math.max(a, b) + 1e-9);
          expect((found?.high ?? 0) - (found?.low ?? 0)).toBeCloseTo(2, 9);
        },
      ),
    );
  });

  it('an estimate is not told outside of its line', () => {
    const line = [
      { at: at(0), value: 1 },
      { at: at(1), value: 2 },
    ];

    expect(estimateAt(line, at(-0.1))).toBeNull();
    expect(estimateAt(line, at(1.1))).toBeNull();
    expect(estimateAt(line, at(0))?.value).toBe(1);
  });

  it('moments are tests and acts, then what is expected after the last test', () => {
    const tested = aPanel({ points: [{ at: at(1), value: 8 }] });
    const expected = aPanel({
      line: [
        { at: at(0.5), value: 1 },
        { at: at(2), value: 1 },
      ],
    });

    expect(momentsOf([tested, expected], [aLane([{ at: at(0) }])])).toEqual([at(0), at(1), at(2)]);
  });
});

describe('the same as a table', () => {
  const panels = [
    aPanel({
      points: [
        { at: at(0.4), value: 8.31, error: 0.3 },
        { at: at(0.7), value: 83, flag: 'flagged' },
      ],
    }),
    aPanel({
      ...{ key: 'demand', label: 'demand', unit: 'dKH a day', decimals: 2 },
      line: [
        { at: at(0), value: 1, low: 0.9, high: 1.1 },
        { at: at(2), value: 2, low: 1.9, high: 2.1 },
      ],
    }),
  ];
  const lanes = [aLane([{ at: at(1.5), note: '130 L' }])];

  it('has a row for each day, the newest first, with errors, flags, estimates and acts', () => {
    const rows = dayRows(panels, lanes, [at(0), at(2)], 'UTC');

    expect(tableHeads(panels, lanes)).toEqual(['Alkalinity, dKH', 'Demand, dKH a day', 'Water change']);
    expect(rows).toEqual([
      { day: '2026-03-02', cells: ['', '1.75 (1.65 to 1.85)', '130 L'] },
      { day: '2026-03-01', cells: ['8.3 ± 0.3; 83.0 (flagged)', '1.25 (1.15 to 1.35)', ''] },
    ]);
  });

  it('when a part is shown, holds that part alone', () => {
    expect(dayRows(panels, lanes, [at(1), at(1.9)], 'UTC').map(({ day }) => day)).toEqual(['2026-03-02']);
  });
});

describe('how panels stack', () => {
  it('panels and lanes follow one another without touching', () => {
    const { panels, lanes, height } = stackOf([aPanel(), aPanel({}, { height: 72 })], [aLane([]), aLane([])]);
    const tops = [panels[0], ...lanes, panels[1]].map((each) => each?.top ?? 0);

    expect(tops).toEqual([...tops].sort((a, b) => a - b));
    expect(lanes[0]?.top).toBeGreaterThan((panels[0]?.top ?? 0) + (panels[0]?.height ?? 0));
    expect(height).toBe((panels[1]?.top ?? 0) + 72);
  });
});

describe('the words under the time axis', () => {
  const zone = 'Europe/Lisbon';
  it.each([
    ['a day and a half', 1.5, /^(?:\d\d:\d\d|\d+ [A-Z][a-z]{2})$/],
    ['a quarter', 90, /^\d+ [A-Z][a-z]{2}$/],
    ['three years', 1096, /^[A-Z][a-z]{2} \d{4}$/],
  ])('for %s, are few, in order, inside and of one kind', (_, days, form) => {
    const ticks = timeTicks(at(0), at(days), 6, zone);

    expect(ticks.length).toBeGreaterThan(1);
    expect(ticks.length).toBeLessThanOrEqual(7);
    for (const tick of ticks) {
      expect(tick.text).toMatch(form);
      expect(tick.at).toBeGreaterThanOrEqual(at(0));
      expect(tick.at).toBeLessThanOrEqual(at(days));
    }
  });

  it('when the clock changes, midnight stays midnight on the farm', () => {
    // Europe/Lisbon goes to summer time on 29 March 2026 at 01:00 UTC.
    const ticks = timeTicks(Date.UTC(2026, 2, 28), Date.UTC(2026, 2, 31), 10, zone);

    expect(ticks.map(({ at: instant }) => new Date(instant).toISOString())).toEqual([
      '2026-03-28T00:00:00.000Z',
      '2026-03-29T00:00:00.000Z',
      '2026-03-29T23:00:00.000Z',
      '2026-03-30T23:00:00.000Z',
    ]);
  });
});
