import { and, desc, eq, gte } from 'drizzle-orm';
import type { Overfill } from '../../shared/contracts/overfills.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { overfills, reservoirEvents, reservoirs } from '../db/schema/index.ts';

export type OverfillRow = typeof overfills.$inferSelect;

/** Overfills of a system, newest first; where the levels of one were taken back, so was the overfill. */
export function overfillsSince(db: Db, systemId: string, since: number): Overfill[] {
  return standing(db)
    .where(and(eq(overfills.systemId, systemId), gte(overfills.at, since)))
    .orderBy(desc(overfills.at))
    .all()
    .map(toOverfill);
}

/** @throws {DomainError} `record.not_found` */
export function overfillRow(db: Db, overfillId: string): OverfillRow {
  const row = standing(db).where(eq(overfills.id, overfillId)).get();
  if (!row) throw new DomainError('record.not_found', 'This is gone. Someone took it back.');
  return row.overfill;
}

export function showOverfill(db: Db, overfillId: string): Overfill {
  const row = standing(db).where(eq(overfills.id, overfillId)).get();
  if (!row) throw new DomainError('record.not_found', 'This is gone. Someone took it back.');
  return toOverfill(row);
}

function standing(db: Db) {
  return db
    .select({ overfill: overfills, reservoirCode: reservoirs.code })
    .from(overfills)
    .innerJoin(reservoirs, eq(reservoirs.id, overfills.reservoirId))
    .innerJoin(reservoirEvents, eq(reservoirEvents.id, overfills.eventId))
    .$dynamic();
}

function toOverfill({ overfill, reservoirCode }: { overfill: OverfillRow; reservoirCode: string }): Overfill {
  const { id, systemId, reservoirId, litres, alkalinityMeqL, at, by, note } = overfill;
  return { id, systemId, reservoirId, reservoirCode, litres, alkalinityMeqL, at, by, note };
}
