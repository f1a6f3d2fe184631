import { and, eq, gte } from 'drizzle-orm';
import { checkFor } from '../../shared/domain/calibration.ts';
import { meanOfTests } from '../../shared/domain/replicates.ts';
import { testErrorOf } from '../../shared/domain/test-error.ts';
import { PARAMETERS, type ParameterCode } from '../../shared/domain/units.ts';
import type { Db } from '../db/client.ts';
import { readings } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { type CalibrationRow, calibrationsOf, type TestMethodRow, testMethodRow } from '../queries/test-methods.ts';

/** What was tested, in the canonical unit: one test, or several of the same water. */
interface Tested {
  parameter: ParameterCode;
  tests: readonly number[];
  /** The method in words; its error counts where no method of the farm is named. */
  method: string;
  methodId: string | null;
  kitLotId: string | null;
  takenAt: number;
}

/** The columns that say what a reading states. */
interface Statement {
  value: number;
  measured: number | null;
  sd: number | null;
  repeats: number[] | null;
  calibrationId: string | null;
}

/** States readings by the farm's methods and checks, which are read once each. */
export class ReadingStatements {
  private readonly methods = new Map<string, { row: TestMethodRow; checks: CalibrationRow[] }>();
  private readonly db: Db;

  constructor(db: Db) {
    this.db = db;
  }

  of(tested: Tested): Statement {
    const method = tested.methodId === null ? null : this.method(tested.methodId);
    return stateReading(tested, method?.row ?? null, checkFor(method?.checks ?? [], tested));
  }

  private method(methodId: string) {
    const known = this.methods.get(methodId);
    if (known) return known;
    const method = { row: testMethodRow(this.db, methodId), checks: calibrationsOf(this.db, methodId) };
    this.methods.set(methodId, method);
    return method;
  }
}

/** States the readings of a method anew, after its error or its checks have changed. @returns how many changed */
export function restateReadings(
  write: Write,
  method: TestMethodRow,
  checks: readonly CalibrationRow[] = calibrationsOf(write.tx, method.id),
  from = 0,
): number {
  const rows = write.tx
    .select()
    .from(readings)
    .where(and(eq(readings.methodId, method.id), gte(readings.takenAt, from)))
    .all();
  let changed = 0;
  for (const row of rows) {
    const tests = row.repeats ?? [row.measured ?? row.value];
    const tested = { ...row, tests, parameter: method.parameter };
    const { value, measured, sd, calibrationId } = stateReading(tested, method, checkFor(checks, row));
    if (value === row.value && sd === row.sd && calibrationId === row.calibrationId) continue;
    write.tx.update(readings).set({ value, measured, sd, calibrationId }).where(eq(readings.id, row.id)).run();
    changed += 1;
  }
  return changed;
}

function stateReading(tested: Tested, method: TestMethodRow | null, check: CalibrationRow | null): Statement {
  const { parameter, tests } = tested;
  const { mean, sd } = meanOfTests(tests, method?.repeatabilitySd ?? testErrorOf(parameter, tested.method).sd);
  return {
    value: check ? Math.max(leastOf(parameter), mean - check.bias) : mean,
    measured: check ? mean : null,
    sd: method || tests.length > 1 ? sd : null,
    repeats: tests.length > 1 ? [...tests] : null,
    calibrationId: check?.id ?? null,
  };
}

/** A correction never goes below what can be, such as zero for a nutrient. */
function leastOf(parameter: ParameterCode): number {
  return PARAMETERS.find(({ code }) => code === parameter)?.plausible.min ?? 0;
}
