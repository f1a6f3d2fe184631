import { describe, expect, it } from 'vitest';
import { solveLinear } from '../../../../server/outside/linear-solver.ts';
import { adviseDosing } from '../../../../shared/domain/dosing-plan/advice.ts';
import { adviceSentence, adviceText, type AdviceWords } from '../../../../shared/domain/dosing-plan/advice-words.ts';
import { ADVICE_RULES } from '../../../../shared/domain/dosing-plan/facts.ts';
import { ruleSentence } from '../../../../shared/domain/dosing-plan/rule-words.ts';
import { USUAL_WATER_RULES } from '../../../../shared/domain/dosing-plan/rules.ts';
import { MEQ_PER_DKH } from '../../../../shared/domain/units.ts';
import { adviceFacts, BICARBONATE, CALCIUM_CHLORIDE } from '../../../support/advice-facts.ts';

const rules = USUAL_WATER_RULES;
const words: AdviceWords = {
  rate: (meqL) => `${(meqL / MEQ_PER_DKH).toFixed(2)} dKH`,
  level: (meqL) => `${(meqL / MEQ_PER_DKH).toFixed(1)} dKH`,
  litres: (amountL) => `${amountL.toFixed(0)} L`,
  grams: (amountG) => `${amountG.toFixed(2)} g`,
  millilitres: (amountMl) => `${amountMl.toFixed(1)} mL`,
  amount: (value, unit) => `${value.toFixed(0)} ${unit}`,
  ph: (value) => value.toFixed(2),
};

function said(changes: Parameters<typeof adviceFacts>[0] = {}): string {
  const facts = adviceFacts(changes);
  const advice = adviseDosing(facts, rules, solveLinear);
  const plan = facts.plan && { strengthMeqL: facts.plan.strengthMeqL, limeGPerL: 1.2 };
  return adviceText(adviceSentence(advice, { ...facts, plan }, rules, words));
}

describe('the sentence of an advice', () => {
  it('when the strength should change, names the lime, the evaporation and the rest', () => {
    expect(said({ supplements: [BICARBONATE, CALCIUM_CHLORIDE], limewater: { onlineMeqL: 20 } })).toBe(
      'The corals take 1.12 dKH a day. Mix limewater with 1.02 g of lime a litre for the 20 L that evaporate a day, and dose 279 mL of Bicarbonate solution a day and 250 mL of Calcium solution a day.',
    );
  });

  it('when the level is too low, corrects first and holds meanwhile', () => {
    expect(said({ level: { meqL: 6.5 * MEQ_PER_DKH, error: 0.1 } })).toMatch(
      /^Correct first: alkalinity is 6\.5 dKH, below 7\.5 dKH\. Add \d+ mL of Bicarbonate solution a day for 2 days, up to 8\.3 dKH\. Meanwhile mix limewater with \d\.\d\d g of lime a litre/,
    );
  });

  it('when the level is too high, lets it fall', () => {
    expect(said({ level: { meqL: 10 * MEQ_PER_DKH, error: 0.1 } })).toMatch(
      /above 9\.0 dKH\. Let it fall 0\.\d\d dKH a day over 2 days\./,
    );
  });

  it.each([
    [
      'pause',
      { water: { ...adviceFacts().water, phNbs: 8.62 } },
      'Stop limewater: the pH reads 8.62, above your limit of 8.50.',
    ],
    ['wait_for_tests', { demand: null }, 'Test alkalinity: there is not enough to go by yet.'],
    ['wait_for_levels', { given: { limewater: null, others: 0, waterChanges: 0 } }, 'Log the level of the reservoir'],
    [
      'mix_plan',
      { plan: { strengthMeqL: 32, mixed: false } },
      'Mix the next reservoir with 1.20 g of lime a litre, as planned.',
    ],
    ['wait_after_change', { testsSinceChange: 1 }, 'there is one test since the last change, and 4 are needed'],
    [
      'hold',
      { given: { limewater: 0.4, others: 0, waterChanges: 0 } },
      'Leave it as it is: what goes in is what the corals take',
    ],
  ] satisfies [string, Parameters<typeof adviceFacts>[0], string][])('of %s says what to do', (_, changes, start) => {
    expect(said(changes)).toContain(start);
  });
});

describe('the sentence of a rule', () => {
  it.each(ADVICE_RULES)('of %s ends as a sentence and holds no gap', (rule) => {
    expect(ruleSentence(rule, rules)).toMatch(/^[A-Z].*[a-z.)]\.$/);
    expect(ruleSentence(rule, rules)).not.toMatch(/undefined|NaN/);
  });
});
