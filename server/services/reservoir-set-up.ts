import { and, eq } from 'drizzle-orm';
import type { CreateReservoir, EditReservoir, ShareReservoir } from '../../shared/contracts/reservoir-set-up.ts';
import type { Reservoir } from '../../shared/contracts/reservoirs.ts';
import { wholeShares } from '../../shared/domain/reservoir-shares.ts';
import { DomainError } from '../../shared/errors.ts';
import { reservoirFeeds, reservoirs } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { onlineFor } from '../queries/reservoir-feeds.ts';
import { reservoirRow, type ReservoirRow, showReservoir } from '../queries/reservoirs.ts';
import { systemRow } from '../queries/systems.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';
import { assertFits } from './reservoir-events.ts';

export function createReservoir(write: Write, input: CreateReservoir): Reservoir {
  systemRow(write.tx, input.systemId);
  assertIntakeFits(input);
  const reservoirId = write.newId();
  write.tx
    .insert(reservoirs)
    .values({ id: reservoirId, ...input, createdAt: write.now })
    .run();
  const after = showReservoir(write.tx, reservoirId, write.now);
  write.audit({ action: 'reservoir.created', entity: 'reservoir', entityId: reservoirId, after });
  return after;
}

/** Changes what a vessel is like, puts it away, or brings it back. */
export function editReservoir(write: Write, reservoirId: string, ifMatch: number, edit: EditReservoir): Reservoir {
  const row = reservoirRow(write.tx, reservoirId);
  const before = showReservoir(write.tx, reservoirId, write.now);
  assertVersion(row, ifMatch, before);
  const { retired, ...fields } = edit;
  const next = { ...row, ...definedOnly(fields) };
  assertFits(next, row.levelL, 'volumeL');
  assertIntakeFits(next);
  write.tx
    .update(reservoirs)
    .set({ ...fields, retiredAt: retiredAt(write, row, retired), version: row.version + 1 })
    .where(eq(reservoirs.id, reservoirId))
    .run();
  const after = showReservoir(write.tx, reservoirId, write.now);
  write.audit({ action: 'reservoir.changed', entity: 'reservoir', entityId: reservoirId, before, after });
  return after;
}

/** From now on its flow is shared like this; what it gave before stays with those who got it then. */
export function shareReservoir(write: Write, reservoirId: string, ifMatch: number, input: ShareReservoir): Reservoir {
  const row = reservoirRow(write.tx, reservoirId);
  const before = showReservoir(write.tx, reservoirId, write.now);
  assertVersion(row, ifMatch, before);
  const feeds = wholeShares(input.feeds);
  const systemIds = feeds.map(({ systemId }) => systemId);
  for (const systemId of systemIds) systemRow(write.tx, systemId);
  assertMayFeed(write, row, systemIds);
  const since = write.now;
  // Set twice at one instant, the later set counts alone.
  const ofInstant = and(eq(reservoirFeeds.reservoirId, reservoirId), eq(reservoirFeeds.since, since));
  write.tx.delete(reservoirFeeds).where(ofInstant).run();
  write.tx
    .insert(reservoirFeeds)
    .values(feeds.map((feed) => ({ ...feed, reservoirId, since })))
    .run();
  write.tx
    .update(reservoirs)
    .set({ version: row.version + 1 })
    .where(eq(reservoirs.id, reservoirId))
    .run();
  const after = showReservoir(write.tx, reservoirId, write.now);
  write.audit({ action: 'reservoir.shared', entity: 'reservoir', entityId: reservoirId, before, after });
  return after;
}

function retiredAt(write: Write, row: ReservoirRow, retired: boolean | undefined): number | null {
  if (retired === undefined) return row.retiredAt;
  if (!retired) return null;
  if (row.state === 'online') {
    throw new DomainError('rule.refused', `${row.code} is online. Put another online, or mark it spent first.`);
  }
  return row.retiredAt ?? write.now;
}

function assertIntakeFits({ intakeMm, heightMm }: Pick<CreateReservoir, 'intakeMm' | 'heightMm'>): void {
  if (intakeMm === undefined || intakeMm === null || heightMm === undefined || heightMm === null) return;
  if (intakeMm < heightMm) return;
  const message = 'The intake must be below the full level.';
  throw new DomainError('input.invalid', message, { fields: [{ path: 'intakeMm', message }] });
}

/** Its own system stays one of those it feeds, and none of them may have two reservoirs online. */
function assertMayFeed(write: Write, row: ReservoirRow, systemIds: readonly string[]): void {
  const refuse = (message: string): never => {
    throw new DomainError('input.invalid', message, { fields: [{ path: 'feeds', message }] });
  };
  if (!systemIds.includes(row.systemId)) refuse('Its own system must get a share.');
  if (row.state !== 'online') return;
  const other = onlineFor(write.tx, systemIds, write.now).find(({ id }) => id !== row.id);
  if (other) refuse(`${other.code} is online for one of these systems. Take it off first.`);
}
