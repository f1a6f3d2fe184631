import { refDebounced } from '@vueuse/core';
import { type Ref, computed } from 'vue';
import { MS_PER_DAY } from '@shared/domain/days.ts';
import type { DemandParameter } from '@shared/contracts/demand.ts';
import { PARAMETER_CODES, type ParameterCode } from '@shared/domain/units.ts';
import { type Lane, type Panel, momentsOf } from '@/components/charts/series.ts';
import type { Span } from '@/components/charts/zoom.ts';
import { type TimelineWish, useTimeline } from '@/queries/timeline.ts';
import { useSystemDemand } from '@/queries/water.ts';
import { useUnitChoicesStore } from '@/stores/unit-choices.ts';
import { limitedPanels } from '@/views/water/control-panels.ts';
import { actLanes, demandPanel, limewaterPanel, readingPanel } from '@/views/water/system-panels.ts';
import type { ChartChoices } from '@/views/water/use-chart-choices.ts';

/** The longest history of demand that the server tells. */
const MOST_DEMAND_DAYS = 365;
/** What is to come takes a fifth of the picture at most. */
const AHEAD_PART = 0.25;
const SETTLE_MS = 250;

/** What the chart of a system draws: its data, made ready for what was chosen. */
export function useSystemChart(systemId: () => string, { days, shown, limits }: ChartChoices, view: Ref<Span | null>) {
  const units = useUnitChoicesStore();
  const parameters = computed(() => PARAMETER_CODES.filter((code) => shown.value.includes(code)));
  /** From the start of a day in UTC, so that one question serves the whole day. */
  const whole = computed<TimelineWish>(() => ({
    from: Math.floor(Date.now() / MS_PER_DAY) * MS_PER_DAY - days.value * MS_PER_DAY,
    parameters: parameters.value,
  }));
  const { data: timeline, error, isLoading, refetch } = useTimeline(systemId, whole);
  const demandOf = (parameter: DemandParameter) =>
    useSystemDemand(
      () => (parameter === 'alkalinity' || shown.value.includes(parameter) ? systemId() : undefined),
      () => Math.min(days.value, MOST_DEMAND_DAYS),
      parameter,
    ).data;
  const [demand, calcium, magnesium] = [demandOf('alkalinity'), demandOf('calcium'), demandOf('magnesium')];
  const estimates = computed(() =>
    [demand.value, calcium.value, magnesium.value].flatMap((each) => (each ? [each] : [])),
  );

  /** Where readings were left out, a closer look asks for all of those in the part. */
  const isThin = computed(() => timeline.value?.series.some(({ points, total }) => points.length < total) ?? false);
  const settledView = refDebounced(view, SETTLE_MS);
  const closer = computed<TimelineWish | null>(() => {
    if (!isThin.value || !settledView.value) return null;
    const [from, to] = settledView.value;
    return { from: Math.round(from), to: Math.round(to), parameters: parameters.value };
  });
  const { data: part } = useTimeline(systemId, closer);
  const drawn = computed(() => (closer.value && part.value ? part.value : timeline.value));

  const readings = computed(() => {
    const estimateOf = (code: ParameterCode) => estimates.value.find(({ parameter }) => parameter === code);
    return drawn.value?.series.map((each) => readingPanel(each, units, estimateOf(each.parameter))) ?? [];
  });
  /** Demands of the parameters that are shown; of alkalinity where none of them has one. */
  const demands = computed(() => {
    if (!shown.value.includes('demand')) return [];
    const told = estimates.value.filter(({ history }) => history.length > 1);
    const own = told.filter(({ parameter }) => shown.value.includes(parameter));
    return own.length > 0 ? own : told.slice(0, 1);
  });
  /** Limits stand on every reading of the period, so a thinned one has none. */
  const limited = computed(() => {
    const first = readings.value[0];
    if (!first || limits.value === 'band' || isThin.value) return null;
    return limitedPanels(first, limits.value);
  });
  const panels = computed<Panel[]>(() => {
    const list = limited.value ? [...limited.value.panels, ...readings.value.slice(1)] : [...readings.value];
    if (shown.value.includes('limewater') && timeline.value && timeline.value.limewater.length > 0) {
      list.push(limewaterPanel(timeline.value.limewater, units));
    }
    list.push(...demands.value.map((each) => demandPanel(each, units)));
    return list;
  });
  const lanes = computed<Lane[]>(() =>
    shown.value.includes('acts') && timeline.value ? actLanes(timeline.value, units) : [],
  );

  /** A young system's chart starts where its records do. */
  const from = computed(() => {
    const first = momentsOf(readings.value, lanes.value)[0] ?? 0;
    const { from: asked = 0, to: now = 0 } = timeline.value ?? {};
    return first - asked > (now - asked) / 8 ? first - MS_PER_DAY : asked;
  });
  const to = computed(() => {
    const now = timeline.value?.to ?? 0;
    const last = Math.max(now, ...demands.value.flatMap(({ forecast }) => forecast.map(({ at }) => at)));
    return Math.max(now, Math.min(last, now + (now - from.value) * AHEAD_PART));
  });

  return { timeline, demand, error, isLoading, refetch, whole, isThin, limited, panels, lanes, from, to };
}
