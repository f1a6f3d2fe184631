import { and, eq } from 'drizzle-orm';
import type {
  EditLabelStock,
  LabelStock,
  LabelStockFields,
  MeasureFit,
  SavedFit,
} from '../../shared/contracts/label-stocks.ts';
import { calibrationRules, fitFromMeasures } from '../../shared/domain/label-fit.ts';
import { assertMeasures } from '../../shared/domain/label-places.ts';
import { DomainError } from '../../shared/errors.ts';
import { labelFits, labelStocks } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { labelStock, ownStockRow, toLabelStock } from '../queries/label-stocks.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';

/** @throws {DomainError} `input.invalid` for measures that do not fit the paper; `record.duplicate` */
export function addLabelStock(write: Write, fields: LabelStockFields): LabelStock {
  assertMeasures(fields);
  const row = write.tx
    .insert(labelStocks)
    .values({ id: write.newId(), ...fields, createdAt: write.now })
    .returning()
    .get();
  write.audit({ action: 'label_stock.added', entity: 'label_stock', entityId: row.id, after: row });
  return toLabelStock(row);
}

/** @throws {DomainError} `record.not_found`; `edit.stale`; `input.invalid`; `record.duplicate` */
export function editLabelStock(write: Write, id: string, ifMatch: number, input: EditLabelStock): LabelStock {
  const before = ownStockRow(write.tx, id);
  assertVersion(before, ifMatch, toLabelStock(before));
  const { retired, ...fields } = definedOnly(input);
  assertMeasures({ ...before, ...fields });
  const retiredAt = retired === undefined ? before.retiredAt : retired ? (before.retiredAt ?? write.now) : null;
  const after = write.tx
    .update(labelStocks)
    .set({ ...fields, retiredAt, version: before.version + 1 })
    .where(eq(labelStocks.id, id))
    .returning()
    .get();
  write.audit({ action: 'label_stock.changed', entity: 'label_stock', entityId: id, before, after });
  return toLabelStock(after);
}

/**
 * Keeps what a printer needs on a stock, in place of what was kept before.
 *
 * @throws {DomainError} `record.not_found`; `input.invalid` where the printer is too far off
 */
export function saveLabelFit(write: Write, { stockId, printer, ...measured }: MeasureFit): SavedFit {
  const fit = fitFromMeasures(calibrationRules(labelStock(write.tx, stockId)), measured);
  const values = { stockId, printer, ...fit, savedAt: write.now, by: write.actor.name };
  const saved = write.tx
    .insert(labelFits)
    .values(values)
    .onConflictDoUpdate({ target: [labelFits.stockId, labelFits.printer], set: values })
    .returning()
    .get();
  write.audit({ action: 'label_fit.saved', entity: 'label_fit', entityId: `${stockId}/${printer}`, after: saved });
  return saved;
}

/** @throws {DomainError} `record.not_found` */
export function forgetLabelFit(write: Write, stockId: string, printer: string): void {
  const before = write.tx
    .delete(labelFits)
    .where(and(eq(labelFits.stockId, stockId), eq(labelFits.printer, printer)))
    .returning()
    .get();
  if (!before) throw new DomainError('record.not_found', 'Nothing is kept for this printer on this stock.');
  write.audit({ action: 'label_fit.forgotten', entity: 'label_fit', entityId: `${stockId}/${printer}`, before });
}
