import { DomainError } from '../errors.ts';

/** Size of a rack: rows are lettered from A, columns numbered from 1. */
export interface RackSize {
  rows: number;
  columns: number;
}

/** Every position of a rack in reading order, … B-1, …; rows 1 to 26, columns 1 to 99. */
export function positionsOf({ rows, columns }: RackSize): string[] {
  return Array.from({ length: rows * columns }, (_, index) =>
    positionAt(Math.floor(index / columns), (index % columns) + 1),
  );
}

/** Row index from 0 and column from 1 of a position like 'C-11', or null where the text is none. */
export function parsePosition(text: string): { row: number; column: number } | null {
  const match = /^([A-Z])-([1-9]\d?)$/.exec(text);
  if (!match?.[1] || !match[2]) return null;
  return { row: match[1].charCodeAt(0) - 65, column: Number(match[2]) };
}

/** The name of a place on a rack, such as `B-3`, from its row, counted from 0, and its column, counted from 1. */
export function positionAt(row: number, column: number): string {
  return `${String.fromCharCode(65 + row)}-${column}`;
}

/** Whether a rack of this size has the position. */
export function hasPosition({ rows, columns }: RackSize, position: string): boolean {
  const place = parsePosition(position);
  return place !== null && place.row < rows && place.column <= columns;
}

/**
 * Free positions for a number of plugs, in reading order from a start.
 *
 * @param taken positions that plugs stand at
 * @param start first position to look at; left out: A-1
 * @throws {DomainError} `input.invalid` for a start that the rack does not have; `rule.refused` where too few are free
 */
export function freePositions(size: RackSize, taken: Iterable<string>, count: number, start = 'A-1'): string[] {
  assertPosition(size, start, 'startPosition');
  const occupied = new Set(taken);
  const all = positionsOf(size);
  const free = all.slice(all.indexOf(start)).filter((position) => !occupied.has(position));
  if (free.length >= count) return free.slice(0, count);
  throw new DomainError(
    'rule.refused',
    `Only ${free.length} positions are free from ${start} on, for ${count} plugs. Choose another rack or start earlier.`,
    { details: { free: free.length, wanted: count, start } },
  );
}

/** @throws {DomainError} `input.invalid` at the field, where the rack has no such position */
export function assertPosition(size: RackSize, position: string, field: string): void {
  if (hasPosition(size, position)) return;
  const last = positionAt(size.rows - 1, size.columns);
  const message = `This rack goes from A-1 to ${last}.`;
  throw new DomainError('input.invalid', message, { fields: [{ path: field, message }] });
}
