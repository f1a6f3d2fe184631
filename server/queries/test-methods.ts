import { asc, count, desc, eq, isNotNull } from 'drizzle-orm';
import type { Calibration, KitLot, TestMethod } from '../../shared/contracts/test-methods.ts';
import { calibrationBias } from '../../shared/domain/calibration.ts';
import { differenceInUnit, SD_PER_HALF_INTERVAL } from '../../shared/domain/test-error.ts';
import { PARAMETER_CODES, type ParameterCode } from '../../shared/domain/units.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { calibrations, kitLots, readings, testMethods } from '../db/schema/index.ts';

export type TestMethodRow = typeof testMethods.$inferSelect & { parameter: ParameterCode };
export type KitLotRow = typeof kitLots.$inferSelect;
export type CalibrationRow = typeof calibrations.$inferSelect;

const CHECKS_SHOWN = 10;

/** All methods in the order of the parameters, those in use first. */
export function listTestMethods(db: Db): TestMethod[] {
  const rows = db.select().from(testMethods).orderBy(asc(testMethods.retiredAt), asc(testMethods.createdAt)).all();
  const all = withParts(db, rows.map(knownRow));
  return PARAMETER_CODES.flatMap((code) => all.filter(({ parameter }) => parameter === code));
}

export function showTestMethod(db: Db, methodId: string): TestMethod {
  const [method] = withParts(db, [testMethodRow(db, methodId)]);
  if (!method) throw new Error('A method that was just read is gone.');
  return method;
}

/** @throws {DomainError} `record.not_found` */
export function testMethodRow(db: Db, methodId: string): TestMethodRow {
  const row = db.select().from(testMethods).where(eq(testMethods.id, methodId)).get();
  if (!row) throw new DomainError('record.not_found', 'There is no such test method. Choose one from the list.');
  return knownRow(row);
}

/** @throws {DomainError} `record.not_found` */
export function kitLotRow(db: Db, kitLotId: string): KitLotRow {
  const row = db.select().from(kitLots).where(eq(kitLots.id, kitLotId)).get();
  if (!row) throw new DomainError('record.not_found', 'There is no such kit lot. Choose one of its method.');
  return row;
}

/** Every check of a method, oldest first. */
export function calibrationsOf(db: Db, methodId: string): CalibrationRow[] {
  return db
    .select()
    .from(calibrations)
    .where(eq(calibrations.methodId, methodId))
    .orderBy(asc(calibrations.at), asc(calibrations.createdAt))
    .all();
}

export function showCalibration(db: Db, calibrationId: string): Calibration {
  const row = db
    .select({ check: calibrations, method: testMethods })
    .from(calibrations)
    .innerJoin(testMethods, eq(testMethods.id, calibrations.methodId))
    .where(eq(calibrations.id, calibrationId))
    .get();
  if (!row) throw new DomainError('record.not_found', 'This check is gone. Someone took it back.');
  const corrects = db.select({ n: count() }).from(readings).where(eq(readings.calibrationId, calibrationId)).get();
  return toCalibration(row.check, row.method.repeatabilitySd, corrects?.n ?? 0);
}

export function toKitLot({ id, methodId, code, openedOn, expiresOn, usedUpAt, version }: KitLotRow): KitLot {
  return { id, methodId, code, openedOn, expiresOn, usedUp: usedUpAt !== null, version };
}

function withParts(db: Db, rows: readonly TestMethodRow[]): TestMethod[] {
  const lots = db.select().from(kitLots).orderBy(asc(kitLots.usedUpAt), desc(kitLots.createdAt)).all();
  const checks = db.select().from(calibrations).orderBy(desc(calibrations.at), desc(calibrations.createdAt)).all();
  const byMethod = counted(db, readings.methodId);
  const byCheck = counted(db, readings.calibrationId);
  return rows.map((row) => {
    const { id, parameter, name, unit, repeatabilitySd, source, version } = row;
    return {
      ...{ id, parameter, name, unit, repeatabilitySd, source, version, retired: row.retiredAt !== null },
      error: inUnit(row, SD_PER_HALF_INTERVAL * repeatabilitySd),
      step: inUnit(row, row.resolution),
      readings: byMethod.get(id) ?? 0,
      lots: lots.filter(({ methodId }) => methodId === id).map(toKitLot),
      calibrations: checks
        .filter(({ methodId }) => methodId === id)
        .slice(0, CHECKS_SHOWN)
        .map((check) => toCalibration(check, repeatabilitySd, byCheck.get(check.id) ?? 0)),
    };
  });
}

/** Readings by method or by check. */
function counted(db: Db, column: typeof readings.methodId | typeof readings.calibrationId): Map<string, number> {
  const rows = db.select({ key: column, n: count() }).from(readings).where(isNotNull(column)).groupBy(column).all();
  return new Map(rows.flatMap(({ key, n }) => (key === null ? [] : [[key, n] as const])));
}

function toCalibration(row: CalibrationRow, repeatabilitySd: number, corrects: number): Calibration {
  const { id, methodId, kitLotId, at, by, note, solution, referenceValue, referenceSd, found, bias, biasSd } = row;
  const { mean, low, high, isDistinct } = calibrationBias({ found, referenceValue, referenceSd, repeatabilitySd });
  return {
    ...{ id, methodId, kitLotId, at, by, note, solution, referenceValue, referenceSd, found },
    ...{ mean, bias, biasSd, low, high, isDistinct, corrects },
  };
}

/** A difference in the unit that is read, without the noise of the way there and back. */
function inUnit({ parameter, unit }: TestMethodRow, difference: number): number {
  return Number(differenceInUnit(parameter, difference, unit).toPrecision(9));
}

/** The table only ever gets codes of the list; the column's type is plain text. */
function knownRow(row: typeof testMethods.$inferSelect): TestMethodRow {
  const parameter = PARAMETER_CODES.find((code) => code === row.parameter);
  if (!parameter) throw new Error(`Test method of an unknown parameter ${row.parameter}.`);
  return { ...row, parameter };
}
