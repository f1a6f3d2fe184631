import { cpSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { openDatabase, type Sqlite } from '../../../server/db/client.ts';
import { migrateDatabase } from '../../../server/db/migrate.ts';
import { tempFolder } from '../../support/temp-folder.ts';

const ours = fileURLToPath(new URL('../../../drizzle', import.meta.url));

interface Journal {
  entries: { idx: number; version: string; when: number; tag: string; breakpoints: boolean }[];
}

/** Our migrations and, after them, one more. */
function withMigration(sql: string): string {
  const folder = path.join(tempFolder(), 'drizzle');
  cpSync(ours, folder, { recursive: true });
  const file = path.join(folder, 'meta', '_journal.json');
  const journal = JSON.parse(readFileSync(file, 'utf8')) as Journal;
  const last = journal.entries.at(-1);
  if (!last) throw new Error('There are no migrations.');
  journal.entries.push({ ...last, idx: last.idx + 1, when: last.when + 1, tag: '9999_next' });
  writeFileSync(file, JSON.stringify(journal));
  writeFileSync(path.join(folder, '9999_next.sql'), sql);
  return folder;
}

async function oldFarm() {
  const folder = tempFolder();
  const file = path.join(folder, 'limestead.sqlite');
  const { sqlite } = openDatabase(file);
  const ran = await migrateDatabase(sqlite, file, 1);
  sqlite.exec(`INSERT INTO farm (id, name, time_zone, currency, created_at) VALUES (1, 'Old Farm', 'UTC', 'EUR', 1)`);
  const copies = () => readdirSync(folder).filter((name) => name.includes('.before-'));
  return { folder, file, sqlite, ran, copies };
}

const nameOf = (sqlite: Sqlite) => sqlite.prepare('SELECT name FROM farm').pluck().get();
const ran = (sqlite: Sqlite) => sqlite.prepare('SELECT count(*) FROM __drizzle_migrations').pluck().get();

describe('starting on a database', () => {
  it('when it is new, makes all tables, without a backup of nothing, and later starts find nothing to do', async () => {
    const { file, sqlite, ran, copies } = await oldFarm();

    expect(ran).toBe(readdirSync(ours).filter((name) => name.endsWith('.sql')).length);
    expect(await migrateDatabase(sqlite, file, 2)).toBe(0);
    expect(copies()).toEqual([]);
    expect(sqlite.pragma('foreign_keys', { simple: true })).toBe(1);
  });

  it('when it is of an older version, keeps a copy as it was, then changes it', async () => {
    const { folder, file, sqlite, copies } = await oldFarm();
    const migrations = withMigration(`UPDATE farm SET name = 'New Farm';`);

    expect(await migrateDatabase(sqlite, file, 7, migrations)).toBe(1);

    expect(nameOf(sqlite)).toBe('New Farm');
    expect(copies()).toEqual(['limestead.sqlite.before-7']);
    expect(nameOf(openDatabase(path.join(folder, 'limestead.sqlite.before-7')).sqlite)).toBe('Old Farm');
  });

  it.each([
    [
      'fails half way',
      `UPDATE farm SET name = 'Half';\n--> statement-breakpoint\nUPDATE no_such_table SET x = 1;`,
      /no_such_table/,
    ],
    [
      'leaves rows that point nowhere',
      `UPDATE farm SET name = 'Half';\n--> statement-breakpoint\nINSERT INTO tank (id, code, name, system_id, created_at) VALUES ('t', 'T', 'T', 'gone', 1);`,
      /1 rows that point nowhere/,
    ],
  ])('when the change %s, nothing of it stays and the next start tries again', async (_, sql, why) => {
    const { file, sqlite } = await oldFarm();
    const before = ran(sqlite);
    const migrations = withMigration(sql);

    await expect(migrateDatabase(sqlite, file, 7, migrations)).rejects.toThrow(why);

    expect([nameOf(sqlite), ran(sqlite)]).toEqual(['Old Farm', before]);
    expect(sqlite.pragma('foreign_keys', { simple: true })).toBe(1);
    await expect(migrateDatabase(sqlite, file, 8, migrations)).rejects.toThrow(why);
  });

  it('when it is of a newer version, refuses to touch it', async () => {
    const { file, sqlite } = await oldFarm();
    await migrateDatabase(sqlite, file, 7, withMigration(`UPDATE farm SET name = 'New Farm';`));

    await expect(migrateDatabase(sqlite, file, 8)).rejects.toThrow('made by a newer version of Limestead');
  });
});
