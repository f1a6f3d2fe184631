import { and, desc, eq, isNull } from 'drizzle-orm';
import type { ChangeDosing, DosingRate, DoseWindow, StartDosing } from '../../shared/contracts/dosing.ts';
import { DomainError } from '../../shared/errors.ts';
import { dosingRates } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import type { RateRow } from '../queries/dosed-amounts.ts';
import { pumpRow } from '../queries/dosing-pumps.ts';
import { rateRow, showRate } from '../queries/dosing-rates.ts';
import { systemRow } from '../queries/systems.ts';
import { waterItem } from '../queries/water-items.ts';
import { actTime } from './act-time.ts';
import { unbookFrom } from './dosing-bookings.ts';

/**
 * Begins to dose a supplement steadily.
 *
 * @throws {DomainError} `record.duplicate` where it runs into the system already; `input.invalid`
 */
export function startDosing(write: Write, input: StartDosing): DosingRate {
  systemRow(write.tx, input.systemId);
  const item = waterItem(write.tx, 'supplement', input.itemId, 'itemId');
  assertPump(write, input.pumpId ?? null, item.unit);
  if (runningOf(write, input.systemId, item.id)) {
    const message = 'This runs into the system already. Change that dose instead.';
    throw new DomainError('record.duplicate', message, { fields: [{ path: 'itemId', message }] });
  }
  const fromAt = actTime(write, input.at);
  assertAfterLast(write, input.systemId, item.id, fromAt);
  const row = insertRate(write, { ...input, itemId: item.id, fromAt });
  write.audit({ action: 'dosing.started', entity: 'dosing_rate', entityId: row.id, after: row });
  return showRate(write.tx, row.id, write.now);
}

/** Ends a dose and begins the next one at the same instant. @throws {DomainError} `rule.refused` where it has ended */
export function changeDosing(write: Write, rateId: string, input: ChangeDosing): DosingRate {
  const before = runningRow(write, rateId);
  const fromAt = actTime(write, input.at);
  const { systemId, itemId } = before;
  const item = waterItem(write.tx, 'supplement', itemId, 'itemId');
  const pumpId = input.pumpId === undefined ? before.pumpId : input.pumpId;
  assertPump(write, pumpId, item.unit);
  endRate(write, before, fromAt);
  const kept = windowGiven(before);
  const window = input.window === undefined ? kept : input.window;
  const row = insertRate(write, {
    ...{ systemId, itemId, pumpId, window, fromAt },
    ...{ amountPerDay: input.amountPerDay, note: input.note },
  });
  write.audit({ action: 'dosing.changed', entity: 'dosing_rate', entityId: row.id, before, after: row });
  return showRate(write.tx, row.id, write.now);
}

/** @throws {DomainError} `rule.refused` where it has ended already */
export function stopDosing(write: Write, rateId: string, givenAt: number | undefined): DosingRate {
  const before = runningRow(write, rateId);
  const after = endRate(write, before, actTime(write, givenAt));
  write.audit({ action: 'dosing.stopped', entity: 'dosing_rate', entityId: rateId, before, after });
  return showRate(write.tx, rateId, write.now);
}

/** Takes a stop back. @throws {DomainError} `rule.refused` where it runs, or where it was begun anew since */
export function resumeDosing(write: Write, rateId: string): DosingRate {
  const before = rateRow(write.tx, rateId);
  if (before.toAt === null) throw new DomainError('rule.refused', 'This dose runs.');
  const latest = latestOf(write, before.systemId, before.itemId);
  if (latest?.id !== rateId)
    throw new DomainError('rule.refused', 'It was begun anew since. Change that dose instead.');
  // Its last day was booked up to the stop only.
  unbookFrom(write, before, before.toAt);
  const after = setEnd(write, rateId, null);
  write.audit({ action: 'dosing.resumed', entity: 'dosing_rate', entityId: rateId, before, after });
  return showRate(write.tx, rateId, write.now);
}

