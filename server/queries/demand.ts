import type { Demand, LimeCeiling, SystemDemand } from '../../shared/contracts/water.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { DEFAULT_WINDOW_DAYS, demandHistory, type DemandEstimate, estimateDemand } from '../../shared/domain/demand.ts';
import { limewaterCeiling } from '../../shared/domain/limewater.ts';
import { saturatedStrength, USUAL_VINEGAR_ML_PER_L } from '../../shared/domain/limewater-ceiling.ts';
import { litresPerDay, supplyPerDay, supplyWithin } from '../../shared/domain/reservoir-use.ts';
import type { Db } from '../db/client.ts';
import { type SystemSupply, systemSupply, TEST_SD_MEQ_L } from './demand-inputs.ts';
import { systemRow, type SystemRow } from './systems.ts';

/** Evaporation is told from the limewater that topped it up over as many days. */
const EVAPORATION_DAYS = 7;

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
    ceiling: ceilingOf(system, supply, now),
    history: demandHistory(supply.demandInputs, from, now).map((each) => ({
      ...{ at: each.to, demand: each.demandMeqLPerDay, low: each.low, high: each.high },
    })),
    waterChanges: supply.waterChanges.filter(({ at }) => at >= from).map(({ at, litres }) => ({ at, litres })),
    inputs: inputsOf(system, supply, demand),
  };
}

/** Demand of a system now, alone: for lists. */
export function currentDemand(db: Db, system: SystemRow, now: number): Demand {
  return demandNow(systemSupply(db, system, now - 2 * DEFAULT_WINDOW_DAYS * MS_PER_DAY, now), now);
}

function demandNow(supply: SystemSupply, now: number): Demand {
  const estimate = estimateDemand(supply.demandInputs, now);
  const { from, to, readings } = estimate;
  const basis = { from, to, readings, windowDays: DEFAULT_WINDOW_DAYS };
  if (!estimate.enough) return { enough: false, ...basis, reason: estimate.reason };
  return { enough: true, ...basis, ...ratesOf(estimate, supply) };
}

function ratesOf(estimate: Extract<DemandEstimate, { enough: true }>, supply: SystemSupply) {
  const { from, to, demandMeqLPerDay, low, high, supplyMeqLPerDay } = estimate;
  return {
    ...{ demand: demandMeqLPerDay, low, high, supply: supplyMeqLPerDay },
    limewater: supplyPerDay(supply.limewater, from, to),
    others: supplyPerDay(supply.doses, from, to),
  };
}

function ceilingOf(system: SystemRow, { use, strengthMeqL }: SystemSupply, now: number): LimeCeiling | null {
  const evaporationLPerDay = litresPerDay(use, now, EVAPORATION_DAYS);
  if (evaporationLPerDay === null || strengthMeqL === null) return null;
  const at = (strength: number) => limewaterCeiling(evaporationLPerDay, strength, system.netVolumeL);
  return {
    ...{ evaporationLPerDay, strengthMeqL, now: at(strengthMeqL) },
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
    testSdMeqL: TEST_SD_MEQ_L,
    knownSince: supply.knownSince,
  };
}
