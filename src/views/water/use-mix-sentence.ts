import { type ComputedRef, type Ref, computed } from 'vue';
import type { Reservoir } from '@shared/contracts/reservoirs.ts';
import { systemTitle } from '@shared/domain/system-title.ts';
import { useUnitChoicesStore } from '@/stores/unit-choices.ts';
import type { HoldingMix } from '@/views/water/holding-mix.ts';

/** What to mix, and what it is for. */
export function useMixSentence(
  reservoir: Ref<Reservoir | undefined>,
  {
    holding,
    isPlanned,
    limeG,
  }: { holding: Ref<HoldingMix | null>; isPlanned: Ref<boolean>; limeG: Ref<number | null> },
): ComputedRef<string | null> {
  const units = useUnitChoicesStore();
  const grams = (value: number) => units.say('mass', value, { decimals: 0 });

  return computed(() => {
    if (!reservoir.value) return null;
    const system = systemTitle({ code: reservoir.value.systemCode, name: reservoir.value.systemName });
    if (isPlanned.value && limeG.value !== null)
      return `The plan for ${system} asks for ${grams(limeG.value)} of lime here.`;
    if (!holding.value) {
      return `What would hold ${system} is not known yet: log alkalinity tests and the levels of its reservoirs. Start at half strength.`;
    }
    const { limeG: held, vinegarMl, holds } = holding.value;
    const vinegar = vinegarMl > 0 ? ` and ${units.say('liquid', vinegarMl, { decimals: 0 })} of vinegar` : '';
    return holds
      ? `${grams(held)} of lime${vinegar} would hold the alkalinity of ${system} at what it takes and evaporates now.`
      : `Even ${grams(held)} of lime${vinegar} do not hold ${system}: it takes more than limewater can carry.`;
  });
}
