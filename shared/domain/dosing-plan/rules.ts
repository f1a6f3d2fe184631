import { MEQ_PER_DKH } from '../units/water.ts';

/** The farm's own rules of dosing. Alkalinity in meq/L. */
export interface WaterRules {
  /** Strength to begin with, part of saturation. */
  startStrength: number;
  /** The most that the strength rises at a time, part of saturation. */
  strengthStep: number;
  /** Alkalinity tests after a change before the next one. */
  testsBeforeChange: number;
  /** Window of the steady test, days. */
  steadyDays: number;
  /** What the level may change over that window and still count as steady. */
  steadyToleranceMeqL: number;
  /** The most that a correction raises or lowers the level in a day. */
  mostChangePerDayMeqL: number;
  /** pH (NBS) that no dose may pass, and that holds dosing while the water is above it. */
  phLimit: number;
  /** The most that the pH rises within an hour of dosing. */
  phRise: number;
  /** Aragonite saturation that no dose may pass. */
  omegaLimit: number;
  /** From this pH on limewater is dosed at night only. */
  nightPh: number;
  /** The most vinegar in a litre of limewater, mL of 5 %. */
  mostVinegarMlPerL: number;
  /** Part of what limewater can carry from which a second method is worth planning. */
  secondMethodAt: number;
  /** How far calcium may drift in a day for want of a balanced mix, mg/L. */
  calciumDriftMgL: number;
}

export type WaterRuleName = keyof WaterRules;

/** How a rule is shown and bounded. */
export interface WaterRuleFact {
  label: string;
  /** The quantity whose unit people choose; null for plain numbers, whose unit stands in `unit`. */
  quantity: 'alkalinity' | null;
  unit: string;
  usual: number;
  least: number;
  most: number;
  decimals: number;
  /** Why there is such a rule, and where its number comes from. */
  reason: string;
}

const PRACTICE = 'Common practice, no source.';

export const WATER_RULE_FACTS: Readonly<Record<WaterRuleName, WaterRuleFact>> = {
  startStrength: {
    ...{ label: 'Strength to begin with', quantity: null, unit: 'of saturation', decimals: 2 },
    ...{ usual: 0.5, least: 0.1, most: 1 },
    reason: `A system new to limewater shows how it takes it before it gets all of it. ${PRACTICE}`,
  },
  strengthStep: {
    ...{ label: 'Largest step up in strength', quantity: null, unit: 'of saturation', decimals: 2 },
    ...{ usual: 0.15, least: 0.02, most: 1 },
    reason: `Small steps show their effect before the next one. Steps down are not held back. ${PRACTICE}`,
  },
  testsBeforeChange: {
    ...{ label: 'Tests after a change before the next', quantity: null, unit: 'tests', decimals: 0 },
    ...{ usual: 4, least: 2, most: 30 },
    reason: `Fewer can’t tell the effect from the error of the tests. ${PRACTICE}`,
  },
  steadyDays: {
    ...{ label: 'Days that make a level steady', quantity: null, unit: 'days', decimals: 0 },
    ...{ usual: 21, least: 7, most: 90 },
    reason: `Three weeks of tests without a trend: what is dosed is right, so leave it. ${PRACTICE}`,
  },
  steadyToleranceMeqL: {
    ...{ label: 'Change over those days that counts as steady', quantity: 'alkalinity', unit: '', decimals: 2 },
    ...{ usual: 0.5 * MEQ_PER_DKH, least: 0.02, most: 2 },
    reason: `About the error of two tests; a smaller change is no change. ${PRACTICE}`,
  },
  mostChangePerDayMeqL: {
    ...{ label: 'Largest correction in a day', quantity: 'alkalinity', unit: '', decimals: 2 },
    ...{ usual: 1.4 * MEQ_PER_DKH, least: 0.05, most: 2 },
    reason: `Corals bear a slow change better than a fast one. ${PRACTICE}`,
  },
  phLimit: {
    ...{ label: 'Highest pH', quantity: null, unit: 'pH (NBS)', decimals: 2 },
    ...{ usual: 8.5, least: 8, most: 9 },
    reason: `Above it limewater stops until the pH has come down. ${PRACTICE}`,
  },
  phRise: {
    ...{ label: 'Largest rise of pH in an hour', quantity: null, unit: 'pH', decimals: 2 },
    ...{ usual: 0.2, least: 0.02, most: 0.5 },
    reason: `A steeper rise burns tissue near the inlet. ${PRACTICE}`,
  },
  omegaLimit: {
    ...{ label: 'Highest aragonite saturation', quantity: null, unit: 'Ω', decimals: 1 },
    ...{ usual: 7, least: 4, most: 10 },
    reason:
      'Above about 7 chalk drops out and takes more alkalinity than was given (Moras et al. 2022, Biogeosciences 19:3537).',
  },
  nightPh: {
    ...{ label: 'Dose at night from a pH of', quantity: null, unit: 'pH (NBS)', decimals: 2 },
    ...{ usual: 8.35, least: 7.8, most: 9 },
    reason: `At night the pH falls, so the same dose lifts it less high. ${PRACTICE}`,
  },
  mostVinegarMlPerL: {
    ...{ label: 'Most vinegar in a litre of limewater', quantity: null, unit: 'mL of 5 %', decimals: 1 },
    ...{ usual: 5, least: 0, most: 12 },
    reason: `It is a dose of carbon too: oxygen falls and slime may grow. ${PRACTICE}`,
  },
  secondMethodAt: {
    ...{ label: 'Plan a second method from', quantity: null, unit: 'of what limewater carries', decimals: 2 },
    ...{ usual: 0.9, least: 0.5, most: 1 },
    reason: `Evaporation falls in damp weather just when corals grow best. ${PRACTICE}`,
  },
  calciumDriftMgL: {
    ...{ label: 'Drift of calcium that is left alone', quantity: null, unit: 'mg/L a day', decimals: 1 },
    ...{ usual: 0.3, least: 0, most: 10 },
    reason: `About 10 mg/L in a month, the error of one test. ${PRACTICE}`,
  },
};

const NAMES = Object.keys(WATER_RULE_FACTS) as WaterRuleName[]; // the record above has just these keys

/** The rules that hold until a farm sets its own. */
export const USUAL_WATER_RULES: WaterRules = ruleValues(({ usual }) => usual);

/** One value for each rule. */
export function ruleValues(valueOf: (fact: WaterRuleFact, name: WaterRuleName) => number): WaterRules {
  // Every name gets a value, which the type of `fromEntries` can't tell.
  return Object.fromEntries(
    NAMES.map((name) => [name, valueOf(WATER_RULE_FACTS[name], name)]),
  ) as unknown as WaterRules;
}
