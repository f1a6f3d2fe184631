import { and, asc, eq, isNull, or } from 'drizzle-orm';
import type { Withheld } from '../../shared/contracts/stock.ts';
import type { Db } from '../db/client.ts';
import { batches, racks, systems, withholds } from '../db/schema/index.ts';

export type WithholdRow = typeof withholds.$inferSelect;

/** Where a piece is, for the question what keeps it from sale. */
export interface WithholdPlace {
  plugCode?: string | null;
  batchId?: string | null;
  rackId?: string | null;
  systemId?: string | null;
}

/** Open reasons that keep something from sale: by its plug, its batch, its rack or its system. */
export function openWithholds(db: Db, place: WithholdPlace): WithholdRow[] {
  const matches = [
    place.plugCode ? eq(withholds.plugCode, place.plugCode) : undefined,
    place.batchId ? eq(withholds.batchId, place.batchId) : undefined,
    place.rackId ? eq(withholds.rackId, place.rackId) : undefined,
    place.systemId ? eq(withholds.systemId, place.systemId) : undefined,
  ].filter((each) => each !== undefined);
  if (matches.length === 0) return [];
  return db
    .select()
    .from(withholds)
    .where(and(isNull(withholds.endedAt), or(...matches)))
    .orderBy(asc(withholds.startedAt))
    .all();
}

/** Everything that is kept from sale now. */
export function listWithholds(db: Db): Withheld[] {
  return named(db).where(isNull(withholds.endedAt)).orderBy(asc(withholds.startedAt)).all().map(toWithheld);
}

export function findWithhold(db: Db, id: string): Withheld | null {
  const row = named(db).where(eq(withholds.id, id)).get();
  return row ? toWithheld(row) : null;
}

export function scopeOf(row: WithholdRow): Withheld['scope'] {
  if (row.plugCode !== null) return 'plug';
  if (row.batchId !== null) return 'batch';
  return row.rackId !== null ? 'rack' : 'system';
}

/** What pages of a batch, rack or plug show of a withhold. */
export function toReason(row: WithholdRow) {
  return { id: row.id, reason: row.reason, scope: scopeOf(row), startedAt: row.startedAt };
}

function named(db: Db) {
  return db
    .select({ withhold: withholds, batch: batches.code, rack: racks.code, system: systems.code })
    .from(withholds)
    .leftJoin(batches, eq(batches.id, withholds.batchId))
    .leftJoin(racks, eq(racks.id, withholds.rackId))
    .leftJoin(systems, eq(systems.id, withholds.systemId));
}

function toWithheld(row: {
  withhold: WithholdRow;
  batch: string | null;
  rack: string | null;
  system: string | null;
}): Withheld {
  const { withhold, batch, rack, system } = row;
  return {
    id: withhold.id,
    scope: scopeOf(withhold),
    of: withhold.plugCode ?? batch ?? rack ?? system ?? '',
    reason: withhold.reason,
    startedAt: withhold.startedAt,
    startedBy: withhold.startedBy,
    endedAt: withhold.endedAt,
    endedBy: withhold.endedBy,
  };
}
