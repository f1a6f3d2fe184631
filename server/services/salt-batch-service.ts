import { eq } from 'drizzle-orm';
import type { EditSaltBatch, MixSaltBatch, SaltBatch } from '../../shared/contracts/salt-batches.ts';
import { MS_PER_HOUR } from '../../shared/domain/days.ts';
import { DomainError } from '../../shared/errors.ts';
import { saltBatches, waterChanges } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { saltBatchRow, showSaltBatch } from '../queries/salt-batches.ts';
import { waterItem } from '../queries/water-items.ts';
import { actTime } from './act-time.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';
import { returnSupply } from './supply-return.ts';
import { useSupply } from './supply-use.ts';

/**
 * Mixes new salt water; its salt leaves the supplies and goes on to the systems with the water.
 *
 * @throws {DomainError} `supply.not_enough`; `input.invalid`
 */
export function mixSaltBatch(write: Write, input: MixSaltBatch): SaltBatch {
  const { at: givenAt, readyHours, saltItemId, saltG, ...fields } = input;
  const at = actTime(write, givenAt);
  const salt = saltG > 0 ? waterItem(write.tx, 'salt', saltItemId, 'saltItemId') : null;
  const row = write.tx
    .insert(saltBatches)
    .values({
      ...{ id: write.newId(), ...fields, saltG, saltItemId: salt?.id ?? null, remainingL: fields.litres },
      ...{ at, readyAt: Math.round(at + readyHours * MS_PER_HOUR), by: write.actor.name },
    })
    .returning()
    .get();
  if (salt) useSupply(write, { itemId: salt.id, quantity: saltG, cause: 'salt_batch', causeId: row.id, at });
  write.audit({ action: 'salt_batch.mixed', entity: 'salt_batch', entityId: row.id, after: row });
  return showSaltBatch(write.tx, row.id, write.now);
}

/** @throws {DomainError} `record.not_found`; `edit.stale` */
export function editSaltBatch(write: Write, batchId: string, ifMatch: number, input: EditSaltBatch): SaltBatch {
  const before = saltBatchRow(write.tx, batchId);
  assertVersion(before, ifMatch, showSaltBatch(write.tx, batchId, write.now));
  const { discarded, ...fields } = definedOnly(input);
  const discardedAt =
    discarded === undefined ? before.discardedAt : discarded ? (before.discardedAt ?? write.now) : null;
  const after = write.tx
    .update(saltBatches)
    .set({ ...fields, discardedAt, version: before.version + 1 })
    .where(eq(saltBatches.id, batchId))
    .returning()
    .get();
  write.audit({ action: 'salt_batch.changed', entity: 'salt_batch', entityId: batchId, before, after });
  return showSaltBatch(write.tx, batchId, write.now);
}

/** @throws {DomainError} `record.not_found`; `record.in_use` where a water change took of it */
export function undoSaltBatch(write: Write, batchId: string): void {
  const before = saltBatchRow(write.tx, batchId);
  const used = write.tx.select().from(waterChanges).where(eq(waterChanges.saltBatchId, batchId)).limit(1).get();
  if (used) throw new DomainError('record.in_use', 'A water change took of it. Take that one back first.');
  returnSupply(write, 'salt_batch', batchId, 'Pour it away instead.');
  write.tx.delete(saltBatches).where(eq(saltBatches.id, batchId)).run();
  write.audit({ action: 'salt_batch.undone', entity: 'salt_batch', entityId: batchId, before });
}
