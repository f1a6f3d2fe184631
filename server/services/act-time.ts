import { DomainError } from '../../shared/errors.ts';
import type { Write } from '../db/write.ts';

const CLOCK_SLACK_MS = 5 * 60_000;

/**
 * When an act happened: as given (phones send late, with the time of the act), or now.
 *
 * @throws {DomainError} `input.invalid` at the field for a time that is still to come
 */
export function actTime(write: Write, given: number | undefined, field = 'at'): number {
  if (given === undefined) return write.now;
  if (given <= write.now + CLOCK_SLACK_MS) return given;
  throw new DomainError('input.invalid', 'This time is still to come. Check the clock and the day.', {
    fields: [{ path: field, message: 'This time is still to come.' }],
  });
}
