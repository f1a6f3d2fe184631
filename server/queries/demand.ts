import type { Carried, Demand, DemandParameter, LimeCeiling, SystemDemand } from '../../shared/contracts/demand.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { toldBy } from '../../shared/domain/demand/told.ts';
import { REACH_95, type DemandPoint, type Estimate } from '../../shared/domain/demand/track-demand.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { limewaterCeiling } from '../../shared/domain/limewater.ts';
import { saturatedStrength, USUAL_VINEGAR_ML_PER_L } from '../../shared/domain/limewater-ceiling.ts';
import { supplyWithin, type UseInterval } from '../../shared/domain/reservoir-use.ts';
import { testErrorOf } from '../../shared/domain/test-error.ts';
import type { Db } from '../db/client.ts';
import { carriedNow, evaporationOf } from './carried.ts';
import { perMeqOfLimewater, systemSupply, type SystemSupply } from './demand-inputs.ts';
import { CHANGE_DAYS } from './demand-change.ts';
import { checksOf } from './demand-checks.ts';
import { knownDemand } from './demand-state.ts';
import { rangeOf, type SystemTrack, trackSystem } from './demand-track.ts';
import { systemRow, type SystemRow } from './systems.ts';

/** Charts reach back at least as far as demand is compared with what it was. */
const USUAL_HISTORY_DAYS = 90;
const FORECAST_DAYS = 28;
/** What is given now is told from the last two weeks; a level was read before them. */
const CARRIED_DAYS = 28;

export interface DemandQuestion {
  historyDays?: number;
  parameter?: DemandParameter;
}

/** Demand of a system now, with its history, its ceiling and how it was made. */
export function systemDemand(
  db: Db,
  systemId: string,
  now: number,
  { historyDays = USUAL_HISTORY_DAYS, parameter = 'alkalinity' }: DemandQuestion = {},
): SystemDemand {
  const system = systemRow(db, systemId);
  const past = Array.from({ length: Math.max(historyDays, CHANGE_DAYS) }, (_, index) => now - (index + 1) * MS_PER_DAY);
  const ahead = Array.from({ length: FORECAST_DAYS }, (_, index) => now + (index + 1) * MS_PER_DAY);
  const found = trackSystem(db, system, { now, marks: [...past, ...ahead], solute: parameter });
  const { supply, demand } = found;
  const from = now - historyDays * MS_PER_DAY;
  const days = daysTold(found).filter(({ at }) => at >= from);
  const biasSd = supply.tests.at(-1)?.biasSd ?? 0;
  return {
    ...{ systemId, parameter, netVolumeL: system.netVolumeL, demand },
    carried: carriedNow(system, supply, now),
    ceiling: ceilingOf(system, supply, now),
    history: days.map(({ at, smoothedDemand }) => ({ at, ...rangeOf(smoothedDemand) })),
    levels: days.map(({ at, smoothedLevel }) => ({ at, ...levelRange(smoothedLevel, biasSd) })),
    forecast: demand.enough
      ? found.track.points.filter(({ at }) => at > now).map((point) => ({ at: point.at, ...rangeOf(point.demand) }))
      : [],
    flagged: flaggedSince(found, from),
    checks: parameter === 'alkalinity' ? checksOf(db, system, found) : [],
    waterChanges: supply.waterChanges.filter(({ at }) => at >= from).map(({ at, litres }) => ({ at, litres })),
    inputs: inputsOf(found),
  };
}

/** What a system takes and is given now, alone: for lists. */
export function currentDemand(db: Db, system: SystemRow, now: number): { demand: Demand; carried: Carried } {
  const supply = systemSupply(db, system, { from: now - CARRIED_DAYS * MS_PER_DAY, now });
  return { demand: knownDemand(db, system, now).demand, carried: carriedNow(system, supply, now) };
}

/** The days up to now on which tests before or after them told something. */
function daysTold({ track, trusted, now }: SystemTrack): DemandPoint[] {
  const tellsAt = (at: number) => toldBy(trusted, at).lacks === null;
  return track.points.filter(({ at, reading }) => !reading && at <= now && tellsAt(at));
}

/** A kit's own bias moves all levels alike, so that it is no matter of demand. */
function levelRange({ value, sd }: Estimate, biasSd: number) {
  const reach = REACH_95 * Math.hypot(sd, biasSd);
  return { level: value, low: value - reach, high: value + reach };
}

function flaggedSince({ track, supply }: SystemTrack, from: number): SystemDemand['flagged'] {
  return track.points.flatMap(({ at, flagged, expected }) => {
    const test = flagged && at >= from ? supply.tests.find((each) => each.at === at) : undefined;
    return test && expected ? [{ readingId: test.id, at, value: test.value, expected: expected.value }] : [];
  });
}

function ceilingOf({ netVolumeL }: SystemRow, supply: SystemSupply, now: number): LimeCeiling | null {
  const evaporationLPerDay = evaporationOf(supply, now);
  if (evaporationLPerDay === null) return null;
  const at = (strength: number) =>
    limewaterCeiling(evaporationLPerDay, strength, netVolumeL) * perMeqOfLimewater(supply.solute);
  return {
    evaporationLPerDay,
    saturated: at(saturatedStrength()),
    withVinegar: at(saturatedStrength(USUAL_VINEGAR_ML_PER_L)),
    vinegarMlPerL: USUAL_VINEGAR_ML_PER_L,
  };
}

function inputsOf({ supply, demand, track, now }: SystemTrack): SystemDemand['inputs'] {
  // Readings end where the last test is, while what is given counts up to now.
  const { from, to } = demand;
  const within = (at: number) => at > from && at <= now;
  const sumOf = (spans: SystemSupply['use'], of: (span: UseInterval) => number) =>
    supplyWithin(
      spans.map((span) => ({ from: span.from, to: span.to, meqL: of(span) })),
      from,
      now,
    );
  const all = [...supply.use, ...supply.assumed];
  const { drift, supplyError, testScale } = track.noise;
  return {
    limewaterL: sumOf(all, ({ litres }) => litres),
    limewaterMeq: sumOf(all, ({ alkalinityMeq }) => alkalinityMeq),
    assumedL: sumOf(supply.assumed, ({ litres }) => litres),
    doses: supply.doses.filter(({ to: at }) => within(at)).length,
    waterChanges: supply.waterChanges.filter(({ at }) => within(at)).length,
    tests: testsUsed(supply, (at) => at >= from && at <= to),
    knownSince: supply.knownSince,
    salinity: supply.salinityAt(now)?.value ?? null,
    noise: { drift, supplyError, testScale },
  };
}

/** The tests by their methods, the most used first. */
function testsUsed({ tests, solute }: SystemSupply, isUsed: (at: number) => boolean): SystemDemand['inputs']['tests'] {
  const used = tests
    .filter(({ at }) => isUsed(at))
    .map(({ method, sd }) => ({ method: testErrorOf(solute, method).method, half: REACH_95 * sd }));
  return [...groupBy(used, ({ method }) => method).entries()]
    .map(([method, same]) => ({ method, count: same.length, error: same[0]?.half ?? 0 }))
    .sort((a, b) => b.count - a.count);
}
