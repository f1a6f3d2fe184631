import { eq } from 'drizzle-orm';
import type { Calibrate, Calibration } from '../../shared/contracts/test-methods.ts';
import { calibrationBias } from '../../shared/domain/calibration.ts';
import { assertReadingValue } from '../../shared/domain/reading-value.ts';
import { canonicalDifference, SD_PER_HALF_INTERVAL } from '../../shared/domain/test-error.ts';
import { DomainError } from '../../shared/errors.ts';
import { calibrations } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import {
  calibrationsOf,
  kitLotRow,
  showCalibration,
  type TestMethodRow,
  testMethodRow,
} from '../queries/test-methods.ts';
import { actTime } from './act-time.ts';
import { restateReadings } from './reading-statement.ts';

/**
 * Stores a check of a method against a known solution, and corrects the readings that it counts for.
 * @throws {DomainError} `record.not_found`; `input.invalid` at the field
 */
export function calibrate(write: Write, methodId: string, input: Calibrate): Calibration {
  const method = testMethodRow(write.tx, methodId);
  const { kitLotId, unit, solution, note } = input;
  assertLotOf(write, methodId, kitLotId);
  const at = actTime(write, input.at);
  const referenceValue = assertReadingValue(method.parameter, input.referenceValue, unit, 'referenceValue');
  const found = input.found.map((value, index) => assertReadingValue(method.parameter, value, unit, `found.${index}`));
  const referenceSd = canonicalDifference(method.parameter, input.referenceError, unit) / SD_PER_HALF_INTERVAL;
  const { bias, biasSd } = calibrationBias({
    ...{ found, referenceValue, referenceSd },
    repeatabilitySd: method.repeatabilitySd,
  });
  const id = write.newId();
  write.tx
    .insert(calibrations)
    .values({
      ...{ id, methodId, kitLotId, at, solution, note, referenceValue, referenceSd, found, bias, biasSd },
      ...{ by: write.actor.name, createdAt: write.now },
    })
    .run();
  restateReadings(write, method, calibrationsOf(write.tx, methodId), at);
  const after = showCalibration(write.tx, id);
  write.audit({ action: 'calibration.made', entity: 'calibration', entityId: id, after });
  return after;
}

/** Takes a check back: what it corrected stands as the check before it says. @throws {DomainError} `record.not_found` */
export function removeCalibration(write: Write, calibrationId: string): void {
  const before = showCalibration(write.tx, calibrationId);
  const others = calibrationsOf(write.tx, before.methodId).filter(({ id }) => id !== calibrationId);
  // First the readings let go of it, then it may go.
  restateReadings(write, testMethodRow(write.tx, before.methodId), others, before.at);
  write.tx.delete(calibrations).where(eq(calibrations.id, calibrationId)).run();
  write.audit({ action: 'calibration.removed', entity: 'calibration', entityId: calibrationId, before });
}

/** After a method got another error: its checks are as sure as that makes them, and so are its readings. */
export function restateMethod(write: Write, method: TestMethodRow): void {
  for (const check of calibrationsOf(write.tx, method.id)) {
    const { biasSd } = calibrationBias({ ...check, repeatabilitySd: method.repeatabilitySd });
    write.tx.update(calibrations).set({ biasSd }).where(eq(calibrations.id, check.id)).run();
  }
  restateReadings(write, method);
}

function assertLotOf(write: Write, methodId: string, kitLotId: string | null): void {
  if (kitLotId === null || kitLotRow(write.tx, kitLotId).methodId === methodId) return;
  const message = 'Choose a kit lot of this method.';
  throw new DomainError('input.invalid', message, { fields: [{ path: 'kitLotId', message }] });
}
