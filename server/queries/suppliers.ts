import { asc, count, eq } from 'drizzle-orm';
import type { Supplier } from '../../shared/contracts/suppliers.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { items, suppliers } from '../db/schema/index.ts';

export function listSuppliers(db: Db): Supplier[] {
  return suppliersWithItems(db).orderBy(asc(suppliers.name)).all();
}

/** @throws {DomainError} `record.not_found` */
export function supplierById(db: Db, supplierId: string): Supplier {
  const supplier = suppliersWithItems(db).where(eq(suppliers.id, supplierId)).get();
  if (!supplier) throw new DomainError('record.not_found', 'This supplier is not known.');
  return supplier;
}

function suppliersWithItems(db: Db) {
  return db
    .select({
      id: suppliers.id,
      name: suppliers.name,
      email: suppliers.email,
      items: count(items.id),
      version: suppliers.version,
    })
    .from(suppliers)
    .leftJoin(items, eq(items.supplierId, suppliers.id))
    .groupBy(suppliers.id)
    .$dynamic();
}
