import SqliteDatabase from 'better-sqlite3';
import { drizzle } from 'drizzle-orm/better-sqlite3';
import type { BaseSQLiteDatabase } from 'drizzle-orm/sqlite-core';
import * as schema from './schema/index.ts';

/** What queries take: the database, or the transaction under way. */
export type Db = BaseSQLiteDatabase<'sync', SqliteDatabase.RunResult, typeof schema>;
export type Sqlite = SqliteDatabase.Database;

/** Opens the database file (or `:memory:`) with the pragmas that everything relies on. The only place that opens one. */
export function openDatabase(file: string): { db: Db; sqlite: Sqlite } {
  const sqlite = new SqliteDatabase(file);
  sqlite.pragma('journal_mode = WAL');
  // What was answered must outlast a power cut: the payment service tells of a payment only until we say that we have it.
  sqlite.pragma('synchronous = FULL');
  sqlite.pragma('foreign_keys = ON');
  sqlite.pragma('busy_timeout = 5000');
  sqlite.pragma('cache_size = -32000');
  return { db: drizzle(sqlite, { schema }), sqlite };
}
