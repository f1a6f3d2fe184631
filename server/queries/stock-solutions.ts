import { asc, desc, eq, inArray, sum } from 'drizzle-orm';
import type { SolutionBatch, StockSolution } from '../../shared/contracts/stock-solutions.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { items, lots, solutionBatches, solutionParts, stockSolutions } from '../db/schema/index.ts';

export type SolutionRow = typeof stockSolutions.$inferSelect;
export type SolutionPartRow = typeof solutionParts.$inferSelect;

/** Of each recipe the newest batches are shown. */
const MOST_BATCHES = 6;

/** Recipes by name, those that are still made first. */
export function listStockSolutions(db: Db): StockSolution[] {
  const rows = db
    .select({ solution: stockSolutions, item: items })
    .from(stockSolutions)
    .innerJoin(items, eq(items.id, stockSolutions.itemId))
    .orderBy(asc(items.retiredAt), asc(items.name))
    .all();
  const held = onHandOf(db);
  const parts = groupBy(allParts(db), ({ part }) => part.solutionId);
  return rows.map(({ solution, item }) => ({
    ...{ id: solution.id, itemId: item.id, code: item.code, name: item.name },
    ...{ litres: solution.litres, note: solution.note, retired: item.retiredAt !== null },
    ...{ alkalinityMeq: item.strength ?? 0, calciumMg: item.calciumMg ?? 0, magnesiumMg: item.magnesiumMg ?? 0 },
    onHandMl: held.get(item.id) ?? 0,
    parts: (parts.get(solution.id) ?? []).map(({ part, itemName }) => ({
      ...{ itemId: part.itemId, itemName, powder: part.powder, purity: part.purity, grams: part.grams },
      onHandG: held.get(part.itemId) ?? 0,
    })),
    batches: batchesOf(db, solution.id),
  }));
}

/** @throws {DomainError} `record.not_found` */
export function showStockSolution(db: Db, solutionId: string): StockSolution {
  const found = listStockSolutions(db).find(({ id }) => id === solutionId);
  if (!found) throw new DomainError('record.not_found', 'This recipe is not known.');
  return found;
}

/** @throws {DomainError} `record.not_found` */
export function solutionRow(db: Db, solutionId: string): SolutionRow {
  const row = db.select().from(stockSolutions).where(eq(stockSolutions.id, solutionId)).get();
  if (!row) throw new DomainError('record.not_found', 'This recipe is not known.');
  return row;
}

export function partsOf(db: Db, solutionId: string): SolutionPartRow[] {
  return db
    .select()
    .from(solutionParts)
    .where(eq(solutionParts.solutionId, solutionId))
    .orderBy(asc(solutionParts.position))
    .all();
}

function allParts(db: Db) {
  return db
    .select({ part: solutionParts, itemName: items.name })
    .from(solutionParts)
    .innerJoin(items, eq(items.id, solutionParts.itemId))
    .orderBy(asc(solutionParts.position))
    .all();
}

/** What is in store of every supply that has to do with recipes. */
function onHandOf(db: Db): Map<string, number> {
  const made = db.select({ itemId: stockSolutions.itemId }).from(stockSolutions);
  const weighed = db.select({ itemId: solutionParts.itemId }).from(solutionParts);
  const rows = db
    .select({ itemId: lots.itemId, amount: sum(lots.remaining) })
    .from(lots)
    .where(inArray(lots.itemId, made.union(weighed)))
    .groupBy(lots.itemId)
    .all();
  return new Map(rows.map(({ itemId, amount }) => [itemId, Number(amount ?? 0)]));
}

function batchesOf(db: Db, solutionId: string): SolutionBatch[] {
  return db
    .select({ batch: solutionBatches, lot: lots })
    .from(solutionBatches)
    .innerJoin(lots, eq(lots.id, solutionBatches.lotId))
    .where(eq(solutionBatches.solutionId, solutionId))
    .orderBy(desc(solutionBatches.at))
    .limit(MOST_BATCHES)
    .all()
    .map(({ batch: { id, lotId, litres, at, by }, lot }) => ({
      ...{ id, lotId, litres, at, by, lotCode: lot.code },
      ...{ remainingMl: lot.remaining, costMicro: lot.remainingMicro },
    }));
}
