import { and, asc, eq, gte, lte } from 'drizzle-orm';
import { testErrorOf } from '../../shared/domain/test-error.ts';
import type { ParameterCode } from '../../shared/domain/units.ts';
import type { Db } from '../db/client.ts';
import { calibrations, readings } from '../db/schema/index.ts';

/** A reading with its errors, all in the parameter's canonical unit. */
export interface ReadingWithError {
  id: string;
  at: number;
  /** Less the bias of the kit, where a check tells it. */
  value: number;
  /** Standard deviation from one test to the next, of the mean where there were several. */
  sd: number;
  /** Standard deviation of the correction, the same mistake in every reading of that kit; 0 where none was made. */
  biasSd: number;
  method: string;
}

/** Readings of one parameter, oldest first, each with how far its test may be off. */
export function readingsWithError(
  db: Db,
  systemId: string,
  parameter: ParameterCode,
  from: number,
  to: number,
): ReadingWithError[] {
  return db
    .select({
      ...{ id: readings.id, at: readings.takenAt, value: readings.value, method: readings.method },
      ...{ sd: readings.sd, biasSd: calibrations.biasSd },
    })
    .from(readings)
    .leftJoin(calibrations, eq(calibrations.id, readings.calibrationId))
    .where(
      and(
        eq(readings.systemId, systemId),
        eq(readings.parameter, parameter),
        gte(readings.takenAt, from),
        lte(readings.takenAt, to),
      ),
    )
    .orderBy(asc(readings.takenAt))
    .all()
    .map(({ sd, biasSd, ...reading }) => ({
      ...reading,
      sd: sd ?? testErrorOf(parameter, reading.method).sd,
      biasSd: biasSd ?? 0,
    }));
}
