import { inWrite, SYSTEM } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { bringCostsUpToDate } from '../services/cost-shares.ts';
import { farms } from '../db/schema/index.ts';

/** Works the month's shares out anew once a day, and sooner where something changed; cheap where nothing did. */
export function shareCosts(deps: Deps): void {
  const isSetUp = deps.db.select({ id: farms.id }).from(farms).get() !== undefined;
  if (isSetUp) inWrite(deps, SYSTEM, bringCostsUpToDate);
}
