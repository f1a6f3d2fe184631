import type { SystemPlan } from '@shared/contracts/plan.ts';
import type { useUnitChoicesStore } from '@/stores/unit-choices.ts';
import { adviceWords, amountText } from '@/views/water/plan-words.ts';

/** One means of a plan: what to give a day and what it brings. */
export interface PlanMeans {
  key: string;
  label: string;
  amount: string;
  bringsMeqL: number;
  look: 'lime' | 'other' | 'missing';
}

/** What brings the day's alkalinity, the limewater first; what nothing brings comes last. */
export function meansOfPlan({ advice }: SystemPlan, units: ReturnType<typeof useUnitChoicesStore>): PlanMeans[] {
  const words = adviceWords(units);
  const { limewater, supplements, shortMeqL } = advice;
  const lime: PlanMeans[] =
    limewater && limewater.limeGPerL > 0
      ? [
          {
            ...{ key: 'lime', label: 'Limewater', bringsMeqL: limewater.bringsMeqL, look: 'lime' },
            amount: `${words.litres(limewater.litresPerDay)} with ${words.grams(limewater.limeGPerL)} of lime${
              limewater.vinegarMlPerL > 0 ? ` and ${words.millilitres(limewater.vinegarMlPerL)} of vinegar` : ''
            } a litre`,
          },
        ]
      : [];
  const others = supplements.map(({ itemId, name, unit, amountPerDay, bringsMeqL }): PlanMeans => {
    return { key: itemId, label: name, amount: amountText(units, amountPerDay, unit), bringsMeqL, look: 'other' };
  });
  const missing: PlanMeans[] = advice.rules.includes('short')
    ? [{ key: 'missing', label: 'Missing', amount: 'no means of the farm', bringsMeqL: shortMeqL, look: 'missing' }]
    : [];
  return [...lime, ...others, ...missing];
}
