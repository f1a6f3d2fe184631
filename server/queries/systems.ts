import { asc, eq } from 'drizzle-orm';
import type { System, Tank, TargetBand } from '../../shared/contracts/systems.ts';
import { PARAMETER_CODES } from '../../shared/domain/units.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { systems, tanks, targetBands } from '../db/schema/index.ts';

export type SystemRow = typeof systems.$inferSelect;

/** @throws {DomainError} `record.not_found` */
export function systemRow(db: Db, systemId: string): SystemRow {
  const row = db.select().from(systems).where(eq(systems.id, systemId)).get();
  if (!row) throw new DomainError('record.not_found', 'There is no such system. Choose one from the list.');
  return row;
}

export function listSystems(db: Db): System[] {
  const rows = db.select().from(systems).orderBy(asc(systems.code)).all();
  return rows.map((row) => toSystem(db, row));
}

export function showSystem(db: Db, systemId: string): System {
  return toSystem(db, systemRow(db, systemId));
}

export function bandsOf(db: Db, systemId: string): TargetBand[] {
  const rows = db.select().from(targetBands).where(eq(targetBands.systemId, systemId)).all();
  return PARAMETER_CODES.flatMap((parameter) =>
    rows.filter((row) => row.parameter === parameter).map(({ low, high }) => ({ parameter, low, high })),
  );
}

export function toSystem(db: Db, row: SystemRow): System {
  const tankRows = db.select().from(tanks).where(eq(tanks.systemId, row.id)).orderBy(asc(tanks.code)).all();
  return { ...systemFacts(row), bands: bandsOf(db, row.id), tanks: tankRows.map(toTank) };
}

/** What a system is, without what belongs to it. */
export function systemFacts({ id, code, name, kind, netVolumeL, surfaceM2, note, createdAt, version }: SystemRow) {
  return { id, code, name, kind, netVolumeL, surfaceM2, note, createdAt, version };
}

export function toTank({ id, systemId, code, name }: typeof tanks.$inferSelect): Tank {
  return { id, systemId, code, name };
}
