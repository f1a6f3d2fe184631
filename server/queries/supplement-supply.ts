import { and, asc, eq, gt, gte, isNull, lt, lte, or } from 'drizzle-orm';
import type { SupplyInterval } from '../../shared/domain/reservoir-use.ts';
import type { Db } from '../db/client.ts';
import { doses, dosingRates, items } from '../db/schema/index.ts';
import { dosedBetween } from './dosed-amounts.ts';
import { factorsByPump } from './dosing-pumps.ts';
import { farmOf } from './farm.ts';
import type { SystemRow } from './systems.ts';

/** What supplements bring: alkalinity in meq, calcium and magnesium in mg. */
export type Solute = 'alkalinity' | 'calcium' | 'magnesium';

/**
 * What supplements other than limewater brought to a system between two instants, each as a rise of the whole
 * system's level: single doses as stretches without length, steady ones as they ran and as their pumps really gave.
 *
 * @returns oldest first; `meqL` is meq/L for alkalinity and mg/L for calcium and magnesium
 */
export function supplementSupply(
  db: Db,
  system: SystemRow,
  from: number,
  to: number,
  solute: Solute,
): SupplyInterval[] {
  const supply = [...singleDoses(db, system, from, to, solute), ...steadyDoses(db, system, from, to, solute)];
  return supply.filter(({ meqL }) => meqL > 0).sort((a, b) => a.from - b.from);
}

const DOSED = { alkalinity: doses.alkalinityMeq, calcium: doses.calciumMg, magnesium: doses.magnesiumMg };
const PER_UNIT = { alkalinity: items.strength, calcium: items.calciumMg, magnesium: items.magnesiumMg };

function singleDoses(db: Db, system: SystemRow, from: number, to: number, solute: Solute): SupplyInterval[] {
  return db
    .select({ at: doses.at, amount: DOSED[solute] })
    .from(doses)
    .where(and(eq(doses.systemId, system.id), gte(doses.at, from), lte(doses.at, to)))
    .orderBy(asc(doses.at))
    .all()
    .map(({ at, amount }) => ({ from: at, to: at, meqL: amount / system.netVolumeL }));
}

function steadyDoses(db: Db, system: SystemRow, from: number, to: number, solute: Solute): SupplyInterval[] {
  const rows = db
    .select({ rate: dosingRates, perUnit: PER_UNIT[solute] })
    .from(dosingRates)
    .innerJoin(items, eq(items.id, dosingRates.itemId))
    .where(
      and(
        eq(dosingRates.systemId, system.id),
        lt(dosingRates.fromAt, to),
        or(isNull(dosingRates.toAt), gt(dosingRates.toAt, from)),
      ),
    )
    .all();
  if (rows.length === 0) return [];
  const span = { from, to, timeZone: farmOf(db).timeZone };
  const factors = factorsByPump(db);
  return rows.flatMap(({ rate, perUnit }) =>
    dosedBetween(rate, factors, span).map((stretch) => ({
      ...{ from: stretch.from, to: stretch.to },
      meqL: (stretch.amount * (perUnit ?? 0)) / system.netVolumeL,
    })),
  );
}
