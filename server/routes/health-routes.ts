import { sql } from 'drizzle-orm';
import { DONE } from '../../shared/contracts/common.ts';
import { healthEndpoints } from '../../shared/contracts/health.ts';
import type { Api } from '../http/api.ts';

export function healthRoutes(api: Api): void {
  api.read(healthEndpoints.health, () => DONE);
  api.read(healthEndpoints.ready, (db) => {
    db.get(sql`SELECT 1`);
    return DONE;
  });
}
