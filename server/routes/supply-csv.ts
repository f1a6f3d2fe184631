import type { Item, Lot, SUPPLY_TABLES, Use } from '../../shared/contracts/supplies.ts';
import { MICRO_PER_MAJOR, minorDigits } from '../../shared/domain/money.ts';
import type { Db } from '../db/client.ts';
import { csvFile, type CsvColumns } from '../http/csv-file.ts';
import type { FileAnswer } from '../file-answer.ts';
import { farmOf } from '../queries/farm.ts';
import { listItems } from '../queries/supply-items.ts';
import { allLots, allUses } from '../queries/supply-lots.ts';

/** A table of supplies as CSV; amounts in the item's unit, money in the farm's currency. */
export function supplyCsv(db: Db, table: (typeof SUPPLY_TABLES)[number], now: number): FileAnswer {
  const { currency } = farmOf(db);
  switch (table) {
    case 'items':
      return csvFile('supplies.csv', itemColumns(currency), listItems(db, { retired: 'no' }, now));
    case 'lots':
      return csvFile('supply-lots.csv', lotColumns(currency), allLots(db));
    case 'uses':
      return csvFile('supply-uses.csv', useColumns(currency), allUses(db));
  }
}

function itemColumns(currency: string): CsvColumns<Item> {
  return {
    code: (item) => item.code,
    name: (item) => item.name,
    kind: (item) => item.kind,
    unit: (item) => item.unit,
    on_hand: (item) => item.onHand,
    [`value_${currency}`]: (item) => item.onHandMicro / MICRO_PER_MAJOR,
    use_per_day: (item) => item.use.perDay,
    days_left: (item) => item.advice.daysLeft,
    order_by: (item) => item.advice.orderByDay,
    order_packs: (item) => item.advice.orderPacks,
    pack_size: (item) => item.packSize,
    lead_time_days: (item) => item.leadTimeDays,
    safety_days: (item) => item.safetyDays,
    supplier: (item) => item.supplierName,
    state: (item) => item.state,
  };
}

function lotColumns(currency: string): CsvColumns<Lot> {
  const major = 10 ** minorDigits(currency);
  return {
    item: (lot) => lot.itemCode,
    lot: (lot) => lot.code,
    received_on: (lot) => lot.receivedOn,
    expires_on: (lot) => lot.expiresOn,
    unit: (lot) => lot.unit,
    quantity: (lot) => lot.quantity,
    remaining: (lot) => lot.remaining,
    [`cost_${currency}`]: (lot) => lot.costMinor / major,
    [`remaining_cost_${currency}`]: (lot) => lot.remainingMicro / MICRO_PER_MAJOR,
    received_by: (lot) => lot.receivedBy,
  };
}

function useColumns(currency: string): CsvColumns<Use> {
  return {
    at: (use) => new Date(use.at).toISOString(),
    item: (use) => use.itemCode,
    lot: (use) => use.lotCode,
    unit: (use) => use.unit,
    quantity: (use) => use.quantity,
    [`cost_${currency}`]: (use) => use.costMicro / MICRO_PER_MAJOR,
    cause: (use) => use.cause,
    system: (use) => use.systemCode,
    by: (use) => use.by,
  };
}
