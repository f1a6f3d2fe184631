import { ewmaChart, individualsChart, runSignals } from '@shared/domain/control-charts.ts';
import type { Panel, Series, SeriesPoint } from '@/components/charts/series.ts';
import { formatNumber } from '@/formatting/format-number.ts';

export const LIMIT_CHOICES = [
  { value: 'band', title: 'Target band' },
  { value: 'individuals', title: 'Limits of single values' },
  { value: 'ewma', title: 'Limits of the moving average' },
] as const;
export type LimitChoice = (typeof LIMIT_CHOICES)[number]['value'];

/** Limits from fewer values would move with each new one. */
const FEWEST_VALUES = 8;
const WEIGHT = 0.3;

/** A panel with its limits, and how those were made. */
export interface Limited {
  panels: Panel[];
  made: { label: string; value: string }[];
}

/**
 * A panel of readings with the limits inside of which they stay while nothing special happens, or null where too few
 * readings are there to tell. Flagged readings are left out.
 */
export function limitedPanels(panel: Panel, choice: Exclude<LimitChoice, 'band'>): Limited | null {
  const series = panel.series[0];
  const points = series?.points ?? [];
  const counted = points.filter(({ flag }) => flag === undefined);
  if (!series || counted.length < FEWEST_VALUES) return null;
  const values = counted.map(({ value }) => value);
  const chart = individualsChart(values);
  // Readings that never differ leave no room for limits.
  if (!(chart.sigma > 0)) return null;
  const number = (value: number) => formatNumber(value, { decimals: series.decimals + 1 });
  const made = [
    { label: 'Readings', value: String(values.length) },
    { label: 'Mean', value: `${number(chart.mean)} ${series.unit}` },
    { label: 'Mean moving range', value: number(chart.meanMovingRange) },
    { label: 'Sigma, from it by 1.128', value: number(chart.sigma) },
  ];
  const single = { series, points, counted, chart, number };
  if (choice === 'individuals') return { panels: individualPanels(panel, single), made };
  return {
    panels: [ewmaPanel(panel, single)],
    made: [...made, { label: 'Weight of the newest', value: String(WEIGHT) }],
  };
}

interface Single {
  series: Series;
  points: readonly SeriesPoint[];
  /** Those that limits are made from. */
  counted: readonly SeriesPoint[];
  chart: ReturnType<typeof individualsChart>;
  number: (value: number) => string;
}

function individualPanels(panel: Panel, { series, points, counted, chart, number }: Single): Panel[] {
  const values = counted.map(({ value }) => value);
  const rules = new Map<number, string>();
  for (const { index, rule } of runSignals(values, chart)) {
    const at = counted[index]?.at;
    if (at !== undefined && !rules.has(at)) rules.set(at, rule);
  }
  const ranges = counted.slice(1).map(({ at }, index): SeriesPoint => {
    const value = chart.movingRanges[index] ?? 0;
    return { at, value, ...(value > chart.movingRangeHigh ? { signal: 'beyond its limit' } : {}) };
  });
  return [
    {
      key: panel.key,
      series: [{ ...series, line: [], points: points.map((point) => signalled(point, rules.get(point.at))) }],
      rules: [
        { kind: 'limit', value: chart.high, label: `upper limit ${number(chart.high)}` },
        { kind: 'centre', value: chart.mean, label: `mean ${number(chart.mean)}` },
        { kind: 'limit', value: chart.low, label: `lower limit ${number(chart.low)}` },
      ],
    },
    {
      ...{ key: `${panel.key} moving range`, fromZero: true },
      series: [{ ...series, ...{ key: 'range', label: 'moving range', tone: 'slate' }, line: [], points: ranges }],
      rules: [
        { kind: 'limit', value: chart.movingRangeHigh, label: `upper limit ${number(chart.movingRangeHigh)}` },
        { kind: 'centre', value: chart.meanMovingRange, label: `mean ${number(chart.meanMovingRange)}` },
      ],
    },
  ];
}

/** The line is the moving average; the band around the mean are its limits. */
function ewmaPanel(panel: Panel, { series, points, counted, chart, number }: Single): Panel {
  const values = counted.map(({ value }) => value);
  const averages = ewmaChart(values, { target: chart.mean, sigma: chart.sigma, weight: WEIGHT });
  const out = new Map<number, string>();
  counted.forEach(({ at }, index) => {
    if (averages[index]?.isOut) out.set(at, 'moving average beyond its limit');
  });
  return {
    key: panel.key,
    series: [
      {
        ...series,
        label: `${series.label}, moving average within its limits`,
        points: points.map((point) => signalled(point, out.get(point.at))),
        line: averages.map(({ value, low, high }, index) => ({ at: counted[index]?.at ?? 0, value, low, high })),
      },
    ],
    rules: [{ kind: 'centre', value: chart.mean, label: `mean ${number(chart.mean)}` }],
  };
}

function signalled(point: SeriesPoint, signal: string | undefined): SeriesPoint {
  return signal === undefined ? point : { ...point, signal };
}
