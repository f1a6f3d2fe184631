import { eq } from 'drizzle-orm';
import type { CreateSupplier, EditSupplier } from '../../shared/contracts/suppliers.ts';
import type { CreateItem, EditItem } from '../../shared/contracts/supplies.ts';
import { itemProblems } from '../../shared/domain/supply-items.ts';
import { DomainError } from '../../shared/errors.ts';
import { items, lots, stockSolutions, suppliers } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { supplyItem } from '../queries/supply-items.ts';
import { supplierById } from '../queries/suppliers.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';

type ItemRow = typeof items.$inferSelect;

/** Adds a supply. @returns its id */
export function createItem(write: Write, input: CreateItem): string {
  assertSupplier(write, input.supplierId ?? null);
  const row = write.tx
    .insert(items)
    .values({
      ...input,
      id: write.newId(),
      supplierId: input.supplierId ?? null,
      strength: input.strength ?? null,
      calciumMg: input.calciumMg ?? null,
      magnesiumMg: input.magnesiumMg ?? null,
      createdAt: write.now,
    })
    .returning()
    .get();
  write.audit({ action: 'item.created', entity: 'item', entityId: row.id, after: row });
  return row.id;
}

/**
 * Changes a supply, or retires it so that it is offered no more.
 *
 * @throws {DomainError} `edit.stale`; `record.in_use` for another unit or kind once lots of it were received
 */
export function editItem(write: Write, itemId: string, ifMatch: number, input: EditItem): void {
  const before = itemRow(write, itemId);
  assertVersion(before, ifMatch, supplyItem(write.tx, itemId, write.now));
  const { retired, ...fields } = definedOnly(input);
  const after = { ...before, ...fields };
  assertFits(after);
  assertKindStays(write, before, after);
  assertStrengthStays(write, before, after);
  assertSupplier(write, after.supplierId);

  const retiredAt = retired === undefined ? before.retiredAt : retired ? (before.retiredAt ?? write.now) : null;
  const row = write.tx
    .update(items)
    .set({ ...fields, retiredAt, version: before.version + 1 })
    .where(eq(items.id, itemId))
    .returning()
    .get();
  write.audit({ action: 'item.changed', entity: 'item', entityId: itemId, before, after: row });
}

/** Adds a supplier. @returns its id */
export function createSupplier(write: Write, input: CreateSupplier): string {
  const row = write.tx
    .insert(suppliers)
    .values({ id: write.newId(), ...input, createdAt: write.now })
    .returning()
    .get();
  write.audit({ action: 'supplier.created', entity: 'supplier', entityId: row.id, after: row });
  return row.id;
}

/** @throws {DomainError} `edit.stale`, `record.not_found` */
export function editSupplier(write: Write, supplierId: string, ifMatch: number, input: EditSupplier): void {
  const before = supplierById(write.tx, supplierId);
  assertVersion(before, ifMatch, before);
  const row = write.tx
    .update(suppliers)
    .set({ ...definedOnly(input), version: before.version + 1 })
    .where(eq(suppliers.id, supplierId))
    .returning()
    .get();
  write.audit({ action: 'supplier.changed', entity: 'supplier', entityId: supplierId, before, after: row });
}

/** @throws {DomainError} `record.not_found` */
export function itemRow(write: Write, itemId: string): ItemRow {
  const row = write.tx.select().from(items).where(eq(items.id, itemId)).get();
  if (!row) throw new DomainError('record.not_found', 'This supply is not known.');
  return row;
}

function assertFits(item: ItemRow): void {
  const fields = itemProblems(item);
  if (fields.length > 0) {
    throw new DomainError('input.invalid', 'Some of what was entered needs another look.', { fields });
  }
}

/** Amounts in lots and uses are in the item's unit, so it can not change under them. */
function assertKindStays(write: Write, before: ItemRow, after: ItemRow): void {
  if (before.kind === after.kind && before.unit === after.unit) return;
  const used = write.tx.select({ id: lots.id }).from(lots).where(eq(lots.itemId, before.id)).limit(1).get();
  if (!used) return;
  throw new DomainError(
    'record.in_use',
    'Lots of this were received already, so its kind and unit stay. Retire it and add a new supply instead.',
    { fields: [{ path: before.kind === after.kind ? 'unit' : 'kind', message: 'This can not change any more.' }] },
  );
}

/** What a recipe makes is as strong as its recipe says. */
function assertStrengthStays({ tx }: Write, before: ItemRow, after: ItemRow): void {
  const paths = (['kind', 'unit', 'strength', 'calciumMg', 'magnesiumMg'] as const).filter(
    (path) => before[path] !== after[path],
  );
  if (paths.length === 0) return;
  const recipe = tx.select().from(stockSolutions).where(eq(stockSolutions.itemId, before.id)).get();
  if (!recipe) return;
  const message = 'Its recipe says what it is. Retire it and write another recipe instead.';
  throw new DomainError('record.in_use', message, { fields: paths.map((path) => ({ path, message })) });
}

function assertSupplier(write: Write, supplierId: string | null): void {
  if (supplierId === null) return;
  if (write.tx.select().from(suppliers).where(eq(suppliers.id, supplierId)).get()) return;
  throw new DomainError('input.invalid', 'Choose a supplier from the list.', {
    fields: [{ path: 'supplierId', message: 'Choose a supplier from the list.' }],
  });
}
