import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { demandStates } from '../../../server/db/schema/index.ts';
import { inWrite, SYSTEM } from '../../../server/db/write.ts';
import { keepDemands } from '../../../server/jobs/keep-demands.ts';
import { knownDemand } from '../../../server/queries/demand-state.ts';
import { trackSystem } from '../../../server/queries/demand-track.ts';
import { systemRow } from '../../../server/queries/systems.ts';
import { logDose } from '../../../server/services/dose-service.ts';
import { keepDemand } from '../../../server/services/demand-keeping.ts';
import { logWaterChange } from '../../../server/services/water-change-service.ts';
import { givenItem, givenLot } from '../../support/given-supplies.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';
import { givenLevel, givenReading, givenRefill, givenReservoir, givenSystem } from '../../support/given-water.ts';

const DAY = 86_400_000;

/** Twelve tests on even days, in dKH. */
function givenTested(farm: TestFarm): string {
  const systemId = givenSystem(farm);
  for (let test = 0; test < 12; test += 1) {
    givenReading(farm, systemId, 9 - 0.2 * test + 0.05 * (test % 3));
    farm.wait(2 * DAY);
  }
  return systemId;
}

const keptOf = (farm: TestFarm, systemId: string) =>
  farm.db.select().from(demandStates).where(eq(demandStates.systemId, systemId)).all();

const keep = (farm: TestFarm, systemId: string) =>
  inWrite(farm.deps, SYSTEM, (write) => keepDemand(write, systemRow(write.tx, systemId), 'alkalinity'));

describe('a demand that is kept', () => {
  it('is the one that is worked out, then and on days after it', async () => {
    const farm = await startFarm();
    const systemId = givenTested(farm);
    const system = systemRow(farm.db, systemId);

    keep(farm, systemId);
    for (const days of [0, 1, 9]) {
      farm.wait(days * DAY);
      const now = farm.deps.clock.now();
      const worked = trackSystem(farm.db, system, { now }).demand;
      const kept = knownDemand(farm.db, system, now).demand;

      expect(kept).toMatchObject({ enough: true, readings: worked.readings, from: worked.from, to: worked.to });
      if (!kept.enough || !worked.enough) throw new Error('Both are known.');
      expect(kept.demand).toBeCloseTo(worked.demand, 9);
      expect(kept.low).toBeCloseTo(worked.low, 9);
      expect(kept.high).toBeCloseTo(worked.high, 9);
    }
  });

  it('when its tests are long ago, tells no demand any more', async () => {
    const farm = await startFarm();
    const systemId = givenTested(farm);
    keep(farm, systemId);
    farm.wait(40 * DAY);

    const { demand, estimate } = knownDemand(farm.db, systemRow(farm.db, systemId), farm.deps.clock.now());

    expect(demand).toMatchObject({ enough: false, reason: 'too_few_readings', readings: 0 });
    expect(estimate).toBeNull();
  });

  it('when demand of an earlier instant is asked, is not used', async () => {
    const farm = await startFarm();
    const systemId = givenTested(farm);
    keep(farm, systemId);
    const system = systemRow(farm.db, systemId);
    const earlier = farm.deps.clock.now() - 6 * DAY;

    expect(knownDemand(farm.db, system, earlier).demand).toEqual(trackSystem(farm.db, system, { now: earlier }).demand);
  });
});

describe('what a kept demand stands on', () => {
  const changes: [string, (farm: TestFarm, systemId: string) => void][] = [
    ['a test is logged', (farm, systemId) => void givenReading(farm, systemId, 8)],
    [
      'water is changed',
      (farm, systemId) =>
        farm.write((write) => void logWaterChange(write, { systemId, litres: 50, alkalinityMeqL: 3, saltG: 0 })),
    ],
    [
      'a supplement is dosed',
      (farm, systemId) => {
        const itemId = givenItem(farm, { kind: 'supplement', name: 'Soda', unit: 'mL', strength: 1 });
        givenLot(farm, itemId, { quantity: 100 });
        keep(farm, systemId);
        farm.write((write) => void logDose(write, { systemId, itemId, amount: 10, note: '' }));
      },
    ],
    [
      'a level of its reservoir is read',
      (farm, systemId) => {
        const reservoirId = givenReservoir(farm, systemId);
        givenRefill(farm, reservoirId);
        farm.wait(1000);
        keep(farm, systemId);
        givenLevel(farm, reservoirId, 20);
      },
    ],
  ];

  it.each(changes)('when %s, it is worked out anew', async (_, change) => {
    const farm = await startFarm();
    const systemId = givenTested(farm);
    keep(farm, systemId);
    expect(keptOf(farm, systemId)).toHaveLength(1);

    change(farm, systemId);

    expect(keptOf(farm, systemId)).toEqual([]);
  });

  it('when another system is tested, stays', async () => {
    const farm = await startFarm();
    const systemId = givenTested(farm);
    keep(farm, systemId);

    givenReading(farm, givenSystem(farm), 8);

    expect(keptOf(farm, systemId)).toHaveLength(1);
  });
});

describe('the job that keeps demands', () => {
  it('when it runs, keeps those of systems that were tested, once', async () => {
    const farm = await startFarm();
    const systemId = givenTested(farm);
    givenSystem(farm);

    await keepDemands(farm.deps);
    const first = farm.db.select().from(demandStates).all();
    farm.wait(3_600_000);
    await keepDemands(farm.deps);

    expect(first).toMatchObject([{ systemId, parameter: 'alkalinity' }]);
    expect(farm.db.select().from(demandStates).all()).toEqual(first);
  });

  it('when one is older than a day, makes it anew', async () => {
    const farm = await startFarm();
    const systemId = givenTested(farm);
    await keepDemands(farm.deps);
    farm.wait(DAY + 1);

    await keepDemands(farm.deps);

    expect(keptOf(farm, systemId)).toMatchObject([{ at: farm.deps.clock.now() }]);
  });
});
