import { and, asc, desc, eq } from 'drizzle-orm';
import type { LabelStock, SavedFit } from '../../shared/contracts/label-stocks.ts';
import { type LabelFit, NO_FIT } from '../../shared/domain/label-fit.ts';
import { LABEL_SHEETS, type LabelSheet } from '../../shared/domain/label-sheets.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { labelFits, labelStocks } from '../db/schema/index.ts';

type LabelStockRow = typeof labelStocks.$inferSelect;

/** Own stocks by name, then those of the product. */
export function listLabelStocks(db: Db): LabelStock[] {
  const own = db.select().from(labelStocks).orderBy(asc(labelStocks.name)).all();
  return [...own.map(toLabelStock), ...LABEL_SHEETS.map(toShippedStock)];
}

/** What printers need, the latest first. */
export function listLabelFits(db: Db): SavedFit[] {
  return db.select().from(labelFits).orderBy(desc(labelFits.savedAt), asc(labelFits.printer)).all();
}

/** @throws {DomainError} `record.not_found` */
export function labelStock(db: Db, stockId: string): LabelStock {
  const shipped = LABEL_SHEETS.find(({ id }) => id === stockId);
  return shipped ? toShippedStock(shipped) : toLabelStock(ownStockRow(db, stockId));
}

/** @throws {DomainError} `record.not_found` */
export function ownStockRow(db: Db, stockId: string): LabelStockRow {
  const row = db.select().from(labelStocks).where(eq(labelStocks.id, stockId)).get();
  if (row) return row;
  const message = 'There is no such label stock.';
  throw new DomainError('record.not_found', message, { fields: [{ path: 'stockId', message }] });
}

/** What a printer needs on a stock; nothing where it was never measured, or no printer is named. */
export function labelFit(db: Db, stockId: string, printer: string | null): LabelFit {
  if (printer === null) return NO_FIT;
  const where = and(eq(labelFits.stockId, stockId), eq(labelFits.printer, printer));
  return db.select().from(labelFits).where(where).get() ?? NO_FIT;
}

export function toLabelStock({ retiredAt, createdAt: _, ...row }: LabelStockRow): LabelStock {
  return { ...row, shipped: false, retired: retiredAt !== null };
}

function toShippedStock(sheet: LabelSheet): LabelStock {
  return { ...sheet, shipped: true, retired: false, version: 1 };
}
