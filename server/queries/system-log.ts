import type { ResponseOf } from '../../shared/contracts/endpoint.ts';
import type { LogSubject, systemLogEndpoints } from '../../shared/contracts/system-log.ts';
import type { Db } from '../db/client.ts';
import { doseLogs } from './system-log/doses.ts';
import { limewaterLogs } from './system-log/limewater.ts';
import { readingLog } from './system-log/readings.ts';
import type { LogSource } from './system-log/source.ts';
import { workLog } from './system-log/work.ts';
import { systemRow } from './systems.ts';

const SOURCES: readonly LogSource[] = [readingLog, ...doseLogs, ...limewaterLogs, workLog];

/** More of one kind than this does not happen at one instant; readings of one time are one entry. */
const MOST_AT_ONCE = 25;

interface LogQuery {
  subject?: LogSubject | undefined;
  before?: number | undefined;
  limit: number;
}

/**
 * Everything that happened in a system, newest first. Pages end between two instants, never inside of one, so that what
 * was done at once stays together and nothing is left out.
 */
export function systemLog(
  db: Db,
  systemId: string,
  { subject, before = Number.MAX_SAFE_INTEGER, limit }: LogQuery,
): ResponseOf<typeof systemLogEndpoints.list> {
  const system = systemRow(db, systemId);
  const all = SOURCES.filter((source) => subject === undefined || source.subject === subject)
    .flatMap(({ read }) => read(db, system, { before, limit: limit + MOST_AT_ONCE }))
    .sort((a, b) => b.at - a.at || a.id.localeCompare(b.id));
  const last = all[limit - 1]?.at;
  if (last === undefined || all.length <= limit) return { items: all, nextBefore: null };
  const items = all.filter(({ at }) => at >= last);
  return { items, nextBefore: items.length < all.length ? last : null };
}
