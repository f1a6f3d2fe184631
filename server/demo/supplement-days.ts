import type { CreateStockSolution } from '../../shared/contracts/stock-solutions.ts';
import { MS_PER_DAY, MS_PER_HOUR } from '../../shared/domain/days.ts';
import type { PowderCode } from '../../shared/domain/stock-solutions.ts';
import type { Actor, Write } from '../db/write.ts';
import { bookDosing } from '../services/dosing-bookings.ts';
import { startDosing } from '../services/dosing-service.ts';
import { calibratePump, createPump } from '../services/pump-service.ts';
import { createStockSolution, makeSolution } from '../services/stock-solution-service.ts';
import { createItem } from '../services/supply-items.ts';
import { receive } from '../services/supply-lots.ts';
import type { World } from './world.ts';

/** The broodstock's magnesium is held by a pump; so little that the water's alkalinity knows nothing of it. */
const DOSED_SYSTEM = 'E';
const DOSED_ML_A_DAY = 25;
const DOSED_DAYS = 38;

interface Powder {
  code: string;
  name: string;
  powder: PowderCode;
  kg: number;
  costMinor: number;
}

const POWDERS: readonly Powder[] = [
  { code: 'CARB', name: 'Sodium carbonate', powder: 'sodium_carbonate', kg: 10, costMinor: 2900 },
  { code: 'CACL2', name: 'Calcium chloride dihydrate', powder: 'calcium_chloride_dihydrate', kg: 10, costMinor: 3400 },
  { code: 'MGCL2', name: 'Magnesium chloride', powder: 'magnesium_chloride_hexahydrate', kg: 10, costMinor: 3100 },
];

/** Recipes of 5 L, balanced so that equal volumes of the first two make calcium carbonate. */
const RECIPES = [
  {
    code: 'PART-A',
    name: 'Alkalinity part',
    powder: 'sodium_carbonate',
    grams: 495,
    note: 'Never beside the calcium part.',
  },
  { code: 'PART-C', name: 'Calcium part', powder: 'calcium_chloride_dihydrate', grams: 687, note: '' },
  { code: 'PART-M', name: 'Magnesium part', powder: 'magnesium_chloride_hexahydrate', grams: 1960, note: '' },
] as const;
const RECIPE_L = 5;

/** Checks of the pump: so many days before the end, what came of 10 mL, and whether it was set right by it. */
const CHECKS = [
  { before: 96, came: [10.1, 9.9, 10.0], adjusted: false },
  { before: 52, came: [8.7, 8.8, 8.6], adjusted: true },
  { before: 6, came: [9.7, 9.6, 9.8], adjusted: false },
];

/** Puts recipes, a calibrated pump and one steady dose on the agenda. */
export function planSupplements(world: World): void {
  // Ids of its own leave those of the rest of the farm as they are.
  const ids = world.chance('supplement ids');
  const put = (daysBefore: number, actor: Actor, act: (write: Write) => void) => {
    const at = Math.round(world.now - daysBefore * MS_PER_DAY - 3 * MS_PER_HOUR);
    world.agenda.put(at, actor, (write) => act({ ...write, newId: () => ids.uuid() }));
  };
  if (world.days.length <= (CHECKS[0]?.before ?? 0) + 5) return;
  const { owner, grower } = world.staff;
  const made: { solutions: Map<string, { id: string; itemId: string }>; pumpId: string } = {
    ...{ solutions: new Map(), pumpId: '' },
  };
  put(100, owner, (write) => {
    made.solutions = writeRecipes(write);
    made.pumpId = createPump(write, { code: 'P-1', name: 'Mother House, left head' }).id;
  });
  for (const { before, came, adjusted } of CHECKS) {
    const note = adjusted ? 'Tube replaced' : '';
    put(before, grower, (write) => {
      calibratePump(write, made.pumpId, { askedMl: 10, measuredMl: came, adjusted, note });
    });
  }
  const make = (code: string, litres: number) => (write: Write) => {
    const solution = made.solutions.get(code);
    if (solution) makeSolution(write, solution.id, { litres });
  };
  put(DOSED_DAYS + 1, grower, make('PART-M', 2));
  put(12, grower, make('PART-A', 5));
  put(12 - 0.01, grower, make('PART-C', 5));
  put(DOSED_DAYS, grower, (write) => {
    const systemId = world.systems.find(({ spec }) => spec.code === DOSED_SYSTEM)?.id;
    const itemId = made.solutions.get('PART-M')?.itemId;
    if (systemId === undefined || itemId === undefined) return;
    const window = { startMinute: 22 * 60, endMinute: 6 * 60 };
    startDosing(write, { systemId, itemId, pumpId: made.pumpId, amountPerDay: DOSED_ML_A_DAY, window, note: '' });
  });
  for (let day = DOSED_DAYS - 1; day >= 0; day -= 1) put(day, owner, bookDosing);
}

function writeRecipes(write: Write): Map<string, { id: string; itemId: string }> {
  const powders = new Map(POWDERS.map((powder) => [powder.powder, stockPowder(write, powder)]));
  return new Map(
    RECIPES.map(({ code, name, powder, grams, note }) => {
      const parts: CreateStockSolution['parts'] = [{ itemId: powders.get(powder) ?? '', powder, purity: 0.99, grams }];
      return [code, createStockSolution(write, { code, name, litres: RECIPE_L, note, parts })];
    }),
  );
}

/** @returns the item's id */
function stockPowder(write: Write, { code, name, kg, costMinor }: Powder): string {
  const itemId = createItem(write, {
    ...{ code, name, kind: 'other', unit: 'g', packSize: 5000, leadTimeDays: 6, safetyDays: 14 },
  });
  receive(write, { itemId, code: `${code}-1`, quantity: kg * 1000, costMinor });
  return itemId;
}