/** Takes a dose back as if it had never been; one that it followed on at once runs on. */
export function undoDosing(write: Write, rateId: string): void {
  const before = rateRow(write.tx, rateId);
  if (latestOf(write, before.systemId, before.itemId)?.id !== rateId) {
    throw new DomainError('rule.refused', 'It was changed since. Take the later change back first.');
  }
  unbookFrom(write, before, before.fromAt);
  write.tx.delete(dosingRates).where(eq(dosingRates.id, rateId)).run();
  const former = latestOf(write, before.systemId, before.itemId);
  if (former?.toAt === before.fromAt) {
    unbookFrom(write, former, former.toAt);
    setEnd(write, former.id, null);
  }
  write.audit({ action: 'dosing.undone', entity: 'dosing_rate', entityId: rateId, before });
}

interface NewRate {
  systemId: string;
  itemId: string;
  pumpId?: string | null | undefined;
  amountPerDay: number;
  window?: DoseWindow | null | undefined;
  fromAt: number;
  note: string;
}

function insertRate(write: Write, { window, pumpId, ...rate }: NewRate): RateRow {
  return write.tx
    .insert(dosingRates)
    .values({
      ...{ id: write.newId(), systemId: rate.systemId, itemId: rate.itemId, pumpId: pumpId ?? null },
      ...{ amountPerDay: rate.amountPerDay, fromAt: rate.fromAt, note: rate.note, by: write.actor.name },
      ...{ startMinute: window?.startMinute ?? null, endMinute: window?.endMinute ?? null },
    })
    .returning()
    .get();
}

function endRate(write: Write, rate: RateRow, at: number): RateRow {
  if (at < rate.fromAt) {
    const message = 'That is before it began.';
    throw new DomainError('input.invalid', message, { fields: [{ path: 'at', message }] });
  }
  unbookFrom(write, rate, at);
  return setEnd(write, rate.id, at);
}

function setEnd(write: Write, rateId: string, toAt: number | null): RateRow {
  return write.tx
    .update(dosingRates)
    .set({ toAt, endedBy: toAt === null ? null : write.actor.name })
    .where(eq(dosingRates.id, rateId))
    .returning()
    .get();
}

function runningRow(write: Write, rateId: string): RateRow {
  const row = rateRow(write.tx, rateId);
  if (row.toAt === null) return row;
  throw new DomainError('rule.refused', 'This dose was stopped already. Begin a new one.');
}

function runningOf({ tx }: Write, systemId: string, itemId: string): RateRow | undefined {
  const isIt = and(eq(dosingRates.systemId, systemId), eq(dosingRates.itemId, itemId), isNull(dosingRates.toAt));
  return tx.select().from(dosingRates).where(isIt).get();
}

function latestOf({ tx }: Write, systemId: string, itemId: string): RateRow | undefined {
  return tx
    .select()
    .from(dosingRates)
    .where(and(eq(dosingRates.systemId, systemId), eq(dosingRates.itemId, itemId)))
    .orderBy(desc(dosingRates.fromAt), desc(isNull(dosingRates.toAt)))
    .limit(1)
    .get();
}

function assertAfterLast(write: Write, systemId: string, itemId: string, fromAt: number): void {
  const last = latestOf(write, systemId, itemId);
  if (!last?.toAt || last.toAt <= fromAt) return;
  const message = 'An earlier dose of it ran then. Begin later.';
  throw new DomainError('input.invalid', message, { fields: [{ path: 'at', message }] });
}

function assertPump(write: Write, pumpId: string | null, unit: string): void {
  if (pumpId === null) return;
  const { retiredAt } = pumpRow(write.tx, pumpId);
  const message =
    unit === 'mL' ? (retiredAt === null ? null : 'This pump is retired.') : 'A pump doses what is kept in mL only.';
  if (message !== null) throw new DomainError('input.invalid', message, { fields: [{ path: 'pumpId', message }] });
}

function windowGiven({ startMinute, endMinute }: RateRow): DoseWindow | null {
  return startMinute === null || endMinute === null ? null : { startMinute, endMinute };
}
