import { type ComputedRef, type Ref, computed, ref } from 'vue';
import { type Mark, type Panel, type Series, markWords, momentsOf, nearestIndex } from '@/components/charts/series.ts';
import { THIN_SPACE, formatNumber } from '@/formatting/format-number.ts';
import { formatInstant } from '@/formatting/format-day.ts';

export interface ReadOut {
  moments: ComputedRef<number[]>;
  /** Which moment is read out; -1 for none. */
  index: Ref<number>;
  at: ComputedRef<number | null>;
  text: ComputedRef<string>;
  pointAt: (instant: number) => void;
  leave: () => void;
}

/** What a chart says about one moment, chosen by pointer, finger or keys. */
export function useReadOut(source: { panels: Panel[]; marks: Mark[]; timeZone: string }): ReadOut {
  const moments = computed(() => momentsOf(source.panels, source.marks));
  const index = ref(-1);
  const at = computed(() => moments.value[index.value] ?? null);

  const text = computed(() => {
    if (at.value === null) return '';
    const moment = at.value;
    const said = source.panels.flatMap(({ series }) => series.flatMap((each) => sayAt(each, moment)));
    const done = source.marks.filter((mark) => mark.at === moment).map(markWords);
    return `${formatInstant(moment, source.timeZone)}: ${[...said, ...done].join('; ')}`;
  });

  function pointAt(instant: number) {
    index.value = nearestIndex(moments.value, instant);
  }
  function leave() {
    index.value = -1;
  }
  return { moments, index, at, text, pointAt, leave };
}

function sayAt(series: Series, moment: number): string[] {
  const { decimals, unit, label } = series;
  const number = (value: number) => formatNumber(value, { decimals });
  const point = series.points?.find((each) => each.at === moment);
  const estimate = series.line?.find((each) => each.at === moment);
  const said: string[] = [];
  if (point) {
    const error = point.error === undefined ? '' : ` ± ${number(point.error)}`;
    said.push(`${label} ${number(point.value)}${error}${THIN_SPACE}${unit}${point.note ? `, ${point.note}` : ''}`);
  }
  if (estimate) {
    const { low, high } = estimate;
    const band = low === undefined || high === undefined ? '' : ` (${number(low)} to ${number(high)})`;
    said.push(`${label}${point ? ', estimate' : ''} ${number(estimate.value)}${band}${THIN_SPACE}${unit}`);
  }
  return said;
}
