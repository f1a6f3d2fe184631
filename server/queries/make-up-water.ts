import { desc, eq, isNotNull, isNull, sql } from 'drizzle-orm';
import type { Cartridge, MakeUpReading, MakeUpWater } from '../../shared/contracts/make-up-water.ts';
import { CARTRIDGE_STAGES, cartridgeState, rejectionPercent } from '../../shared/domain/cartridges.ts';
import { addDays, type Day, dayOf, daysBetween, MS_PER_DAY, startOfDay } from '../../shared/domain/days.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { cartridges, makeUpReadings } from '../db/schema/index.ts';
import { farmOf } from './farm.ts';

export type CartridgeRow = typeof cartridges.$inferSelect;
type ReadingRow = typeof makeUpReadings.$inferSelect;

const MOST_READINGS = 120;
const MOST_REPLACED = 20;
/** Litres a day are the mean of so many days, from two looks at least. */
const RATE_DAYS = 28;

/** Quality of the make-up water, and the cartridges that make it. */
export function makeUpWater(db: Db, now: number): MakeUpWater {
  const readings = db.select().from(makeUpReadings).orderBy(desc(makeUpReadings.at)).limit(MOST_READINGS).all();
  const inUse = db.select().from(cartridges).where(isNull(cartridges.removedOn)).all();
  const replaced = db
    .select()
    .from(cartridges)
    .where(isNotNull(cartridges.removedOn))
    .orderBy(desc(cartridges.removedOn))
    .limit(MOST_REPLACED)
    .all();
  const asShown = (row: CartridgeRow) => toCartridge(db, row, now);
  return {
    readings: readings.map(toMakeUpReading),
    cartridges: inUse.sort(byStage).map(asShown),
    replaced: replaced.map(asShown),
    litresPerDay: litresPerDay(readings, now),
  };
}

/** @throws {DomainError} `record.not_found` */
export function cartridgeRow(db: Db, cartridgeId: string): CartridgeRow {
  const row = db.select().from(cartridges).where(eq(cartridges.id, cartridgeId)).get();
  if (!row) throw new DomainError('record.not_found', 'This cartridge is not known.');
  return row;
}

export function toMakeUpReading({
  id,
  at,
  tdsIn,
  tdsMembrane,
  tdsOut,
  litresMade,
  by,
  note,
}: ReadingRow): MakeUpReading {
  const rejection = tdsIn === null || tdsMembrane === null ? null : rejectionPercent(tdsIn, tdsMembrane);
  return { id, at, tdsIn, tdsMembrane, tdsOut, litresMade, rejection, by, note };
}

export function toCartridge(db: Db, row: CartridgeRow, now: number): Cartridge {
  const { timeZone } = farmOf(db);
  const until = row.removedOn ?? dayOf(now, timeZone);
  // What was read on the day of a change is about the one that went out.
  const span = {
    from: startOfDay(addDays(row.installedOn, 1), timeZone),
    to: row.removedOn === null ? now : startOfDay(addDays(row.removedOn, 1), timeZone) - 1,
  };
  const daysUsed = Math.max(0, daysBetween(row.installedOn, until));
  const litresUsed = litresMade(db, span);
  const { stage, lifeDays, lifeL, limit } = row;
  const measured = measuredFor(db, row, span);
  const {
    state,
    by: dueBy,
    usedPart,
  } = cartridgeState({
    ...{ stage, lifeDays, lifeL, limit, daysUsed, litresUsed, measured },
  });
  const { id, name, itemId, installedOn, removedOn, by, note, version } = row;
  return {
    ...{ id, stage, name, itemId, installedOn, removedOn, lifeDays, lifeL, limit },
    ...{ daysUsed, litresUsed, state, dueBy, usedPart, by, note, version },
  };
}

interface Span {
  from: number;
  to: number;
}

function litresMade(db: Db, { from, to }: Span): number {
  const row = db
    .select({ litres: sql<number>`total(${makeUpReadings.litresMade})` })
    .from(makeUpReadings)
    .where(sql`${makeUpReadings.at} >= ${from} AND ${makeUpReadings.at} <= ${to}`)
    .get();
  return row?.litres ?? 0;
}

/** The last figure that a cartridge's limit is for, since it was put in. */
function measuredFor(db: Db, { stage }: CartridgeRow, { from, to }: Span): number | null {
  if (stage !== 'membrane' && stage !== 'resin') return null;
  const isKnown =
    stage === 'resin'
      ? isNotNull(makeUpReadings.tdsOut)
      : sql`${makeUpReadings.tdsMembrane} IS NOT NULL AND ${makeUpReadings.tdsIn} > 0`;
  const row = db
    .select()
    .from(makeUpReadings)
    .where(sql`${makeUpReadings.at} >= ${from} AND ${makeUpReadings.at} <= ${to} AND ${isKnown}`)
    .orderBy(desc(makeUpReadings.at))
    .limit(1)
    .get();
  if (!row) return null;
  return stage === 'resin' ? row.tdsOut : toMakeUpReading(row).rejection;
}

function litresPerDay(readings: readonly ReadingRow[], now: number): number | null {
  const made = readings.filter(({ at, litresMade }) => litresMade !== null && at > now - RATE_DAYS * MS_PER_DAY);
  const first = made.at(-1);
  const last = made[0];
  if (!first || !last || last.at - first.at < MS_PER_DAY) return null;
  // What the first look found was made before it.
  const litres = made.slice(0, -1).reduce((sum, { litresMade }) => sum + (litresMade ?? 0), 0);
  return litres / ((last.at - first.at) / MS_PER_DAY);
}

function byStage(a: { stage: Cartridge['stage']; installedOn: Day }, b: typeof a): number {
  const order = CARTRIDGE_STAGES.indexOf(a.stage) - CARTRIDGE_STAGES.indexOf(b.stage);
  return order || a.installedOn.localeCompare(b.installedOn);
}
