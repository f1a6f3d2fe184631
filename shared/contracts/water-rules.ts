import { z } from 'zod';
import { ruleValues, WATER_RULE_FACTS, type WaterRuleName, type WaterRules } from '../domain/dosing-plan/rules.ts';
import { version } from './common.ts';
import type { Endpoint } from './endpoint.ts';

const NAMES = Object.keys(WATER_RULE_FACTS) as WaterRuleName[]; // the record has just these keys
const WHOLE: readonly WaterRuleName[] = ['testsBeforeChange', 'steadyDays'];

/** A rule within its bounds, which its message names. */
function rule(name: WaterRuleName): z.ZodNumber {
  const { least, most } = WATER_RULE_FACTS[name];
  const number = z.number('Enter a number.').min(least, `At least ${least}.`).max(most, `At most ${most}.`);
  return WHOLE.includes(name) ? number.int('Enter a whole number.') : number;
}

const fields = Object.fromEntries(NAMES.map((name) => [name, rule(name)])) as Record<WaterRuleName, z.ZodNumber>; // every name has its rule

/** The farm's rules of dosing, alkalinity in meq/L. */
export const WaterRuleSettings = z.object({ ...fields, version });
export type WaterRuleSettings = WaterRules & { version: number };

export const ChangeWaterRules = z.strictObject(fields).partial();
export type ChangeWaterRules = z.infer<typeof ChangeWaterRules>;

/** The stored rules, each that is usable; the usual value for the rest. */
export function usableWaterRules(stored: unknown): WaterRules {
  const kept: Record<string, unknown> = typeof stored === 'object' && stored !== null ? { ...stored } : {};
  return ruleValues(({ usual }, name) => rule(name).safeParse(kept[name]).data ?? usual);
}

export const waterRuleEndpoints = {
  show: {
    method: 'get',
    path: '/api/water-rules',
    access: 'water.read',
    summary: 'The farm’s rules of dosing',
    response: WaterRuleSettings,
  },
  change: {
    method: 'patch',
    path: '/api/water-rules',
    access: 'water.configure',
    summary: 'Change the farm’s rules of dosing',
    body: ChangeWaterRules,
    response: WaterRuleSettings,
    edits: true,
  },
} as const satisfies Record<string, Endpoint>;
