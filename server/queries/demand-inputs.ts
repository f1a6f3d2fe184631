import { and, asc, eq, gte, lte } from 'drizzle-orm';
import { CALCIUM_MG_PER_MEQ } from '../../shared/domain/dose-effect.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import type { DemandInputs } from '../../shared/domain/demand/inputs.ts';
import { salinityFactor, salinityThrough } from '../../shared/domain/demand/salinity-correction.ts';
import type { Estimate } from '../../shared/domain/demand/track-demand.ts';
import {
  litresPerDay,
  type SupplyInterval,
  supplyToSystem,
  type UseInterval,
} from '../../shared/domain/reservoir-use.ts';
import type { Db } from '../db/client.ts';
import { waterChanges } from '../db/schema/index.ts';
import { type ReadingWithError, readingsWithError } from './reading-errors.ts';
import { type OnlineUse, systemUse } from './reservoir-use.ts';
import { type Solute, supplementSupply } from './supplement-supply.ts';
import type { SystemRow } from './systems.ts';

/** After the last look at a level the usual use is taken for this long; beyond it nobody knows. */
const ASSUMED_DAYS = 3;

const BY_LIMEWATER: Record<Solute, number> = { alkalinity: 1, calcium: CALCIUM_MG_PER_MEQ, magnesium: 0 };

/** What a meq of limewater brings of a solute: it is calcium hydroxide alone. */
export function perMeqOfLimewater(solute: Solute): number {
  return BY_LIMEWATER[solute];
}

type WaterChangeRow = typeof waterChanges.$inferSelect;

export interface SystemSupply {
  solute: Solute;
  /** What the demand is told from: levels are brought to today's salinity. */
  demandInputs: DemandInputs;
  /** The tests as they were written down, oldest first, those before `knownSince` left out. */
  tests: ReadingWithError[];
  limewater: SupplyInterval[];
  use: UseInterval[];
  assumed: UseInterval[];
  doses: SupplyInterval[];
  waterChanges: WaterChangeRow[];
  /** When use of limewater was first logged, where that is within the period; null without limewater too. */
  knownSince: number | null;
  /** Alkalinity of what is online, meq/L; null where nothing is. */
  strengthMeqL: number | null;
  /** Salinity at an instant from the tests up to it; null before the first. */
  salinityAt: (at: number) => Estimate | null;
}

/** Everything known of a system's alkalinity, calcium or magnesium over a period: tests, and all that was added. */
export function systemSupply(
  db: Db,
  system: SystemRow,
  { from, now, solute = 'alkalinity' }: { from: number; now: number; solute?: Solute },
): SystemSupply {
  const used = systemUse(db, system.id, now, (now - from) / MS_PER_DAY);
  const logged = used.flatMap(({ intervals }) => intervals);
  const assumed = used.flatMap((each) => assumedUse(each, now));
  const limewater = supplyToSystem([...logged, ...assumed], perMeqOfLimewater(solute), system.netVolumeL);
  const dosed = supplementSupply(db, system, from, now, solute);
  const changes = waterChangesBetween(db, system.id, from, now);
  const firstUse = [...logged, ...assumed].reduce((first, interval) => Math.min(first, interval.from), Infinity);
  const knownSince = firstUse > from && firstUse < Infinity ? firstUse : null;
  const tests = readingsWithError(db, system.id, solute, Math.max(from, knownSince ?? from), now);
  const salinityAt = salinityThrough(readingsWithError(db, system.id, 'salinity', from, now));
  const atToday = levelsAtToday(salinityAt, now);
  return {
    demandInputs: {
      readings: tests.map((test) => atToday.reading(test)),
      supply: [...limewater, ...dosed],
      waterChanges: changes.flatMap((change) => atToday.change(change, system, solute)),
    },
    ...{ solute, tests, limewater, use: logged, assumed, doses: dosed, waterChanges: changes, knownSince, salinityAt },
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

const NEW_LEVEL = {
  alkalinity: ({ alkalinityMeqL }: WaterChangeRow) => alkalinityMeqL,
  calcium: ({ calciumMgL }: WaterChangeRow) => calciumMgL,
  magnesium: ({ magnesiumMgL }: WaterChangeRow) => magnesiumMgL,
};

/** Levels as they would be at today's salinity, since evaporation and fresh water are no demand. */
function levelsAtToday(salinityAt: SystemSupply['salinityAt'], now: number) {
  const today = salinityAt(now);
  const factorAt = (at: number): Estimate => {
    const then = salinityAt(at);
    return today && then ? salinityFactor(then, today) : { value: 1, sd: 0 };
  };
  return {
    reading: ({ at, value, sd }: ReadingWithError) => {
      const factor = factorAt(at);
      return { at, value: value * factor.value, sd: Math.hypot(sd * factor.value, value * factor.sd) };
    },
    /** New water that nobody tested for it counts as like the old. */
    change: (row: WaterChangeRow, { netVolumeL }: SystemRow, solute: Solute) => {
      const level = NEW_LEVEL[solute](row);
      if (level === null) return [];
      const own = row.salinity !== null && today ? today.value / row.salinity : factorAt(row.at).value;
      return [{ at: row.at, fraction: Math.min(1, row.litres / netVolumeL), value: level * own }];
    },
  };
}

function waterChangesBetween(db: Db, systemId: string, from: number, to: number): WaterChangeRow[] {
  return db
    .select()
    .from(waterChanges)
    .where(and(eq(waterChanges.systemId, systemId), gte(waterChanges.at, from), lte(waterChanges.at, to)))
    .orderBy(asc(waterChanges.at))
    .all();
}
