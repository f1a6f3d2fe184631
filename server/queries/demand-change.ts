import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { demandChange, type DemandChange } from '../../shared/domain/demand/demand-change.ts';
import type { Db } from '../db/client.ts';
import { pointAt, trackSystem, type SystemTrack } from './demand-track.ts';
import { cameSince, piecesIn } from './standing-pieces.ts';
import type { SystemRow } from './systems.ts';

/** What demand is compared with: what it was so long ago, as all tests since then show it. */
export const CHANGE_DAYS = 14;

/** Whether alkalinity demand went up or down by more than tests, stock and growth explain; null where tests don't tell. */
export function demandChangeOf(db: Db, system: SystemRow, now: number): DemandChange | null {
  return changeIn(db, system, trackSystem(db, system, { now, marks: [now - CHANGE_DAYS * MS_PER_DAY] }));
}

/** @param found must hold the instant {@link CHANGE_DAYS} before now among its marks */
export function changeIn(db: Db, { id }: SystemRow, { track, demand, now }: SystemTrack): DemandChange | null {
  const since = now - CHANGE_DAYS * MS_PER_DAY;
  const before = pointAt(track, since);
  const latest = pointAt(track, now);
  if (!demand.enough || demand.from > since || !before || !latest) return null;
  const pieces = piecesIn(db, id);
  const stock = { before: pieces - cameSince(db, id, since), now: pieces };
  return demandChange({
    ...{ before: before.smoothedDemand, now: latest.demand, since, until: now },
    ...(stock.before > 0 ? { stock } : {}),
  });
}
