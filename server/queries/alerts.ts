import { and, asc, count, desc, eq, isNotNull, isNull, lt, or, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import type { Alert } from '../../shared/contracts/alerts.ts';
import type { Page } from '../../shared/contracts/common.ts';
import type { AlertFacts } from '../../shared/domain/alert-rules.ts';
import { systemTitle } from '../../shared/domain/system-title.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { alerts, systems } from '../db/schema/index.ts';
import { alertWords, endingWords, quietWords } from './alert-words.ts';
import { pageFrom, readCursor } from './cursor.ts';

export type AlertRow = typeof alerts.$inferSelect;

interface AlertQuery {
  cursor?: string | undefined;
  limit: number;
  state: 'open' | 'closed';
  systemId?: string | undefined;
}

/** Alerts that are open, or those that ended, the newest first. */
export function listAlerts(db: Db, { cursor, limit, state, systemId }: AlertQuery, now: number): Page<Alert> {
  const wanted = and(
    state === 'open' ? isNull(alerts.closedAt) : isNotNull(alerts.closedAt),
    systemId ? eq(alerts.systemId, systemId) : undefined,
  );
  const order = state === 'open' ? alerts.openedAt : alerts.closedAt;
  const rows = joined(db)
    .where(and(wanted, cursor ? olderThan(order, cursor) : undefined))
    .orderBy(desc(order), desc(alerts.id))
    .limit(limit + 1)
    .all();
  const total = db.select({ total: count() }).from(alerts).where(wanted).get()?.total ?? 0;
  return pageFrom(rows, limit, total, {
    item: (row) => toAlert(row, now),
    cursor: ({ alert }) => [(state === 'open' ? alert.openedAt : alert.closedAt) ?? 0, alert.id],
  });
}

export function showAlert(db: Db, alertId: string, now: number): Alert {
  const row = joined(db).where(eq(alerts.id, alertId)).get();
  if (!row) throw new DomainError('record.not_found', 'There is no such alert. Choose one from the list.');
  return toAlert(row, now);
}

/** An open alert with what it is about, for entries that lead to acts. */
export interface OpenAlert extends Alert {
  subject: string;
  facts: AlertFacts;
}

/** All that is open, by system. */
export function openAlerts(db: Db, now: number): OpenAlert[] {
  return joined(db)
    .where(isNull(alerts.closedAt))
    .orderBy(asc(systems.code), asc(alerts.openedAt))
    .all()
    .map((row) => ({ ...toAlert(row, now), subject: row.alert.subject, facts: row.alert.facts }));
}

/** How many open ones somebody knows of. */
export function quietAlerts(db: Db): number {
  const quiet = and(isNull(alerts.closedAt), isNotNull(alerts.acknowledgedAt));
  return db.select({ total: count() }).from(alerts).where(quiet).get()?.total ?? 0;
}

function joined(db: Db) {
  return db
    .select({ alert: alerts, system: { code: systems.code, name: systems.name } })
    .from(alerts)
    .innerJoin(systems, eq(systems.id, alerts.systemId))
    .$dynamic();
}

function olderThan(order: typeof alerts.openedAt | typeof alerts.closedAt, cursor: string): SQL | undefined {
  const [at, lastId] = readCursor(cursor, z.tuple([z.number(), z.string()]));
  return or(lt(order, at), and(eq(order, at), lt(alerts.id, lastId)));
}

function toAlert({ alert, system }: { alert: AlertRow; system: { code: string; name: string } }, now: number): Alert {
  const { id, kind, systemId, reservoirId, urgency, facts, openedAt, acknowledgedAt, acknowledgedBy, closedAt } = alert;
  return {
    ...{ id, kind, systemId, systemCode: system.code, reservoirId, urgency },
    // What ended is told as it was seen last.
    ...alertWords(facts, systemTitle(system), closedAt === null ? now : alert.lastSeenAt),
    ...{ openedAt, acknowledgedAt, acknowledgedBy, closedAt },
    quietUntil: acknowledgedAt === null || closedAt !== null ? [] : quietWords(facts),
    ending: endingWords(facts, alert.closedBy),
  };
}
