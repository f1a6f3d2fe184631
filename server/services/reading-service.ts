import { eq } from 'drizzle-orm';
import type { EditReading, LogReadings, Reading } from '../../shared/contracts/readings.ts';
import { assertReadingValue, readingValue } from '../../shared/domain/reading-value.ts';
import { PARAMETERS } from '../../shared/domain/units.ts';
import { DomainError, type FieldError } from '../../shared/errors.ts';
import { domainErrorOf } from '../db/driver-errors.ts';
import { readings } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { readingRow, showReading } from '../queries/readings.ts';
import { systemRow } from '../queries/systems.ts';
import { actTime } from './act-time.ts';
import { assertVersion } from './edit-check.ts';

/** Logs values that were read at one time: all or none. */
export function logReadings(write: Write, input: LogReadings): Reading[] {
  systemRow(write.tx, input.systemId);
  const takenAt = actTime(write, input.takenAt, 'takenAt');
  const values = canonicalValues(input.values);
  const logged = values.map(({ parameter, value }, index) => {
    const readingId = write.newId();
    storeOnce(`values.${index}.value`, parameter, () => {
      write.tx
        .insert(readings)
        .values({
          ...{ id: readingId, systemId: input.systemId, parameter, value, takenAt },
          ...{ method: input.method, note: input.note, by: write.actor.name, createdAt: write.now },
        })
        .run();
    });
    return showReading(write.tx, readingId);
  });
  for (const after of logged) {
    write.audit({ action: 'reading.logged', entity: 'reading', entityId: after.id, after });
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
  const { value, unit = '', takenAt, ...texts } = edit;
  const changes = {
    ...texts,
    ...(value === undefined ? {} : { value: assertReadingValue(before.parameter, value, unit, 'value') }),
    ...(takenAt === undefined ? {} : { takenAt: actTime(write, takenAt, 'takenAt') }),
  };
  storeOnce('takenAt', before.parameter, () => {
    write.tx
      .update(readings)
      .set({ ...changes, version: row.version + 1 })
      .where(eq(readings.id, readingId))
      .run();
  });
  const after = showReading(write.tx, readingId);
  write.audit({ action: 'reading.changed', entity: 'reading', entityId: readingId, before, after });
  return after;
}

/** Takes a reading back; the audit log keeps what it was. */
export function removeReading(write: Write, readingId: string): void {
  const before = showReading(write.tx, readingId);
  write.tx.delete(readings).where(eq(readings.id, readingId)).run();
  write.audit({ action: 'reading.removed', entity: 'reading', entityId: readingId, before });
}

function canonicalValues(given: LogReadings['values']) {
  const fields: FieldError[] = [];
  const values = given.flatMap(({ parameter, value, unit }, index) => {
    const read = readingValue(parameter, value, unit);
    if (read.problem === null) return [{ parameter, value: read.value }];
    fields.push({ path: `values.${index}.value`, message: read.problem });
    return [];
  });
  given.forEach(({ parameter }, index) => {
    if (given.findIndex((each) => each.parameter === parameter) === index) return;
    fields.push({ path: `values.${index}.parameter`, message: 'This parameter stands here twice.' });
  });
  if (fields.length > 0) throw new DomainError('input.invalid', 'Some values need another look.', { fields });
  return values;
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
