import type { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import { DomainError } from '../../shared/errors.ts';

/** An opaque cursor: the sort values of the last row of a page. */
export function writeCursor(parts: readonly (string | number)[]): string {
  return Buffer.from(JSON.stringify(parts)).toString('base64url');
}

/** The sort values in a cursor, checked by their schema. @throws {DomainError} `input.invalid` for anything made up */
export function readCursor<Parts extends z.ZodType>(cursor: string, parts: Parts): z.output<Parts> {
  const parsed = parts.safeParse(decoded(cursor));
  if (parsed.success) return parsed.data;
  throw new DomainError('input.invalid', 'Open this list from its start again.', {
    fields: [{ path: 'cursor', message: 'This place in the list is not known.' }],
  });
}

/** Makes a page of rows that were read with one more than `limit`, which tells whether more follow. */
export function pageFrom<Row, Item>(
  rows: readonly Row[],
  limit: number,
  total: number,
  { item, cursor }: { item: (row: Row) => Item; cursor: (row: Row) => readonly (string | number)[] },
): Page<Item> {
  const shown = rows.slice(0, limit);
  const last = shown.at(-1);
  const nextCursor = rows.length > limit && last !== undefined ? writeCursor(cursor(last)) : null;
  return { items: shown.map(item), nextCursor, total };
}

function decoded(cursor: string): unknown {
  try {
    return JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'));
  } catch {
    return null;
  }
}
