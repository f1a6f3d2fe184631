import type { SystemPlan } from '@shared/contracts/plan.ts';
import { type AdvicePart, adviceSentence, type AdviceWords } from '@shared/domain/dosing-plan/advice-words.ts';
import { formatNumber } from '@/formatting/format-number.ts';
import type { useUnitChoicesStore } from '@/stores/unit-choices.ts';

type Units = ReturnType<typeof useUnitChoicesStore>;

/** Amounts of an advice in the units that the person chose. */
export function adviceWords(units: Units): AdviceWords {
  return {
    rate: (meqL) => units.say('alkalinity', meqL, { difference: true, decimals: decimalsOf(units) }),
    level: (meqL) => units.say('alkalinity', meqL),
    litres: (amountL) => units.say('volume', amountL, { decimals: amountL < 10 ? 1 : 0 }),
    grams: (amountG) => units.say('mass', amountG, { decimals: amountG < 10 ? 2 : 0 }),
    millilitres: (amountMl) => units.say('liquid', amountMl, { decimals: amountMl < 10 ? 1 : 0 }),
    amount: (value, unit) => amountText(units, value, unit),
    ph: (value) => formatNumber(value, { decimals: 2 }),
  };
}

/** An amount of a supply in its own unit, or in the person's where that is a weight or a volume. */
export function amountText(units: Units, value: number, unit: string): string {
  const decimals = value < 10 ? 1 : 0;
  if (unit === 'mL') return units.say('liquid', value, { decimals });
  if (unit === 'g') return units.say('mass', value, { decimals });
  return `${formatNumber(value, { decimals })} ${unit}`;
}

export function planSentence({ advice, facts, rules, plan }: SystemPlan, units: Units): AdvicePart[] {
  return adviceSentence(advice, { ...facts, plan }, rules, adviceWords(units));
}

function decimalsOf(units: Units): number {
  return units.unitFor('alkalinity') === 'ppm' ? 0 : 2;
}
