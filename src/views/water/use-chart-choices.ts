import { type WritableComputedRef, computed } from 'vue';
import { useRoute, useRouter } from 'vue-router';
import { PARAMETERS, type ParameterCode } from '@shared/domain/units.ts';
import { LIMIT_CHOICES, type LimitChoice } from '@/views/water/control-panels.ts';

/** Beside the parameters a chart can show what was done, what was drawn, and what the corals took. */
const OTHERS = [
  { key: 'acts', label: 'Doses and changes' },
  { key: 'limewater', label: 'Limewater' },
  { key: 'demand', label: 'Demand' },
] as const;

export type Shown = ParameterCode | (typeof OTHERS)[number]['key'];

export const SHOWN_CHOICES: readonly { key: Shown; label: string }[] = [
  ...PARAMETERS.map(({ code, label }) => ({ key: code, label })),
  ...OTHERS,
];

export const CHART_DAYS = [
  { value: 7, title: '7 days' },
  { value: 30, title: '30 days' },
  { value: 90, title: '90 days' },
  { value: 365, title: '1 year' },
  { value: 1096, title: '3 years' },
];

const USUAL_SHOWN: readonly Shown[] = ['alkalinity', 'acts', 'limewater', 'demand'];
const USUAL_DAYS = 90;

export interface ChartChoices {
  days: WritableComputedRef<number>;
  /** What is shown, in the order in which it is drawn. */
  shown: WritableComputedRef<readonly Shown[]>;
  /** Which limits the first parameter is seen against. */
  limits: WritableComputedRef<LimitChoice>;
}

/** What a chart shows is part of the page's address, so that it can be sent to someone. */
export function useChartChoices(): ChartChoices {
  const route = useRoute();
  const router = useRouter();
  const put = (query: Record<string, string>) => {
    void router.replace({ query: { ...route.query, ...query } });
  };
  const days = computed({
    get: () => CHART_DAYS.find(({ value }) => String(value) === route.query.days)?.value ?? USUAL_DAYS,
    set: (value) => {
      put({ days: String(value) });
    },
  });
  const shown = computed<readonly Shown[]>({
    get: () => {
      if (typeof route.query.show !== 'string') return USUAL_SHOWN;
      const asked = route.query.show.split(',');
      return SHOWN_CHOICES.map(({ key }) => key).filter((key) => asked.includes(key));
    },
    set: (value) => {
      put({ show: value.join(',') });
    },
  });
  const limits = computed<LimitChoice>({
    get: () => LIMIT_CHOICES.find(({ value }) => value === route.query.limits)?.value ?? 'band',
    set: (value) => {
      put({ limits: value });
    },
  });
  return { days, shown, limits };
}
