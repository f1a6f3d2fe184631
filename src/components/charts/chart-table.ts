import { type Day, dayOf, instantAt } from '@shared/domain/days.ts';
import { type Lane, type Panel, type Series, type SeriesPoint, estimateAt } from '@/components/charts/series.ts';
import type { Span } from '@/components/charts/zoom.ts';
import { formatNumber } from '@/formatting/format-number.ts';

/** A day of a chart in words: a cell for each series and each kind of act, in their order. */
export interface DayRow {
  day: Day;
  cells: string[];
}

const NOON = 12 * 60;

/** The heads of the cells, "Alkalinity, dKH". */
export function tableHeads(panels: readonly Panel[], lanes: readonly Lane[]): string[] {
  const series = panels
    .flatMap((panel) => panel.series)
    .map(({ label, unit }) => (unit === '' ? label : capital(`${label}, ${unit}`)));
  return [...series, ...lanes.map(({ label }) => capital(label))];
}

/** What a chart shows between two instants as rows of days, the newest first; days without anything are left out. */
export function dayRows(
  panels: readonly Panel[],
  lanes: readonly Lane[],
  [from, to]: Span,
  timeZone: string,
): DayRow[] {
  const within = ({ at }: { at: number }) => at >= from && at <= to;
  const series = panels.flatMap((panel) => panel.series);
  const columns = [
    ...series.map((each) => byDay((each.points ?? []).filter(within), timeZone, (point) => pointWords(each, point))),
    ...lanes.map(({ marks }) => byDay(marks.filter(within), timeZone, ({ note }) => note ?? 'done')),
  ];
  const lines = series.flatMap(({ line = [], ahead = [] }) => [...line, ...ahead].filter(within));
  const bars = series.flatMap(({ bars: drawn = [] }) => drawn.map((bar) => ({ at: bar.to })).filter(within));
  const days = new Set(columns.flatMap((column) => [...column.keys()]));
  for (const { at } of [...lines, ...bars]) days.add(dayOf(at, timeZone));
  return [...days]
    .sort()
    .reverse()
    .map((day) => ({
      day,
      cells: columns.map((column, index) => {
        const said = column.get(day);
        if (said) return said.join('; ');
        const own = series[index];
        return own ? estimateWords(own, instantAt(day, NOON, timeZone)) : '';
      }),
    }))
    .filter(({ cells }) => cells.some((cell) => cell !== ''));
}

function byDay<Item extends { at: number }>(
  items: readonly Item[],
  timeZone: string,
  say: (item: Item) => string,
): Map<Day, string[]> {
  const days = new Map<Day, string[]>();
  for (const item of items) {
    const day = dayOf(item.at, timeZone);
    days.set(day, [...(days.get(day) ?? []), say(item)]);
  }
  return days;
}

function pointWords({ decimals }: Series, { value, error, flag, signal }: SeriesPoint): string {
  const number = formatNumber(value, { decimals });
  const known = error === undefined ? number : `${number} ± ${formatNumber(error, { decimals })}`;
  const words = flag ?? signal;
  return words === undefined ? known : `${known} (${words})`;
}

/** Series that are estimated or hold over a time stand at noon of the day; tested ones only where they were tested. */
function estimateWords({ points, line = [], ahead = [], bars = [], decimals }: Series, noon: number): string {
  if (points !== undefined) return '';
  const number = (value: number) => formatNumber(value, { decimals });
  const bar = bars.find(({ from, to }) => noon > from && noon <= to);
  if (bar) return number(bar.value);
  const estimate = estimateAt(line, noon) ?? estimateAt(ahead, noon);
  if (!estimate) return '';
  const { value, low, high } = estimate;
  return low === undefined || high === undefined
    ? number(value)
    : `${number(value)} (${number(low)} to ${number(high)})`;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
