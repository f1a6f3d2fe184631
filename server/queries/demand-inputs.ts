import { and, asc, eq, gte, lte } from 'drizzle-orm';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import type { DemandInputs } from '../../shared/domain/demand.ts';
import {
  litresPerDay,
  type SupplyInterval,
  supplyToSystem,
  type UseInterval,
} from '../../shared/domain/reservoir-use.ts';
import { testErrorOf } from '../../shared/domain/test-error.ts';
import type { Db } from '../db/client.ts';
import { doses, waterChanges } from '../db/schema/index.ts';
import { readingsBetween } from './readings.ts';
import { type OnlineUse, systemUse } from './reservoir-use.ts';
import type { SystemRow } from './systems.ts';

/** After the last look at a level the usual use is taken for this long; beyond it nobody knows. */
const ASSUMED_DAYS = 3;

export interface SystemSupply {
  demandInputs: DemandInputs;
  /** The alkalinity tests with what was written down of their method, oldest first. */
  tests: { at: number; value: number; method: string }[];
  limewater: SupplyInterval[];
  use: UseInterval[];
  assumed: UseInterval[];
  doses: SupplyInterval[];
  waterChanges: (typeof waterChanges.$inferSelect)[];
  /** When use of limewater was first logged; null where the system has no limewater. */
  knownSince: number | null;
  /** Strength of what is online; null where nothing is. */
  strengthMeqL: number | null;
}

/** Everything known of a system's alkalinity over a period: tests, and all that was added between them. */
export function systemSupply(db: Db, system: SystemRow, from: number, now: number): SystemSupply {
  const days = (now - from) / MS_PER_DAY;
  const used = systemUse(db, system.id, now, days);
  const logged = used.flatMap(({ intervals }) => intervals);
  const assumed = used.flatMap((each) => assumedUse(each, now));
  const limewater = supplyToSystem([...logged, ...assumed], 1, system.netVolumeL);
  const dosed = dosesBetween(db, system, from, now);
  const changes = waterChangesBetween(db, system.id, from, now);
  const firsts = [...logged, ...assumed].map((interval) => interval.from);
  const knownSince = firsts.length > 0 ? Math.min(...firsts) : null;
  const tests = readingsBetween(db, system.id, 'alkalinity', Math.max(from, knownSince ?? from), now);
  return {
    demandInputs: {
      readings: tests.map(({ at, value, method }) => ({ at, meqL: value, sd: testErrorOf('alkalinity', method).sd })),
      supply: [...limewater, ...dosed],
      waterChanges: changes.map(({ at, litres, alkalinityMeqL }) => ({
        at,
        fraction: Math.min(1, litres / system.netVolumeL),
        alkalinityMeqL,
      })),
    },
    ...{ tests, limewater, use: logged, assumed, doses: dosed, waterChanges: changes, knownSince },
    strengthMeqL: used.find(({ onlineSince }) => onlineSince !== null)?.alkalinityMeqL ?? null,
  };
}

/** The use that nobody has looked at yet, from what the same reservoir gave in the last week. */
function assumedUse({ intervals, onlineSince, lastAt, levelL, alkalinityMeqL }: OnlineUse, now: number): UseInterval[] {
  const perDay = litresPerDay(intervals, now);
  if (onlineSince === null || lastAt === null || perDay === null || lastAt >= now) return [];
  const to = Math.min(now, lastAt + ASSUMED_DAYS * MS_PER_DAY);
  const litres = Math.min(levelL, (perDay * (to - lastAt)) / MS_PER_DAY);
  return [{ from: lastAt, to, litres, alkalinityMeq: litres * alkalinityMeqL }];
}

function dosesBetween(db: Db, system: SystemRow, from: number, to: number): SupplyInterval[] {
  return db
    .select({ at: doses.at, alkalinityMeq: doses.alkalinityMeq })
    .from(doses)
    .where(and(eq(doses.systemId, system.id), gte(doses.at, from), lte(doses.at, to)))
    .orderBy(asc(doses.at))
    .all()
    .map(({ at, alkalinityMeq }) => ({ from: at, to: at, meqL: alkalinityMeq / system.netVolumeL }));
}

function waterChangesBetween(db: Db, systemId: string, from: number, to: number) {
  return db
    .select()
    .from(waterChanges)
    .where(and(eq(waterChanges.systemId, systemId), gte(waterChanges.at, from), lte(waterChanges.at, to)))
    .orderBy(asc(waterChanges.at))
    .all();
}
