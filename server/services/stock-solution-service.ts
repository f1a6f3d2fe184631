import { eq } from 'drizzle-orm';
import type { CreateStockSolution, MakeSolution, StockSolution } from '../../shared/contracts/stock-solutions.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { solutionStrength } from '../../shared/domain/stock-solutions.ts';
import { DomainError, type FieldError } from '../../shared/errors.ts';
import { items, lots, solutionBatches, solutionParts, stockSolutions } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { partsOf, showStockSolution, solutionRow } from '../queries/stock-solutions.ts';
import { actTime } from './act-time.ts';
import { createItem, itemRow } from './supply-items.ts';
import { addMadeLot } from './supply-lots.ts';
import { returnSupply } from './supply-return.ts';
import { useSupply } from './supply-use.ts';

/** A bottle of it is made within the day, so that it is asked for when a few days are left. */
const MADE_WITHIN = { leadTimeDays: 1, safetyDays: 3 };
const ML_PER_L = 1000;

/**
 * Writes a recipe down. What it makes is a supplement of its own, kept in mL, as strong as the chemistry says.
 *
 * @throws {DomainError} `input.invalid` for supplies that are not weighed; `record.duplicate` for a code that is taken
 */
export function createStockSolution(write: Write, input: CreateStockSolution): StockSolution {
  assertWeighed(write, input.parts);
  const strength = solutionStrength(input.parts, input.litres);
  const itemId = createItem(write, {
    ...{ code: input.code, name: input.name, kind: 'supplement', unit: 'mL', ...MADE_WITHIN },
    packSize: input.litres * ML_PER_L,
    strength: strength.alkalinityMeq / ML_PER_L,
    calciumMg: strength.calciumMg / ML_PER_L,
    magnesiumMg: strength.magnesiumMg / ML_PER_L,
  });
  const row = write.tx
    .insert(stockSolutions)
    .values({ id: write.newId(), itemId, litres: input.litres, note: input.note, createdAt: write.now })
    .returning()
    .get();
  const parts = input.parts.map((part, position) => ({ solutionId: row.id, position, ...part }));
  write.tx.insert(solutionParts).values(parts).run();
  write.audit({
    ...{ action: 'stock_solution.created', entity: 'stock_solution', entityId: row.id },
    after: { ...row, parts: input.parts },
  });
  return showStockSolution(write.tx, row.id);
}

/**
 * Makes a batch: the recipe's powders, scaled, leave their lots; the solution becomes a lot at what they cost.
 *
 * @throws {DomainError} `supply.not_enough`; `rule.refused` where it was retired
 */
export function makeSolution(write: Write, solutionId: string, input: MakeSolution): StockSolution {
  const solution = solutionRow(write.tx, solutionId);
  const item = itemRow(write, solution.itemId);
  if (item.retiredAt !== null) throw new DomainError('rule.refused', 'This recipe is retired. Use it again first.');
  const at = actTime(write, input.at);
  const batchId = write.newId();
  const scale = input.litres / solution.litres;
  const costMicro = partsOf(write.tx, solutionId)
    .map(({ itemId, grams }) =>
      useSupply(write, { itemId, quantity: grams * scale, cause: 'solution', causeId: batchId, at }),
    )
    .reduce((sum, cost) => sum + cost, 0);
  const day = dayOf(at, farmOf(write.tx).timeZone);
  const lot = addMadeLot(write, {
    ...{ itemId: item.id, code: `${item.code}-${day.slice(2).replaceAll('-', '')}`, receivedOn: day },
    ...{ quantity: input.litres * ML_PER_L, costMicro },
  });
  const row = write.tx
    .insert(solutionBatches)
    .values({ id: batchId, solutionId, lotId: lot.id, litres: input.litres, at, by: write.actor.name })
    .returning()
    .get();
  write.audit({ action: 'solution_batch.made', entity: 'solution_batch', entityId: row.id, after: row });
  return showStockSolution(write.tx, solutionId);
}

/** @throws {DomainError} `record.not_found`; `record.in_use` where some of it was used; `rule.refused` after a count */
export function undoSolutionBatch(write: Write, batchId: string): void {
  const before = write.tx.select().from(solutionBatches).where(eq(solutionBatches.id, batchId)).get();
  if (!before) throw new DomainError('record.not_found', 'This is gone. Someone took it back.');
  const lot = write.tx.select().from(lots).where(eq(lots.id, before.lotId)).get();
  if (lot && lot.remaining < lot.quantity) {
    throw new DomainError('record.in_use', 'Some of this batch was used already. Correct what is left by a count.');
  }
  returnSupply(write, 'solution', batchId, 'Correct what is left by a count.');
  write.tx.delete(solutionBatches).where(eq(solutionBatches.id, batchId)).run();
  write.tx.delete(lots).where(eq(lots.id, before.lotId)).run();
  write.audit({ action: 'solution_batch.undone', entity: 'solution_batch', entityId: batchId, before });
}

function assertWeighed({ tx }: Write, parts: CreateStockSolution['parts']): void {
  const fields = parts.flatMap(({ itemId }, index): FieldError[] => {
    const item = tx.select().from(items).where(eq(items.id, itemId)).get();
    if (item?.unit === 'g' && item.retiredAt === null) return [];
    return [{ path: `parts.${index}.itemId`, message: 'Choose a supply that is kept in grams.' }];
  });
  if (fields.length > 0) throw new DomainError('input.invalid', 'Choose supplies that are weighed.', { fields });
}
