import { and, asc, eq, gte, max, sql } from 'drizzle-orm';
import { addDays, type Day, dayOf, eachDay, startOfDay } from '../../shared/domain/days.ts';
import { DomainError } from '../../shared/errors.ts';
import { dosingBookings, dosingRates, lots } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { dosedBetween, type RateRow } from '../queries/dosed-amounts.ts';
import { factorsByPump } from '../queries/dosing-pumps.ts';
import { farmOf } from '../queries/farm.ts';
import { returnSupply } from './supply-return.ts';
import { useSupply } from './supply-use.ts';

/**
 * Books what running doses took from the supplies, a farm's day at a time, once the day or the dose is over. Done twice
 * it changes nothing. Where the lots hold less than ran, what they hold is booked and the rest is told.
 */
export function bookDosing(write: Write): void {
  const { timeZone } = farmOf(write.tx);
  const today = dayOf(write.now, timeZone);
  const factors = factorsByPump(write.tx);
  for (const { rate, day } of daysToBook(write, today, timeZone)) {
    const span = { from: startOfDay(day, timeZone), to: startOfDay(addDays(day, 1), timeZone), timeZone };
    const amount = dosedBetween(rate, factors, span).reduce((sum, stretch) => sum + stretch.amount, 0);
    book(write, rate, { day, amount, at: Math.min(span.to - 1, rate.toAt ?? span.to) });
  }
}

/** Takes back what was booked from an instant's day on, since the dose ended or changed within it. */
export function unbookFrom(write: Write, rate: RateRow, at: number): void {
  const day = dayOf(at, farmOf(write.tx).timeZone);
  const rows = write.tx
    .select()
    .from(dosingBookings)
    .where(and(eq(dosingBookings.rateId, rate.id), gte(dosingBookings.day, day)))
    .all();
  for (const { id } of rows) {
    if (!couldReturn(write, id)) continue;
    write.tx.delete(dosingBookings).where(eq(dosingBookings.id, id)).run();
  }
}

/** A count since has put right what the books said, so what was booked before it stays. */
function couldReturn(write: Write, bookingId: string): boolean {
  try {
    returnSupply(write, 'dosing', bookingId, 'The count has put it right.');
    return true;
  } catch (error) {
    if (error instanceof DomainError && error.code === 'rule.refused') return false;
    throw error;
  }
}

/** Days of each dose that are over and not booked yet; bookings follow one another without gaps. */
function daysToBook({ tx }: Write, today: Day, timeZone: string): { rate: RateRow; day: Day }[] {
  return tx
    .select({ rate: dosingRates, booked: max(dosingBookings.day) })
    .from(dosingRates)
    .leftJoin(dosingBookings, eq(dosingBookings.rateId, dosingRates.id))
    .groupBy(dosingRates.id)
    .orderBy(asc(dosingRates.fromAt))
    .all()
    .flatMap(({ rate, booked }) => {
      const first = booked === null ? dayOf(rate.fromAt, timeZone) : addDays(booked, 1);
      const last = rate.toAt === null ? addDays(today, -1) : dayOf(rate.toAt, timeZone);
      return eachDay(first, last).map((day) => ({ rate, day }));
    });
}

function book(write: Write, rate: RateRow, { day, amount, at }: { day: Day; amount: number; at: number }): void {
  const booked = Math.min(amount, onHandOf(write, rate.itemId));
  const id = write.newId();
  write.tx.insert(dosingBookings).values({ id, rateId: rate.id, day, amount, booked }).run();
  const cause = { cause: 'dosing', causeId: id, systemId: rate.systemId, at } as const;
  useSupply(write, { itemId: rate.itemId, quantity: booked, ...cause });
  write.audit({ action: 'dosing.booked', entity: 'dosing_rate', entityId: rate.id, after: { day, amount, booked } });
}

function onHandOf({ tx }: Write, itemId: string): number {
  const held = tx
    .select({ amount: sql<number>`total(${lots.remaining})` })
    .from(lots)
    .where(eq(lots.itemId, itemId))
    .get();
  return held?.amount ?? 0;
}
