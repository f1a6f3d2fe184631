import type { CreateStockSolution } from '../../shared/contracts/stock-solutions.ts';
import type { StartDosing } from '../../shared/contracts/dosing.ts';
import { bookDosing } from '../../server/services/dosing-bookings.ts';
import { startDosing } from '../../server/services/dosing-service.ts';
import { calibratePump, createPump } from '../../server/services/pump-service.ts';
import { createStockSolution } from '../../server/services/stock-solution-service.ts';
import { givenItem, givenLot } from './given-supplies.ts';
import type { TestFarm } from './start-farm.ts';

let made = 0;

/** Sodium carbonate in store, 5 kg for 10.00. @returns the item's id */
export function givenPowder(farm: TestFarm, quantity = 5000): string {
  const itemId = givenItem(farm, { name: 'Sodium carbonate', kind: 'supplement', unit: 'g', strength: 18.87 });
  givenLot(farm, itemId, { quantity });
  return itemId;
}

/** A recipe of 105.988 g of sodium carbonate in a litre, 2 meq/mL, unless said otherwise. */
export function givenSolution(farm: TestFarm, powderId: string, fields: Partial<CreateStockSolution> = {}) {
  made += 1;
  return farm.write((write) =>
    createStockSolution(write, {
      ...{ code: `SOL-${made}`, name: `Solution ${made}`, litres: 1, note: '' },
      parts: [{ itemId: powderId, powder: 'sodium_carbonate', purity: 1, grams: 105.988 }],
      ...fields,
    }),
  );
}

/** A supplement of 2 meq/mL with a litre in store. @returns the item's id */
export function givenSupplement(farm: TestFarm, quantity = 1000): string {
  const itemId = givenItem(farm, { name: 'Alkalinity part', kind: 'supplement', unit: 'mL', strength: 2 });
  givenLot(farm, itemId, { quantity });
  return itemId;
}

/** @returns the pump's id */
export function givenPump(farm: TestFarm): string {
  made += 1;
  return farm.write((write) => createPump(write, { code: `P-${made}`, name: `Pump ${made}` }).id);
}

export function givenCalibration(
  farm: TestFarm,
  pumpId: string,
  measuredMl: number[],
  { at, adjusted = false }: { at?: number; adjusted?: boolean } = {},
) {
  return farm.write((write) =>
    calibratePump(write, pumpId, { askedMl: 10, measuredMl, adjusted, note: '', ...(at === undefined ? {} : { at }) }),
  );
}

/** 24 mL a day from now on unless said otherwise. @returns the running dose's id */
export function givenDosing(
  farm: TestFarm,
  systemId: string,
  itemId: string,
  fields: Partial<Omit<StartDosing, 'systemId' | 'itemId'>> = {},
): string {
  return farm.write((write) => startDosing(write, { systemId, itemId, amountPerDay: 24, note: '', ...fields }).id);
}

/** Books what ran up to now. */
export function givenBooked(farm: TestFarm): void {
  farm.write(bookDosing);
}
