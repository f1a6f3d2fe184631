import { eq } from 'drizzle-orm';
import type { Measure } from '../../shared/contracts/stock.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { DomainError } from '../../shared/errors.ts';
import { batches, sizeReadings } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { findPlug } from '../queries/find-plugs.ts';
import { inUndoTime } from '../queries/stock-acts.ts';
import { actTime } from './act-time.ts';
import { assertInStock } from './plug-rules.ts';

/**
 * Logs measured sizes (mm) of one plug, or of a sample of a batch. The newest measuring outweighs the expected growth.
 *
 * @throws {DomainError} `record.not_found`; `stock.not_there` for a plug that has left; `input.invalid` for a time before
 *   the cut
 */
export function measureStock(write: Write, input: Measure): { ids: string[]; meanMm: number } {
  const plug = input.plugCode === undefined ? null : findPlug(write.tx, input.plugCode, 'plugCode');
  if (plug) assertInStock(plug);
  const batch = write.tx
    .select()
    .from(batches)
    .where(eq(batches.id, plug?.batchId ?? input.batchId ?? ''))
    .get();
  if (!batch) throw new DomainError('record.not_found', 'This batch is not known. Choose one from the list.');
  const at = actTime(write, input.at);
  // The cut's own hour is not known, so a day's grace to the earlier side.
  if (at < Date.parse(`${batch.cutOn}T00:00:00Z`) - MS_PER_DAY) {
    const message = `This batch was cut on ${batch.cutOn}.`;
    throw new DomainError('input.invalid', message, { fields: [{ path: 'at', message }] });
  }

  const ids = input.sizesMm.map((sizeMm) => {
    const id = write.newId();
    write.tx
      .insert(sizeReadings)
      .values({ id, batchId: batch.id, plugCode: plug?.code ?? null, sizeMm, at, by: write.actor.name })
      .run();
    return id;
  });
  write.audit({ action: 'stock.measured', entity: 'batch', entityId: batch.id, after: { ...input, ids } });
  return { ids, meanMm: input.sizesMm.reduce((sum, mm) => sum + mm, 0) / input.sizesMm.length };
}

/** Takes back a measurement, within a day or by the owner. @throws {DomainError} `record.not_found`; `rule.refused` */
export function undoMeasurement(write: Write, id: string): void {
  const reading = write.tx.select().from(sizeReadings).where(eq(sizeReadings.id, id)).get();
  if (!reading) throw new DomainError('record.not_found', 'This measurement is not there any more.');
  if (!inUndoTime(reading.at, write.now, write.actor.role)) {
    throw new DomainError('rule.refused', 'This is more than a day old. Ask the owner to take it back.');
  }
  write.tx.delete(sizeReadings).where(eq(sizeReadings.id, id)).run();
  write.audit({ action: 'stock.measurement_undone', entity: 'batch', entityId: reading.batchId, before: reading });
}
