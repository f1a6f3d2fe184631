import { testErrorOf } from '../../shared/domain/test-error.ts';
import type { ParameterCode } from '../../shared/domain/units.ts';
import type { Db } from '../db/client.ts';
import { readingsBetween } from './readings.ts';

/** A reading with the standard deviation of its error, both in the parameter's canonical unit. */
export interface ReadingWithError {
  id: string;
  at: number;
  value: number;
  sd: number;
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
  return readingsBetween(db, systemId, parameter, from, to).map((reading) => ({
    ...reading,
    sd: testErrorOf(parameter, reading.method).sd,
  }));
}
