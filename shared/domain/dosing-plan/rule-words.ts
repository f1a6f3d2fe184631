import type { AdviceRule } from './facts.ts';
import type { WaterRules } from './rules.ts';

/** Why advice is as it is: each rule that it followed or ran into, in a sentence. */
export function ruleSentence(rule: AdviceRule, rules: WaterRules): string {
  const percent = (part: number) => `${Math.round(part * 100)} %`;
  switch (rule) {
    case 'correct_first':
      return 'Correct first, then hold: limewater holds a level, it can’t set one right.';
    case 'start_strength':
      return `A system new to limewater starts at ${percent(rules.startStrength)} of saturation.`;
    case 'small_step':
      return `The strength rises by at most ${percent(rules.strengthStep)} of saturation at a time.`;
    case 'enough_tests':
      return `Change again only after ${rules.testsBeforeChange} tests, which show what the last change did.`;
    case 'steady':
      return `No trend over ${rules.steadyDays} days of tests: what is dosed is right.`;
    case 'within_error':
      return 'A difference within the error of the tests is no reason to change.';
    case 'saturation':
      return 'The limewater is saturated: more lime would only settle.';
    case 'ph_limit':
      return `No dose may lift the pH above ${rules.phLimit.toFixed(2)}, or by more than ${rules.phRise.toFixed(2)} in an hour.`;
    case 'omega_limit':
      return `Aragonite saturation must stay under ${rules.omegaLimit.toFixed(1)}: above it chalk drops out.`;
    case 'night':
      return `From a pH of ${rules.nightPh.toFixed(2)} on limewater goes in at night, when the pH is lower.`;
    case 'second_method':
      return `From ${percent(rules.secondMethodAt)} of what limewater can carry a second method is worth planning.`;
    case 'evaporation':
      return 'How much evaporates is not known, so limewater is left out: log the level of the reservoir.';
    case 'calcium_drift':
      return `No means keeps calcium within ${rules.calciumDriftMgL.toFixed(1)} mg/L a day of balance: test it, or add a calcium supplement.`;
    case 'short':
      return 'All means together bring less than the corals take.';
    case 'no_supplement':
      return 'No supplement of the list raises alkalinity: add one with its strength under Supplies.';
    case 'ph_assumed':
      return 'No recent pH: a usual one stands in. Test it before you dose more.';
    case 'water_doubtful':
      return 'The latest tests can’t all be true of one water, so no limit could be worked out: test again.';
    case 'price_unknown':
      return 'Not every price is known, so what has none comes last and no cost is told.';
  }
}
