import { and, eq, isNull, max } from 'drizzle-orm';
import { type AlertEnd, type AlertKind, type Condition, nextStep } from '../../shared/domain/alert-rules.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { alerts } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { conditionsOf, slowConditionsOf } from '../queries/alert-conditions.ts';
import { latestReadings } from '../queries/readings.ts';
import { systemRow } from '../queries/systems.ts';
import type { AlertRow } from '../queries/alerts.ts';

const SLOW_KINDS: readonly AlertKind[] = ['demand_changed', 'overfill_risk'];

/**
 * Brings the alerts of a system up to what holds now: opens, worsens and closes them. Call it in the write that may
 * change what holds; a job does it for what only time changes, and {@link weighRisks} does it for what takes longer to work out.
 */
export function evaluateAlerts(write: Write, systemId: string): readonly Condition[] {
  const open = openAlerts(write.tx, systemId).filter(({ kind }) => !SLOW_KINDS.includes(kind));
  const kinds = new Map(open.map(({ subject, kind }) => [subject, kind]));
  const conditions = conditionsOf(write.tx, systemRow(write.tx, systemId), write.now, kinds);
  bringUpToDate(write, systemId, open, conditions);
  return conditions;
}

/** The same for the alerts about demand and overfills. */
export function weighRisks(write: Write, systemId: string): readonly Condition[] {
  const open = openAlerts(write.tx, systemId).filter(({ kind }) => SLOW_KINDS.includes(kind));
  const conditions = slowConditionsOf(write.tx, systemRow(write.tx, systemId), write.now);
  bringUpToDate(write, systemId, open, conditions);
  return conditions;
}

function bringUpToDate(
  write: Write,
  systemId: string,
  open: readonly AlertRow[],
  conditions: readonly Condition[],
): void {
  for (const condition of conditions) {
    const alert = open.find(({ subject }) => subject === condition.subject);
    meet(write, systemId, alert, condition);
  }
  const held = new Set(conditions.map(({ subject }) => subject));
  for (const alert of open.filter(({ subject }) => !held.has(subject))) close(write, alert);
}

/** The answer of a change to a system's water or limewater, once the alerts about it are up to date. */
export function withAlerts<T>(write: Write, systemId: string, answer: T): T {
  evaluateAlerts(write, systemId);
  return answer;
}

/** Says that someone knows: it is quiet until it is worse by a step. */
export function acknowledgeAlert(write: Write, alertId: string): void {
  const { systemId, subject, kind } = alertRow(write.tx, alertId);
  const evaluate = SLOW_KINDS.includes(kind) ? weighRisks : evaluateAlerts;
  const current = evaluate(write, systemId).find((condition) => condition.subject === subject);
  const alert = alertRow(write.tx, alertId);
  if (alert.closedAt !== null)
    throw new DomainError('rule.refused', 'This has ended meanwhile. Nothing is left to do.');
  write.tx
    .update(alerts)
    .set({
      ...{ acknowledgedAt: write.now, acknowledgedBy: write.actor.name },
      acknowledgedMeasure: current?.measure ?? alert.measure,
    })
    .where(eq(alerts.id, alertId))
    .run();
  write.audit({ action: 'alert.acknowledged', entity: 'alert', entityId: alertId });
}

/** Takes that back: it is loud again. */
export function unacknowledgeAlert(write: Write, alertId: string): void {
  alertRow(write.tx, alertId);
  write.tx.update(alerts).set(NOT_ACKNOWLEDGED).where(eq(alerts.id, alertId)).run();
  write.audit({ action: 'alert.unacknowledged', entity: 'alert', entityId: alertId });
}

const NOT_ACKNOWLEDGED = { acknowledgedAt: null, acknowledgedBy: null, acknowledgedMeasure: null };

function meet(write: Write, systemId: string, alert: AlertRow | undefined, condition: Condition): void {
  const { subject, urgency, facts, reservoirId = null } = condition;
  const step = nextStep(alert, condition);
  const seen = { kind: facts.kind, urgency, facts, reservoirId, lastSeenAt: write.now };
  const told = { announcement: nextAnnouncement(write.tx), announcedAt: write.now, measure: condition.measure };
  if (step === 'open') {
    const alertId = write.newId();
    write.tx
      .insert(alerts)
      .values({ id: alertId, subject, systemId, openedAt: write.now, ...seen, ...told })
      .run();
    write.audit({ action: 'alert.opened', entity: 'alert', entityId: alertId, after: { subject, ...facts } });
  } else if (alert) {
    // The measure stays what was told last, so that slow worsening adds up to a step.
    const again = step === 'tell again' ? { ...told, ...NOT_ACKNOWLEDGED } : {};
    write.tx
      .update(alerts)
      .set({ ...seen, ...again })
      .where(eq(alerts.id, alert.id))
      .run();
  }
}

function close(write: Write, alert: AlertRow): void {
  const closedBy = endOf(write.tx, alert);
  write.tx.update(alerts).set({ closedAt: write.now, closedBy }).where(eq(alerts.id, alert.id)).run();
  write.audit({ action: 'alert.closed', entity: 'alert', entityId: alert.id, after: closedBy });
}

/** The newest test ends what tests began, where it is newer than the one that was seen. */
function endOf(db: Db, { systemId, facts }: AlertRow): AlertEnd {
  if (!('parameter' in facts)) return { by: 'change' };
  const last = latestReadings(db, systemId).find(({ parameter }) => parameter === facts.parameter);
  const seenAt = (facts.kind === 'test_overdue' ? facts.lastAt : facts.at) ?? 0;
  if (!last || last.takenAt <= seenAt) return { by: 'change' };
  return { by: 'reading', parameter: last.parameter, value: last.value, at: last.takenAt };
}

function nextAnnouncement(db: Db): number {
  return (
    (db
      .select({ last: max(alerts.announcement) })
      .from(alerts)
      .get()?.last ?? 0) + 1
  );
}

function openAlerts(db: Db, systemId: string): AlertRow[] {
  return db
    .select()
    .from(alerts)
    .where(and(eq(alerts.systemId, systemId), isNull(alerts.closedAt)))
    .all();
}

function alertRow(db: Db, alertId: string): AlertRow {
  const row = db.select().from(alerts).where(eq(alerts.id, alertId)).get();
  if (!row) throw new DomainError('record.not_found', 'There is no such alert. Choose one from the list.');
  return row;
}
