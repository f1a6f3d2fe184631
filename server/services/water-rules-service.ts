import { eq } from 'drizzle-orm';
import type { ChangeWaterRules, WaterRuleSettings } from '../../shared/contracts/water-rules.ts';
import { farms } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { waterRules } from '../queries/water-rules.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';

/** Sets rules of the farm's own. They have a version of their own: the farm's other settings are edited elsewhere. */
export function changeWaterRules(write: Write, ifMatch: number, change: ChangeWaterRules): WaterRuleSettings {
  const row = farmOf(write.tx);
  const before = waterRules(row);
  assertVersion(before, ifMatch, before);
  const { version, ...rules } = before;
  const after = { ...rules, ...definedOnly(change), version: version + 1 };
  const { version: waterRulesVersion, ...kept } = after;
  const settings = { ...row.settings, waterRules: kept, waterRulesVersion };
  write.tx.update(farms).set({ settings }).where(eq(farms.id, row.id)).run();
  write.audit({ action: 'water_rules.changed', entity: 'farm', entityId: String(row.id), before, after });
  return after;
}
