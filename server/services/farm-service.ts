import { eq } from 'drizzle-orm';
import type { ChangeFarm, FarmSettings } from '../../shared/contracts/farm.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Write } from '../db/write.ts';
import { farms } from '../db/schema/index.ts';
import { farmOf } from '../queries/farm.ts';
import { hasOrders, toFarmSettings } from '../queries/farm-settings.ts';
import { assertVersion } from './edit-check.ts';
import { assertCurrency, assertTimeZone } from './farm-checks.ts';

/**
 * Changes the farm's settings.
 * @throws {DomainError} `edit.stale`; `input.invalid` at the field; `rule.refused` for another currency once there are
 *   orders
 */
export function changeFarm(write: Write, change: ChangeFarm, ifMatch: number): FarmSettings {
  const row = farmOf(write.tx);
  const currencyLocked = hasOrders(write.tx);
  const before = toFarmSettings(row, currencyLocked);
  assertVersion(row, ifMatch, before);

  const settings = {
    name: change.name ?? before.name,
    timeZone: change.timeZone ?? before.timeZone,
    currency: change.currency ?? before.currency,
    address: change.address ?? before.address,
    email: change.email ?? before.email,
    phone: change.phone ?? before.phone,
    taxPercent: Math.round((change.taxPercent ?? before.taxPercent) * 100),
    settings: { ...row.settings, holdMinutes: change.holdMinutes ?? before.holdMinutes },
  };
  assertTimeZone(settings.timeZone);
  assertCurrency(settings.currency);
  if (currencyLocked && settings.currency !== before.currency) throw currencyIsLocked();

  const changed = write.tx
    .update(farms)
    .set({ ...settings, version: row.version + 1 })
    .where(eq(farms.id, row.id))
    .returning()
    .get();
  const after = toFarmSettings(changed, currencyLocked);
  write.audit({ action: 'farm.changed', entity: 'farm', entityId: String(row.id), before, after });
  return after;
}

function currencyIsLocked(): DomainError {
  const message = 'There are orders in the old currency already, so it stays as it is.';
  return new DomainError('rule.refused', message, { fields: [{ path: 'currency', message }] });
}
