import type { LogReadings, TestedValue } from '../../shared/contracts/readings.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { assertReadingValue } from '../../shared/domain/reading-value.ts';
import { LAST_COUNTS_DAYS, suspectValue, type Suggestion } from '../../shared/domain/suspect-value.ts';
import { PARAMETERS, type ParameterCode } from '../../shared/domain/units.ts';
import { DomainError, type FieldError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { valueBefore } from '../queries/readings.ts';
import { kitLotRow, testMethodRow } from '../queries/test-methods.ts';

/** A value with its unit gone and its method known. */
export interface CheckedValue {
  parameter: ParameterCode;
  /** Canonical. */
  tests: number[];
  unit: string;
  methodId: string | null;
  kitLotId: string | null;
  /** The method's name, or what was written. */
  method: string;
}

/** A value that the person is asked about, by its path, with what was probably meant. */
interface Question {
  path: string;
  kind: 'impossible' | 'unusual';
  suggestions: Suggestion[];
}

/**
 * Looks at typed values before they are stored: impossible ones are refused with what was probably meant, unusual ones
 * until they are confirmed.
 *
 * @throws {DomainError} `input.invalid` at the fields, with `details.questions`
 */
export function checkValues(db: Db, input: LogReadings, takenAt: number): CheckedValue[] {
  const fields: FieldError[] = [];
  const questions: Question[] = [];
  input.values.forEach((value, index) => {
    const last = lastOf(db, input.systemId, value.parameter, takenAt);
    const typed = [value.value, ...(value.repeats ?? [])];
    typed.forEach((test, at) => {
      const path = at === 0 ? `values.${index}.value` : `values.${index}.repeats.${at - 1}`;
      const question = ask(value, test, last, path);
      if (!question) return;
      fields.push({ path, message: question.message });
      questions.push(question);
    });
    if (input.values.findIndex(({ parameter }) => parameter === value.parameter) === index) return;
    fields.push({ path: `values.${index}.parameter`, message: 'This parameter stands here twice.' });
  });
  if (fields.length > 0) {
    throw new DomainError('input.invalid', 'Some values need another look.', { fields, details: { questions } });
  }
  return input.values.map((value, index) => checkedValue(db, value, input.method, `values.${index}.`));
}

/**
 * The same for one value of a stored reading.
 * @returns the canonical value
 */
export function checkOneValue(
  db: Db,
  reading: { systemId: string; parameter: ParameterCode; takenAt: number },
  typed: { value: number; unit: string; confirmed: boolean },
): number {
  const { systemId, parameter, takenAt } = reading;
  const question = ask({ ...typed, parameter }, typed.value, lastOf(db, systemId, parameter, takenAt), 'value');
  if (!question) return assertReadingValue(parameter, typed.value, typed.unit, 'value');
  const { message } = question;
  throw new DomainError('input.invalid', message, {
    fields: [{ path: 'value', message }],
    details: { questions: [question] },
  });
}

/** The method and kit lot that a value names, in keeping with each other. @throws {DomainError} `input.invalid` */
export function assertKit(
  db: Db,
  parameter: ParameterCode,
  { methodId, kitLotId }: { methodId: string | null; kitLotId: string | null },
  path: string,
): { name: string } | null {
  const method = methodId === null ? null : testMethodRow(db, methodId);
  if (method && method.parameter !== parameter) {
    const label = PARAMETERS.find(({ code }) => code === parameter)?.label ?? parameter;
    throw refusedAt(`${path}methodId`, `${method.name} tests something else. Choose a method of ${label}.`);
  }
  if (kitLotId !== null && kitLotRow(db, kitLotId).methodId !== methodId) {
    throw refusedAt(`${path}kitLotId`, 'Choose a kit lot of the method.');
  }
  return method;
}

function checkedValue(db: Db, value: TestedValue, written: string, path: string): CheckedValue {
  const { parameter, unit, methodId = null, kitLotId = null } = value;
  const method = assertKit(db, parameter, { methodId, kitLotId }, path);
  const tests = [value.value, ...(value.repeats ?? [])].map((test) =>
    assertReadingValue(parameter, test, unit, `${path}value`),
  );
  return { parameter, tests, unit, methodId, kitLotId, method: method?.name ?? written };
}

function ask(
  { parameter, unit, confirmed }: Pick<TestedValue, 'parameter' | 'unit' | 'confirmed'>,
  test: number,
  last: number | null,
  path: string,
): (Question & { message: string }) | null {
  const suspicion = suspectValue(parameter, test, unit, last);
  if (!suspicion || (suspicion.kind === 'unusual' && confirmed === true)) return null;
  const { kind, suggestions, message } = suspicion;
  return { path, kind, suggestions, message: kind === 'unusual' ? `${message} Confirm it to keep it.` : message };
}

function lastOf(db: Db, systemId: string, parameter: ParameterCode, takenAt: number): number | null {
  const notBefore = takenAt - LAST_COUNTS_DAYS * MS_PER_DAY;
  return valueBefore(db, systemId, parameter, { before: takenAt, notBefore });
}

function refusedAt(path: string, message: string): DomainError {
  return new DomainError('input.invalid', message, { fields: [{ path, message }] });
}
