import type { DemandInputs } from '../../shared/domain/demand/inputs.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { trackDemand } from '../../shared/domain/demand/track-demand.ts';
import { readings } from '../../server/db/schema/index.ts';
import { keepDemands } from '../../server/jobs/keep-demands.ts';
import { systemDemand } from '../../server/queries/demand.ts';
import { knownDemand } from '../../server/queries/demand-state.ts';
import { listSystems, systemRow } from '../../server/queries/systems.ts';
import { waterOverview } from '../../server/queries/water-overview.ts';
import { simulateSystem } from '../support/demand-simulation.ts';
import type { BenchFarm } from './farm.ts';
import { medianOf } from './measure.ts';

const SYSTEMS = 50;
const YEARS = 10;
const ROUNDS = 20;

/** How long demand takes: ten years of fifty systems from nothing, one new test, and the pages that show it. */
export async function demandTimes({ deps, sqlite, now }: BenchFarm): Promise<[what: string, value: string][]> {
  const problems = Array.from({ length: SYSTEMS }, (_, seed) => tenYears(seed));
  const all = await medianOf(3, () => problems.map((problem) => trackDemand(problem)));
  const { db } = deps;
  const [system] = listSystems(db);
  if (!system) throw new Error('The demo farm has no system.');
  const row = systemRow(db, system.id);
  const newTest = sqlite.transaction((at: number) => {
    const test = { id: `bench ${at}`, systemId: row.id, parameter: 'alkalinity', value: 3, takenAt: at };
    db.insert(readings)
      .values({ ...test, by: 'bench', createdAt: at })
      .run();
    return knownDemand(db, row, at).demand;
  });
  const one = await medianOf(ROUNDS, (run) => newTest(now + run * 60_000));
  const page = await medianOf(ROUNDS, () => systemDemand(db, row.id, now));
  await keepDemands(deps);
  const overview = await medianOf(ROUNDS, () => waterOverview(db, now));
  return [
    [`Demand of ${SYSTEMS} systems over ${YEARS} years of daily tests`, `${all.toFixed(0)} ms`],
    ['A new test, and the demand of its system', `${one.toFixed(1)} ms`],
    ['Demand for the page of a system', `${page.toFixed(1)} ms`],
    ['All systems of the demo farm', `${overview.toFixed(1)} ms`],
  ];
}

function tenYears(seed: number): DemandInputs {
  const days = YEARS * 365;
  const { readings: tests, ...system } = simulateSystem(seed, {
    ...{ regime: 'harvest', testEveryDays: 1, testedPart: 1, testSd: 0.054, days },
  });
  return {
    readings: tests.map(([day, value]) => ({ at: day * MS_PER_DAY, value, sd: system.testSd })),
    supply: system.supply.map(([from, to, perDay]) => ({
      ...{ from: from * MS_PER_DAY, to: to * MS_PER_DAY, meqL: perDay * (to - from) },
    })),
    waterChanges: system.waterChanges.map(([day, fraction, value]) => ({ at: day * MS_PER_DAY, fraction, value })),
  };
}
