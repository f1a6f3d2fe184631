import { type ComputedRef, type Ref, computed, ref } from 'vue';
import { type Lane, type Panel, type Series, estimateAt, momentsOf, nearestIndex } from '@/components/charts/series.ts';
import type { Span } from '@/components/charts/zoom.ts';
import { THIN_SPACE, formatNumber } from '@/formatting/format-number.ts';
import { formatInstant } from '@/formatting/format-day.ts';

export interface ReadOut {
  /** Moments that can be read out in the part that is shown. */
  moments: ComputedRef<number[]>;
  /** Which moment is read out; -1 for none. */
  index: Ref<number>;
  at: ComputedRef<number | null>;
  /** When, and what there is to say. */
  words: ComputedRef<{ when: string; said: string[] } | null>;
  pointAt: (instant: number) => void;
  leave: () => void;
}

interface Source {
  panels: readonly Panel[];
  lanes: readonly Lane[];
  timeZone: string;
}

/** What a chart says about one moment, chosen by pointer, finger or keys. */
export function useReadOut(source: Source, span: Ref<Span>): ReadOut {
  const all = computed(() => momentsOf(source.panels, source.lanes));
  const moments = computed(() => all.value.filter((at) => at >= span.value[0] && at <= span.value[1]));
  // Kept as an instant, so that zooming does not move it to another moment.
  const chosen = ref<number | null>(null);
  const at = computed(() => (chosen.value !== null && moments.value.includes(chosen.value) ? chosen.value : null));
  const index = computed({
    get: () => (at.value === null ? -1 : moments.value.indexOf(at.value)),
    set: (value) => (chosen.value = moments.value[value] ?? null),
  });
  const words = computed(() => {
    const moment = at.value;
    if (moment === null) return null;
    const said = source.panels.flatMap(({ series }) => series.flatMap((each) => sayAt(each, moment)));
    const done = source.lanes.flatMap(({ label, marks }) =>
      marks.filter((mark) => mark.at === moment).map(({ note }) => (note === undefined ? label : `${label}: ${note}`)),
    );
    return { when: formatInstant(moment, source.timeZone), said: [...said, ...done] };
  });

  function pointAt(instant: number) {
    index.value = nearestIndex(moments.value, instant);
  }
  function leave() {
    chosen.value = null;
  }
  return { moments, index, at, words, pointAt, leave };
}

function sayAt(series: Series, moment: number): string[] {
  const { decimals, label } = series;
  const unit = series.unit === '' ? '' : `${THIN_SPACE}${series.unit}`;
  const number = (value: number) => formatNumber(value, { decimals });
  const point = series.points?.find((each) => each.at === moment);
  const estimate = estimateAt(series.line ?? [], moment) ?? estimateAt(series.ahead ?? [], moment);
  const bar = series.bars?.find(({ from, to }) => moment > from && moment <= to);
  const said: string[] = [];
  if (point) {
    const error = point.error === undefined ? '' : ` ± ${number(point.error)}`;
    const notes = [point.flag, point.signal, point.note].filter(Boolean).map((note) => `, ${note}`);
    said.push(`${label} ${number(point.value)}${error}${unit}${notes.join('')}`);
  }
  if (estimate) {
    const { low, high } = estimate;
    const band = low === undefined || high === undefined ? '' : ` (${number(low)} to ${number(high)})`;
    const isSecond = series.points !== undefined;
    said.push(`${label}${isSecond ? ', estimate' : ''} ${number(estimate.value)}${band}${unit}`);
  }
  if (bar) said.push(`${label} ${number(bar.value)}${unit}`);
  return said;
}
