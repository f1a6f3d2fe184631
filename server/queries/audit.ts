import { and, asc, count, desc, eq, gte, isNull, lt, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import {
  type AuditChoices,
  type AuditEntry,
  type AuditFilter,
  type ListAudit,
  SYSTEM_ACTOR,
} from '../../shared/contracts/audit.ts';
import type { Page } from '../../shared/contracts/common.ts';
import { addDays, startOfDay } from '../../shared/domain/days.ts';
import type { Db } from '../db/client.ts';
import { SYSTEM } from '../db/write.ts';
import { auditLog, users } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { farmOf } from './farm.ts';

/** A page of changes, newest first. */
export function listAudit(db: Db, { cursor, limit, ...filter }: ListAudit): Page<AuditEntry> {
  const matches = whereOf(db, filter);
  const before = cursor ? lt(auditLog.id, readCursor(cursor, z.tuple([z.int()]))[0]) : undefined;
  const rows = db
    .select()
    .from(auditLog)
    .where(and(matches, before))
    .orderBy(desc(auditLog.id))
    .limit(limit + 1)
    .all();
  const total = db.select({ rows: count() }).from(auditLog).where(matches).get()?.rows ?? 0;
  return pageFrom(rows, limit, total, { item: toAuditEntry, cursor: (row) => [row.id] });
}

/** All changes that match, oldest first, for an export. */
export function allAudit(db: Db, filter: AuditFilter): AuditEntry[] {
  return db.select().from(auditLog).where(whereOf(db, filter)).orderBy(asc(auditLog.id)).all().map(toAuditEntry);
}

export function auditChoices(db: Db): AuditChoices {
  const entities = db.selectDistinct({ entity: auditLog.entity }).from(auditLog).orderBy(asc(auditLog.entity)).all();
  const people = db.select({ id: users.id, name: users.name }).from(users).orderBy(asc(users.name)).all();
  return {
    entities: entities.map(({ entity }) => entity),
    actors: [...people, { id: SYSTEM_ACTOR, name: SYSTEM.name }],
  };
}

/** Days are whole days of the farm, both ends included. */
function whereOf(db: Db, { entity, entityId, actor, from, to }: AuditFilter): SQL | undefined {
  const { timeZone } = farmOf(db);
  return and(
    entity === undefined ? undefined : eq(auditLog.entity, entity),
    entityId === undefined ? undefined : eq(auditLog.entityId, entityId),
    actor === undefined ? undefined : actor === SYSTEM_ACTOR ? isNull(auditLog.actorId) : eq(auditLog.actorId, actor),
    from === undefined ? undefined : gte(auditLog.at, startOfDay(from, timeZone)),
    to === undefined ? undefined : lt(auditLog.at, startOfDay(addDays(to, 1), timeZone)),
  );
}

function toAuditEntry(row: typeof auditLog.$inferSelect): AuditEntry {
  return { ...row, before: row.before ?? null, after: row.after ?? null };
}
