import { createHash } from 'node:crypto';
import SqliteDatabase from 'better-sqlite3';

/** Differs by its random salt even where the password is the same. */
const SALTED = 'password_hash';

/** A hash of everything in a database file, table by table and row by row. */
export function contentHash(file: string): string {
  const sqlite = new SqliteDatabase(file, { readonly: true });
  const hash = createHash('sha256');
  const tables = sqlite
    .prepare<[], string>(
      `SELECT name FROM sqlite_schema WHERE type = 'table' AND name NOT LIKE 'sqlite_%' ORDER BY name`,
    )
    .pluck()
    .all();
  for (const table of tables) {
    hash.update(table);
    for (const row of sqlite.prepare<[], Record<string, unknown>>(`SELECT * FROM "${table}"`).iterate()) {
      hash.update(JSON.stringify({ ...row, [SALTED]: undefined }));
    }
  }
  sqlite.close();
  return hash.digest('hex');
}
