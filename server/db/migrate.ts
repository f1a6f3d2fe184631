import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { readMigrationFiles, type MigrationMeta } from 'drizzle-orm/migrator';
import type { Sqlite } from './client.ts';

const ourMigrations = fileURLToPath(new URL('../../drizzle', import.meta.url));

/**
 * Brings the schema up to date in one transaction, after a backup copy beside the file when there is data to lose.
 * Foreign keys are off meanwhile, since a rebuilt parent table would otherwise take its children along; they are checked
 * before anything is kept.
 * @returns how many migrations ran
 * @throws {Error} for a database of a newer version, and where a migration fails; the database is then as it was
 */
export async function migrateDatabase(
  sqlite: Sqlite,
  file: string,
  now: number,
  migrationsFolder: string = ourMigrations,
): Promise<number> {
  const all = readMigrationFiles({ migrationsFolder });
  const pending = pendingOf(sqlite, all);
  if (pending.length === 0) return 0;
  if (file !== ':memory:' && existsSync(file) && hasTables(sqlite)) await sqlite.backup(`${file}.before-${now}`);

  sqlite.pragma('foreign_keys = OFF');
  try {
    // Asked again under the lock: another process may have been quicker.
    return sqlite.transaction(() => run(sqlite, pendingOf(sqlite, all))).immediate();
  } finally {
    sqlite.pragma('foreign_keys = ON');
  }
}

function run(sqlite: Sqlite, pending: readonly MigrationMeta[]): number {
  // The journal is drizzle-kit's, so that its own commands know what has run.
  sqlite.exec(
    'CREATE TABLE IF NOT EXISTS __drizzle_migrations (id SERIAL PRIMARY KEY, hash text NOT NULL, created_at numeric)',
  );
  const note = sqlite.prepare('INSERT INTO __drizzle_migrations (hash, created_at) VALUES (?, ?)');
  for (const { sql, hash, folderMillis } of pending) {
    for (const statement of sql) sqlite.exec(statement);
    note.run(hash, folderMillis);
  }
  const broken = sqlite.pragma('foreign_key_check') as unknown[];
  if (broken.length > 0) throw new Error(`The migration would leave ${broken.length} rows that point nowhere.`);
  return pending.length;
}

function pendingOf(sqlite: Sqlite, all: readonly MigrationMeta[]): MigrationMeta[] {
  const known = sqlite.prepare("SELECT 1 FROM sqlite_schema WHERE name = '__drizzle_migrations'").get();
  const last = known ? sqlite.prepare('SELECT max(created_at) FROM __drizzle_migrations').pluck().get() : null;
  const lastRun = typeof last === 'number' ? last : 0;
  if (all.every(({ folderMillis }) => folderMillis < lastRun)) {
    throw new Error('This database was made by a newer version of Limestead. Start that version, or restore a backup.');
  }
  return all.filter(({ folderMillis }) => folderMillis > lastRun);
}

function hasTables(sqlite: Sqlite): boolean {
  return sqlite.prepare("SELECT 1 FROM sqlite_schema WHERE type = 'table' LIMIT 1").get() !== undefined;
}
