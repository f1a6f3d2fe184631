import { eq, sql } from 'drizzle-orm';
import { DomainError } from '../../shared/errors.ts';
import { saltBatches } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { saltBatchRow, type SaltBatchRow } from '../queries/salt-batches.ts';
import { moveUse } from './supply-move.ts';

/** Litres so close to each other are the same but for rounding. */
const ROUNDING_L = 1e-6;

/**
 * Takes new water from a batch for a change. Its part of the batch's salt goes with it, so that its cost lands on the
 * system that got the water.
 *
 * @returns the batch as it was before
 * @throws {DomainError} `record.not_found`; `input.invalid` where less is left, or where it was mixed later
 */
export function pourFrom(
  write: Write,
  batchId: string,
  { litres, changeId, systemId, at }: { litres: number; changeId: string; systemId: string; at: number },
): SaltBatchRow {
  const batch = saltBatchRow(write.tx, batchId);
  const left = batch.discardedAt === null ? batch.remainingL : 0;
  if (litres > left + ROUNDING_L) {
    throw refusedAt('litres', `Only ${Number(left.toFixed(1))} L of this batch is left. Enter less, or mix more.`);
  }
  if (at < batch.at) throw refusedAt('at', 'This batch was mixed later than that.');
  write.tx
    .update(saltBatches)
    .set({ remainingL: sql`max(0, ${saltBatches.remainingL} - ${litres})` })
    .where(eq(saltBatches.id, batchId))
    .run();
  moveUse(
    write,
    { cause: 'salt_batch', causeId: batchId },
    { cause: 'water_change', causeId: changeId, systemId, at },
    Math.min(1, litres / batch.remainingL),
  );
  return batch;
}

/** Puts back what a change took that never was. */
export function fillBack(
  write: Write,
  batchId: string,
  { litres, changeId }: { litres: number; changeId: string },
): void {
  const batch = saltBatchRow(write.tx, batchId);
  write.tx
    .update(saltBatches)
    .set({ remainingL: sql`min(${saltBatches.litres}, ${saltBatches.remainingL} + ${litres})` })
    .where(eq(saltBatches.id, batchId))
    .run();
  const to = { cause: 'salt_batch', causeId: batchId, systemId: null, at: batch.at } as const;
  moveUse(write, { cause: 'water_change', causeId: changeId }, to, 1);
}

function refusedAt(path: string, message: string): DomainError {
  return new DomainError('input.invalid', message, { fields: [{ path, message }] });
}
