import { eq } from 'drizzle-orm';
import type { CreateStore, EditStore, Store } from '../../shared/contracts/stores.ts';
import { stores } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { storeRow, toStore } from '../queries/stores.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';

/** @throws {DomainError} `record.duplicate` at `code` */
export function createStore(write: Write, input: CreateStore): Store {
  const row = write.tx
    .insert(stores)
    .values({ id: write.newId(), ...input, createdAt: write.now })
    .returning()
    .get();
  const after = toStore(row);
  write.audit({ action: 'store.created', entity: 'store', entityId: row.id, after });
  return after;
}

/**
 * Changes a store. A retired one keeps its orders and its buyers can still look, but not order.
 * @throws {DomainError} `record.not_found`; `edit.stale`; `record.duplicate` at `code`
 */
export function editStore(write: Write, id: string, ifMatch: number, { retired, ...fields }: EditStore): Store {
  const row = storeRow(write.tx, id);
  const before = toStore(row);
  assertVersion(row, ifMatch, before);
  const retiredAt = retired === undefined ? row.retiredAt : retired ? (row.retiredAt ?? write.now) : null;
  const changed = write.tx
    .update(stores)
    .set({ ...definedOnly(fields), retiredAt, version: row.version + 1 })
    .where(eq(stores.id, id))
    .returning()
    .get();
  const after = toStore(changed);
  write.audit({ action: 'store.changed', entity: 'store', entityId: id, before, after });
  return after;
}
