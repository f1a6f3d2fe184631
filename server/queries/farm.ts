import type { Db } from '../db/client.ts';
import { farms } from '../db/schema/index.ts';

export type FarmRow = typeof farms.$inferSelect;

/** The farm's row, or null before the farm is set up. */
export function findFarm(db: Db): FarmRow | null {
  return db.select().from(farms).get() ?? null;
}

/** The farm of this database: name, zone, currency and the rest of its settings. */
export function farmOf(db: Db): FarmRow {
  const farm = findFarm(db);
  if (!farm) throw new Error('The farm is not set up yet.');
  return farm;
}
