import type { Statement } from 'better-sqlite3';
import type { Sqlite } from '../db/client.ts';

/**
 * Keeps prepared statements by their text, so that the same query is compiled once. A history is made of few kinds of
 * statements run tens of thousands of times each, and those on tables with triggers take long to compile.
 *
 * Only for a database whose statements are never iterated: a cached one can't run twice at a time.
 */
export function cacheStatements(sqlite: Sqlite): void {
  const compiled = new Map<string, Statement>();
  const prepare = sqlite.prepare.bind(sqlite);
  const cached = (source: string): Statement => {
    const known = compiled.get(source);
    if (!known) {
      const statement = prepare(source);
      compiled.set(source, statement);
      return statement;
    }
    // A caller before may have asked for rows of another shape.
    return known.reader ? known.raw(false).pluck(false) : known;
  };
  Object.defineProperty(sqlite, 'prepare', { value: cached });
}
