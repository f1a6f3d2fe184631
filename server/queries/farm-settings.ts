import type { FarmSettings } from '../../shared/contracts/farm.ts';
import type { Db } from '../db/client.ts';
import { orders } from '../db/schema/index.ts';
import { type FarmRow, farmOf } from './farm.ts';
import { holdMinutes } from './order-settings.ts';

/** The farm's settings as the owner sees them. */
export function farmSettings(db: Db): FarmSettings {
  return toFarmSettings(farmOf(db), hasOrders(db));
}

/** Whether amounts in the farm's currency were promised to anyone yet. */
export function hasOrders(db: Db): boolean {
  return db.select({ id: orders.id }).from(orders).limit(1).get() !== undefined;
}

export function toFarmSettings(row: FarmRow, currencyLocked: boolean): FarmSettings {
  const { name, timeZone, currency, address, email, phone, version } = row;
  // The column holds hundredths of a percent, so that tax is reckoned in whole numbers.
  const taxPercent = row.taxPercent / 100;
  return {
    ...{ name, timeZone, currency, currencyLocked, address, email, phone, taxPercent },
    ...{ holdMinutes: holdMinutes(row), version },
  };
}
