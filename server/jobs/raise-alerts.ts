import { farms, systems } from '../db/schema/index.ts';
import { inWrite, SYSTEM } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { evaluateAlerts } from '../services/alert-service.ts';

/** Looks at every system for what time alone changes, such as tests that come due. A transaction each, so that others get their turn. */
export function raiseAlerts(deps: Deps): void {
  if (deps.db.select({ id: farms.id }).from(farms).get() === undefined) return;
  for (const { id } of deps.db.select({ id: systems.id }).from(systems).all()) {
    inWrite(deps, SYSTEM, (write) => evaluateAlerts(write, id));
  }
}
