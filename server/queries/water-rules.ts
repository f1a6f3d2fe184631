import { usableWaterRules, type WaterRuleSettings } from '../../shared/contracts/water-rules.ts';
import type { FarmRow } from './farm.ts';

/** The farm's rules of dosing, from its settings `waterRules`; each the usual one until the farm sets its own. */
export function waterRules({ settings }: Pick<FarmRow, 'settings'>): WaterRuleSettings {
  const version = settings.waterRulesVersion;
  return { ...usableWaterRules(settings.waterRules), version: typeof version === 'number' ? version : 1 };
}
