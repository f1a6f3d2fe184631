import { desc, eq } from 'drizzle-orm';
import type { Addition } from '../../shared/contracts/additions.ts';
import type { Db } from '../db/client.ts';
import { doses, items, waterChanges } from '../db/schema/index.ts';
import { systemRow, type SystemRow } from './systems.ts';

const MOST_SHOWN = 30;

/** The latest water changes and doses of a system, newest first. */
export function listAdditions(db: Db, systemId: string): Addition[] {
  const system = systemRow(db, systemId);
  const changes = db
    .select()
    .from(waterChanges)
    .where(eq(waterChanges.systemId, systemId))
    .orderBy(desc(waterChanges.at))
    .limit(MOST_SHOWN)
    .all();
  const dosed = db
    .select({ dose: doses, item: items })
    .from(doses)
    .innerJoin(items, eq(items.id, doses.itemId))
    .where(eq(doses.systemId, systemId))
    .orderBy(desc(doses.at))
    .limit(MOST_SHOWN)
    .all();
  return [...changes.map(changeAsAddition), ...dosed.map(({ dose, item }) => doseAsAddition(dose, item, system))]
    .sort((a, b) => b.at - a.at)
    .slice(0, MOST_SHOWN);
}

export function changeAsAddition(row: typeof waterChanges.$inferSelect): Addition {
  const { id, systemId, at, by, litres, alkalinityMeqL, calciumMgL, magnesiumMgL, salinity } = row;
  return {
    ...{ id, kind: 'water_change', systemId, at, by, name: 'Water change', amount: litres, unit: 'L' },
    ...{ alkalinityMeqL, calciumMgL, magnesiumMgL, salinity },
  };
}

export function doseAsAddition(
  row: typeof doses.$inferSelect,
  { name, unit }: { name: string; unit: string },
  { netVolumeL }: SystemRow,
): Addition {
  const { id, systemId, at, by, amount, alkalinityMeq, calciumMg, magnesiumMg } = row;
  return {
    ...{ id, kind: 'dose', systemId, at, by, name, amount, unit, salinity: null },
    alkalinityMeqL: alkalinityMeq / netVolumeL,
    calciumMgL: calciumMg / netVolumeL,
    magnesiumMgL: magnesiumMg / netVolumeL,
  };
}
