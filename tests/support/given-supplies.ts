import type { CreateItem, Receive } from '../../shared/contracts/supplies.ts';
import { createItem } from '../../server/services/supply-items.ts';
import { receive } from '../../server/services/supply-lots.ts';
import { useSupply, type SupplyUse } from '../../server/services/supply-use.ts';
import type { TestFarm } from './start-farm.ts';

let made = 0;

/** A sack of lime unless said otherwise. @returns the item's id */
export function givenItem(farm: TestFarm, fields: Partial<CreateItem> = {}): string {
  made += 1;
  return farm.write((write) =>
    createItem(write, {
      code: `ITEM-${made}`,
      name: 'Lime',
      kind: 'lime',
      unit: 'g',
      packSize: 1000,
      leadTimeDays: 7,
      safetyDays: 7,
      strength: 0.95,
      ...fields,
    }),
  );
}

/** Glue, counted in grams and without a strength. @returns the item's id */
export function givenGlue(farm: TestFarm, fields: Partial<CreateItem> = {}): string {
  return givenItem(farm, { name: 'Gel glue', kind: 'glue', unit: 'g', packSize: 300, strength: null, ...fields });
}

/** A received lot: 1,000 units for 10.00 unless said otherwise. @returns the lot's id */
export function givenLot(farm: TestFarm, itemId: string, fields: Partial<Omit<Receive, 'itemId'>> = {}): string {
  return farm.write((write) => receive(write, { itemId, code: 'L1', quantity: 1000, costMinor: 1000, ...fields }));
}

/** Takes from the item's lots. @returns the cost in micro-units */
export function givenUse(
  farm: TestFarm,
  itemId: string,
  quantity: number,
  fields: Partial<Omit<SupplyUse, 'itemId' | 'quantity'>> = {},
): number {
  return farm.write((write) =>
    useSupply(write, { itemId, quantity, cause: 'dose', causeId: write.newId(), at: write.now, ...fields }),
  );
}
