import type { Carried, Demand, LimeCeiling, SystemDemand } from '../../shared/contracts/water.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { DEFAULT_WINDOW_DAYS, demandHistory, estimateDemand } from '../../shared/domain/demand.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { limewaterCeiling } from '../../shared/domain/limewater.ts';
import { saturatedStrength, USUAL_VINEGAR_ML_PER_L } from '../../shared/domain/limewater-ceiling.ts';
import { supplyWithin } from '../../shared/domain/reservoir-use.ts';
import { testErrorOf } from '../../shared/domain/test-error.ts';
import type { Db } from '../db/client.ts';
import { carriedNow, evaporationOf } from './carried.ts';
import { type SystemSupply, systemSupply } from './demand-inputs.ts';
import { systemRow, type SystemRow } from './systems.ts';

/** Demand of a system now, with its history, its ceiling and how it was made. */
export function systemDemand(db: Db, systemId: string, now: number, historyDays = 90): SystemDemand {
  const system = systemRow(db, systemId);
  const supply = systemSupply(db, system, now - (historyDays + DEFAULT_WINDOW_DAYS) * MS_PER_DAY, now);
  const demand = demandNow(supply, now);
  const from = now - historyDays * MS_PER_DAY;
  return {
    systemId,
    netVolumeL: system.netVolumeL,
    demand,
    carried: carriedNow(system, supply, now),
    ceiling: ceilingOf(system, supply, now),
    history: demandHistory(supply.demandInputs, from, now).map((each) => ({
      ...{ at: each.to, demand: each.demandMeqLPerDay, low: each.low, high: each.high },
    })),
    waterChanges: supply.waterChanges.filter(({ at }) => at >= from).map(({ at, litres }) => ({ at, litres })),
    inputs: inputsOf(system, supply, demand),
  };
}

/** What a system takes and is given now, alone: for lists. */
export function currentDemand(db: Db, system: SystemRow, now: number): { demand: Demand; carried: Carried } {
  const supply = systemSupply(db, system, now - 2 * DEFAULT_WINDOW_DAYS * MS_PER_DAY, now);
  return { demand: demandNow(supply, now), carried: carriedNow(system, supply, now) };
}

function demandNow(supply: SystemSupply, now: number): Demand {
  const estimate = estimateDemand(supply.demandInputs, now);
  const { from, to, readings } = estimate;
  const basis = { from, to, readings, windowDays: DEFAULT_WINDOW_DAYS };
  if (!estimate.enough) return { enough: false, ...basis, reason: estimate.reason };
  const { demandMeqLPerDay, low, high } = estimate;
  return { enough: true, ...basis, demand: demandMeqLPerDay, low, high };
}

function ceilingOf({ netVolumeL }: SystemRow, supply: SystemSupply, now: number): LimeCeiling | null {
  const evaporationLPerDay = evaporationOf(supply, now);
  if (evaporationLPerDay === null) return null;
  const at = (strength: number) => limewaterCeiling(evaporationLPerDay, strength, netVolumeL);
  return {
    evaporationLPerDay,
    saturated: at(saturatedStrength()),
    withVinegar: at(saturatedStrength(USUAL_VINEGAR_ML_PER_L)),
    vinegarMlPerL: USUAL_VINEGAR_ML_PER_L,
  };
}

function inputsOf(system: SystemRow, supply: SystemSupply, { from, to }: Demand): SystemDemand['inputs'] {
  const within = (at: number) => at > from && at <= to;
  const litresIn = (spans: SystemSupply['use']) =>
    supplyWithin(
      spans.map((span) => ({ from: span.from, to: span.to, meqL: span.litres })),
      from,
      to,
    );
  return {
    limewaterL: litresIn([...supply.use, ...supply.assumed]),
    limewaterMeq: supplyWithin(supply.limewater, from, to) * system.netVolumeL,
    assumedL: litresIn(supply.assumed),
    doses: supply.doses.filter(({ to: at }) => within(at)).length,
    waterChanges: supply.waterChanges.filter(({ at }) => within(at)).length,
    tests: testsUsed(supply.tests.filter(({ at }) => at >= from && at <= to)),
    knownSince: supply.knownSince,
  };
}

/** The tests by their methods, the most used first. */
function testsUsed(tests: SystemSupply['tests']): SystemDemand['inputs']['tests'] {
  const errors = tests.map(({ method }) => testErrorOf('alkalinity', method));
  return [...groupBy(errors, ({ method }) => method).entries()]
    .map(([method, same]) => ({ method, count: same.length, error: same[0]?.half ?? 0 }))
    .sort((a, b) => b.count - a.count);
}
