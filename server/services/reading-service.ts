import { and, eq, isNull, ne } from 'drizzle-orm';
import type { EditReading, LogReadings, Reading } from '../../shared/contracts/readings.ts';
import { PARAMETERS } from '../../shared/domain/units.ts';
import { DomainError } from '../../shared/errors.ts';
import { domainErrorOf } from '../db/driver-errors.ts';
import { readings, users } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { type ReadingRow, readingRow, showReading } from '../queries/readings.ts';
import { systemRow } from '../queries/systems.ts';
import { actTime } from './act-time.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';
import { assertOwnPhoto } from './reading-photos.ts';
import { ReadingStatements } from './reading-statement.ts';
import { reopenTasks, settleTasks } from './task-settling.ts';
import { assertKit, checkOneValue, checkValues } from './tested-values.ts';

/**
 * Logs values that were read at one time: all or none.
 * @throws {DomainError} `record.not_found`; `input.invalid` at the fields; `record.duplicate`
 */
export function logReadings(write: Write, input: LogReadings): Reading[] {
  systemRow(write.tx, input.systemId);
  const takenAt = actTime(write, input.takenAt, 'takenAt');
  const values = checkValues(write.tx, input, takenAt);
  const by = testerName(write, input.testerId);
  if (input.photoId !== undefined) assertOwnPhoto(write, input.photoId);
  const statements = new ReadingStatements(write.tx);
  const logged = values.map(({ tests, unit, parameter, method, methodId, kitLotId }, index) => {
    const readingId = write.newId();
    const kit = { parameter, method, methodId, kitLotId, takenAt };
    storeOnce(`values.${index}.value`, parameter, () => {
      write.tx
        .insert(readings)
        .values({
          ...{ id: readingId, systemId: input.systemId, ...kit, ...statements.of({ ...kit, tests }) },
          ...{ unit: unit || null, note: input.note, photoId: input.photoId ?? null, by, createdAt: write.now },
        })
        .run();
    });
    return showReading(write.tx, readingId);
  });
  for (const after of logged) {
    write.audit({ action: 'reading.logged', entity: 'reading', entityId: after.id, after });
    settleTasks(write, {
      kind: 'test',
      systemId: after.systemId,
      parameter: after.parameter,
      at: takenAt,
      cause: after.id,
    });
  }
  return logged;
}

/**
 * Corrects a reading.
 * @throws {DomainError} `record.not_found`; `edit.stale`; `input.invalid`; `record.duplicate` where another stands at the time
 */
export function editReading(write: Write, readingId: string, ifMatch: number, edit: EditReading): Reading {
  const row = readingRow(write.tx, readingId);
  const before = showReading(write.tx, readingId);
  assertVersion(row, ifMatch, before);
  const { value, unit = '', confirmed = false, takenAt, methodId, kitLotId, photoId, ...texts } = edit;
  const fresh = value === undefined ? null : checkOneValue(write.tx, before, { value, unit, confirmed });
  if (photoId !== undefined && photoId !== null && photoId !== row.photoId) assertOwnPhoto(write, photoId);
  const kit = {
    methodId: methodId === undefined ? row.methodId : methodId,
    // Another method has other kits.
    kitLotId: kitLotId === undefined ? (methodId === undefined ? row.kitLotId : null) : kitLotId,
    takenAt: takenAt === undefined ? row.takenAt : actTime(write, takenAt, 'takenAt'),
  };
  const named = assertKit(write.tx, before.parameter, kit, '');
  const method = named && methodId !== undefined ? named.name : (texts.method ?? row.method);
  const tests = fresh === null ? testsOf(row) : [fresh];
  const stated = new ReadingStatements(write.tx).of({ ...kit, tests, method, parameter: before.parameter });
  storeOnce('takenAt', before.parameter, () => {
    write.tx
      .update(readings)
      .set({
        ...definedOnly({ note: texts.note, photoId }),
        ...{ ...kit, method, ...stated, version: row.version + 1 },
        ...(fresh === null || unit === '' ? {} : { unit }),
      })
      .where(eq(readings.id, readingId))
      .run();
  });
  const after = showReading(write.tx, readingId);
  write.audit({ action: 'reading.changed', entity: 'reading', entityId: readingId, before, after });
  return after;
}

/** Takes a reading back; the audit log keeps what it was. @returns what it was */
export function removeReading(write: Write, readingId: string): Reading {
  const before = showReading(write.tx, readingId);
  write.tx.delete(readings).where(eq(readings.id, readingId)).run();
  write.audit({ action: 'reading.removed', entity: 'reading', entityId: readingId, before });
  reopenTasks(write, readingId);
  return before;
}

function testsOf({ repeats, measured, value }: ReadingRow): number[] {
  return repeats ?? [measured ?? value];
}

/** The name of who tested. @throws {DomainError} `input.invalid` for no person of the farm */
function testerName(write: Write, testerId: string | undefined): string {
  if (testerId === undefined) return write.actor.name;
  const tester = write.tx
    .select({ name: users.name })
    .from(users)
    .where(and(eq(users.id, testerId), isNull(users.disabledAt), ne(users.role, 'buyer')))
    .get();
  if (tester) return tester.name;
  const message = 'Choose a person of the farm.';
  throw new DomainError('input.invalid', message, { fields: [{ path: 'testerId', message }] });
}

/** One reading for each system, parameter and time: the database's unique index says where there is one already. */
function storeOnce(path: string, parameter: string, store: () => void): void {
  try {
    store();
  } catch (error) {
    if (domainErrorOf(error)?.code !== 'record.duplicate') throw error;
    const label = PARAMETERS.find(({ code }) => code === parameter)?.label ?? parameter;
    const message = `${label} was logged for this time already. Correct that reading, or choose another time.`;
    throw new DomainError('record.duplicate', message, { fields: [{ path, message }] });
  }
}
