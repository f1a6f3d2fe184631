import { todayEndpoints } from '../../shared/contracts/today.ts';
import type { Api } from '../http/api.ts';
import { todayOf } from '../queries/today.ts';

export function todayRoutes(api: Api): void {
  api.read(todayEndpoints.show, (db, { caller }) => todayOf(db, caller.role, api.deps.clock.now(), caller.userId));
}
