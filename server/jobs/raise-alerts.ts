import { farms, systems } from '../db/schema/index.ts';
import { inWrite, SYSTEM, type Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { evaluateAlerts, weighDemand } from '../services/alert-service.ts';

/** Looks at every system for what time alone changes, such as tests that come due. */
export function raiseAlerts(deps: Deps): void {
  forEachSystem(deps, evaluateAlerts);
}

/** Looks whether the demand of any system changed by more than can be explained. */
export function raiseDemandAlerts(deps: Deps): void {
  forEachSystem(deps, weighDemand);
}

/** A transaction for each, so that others get their turn in between. */
function forEachSystem(deps: Deps, look: (write: Write, systemId: string) => unknown): void {
  if (deps.db.select({ id: farms.id }).from(farms).get() === undefined) return;
  for (const { id } of deps.db.select({ id: systems.id }).from(systems).all()) {
    inWrite(deps, SYSTEM, (write) => look(write, id));
  }
}
