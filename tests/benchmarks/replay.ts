import { randomUUID } from 'node:crypto';
import { drizzle } from 'drizzle-orm/better-sqlite3';
import type { Db, Sqlite } from '../../server/db/client.ts';
import * as schema from '../../server/db/schema/index.ts';

interface Statement {
  sql: string;
  params: unknown[];
}

/** Notes the SQL that `act` runs. */
export function recordSql(sqlite: Sqlite, act: (db: Db) => unknown): Statement[] {
  const statements: Statement[] = [];
  const logger = { logQuery: (sql: string, params: unknown[]) => void statements.push({ sql, params }) };
  act(drizzle(sqlite, { schema, logger }));
  return statements;
}

/**
 * Runs noted SQL again without anything around it, each statement prepared once. Ids that were new then are made new
 * each time, as are the numbers in `counted`, so that the rows can be stored again.
 */
export function replayer(
  sqlite: Sqlite,
  statements: readonly Statement[],
  fresh: { ids: readonly string[]; counted: readonly number[] } = { ids: [], counted: [] },
): (run: number) => void {
  const prepared = statements.map(({ sql, params }) => ({ statement: sqlite.prepare(sql), params }));
  const runAll = (run: number) => {
    const ids = new Map(fresh.ids.map((id) => [id, randomUUID() as string]));
    const renewed = (value: unknown) => {
      if (typeof value === 'number') return fresh.counted.includes(value) ? value + run + 1 : value;
      if (typeof value !== 'string') return value;
      return [...ids].reduce((text, [before, after]) => text.replaceAll(before, after), value);
    };
    for (const { statement, params } of prepared) {
      const values = params.map(renewed);
      if (statement.reader) statement.all(...values);
      else statement.run(...values);
    }
  };
  const inTransaction = sqlite.transaction(runAll);
  return (run) => {
    if (fresh.ids.length > 0) inTransaction.immediate(run);
    else runAll(run);
  };
}
