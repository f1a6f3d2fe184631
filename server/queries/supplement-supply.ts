import { and, asc, eq, gte, lte } from 'drizzle-orm';
import type { SupplyInterval } from '../../shared/domain/reservoir-use.ts';
import type { Db } from '../db/client.ts';
import { doses } from '../db/schema/index.ts';
import type { SystemRow } from './systems.ts';

/** What supplements bring: alkalinity in meq, calcium and magnesium in mg. */
export type Solute = 'alkalinity' | 'calcium' | 'magnesium';

/**
 * What supplements other than limewater brought to a system between two instants, each as a rise of the whole
 * system's level. A single dose is a stretch without length.
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
  if (solute !== 'alkalinity') return [];
  return db
    .select({ at: doses.at, alkalinityMeq: doses.alkalinityMeq })
    .from(doses)
    .where(and(eq(doses.systemId, system.id), gte(doses.at, from), lte(doses.at, to)))
    .orderBy(asc(doses.at))
    .all()
    .map(({ at, alkalinityMeq }) => ({ from: at, to: at, meqL: alkalinityMeq / system.netVolumeL }));
}
