import { and, eq, gt, lte, max } from 'drizzle-orm';
import type { SystemEvaporation } from '../../shared/contracts/evaporation.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { checkEvaporation, evaporationFromSalinity, evaporationFromUse } from '../../shared/domain/evaporation.ts';
import { supplyWithin, type UseInterval } from '../../shared/domain/reservoir-use.ts';
import type { Db } from '../db/client.ts';
import { waterChanges } from '../db/schema/index.ts';
import { type ReadingWithError, readingsWithError } from './reading-errors.ts';
import { reservoirsOfSystem } from './reservoir-feeds.ts';
import { systemUse } from './reservoir-use.ts';
import { systemRow, type SystemRow } from './systems.ts';

/** Evaporation is told from what topped it up over as many days. */
const USE_DAYS = 7;
/** Salinity moves little in a week, so that it is looked at for longer. */
const SALINITY_DAYS = 14;
/** A look at a sight tube may be off by this part of the vessel (standard deviation; common practice, no source). */
const LOOK_ERROR = 0.005;

/** What a system loses to the air, by the limewater that replaced it, by its salinity, and whether it fits its surface. */
export function systemEvaporation(db: Db, systemId: string, now: number): SystemEvaporation {
  const system = systemRow(db, systemId);
  const use = systemUse(db, systemId, now, SALINITY_DAYS).flatMap(({ intervals }) => intervals);
  const byUse = evaporationFromUse(use, now, { days: USE_DAYS, levelSdL: lookError(db, systemId) });
  const { surfaceM2 } = system;
  return {
    ...{ systemId, byUse, surfaceM2, bySalinity: salinityTold(db, system, use, now) },
    bySurface: byUse && surfaceM2 !== null ? checkEvaporation(byUse.litresPerDay, surfaceM2) : null,
  };
}

function lookError(db: Db, systemId: string): number {
  const volumes = reservoirsOfSystem(db, systemId).map(({ volumeL }) => volumeL);
  return LOOK_ERROR * Math.max(0, ...volumes);
}

/** The longest stretch of salinity readings since the last water change, which would change the salt. */
function salinityTold(
  db: Db,
  system: SystemRow,
  use: readonly UseInterval[],
  now: number,
): SystemEvaporation['bySalinity'] {
  const from = Math.max(now - SALINITY_DAYS * MS_PER_DAY, lastChange(db, system.id, now) + 1);
  const readings = readingsWithError(db, system.id, 'salinity', from, now);
  const [first] = readings;
  const last = readings.at(-1);
  if (!first || !last || use.length === 0) return null;
  const toppedUpL = litresWithin(use, first.at, last.at);
  const told = evaporationFromSalinity(toSalinity(first), toSalinity(last), {
    netVolumeL: system.netVolumeL,
    toppedUpL,
  });
  if (!told) return null;
  const salinities = { salinityFrom: first.value, salinityTo: last.value };
  return { ...told, ...salinities, from: first.at, to: last.at, toppedUpL };
}

function toSalinity({ at, value, sd }: ReadingWithError) {
  return { at, salinity: value, sd };
}

function lastChange(db: Db, systemId: string, now: number): number {
  const row = db
    .select({ at: max(waterChanges.at) })
    .from(waterChanges)
    .where(
      and(
        eq(waterChanges.systemId, systemId),
        gt(waterChanges.at, now - SALINITY_DAYS * MS_PER_DAY),
        lte(waterChanges.at, now),
      ),
    )
    .get();
  return row?.at ?? 0;
}

function litresWithin(use: readonly UseInterval[], from: number, to: number): number {
  return supplyWithin(
    use.map(({ litres, ...span }) => ({ from: span.from, to: span.to, meqL: litres })),
    from,
    to,
  );
}
