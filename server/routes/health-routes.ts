import { sql } from 'drizzle-orm';
import { DONE } from '../../shared/contracts/common.ts';
import { healthEndpoints } from '../../shared/contracts/health.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import type { Api } from '../http/api.ts';

export function healthRoutes(api: Api): void {
  api.read(healthEndpoints.health, () => DONE);
  api.read(healthEndpoints.ready, (db) => {
    assertReadable(db);
    return DONE;
  });
}

/** Reads a page of the file; a plain `SELECT 1` would not touch it. */
function assertReadable(db: Db): void {
  try {
    db.get(sql`SELECT count(*) FROM sqlite_schema`);
  } catch {
    throw new DomainError('service.unavailable', 'The server can not read its records just now.');
  }
}
