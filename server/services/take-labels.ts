import { and, eq } from 'drizzle-orm';
import type { TakeLabels } from '../../shared/contracts/labels.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Write } from '../db/write.ts';
import { batches, items } from '../db/schema/index.ts';
import { useSupply } from './supply-use.ts';

/** Takes blank labels from the supplies; their cost is part of what the batch's cut took. */
export function takeLabels(write: Write, { itemId, batchId, labels }: TakeLabels): void {
  const batch = write.tx.select().from(batches).where(eq(batches.id, batchId)).get();
  if (!batch) throw new DomainError('record.not_found', 'There is no such batch.');
  const item = write.tx
    .select()
    .from(items)
    .where(and(eq(items.id, itemId), eq(items.kind, 'label')))
    .get();
  if (!item) throw new DomainError('record.not_found', 'There is no such label in the supplies.');

  const costMicro = useSupply(write, {
    ...{ itemId, quantity: labels, cause: 'cut', causeId: batch.cutId, at: write.now },
  });
  write.audit({
    ...{ action: 'labels.taken', entity: 'batch', entityId: batchId },
    after: { item: item.code, labels, costMicro },
  });
}
