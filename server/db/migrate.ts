import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { readMigrationFiles } from 'drizzle-orm/migrator';
import { migrate } from 'drizzle-orm/better-sqlite3/migrator';
import type { BetterSQLite3Database } from 'drizzle-orm/better-sqlite3';
import type { Db, Sqlite } from './client.ts';
import type * as schema from './schema/index.ts';

const migrationsFolder = fileURLToPath(new URL('../../drizzle', import.meta.url));

/**
 * Brings the schema up to date in one transaction, after a backup copy beside the file when there is data to lose.
 * Foreign keys are off meanwhile, since a rebuilt parent table would otherwise take its children along, and checked after.
 * @returns how many migrations ran
 */
export async function migrateDatabase(db: Db, sqlite: Sqlite, file: string, now: number): Promise<number> {
  const pending = countPending(sqlite);
  if (pending === 0) return 0;
  if (file !== ':memory:' && existsSync(file) && hasTables(sqlite)) await sqlite.backup(`${file}.before-${now}`);

  sqlite.pragma('foreign_keys = OFF');
  try {
    migrate(db as BetterSQLite3Database<typeof schema>, { migrationsFolder });
    const broken = sqlite.pragma('foreign_key_check') as unknown[];
    if (broken.length > 0) throw new Error(`The migration left ${broken.length} rows that point nowhere.`);
  } finally {
    sqlite.pragma('foreign_keys = ON');
  }
  return pending;
}

function hasTables(sqlite: Sqlite): boolean {
  return sqlite.prepare("SELECT 1 FROM sqlite_master WHERE type = 'table' LIMIT 1").get() !== undefined;
}

function countPending(sqlite: Sqlite): number {
  const all = readMigrationFiles({ migrationsFolder });
  const known = sqlite.prepare("SELECT 1 FROM sqlite_master WHERE name = '__drizzle_migrations'").get();
  if (!known) return all.length;
  const last = sqlite.prepare('SELECT max(created_at) AS at FROM __drizzle_migrations').get() as { at: number | null };
  return all.filter((migration) => migration.folderMillis > (last.at ?? 0)).length;
}
