import { setImmediate as breathe } from 'node:timers/promises';
import { farms, systems } from '../db/schema/index.ts';
import { inWrite, SYSTEM, type Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { evaluateAlerts, weighRisks } from '../services/alert-service.ts';

/** Looks at every system for what time alone changes, such as tests that come due. */
export function raiseAlerts(deps: Deps): Promise<void> {
  return forEachSystem(deps, evaluateAlerts);
}

/** Looks at what takes long to work out and changes slowly: demand, and what an overfill would do. */
export function raiseSlowAlerts(deps: Deps): Promise<void> {
  return forEachSystem(deps, weighRisks);
}

/** A transaction for each; requests get their turn in between. */
async function forEachSystem(deps: Deps, look: (write: Write, systemId: string) => unknown): Promise<void> {
  if (deps.db.select({ id: farms.id }).from(farms).get() === undefined) return;
  for (const { id } of deps.db.select({ id: systems.id }).from(systems).all()) {
    inWrite(deps, SYSTEM, (write) => look(write, id));
    await breathe();
  }
}
