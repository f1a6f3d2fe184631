import { computed, type ComputedRef } from 'vue';
import { USUAL_WATER_RULES, type WaterRules } from '@shared/domain/dosing-plan/rules.ts';
import { useWaterRules } from '@/queries/plans.ts';

/** The farm's rules of dosing; the usual ones until they are there, so that the bench works without a network. */
export function useBenchRules(): ComputedRef<WaterRules> {
  const { data } = useWaterRules();
  return computed(() => data.value ?? USUAL_WATER_RULES);
}
