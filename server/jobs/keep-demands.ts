import { setImmediate } from 'node:timers/promises';
import { inWrite, SYSTEM } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { systemsToKeep } from '../queries/demand-state.ts';
import { forgetOldDemands, keepDemand, KEPT_SOLUTES } from '../services/demand-keeping.ts';

/** Works out the demands that are not kept, one at a time, so that requests come in between. */
export async function keepDemands(deps: Deps): Promise<void> {
  inWrite(deps, SYSTEM, forgetOldDemands);
  for (const solute of KEPT_SOLUTES) {
    for (const system of systemsToKeep(deps.db, solute)) {
      inWrite(deps, SYSTEM, (write) => keepDemand(write, system, solute));
      await setImmediate();
    }
  }
}
