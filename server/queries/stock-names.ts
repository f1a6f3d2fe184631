import type { Db } from '../db/client.ts';
import { lines, systems } from '../db/schema/index.ts';

/** What each line is called in lists: its code and trade name. */
export function lineNames(db: Db): Map<string, string> {
  const rows = db.select({ id: lines.id, code: lines.code, name: lines.tradeName }).from(lines).all();
  return new Map(rows.map(({ id, code, name }) => [id, `${code} ${name}`]));
}

export function systemNames(db: Db): Map<string, string> {
  const rows = db.select({ id: systems.id, name: systems.name }).from(systems).all();
  return new Map(rows.map(({ id, name }) => [id, name]));
}
