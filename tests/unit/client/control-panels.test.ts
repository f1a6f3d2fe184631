import { expect, it } from 'vitest';
import type { Panel, SeriesPoint } from '../../../src/components/charts/series.ts';
import { limitedPanels } from '../../../src/views/water/control-panels.ts';

const panelOf = (points: SeriesPoint[]): Panel => ({
  key: 'flow',
  band: { min: 0, max: 100 },
  series: [{ ...{ key: 'flow', label: 'flow', unit: 'L', tone: 'plum', decimals: 1 }, points }],
});
const valuesOf = (values: readonly number[]) => values.map((value, day): SeriesPoint => ({ at: day, value }));

// Flow rates of ten batches, NIST/SEMATECH e-Handbook of Statistical Methods, 6.3.2.2: mean 50.81, limits 45.8159 and 55.8041.
const FLOW = [49.6, 47.6, 49.9, 51.3, 47.8, 51.2, 52.6, 52.4, 53.6, 52.1];

it('when limits of single values are asked for, the handbook’s mean and limits are drawn, and a second panel of ranges', () => {
  const limited = limitedPanels(panelOf(valuesOf(FLOW)), 'individuals');

  expect(limited?.panels).toHaveLength(2);
  expect(limited?.panels[0]?.rules?.map(({ value }) => Number(value.toFixed(2)))).toEqual([55.8, 50.81, 45.82]);
  expect(limited?.panels[0]?.band).toBeUndefined();
  expect(limited?.panels[1]?.series[0]?.points).toHaveLength(9);
});

it('when a reading lies beyond the limits, it says so', () => {
  const points = limitedPanels(panelOf(valuesOf([...FLOW, 75])), 'individuals')?.panels[0]?.series[0]?.points ?? [];

  expect(points.at(-1)?.signal).toBe('beyond 3 sigma');
  expect(points[0]?.signal).toBeUndefined();
});

it('when the moving average is asked for, it runs within limits that widen from the start', () => {
  const line = limitedPanels(panelOf(valuesOf(FLOW)), 'ewma')?.panels[0]?.series[0]?.line ?? [];
  const widths = line.map(({ low = 0, high = 0 }) => high - low);

  expect(widths).toHaveLength(10);
  expect(widths).toEqual([...widths].sort((a, b) => a - b));
});

it('when a reading is flagged, it stays in the picture and out of the limits', () => {
  const flagged: SeriesPoint = { at: 99, value: 500, flag: 'flagged' };
  const with_ = limitedPanels(panelOf([...valuesOf(FLOW), flagged]), 'individuals');

  expect(with_?.panels[0]?.rules).toEqual(limitedPanels(panelOf(valuesOf(FLOW)), 'individuals')?.panels[0]?.rules);
  expect(with_?.panels[0]?.series[0]?.points).toContainEqual(flagged);
});

it.each([
  ['too few readings', FLOW.slice(0, 7)],
  ['readings that never differ', Array.from({ length: 12 }, () => 8)],
])('when there are %s, there are no limits', (_, values) => {
  expect(limitedPanels(panelOf(valuesOf(values)), 'individuals')).toBeNull();
});
