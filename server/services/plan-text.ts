import type { SystemPlan } from '../../shared/contracts/plan.ts';
import { adviceSentence, adviceText, type AdviceWords } from '../../shared/domain/dosing-plan/advice-words.ts';
import { MEQ_PER_DKH } from '../../shared/domain/units.ts';

/** Words of what is kept and mailed, where nobody's own units are known. */
const WORDS: AdviceWords = {
  rate: (meqL) => `${(meqL / MEQ_PER_DKH).toFixed(2)} dKH`,
  level: (meqL) => `${(meqL / MEQ_PER_DKH).toFixed(1)} dKH`,
  litres: (amountL) => `${plain(amountL)} L`,
  grams: (amountG) => `${amountG.toFixed(2)} g`,
  millilitres: (amountMl) => `${amountMl.toFixed(1)} mL`,
  amount: (value, unit) => `${plain(value)} ${unit}`,
  ph: (value) => value.toFixed(2),
};

/** What an advice says, as text that is kept. */
export function adviceAsText({ advice, facts, rules, plan }: SystemPlan): string {
  return adviceText(adviceSentence(advice, { ...facts, plan }, rules, WORDS));
}

/** Three figures, which is more than anyone measures. */
function plain(value: number): string {
  return value >= 100 ? value.toFixed(0) : value.toPrecision(3).replace(/\.?0+$/, '');
}
