import type { WaterState } from '../dose-effect.ts';
import type { Steadiness } from '../steady-test.ts';

/** A supplement of the farm's list. */
export interface SupplementFact {
  itemId: string;
  name: string;
  unit: string;
  /** What one unit brings. */
  alkalinityMeq: number;
  calciumMg: number;
  /** Price of one unit, micro-units of the farm's currency; null where no receipt tells. */
  cost: number | null;
}

export interface LimewaterFact {
  /** Strength of what is online, meq/L; null with nothing online. */
  onlineMeqL: number | null;
  /** Temperature that the limewater is mixed at, °C. */
  temperatureC: number;
  /** Part of the lime that is calcium hydroxide. */
  purity: number;
  /** Acid of the farm's vinegar, % w/v; null where it has none. */
  acidPercent: number | null;
  /** Price of a gram and of a millilitre, micro-units; null where no receipt tells. */
  limeCost: number | null;
  vinegarCost: number | null;
}

/** All that advice on a system's dosing is based on. Rates are meq/L of the system a day. */
export interface AdviceFacts {
  netVolumeL: number;
  /** Where alkalinity should stay; null where the system has no band. */
  band: { low: number; high: number } | null;
  /** Alkalinity now, with half of its 95 % interval. */
  level: { meqL: number; error: number } | null;
  demand: { meqLPerDay: number; low: number; high: number } | null;
  /** What it is given as things stand; limewater null where its use is not known. */
  given: { limewater: number | null; others: number; waterChanges: number };
  steady: Steadiness;
  /** Alkalinity tests since the dosing last changed. */
  testsSinceChange: number;
  water: WaterState;
  /** Parts of the water that no recent test tells, so that a usual value stands in. */
  assumed: (keyof WaterState)[];
  evaporationLPerDay: number | null;
  /** Null where the system has no reservoir. */
  limewater: LimewaterFact | null;
  supplements: SupplementFact[];
  /** The plan that runs, and whether what is online was mixed by it. */
  plan: { strengthMeqL: number; mixed: boolean } | null;
}

export const ADVICE_KINDS = [
  'pause',
  'correct_low',
  'correct_high',
  'wait_for_tests',
  'wait_for_levels',
  'mix_plan',
  'start',
  'hold',
  'wait_after_change',
  'change',
] as const;
/**
 * What to do: stop until the water is within limits; correct first; wait until there is enough to go by; mix what was
 * decided; begin; leave it as it is; wait for the effect of the last change; change.
 */
export type AdviceKind = (typeof ADVICE_KINDS)[number];

export const ADVICE_RULES = [
  'correct_first',
  'start_strength',
  'small_step',
  'enough_tests',
  'steady',
  'within_error',
  'saturation',
  'ph_limit',
  'omega_limit',
  'night',
  'second_method',
  'evaporation',
  'calcium_drift',
  'short',
  'no_supplement',
  'ph_assumed',
  'water_doubtful',
  'price_unknown',
] as const;
/** What the advice followed or ran into. */
export type AdviceRule = (typeof ADVICE_RULES)[number];

export interface LimewaterAdvice {
  litresPerDay: number;
  strengthMeqL: number;
  limeGPerL: number;
  vinegarMlPerL: number;
  bringsMeqL: number;
  /** Hours of the day in which it goes in. */
  hours: 12 | 24;
}

export interface SupplementAdvice {
  itemId: string;
  name: string;
  unit: string;
  amountPerDay: number;
  bringsMeqL: number;
}

export interface CorrectionAdvice {
  from: number;
  to: number;
  days: number;
  /** Change in a day; below zero where it is left to fall. */
  changePerDay: number;
  /** What is dosed for it on top; null where it is left to fall, or where no supplement raises alkalinity. */
  supplement: (SupplementAdvice & { total: number }) | null;
}

/** Advice on one system's dosing. */
export interface Advice {
  kind: AdviceKind;
  rules: AdviceRule[];
  /** What is to be dosed a day where the advice names amounts. */
  targetMeqL: number | null;
  limewater: LimewaterAdvice | null;
  supplements: SupplementAdvice[];
  correction: CorrectionAdvice | null;
  /** What no means of the farm can bring, meq/L a day. */
  shortMeqL: number;
  /** How much calcium would drift beyond the rule, mg/L a day. */
  calciumDriftMgL: number;
  /** Demand as part of what saturated limewater can carry at today's evaporation. */
  ceilingShare: number | null;
  /** Micro-units of the farm's currency; null where a price is not known. */
  costPerDayMicro: number | null;
}
