import { and, eq } from 'drizzle-orm';
import type {
  AddKitLot,
  CreateTestMethod,
  EditKitLot,
  EditTestMethod,
  KitLot,
  TestMethod,
} from '../../shared/contracts/test-methods.ts';
import { canonicalDifference, SD_PER_HALF_INTERVAL } from '../../shared/domain/test-error.ts';
import { type ParameterCode, unitsOf } from '../../shared/domain/units.ts';
import { USUAL_METHOD_SOURCE, USUAL_METHODS } from '../../shared/domain/usual-methods.ts';
import { DomainError } from '../../shared/errors.ts';
import { domainErrorOf } from '../db/driver-errors.ts';
import { kitLots, testMethods } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { kitLotRow, listTestMethods, showTestMethod, testMethodRow, toKitLot } from '../queries/test-methods.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';
import { restateMethod } from './calibration-service.ts';

/** Adds a method. @throws {DomainError} `input.invalid`; `record.duplicate` */
export function createTestMethod(write: Write, input: CreateTestMethod): TestMethod {
  const { parameter, name, unit, error, step, source } = input;
  assertUnit(parameter, unit);
  return insertMethod(write, {
    ...{ parameter, name, unit, source },
    repeatabilitySd: canonicalDifference(parameter, error, unit) / SD_PER_HALF_INTERVAL,
    resolution: canonicalDifference(parameter, step, unit),
  });
}

/** Adds the usual methods that the farm has not yet. */
export function addUsualMethods(write: Write): TestMethod[] {
  for (const method of USUAL_METHODS) {
    const { parameter, name } = method;
    const there = write.tx
      .select({ id: testMethods.id })
      .from(testMethods)
      .where(and(eq(testMethods.parameter, parameter), eq(testMethods.name, name)))
      .get();
    if (!there) insertMethod(write, { ...method, source: USUAL_METHOD_SOURCE });
  }
  return listTestMethods(write.tx);
}

/**
 * Changes a method. Readings that name it get its new error.
 * @throws {DomainError} `record.not_found`; `edit.stale`; `input.invalid`; `record.duplicate`
 */
export function editTestMethod(write: Write, methodId: string, ifMatch: number, edit: EditTestMethod): TestMethod {
  const row = testMethodRow(write.tx, methodId);
  const before = showTestMethod(write.tx, methodId);
  assertVersion(row, ifMatch, before);
  const { error, step, retired, ...texts } = edit;
  const unit = texts.unit ?? row.unit;
  assertUnit(row.parameter, unit);
  const sd = error === undefined ? undefined : canonicalDifference(row.parameter, error, unit) / SD_PER_HALF_INTERVAL;
  const resolution = step === undefined ? undefined : canonicalDifference(row.parameter, step, unit);
  onceIn('name', 'This parameter has a method of this name already.', () => {
    write.tx
      .update(testMethods)
      .set({
        ...definedOnly({ ...texts, repeatabilitySd: sd, resolution }),
        ...(retired === undefined ? {} : { retiredAt: retired ? (row.retiredAt ?? write.now) : null }),
        version: row.version + 1,
      })
      .where(eq(testMethods.id, methodId))
      .run();
  });
  if (sd !== undefined && sd !== row.repeatabilitySd) restateMethod(write, testMethodRow(write.tx, methodId));
  const after = showTestMethod(write.tx, methodId);
  write.audit({ action: 'test_method.changed', entity: 'test_method', entityId: methodId, before, after });
  return after;
}

/** @throws {DomainError} `record.not_found`; `input.invalid`; `record.duplicate` */
export function addKitLot(write: Write, methodId: string, input: AddKitLot): KitLot {
  testMethodRow(write.tx, methodId);
  assertOrder(input);
  const id = write.newId();
  onceIn('code', 'This method has a kit lot of this code already.', () => {
    write.tx
      .insert(kitLots)
      .values({ id, methodId, ...input, createdAt: write.now })
      .run();
  });
  const after = toKitLot(kitLotRow(write.tx, id));
  write.audit({ action: 'kit_lot.added', entity: 'kit_lot', entityId: id, after });
  return after;
}

/** @throws {DomainError} `record.not_found`; `edit.stale`; `input.invalid`; `record.duplicate` */
export function editKitLot(write: Write, kitLotId: string, ifMatch: number, edit: EditKitLot): KitLot {
  const row = kitLotRow(write.tx, kitLotId);
  const before = toKitLot(row);
  assertVersion(row, ifMatch, before);
  const { usedUp, ...fields } = edit;
  assertOrder({ ...row, ...definedOnly(fields) });
  onceIn('code', 'This method has a kit lot of this code already.', () => {
    write.tx
      .update(kitLots)
      .set({
        ...definedOnly(fields),
        ...(usedUp === undefined ? {} : { usedUpAt: usedUp ? (row.usedUpAt ?? write.now) : null }),
        version: row.version + 1,
      })
      .where(eq(kitLots.id, kitLotId))
      .run();
  });
  const after = toKitLot(kitLotRow(write.tx, kitLotId));
  write.audit({ action: 'kit_lot.changed', entity: 'kit_lot', entityId: kitLotId, before, after });
  return after;
}

function insertMethod(
  write: Write,
  values: Omit<typeof testMethods.$inferInsert, 'id' | 'createdAt' | 'version' | 'retiredAt'>,
): TestMethod {
  const id = write.newId();
  onceIn('name', 'This parameter has a method of this name already.', () => {
    write.tx
      .insert(testMethods)
      .values({ id, ...values, createdAt: write.now })
      .run();
  });
  const after = showTestMethod(write.tx, id);
  write.audit({ action: 'test_method.created', entity: 'test_method', entityId: id, after });
  return after;
}

function assertUnit(parameter: ParameterCode, unit: string): void {
  if (unitsOf(parameter).includes(unit)) return;
  throw refused('unit', `Choose one of these units: ${unitsOf(parameter).join(', ')}.`);
}

function assertOrder({ openedOn, expiresOn }: { openedOn: string | null; expiresOn: string | null }): void {
  if (openedOn === null || expiresOn === null || openedOn <= expiresOn) return;
  throw refused('expiresOn', 'It can not expire before it was opened.');
}

/** Runs a write whose uniqueness the database keeps, and says at the field where it is broken. */
function onceIn(path: string, message: string, store: () => void): void {
  try {
    store();
  } catch (error) {
    if (domainErrorOf(error)?.code !== 'record.duplicate') throw error;
    throw new DomainError('record.duplicate', message, { fields: [{ path, message }] });
  }
}

function refused(path: string, message: string): DomainError {
  return new DomainError('input.invalid', message, { fields: [{ path, message }] });
}
