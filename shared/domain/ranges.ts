import { DomainError } from '../errors.ts';

/**
 * Refuses a value outside its limits, NaN included.
 *
 * @param name what the value is, with its unit, as people read it
 * @throws {DomainError} `domain.out_of_range`
 */
export function assertWithin(name: string, value: number, min: number, max: number): void {
  if (value >= min && value <= max) return;
  throw new DomainError('domain.out_of_range', betweenWords(name, min, max), { details: { value, min, max } });
}

/**
 * The same for an input with a name of its own, so that the message can stand at its field.
 *
 * @param path name of the input in what was given
 * @throws {DomainError} `domain.out_of_range` with the path in `fields`
 */
export function assertInput(path: string, name: string, value: number, min: number, max: number): void {
  if (value >= min && value <= max) return;
  const message = betweenWords(name, min, max);
  throw new DomainError('domain.out_of_range', message, {
    fields: [{ path, message }],
    details: { input: path, value, min, max },
  });
}

/** Refuses a negative or endless value. @throws {DomainError} `domain.out_of_range` */
export function assertNotNegative(name: string, value: number): void {
  if (value >= 0 && Number.isFinite(value)) return;
  throw new DomainError('domain.out_of_range', `${name} must be zero or more.`, { details: { value } });
}

/** Refuses zero and less. @throws {DomainError} `domain.out_of_range` */
export function assertAboveZero(name: string, value: number): void {
  if (value > 0 && Number.isFinite(value)) return;
  throw new DomainError('domain.out_of_range', `${name} must be above zero.`, { details: { value } });
}

/** Refuses a purity that is no part of a whole. @throws {DomainError} `domain.out_of_range` */
export function assertPurity(purity: number): void {
  if (purity > 0 && purity <= 1) return;
  throw new DomainError('domain.out_of_range', 'Purity must be above 0 % and at most 100 %.', { details: { purity } });
}

/** Limits that were worked out have more digits than anybody reads. */
function betweenWords(name: string, min: number, max: number): string {
  const shown = (limit: number) => String(Number(limit.toPrecision(6)));
  return `${name} must be between ${shown(min)} and ${shown(max)}.`;
}
