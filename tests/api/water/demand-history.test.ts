import { describe, expect, it } from 'vitest';
import { demandChangeOf } from '../../../server/queries/demand-change.ts';
import { systemRow } from '../../../server/queries/systems.ts';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';
import { givenReading, givenSystem } from '../../support/given-water.ts';

const DAY = 86_400_000;

/** Daily tests of a system without any supply that takes `demandOn(day)` dKH a day, up to now; `slips` are odd values. */
function givenDailyTests(
  farm: TestFarm,
  days: number,
  demandOn: (day: number) => number,
  slips: Record<number, number> = {},
): string {
  const systemId = givenSystem(farm);
  let level = 12;
  for (let day = 0; day < days; day += 1) {
    givenReading(farm, systemId, slips[day] ?? level);
    level -= demandOn(day);
    if (day < days - 1) farm.wait(DAY);
  }
  return systemId;
}

describe('demand over time', () => {
  it('when asked, is told for each day of the period with its interval, and four weeks ahead', async () => {
    const farm = await startFarm();
    const systemId = givenDailyTests(farm, 40, () => 0.1);
    const now = farm.deps.clock.now();
    const viewer = await farm.as('viewer');

    const { body } = await viewer.get(`/api/systems/${systemId}/demand`).query({ days: 14 });

    expect(body.history.map(({ at }: { at: number }) => at)).toEqual(
      Array.from({ length: 15 }, (_, index) => now - (14 - index) * DAY),
    );
    expect(body.history.at(-1).demand).toBeCloseTo(body.demand.demand, 6);
    expect(body.history.at(-1).high).toBeCloseTo(body.demand.high, 4);
    expect(body.demand.demand / MEQ_PER_DKH).toBeCloseTo(0.1, 1);
    expect(body.levels).toHaveLength(15);
    expect(body.levels.at(-1).level / MEQ_PER_DKH).toBeCloseTo(12 - 3.9, 1);
    expect(body.forecast).toHaveLength(28);
    const reach = ({ low, high }: { low: number; high: number }) => high - low;
    expect(reach(body.forecast[27])).toBeGreaterThan(reach(body.forecast[0]));
    expect(reach(body.forecast[0])).toBeGreaterThan(reach(body.demand));
  });

  it('when tests are few, has no days and no forecast', async () => {
    const farm = await startFarm();
    const systemId = givenDailyTests(farm, 2, () => 0.1);
    const viewer = await farm.as('viewer');

    const { body } = await viewer.get(`/api/systems/${systemId}/demand`);

    expect(body).toMatchObject({ history: [], levels: [], forecast: [], flagged: [], checks: [] });
  });

  it('when calcium is asked for, is told in mg/L from calcium tests', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm);
    for (let day = 0; day <= 21; day += 3) {
      givenReading(farm, systemId, 440 - 2 * day, { parameter: 'calcium', unit: 'mg/L' });
      farm.wait(3 * DAY);
    }
    const viewer = await farm.as('viewer');

    const { body } = await viewer.get(`/api/systems/${systemId}/demand`).query({ parameter: 'calcium' });

    expect(body).toMatchObject({ parameter: 'calcium', demand: { enough: true, readings: 8 } });
    expect(body.demand.low).toBeLessThan(2);
    expect(body.demand.high).toBeGreaterThan(2);
    expect((await viewer.get(`/api/systems/${systemId}/demand`).query({ parameter: 'ph' })).status).toBe(400);
  });
});

describe('a test that nobody believes', () => {
  it('when it is mistyped, is told of with what was expected, and does not move the demand', async () => {
    const farm = await startFarm();
    const systemId = givenDailyTests(farm, 30, () => 0.1, { 25: 3.8 });
    const viewer = await farm.as('viewer');

    const { body } = await viewer.get(`/api/systems/${systemId}/demand`);

    expect(body.flagged).toHaveLength(1);
    expect(body.flagged[0].value / MEQ_PER_DKH).toBeCloseTo(3.8, 6);
    expect(body.flagged[0].expected / MEQ_PER_DKH).toBeCloseTo(12 - 2.5, 1);
    // Of the 29 tests of four weeks.
    expect(body.demand.readings).toBe(28);
    expect(body.demand.demand / MEQ_PER_DKH).toBeCloseTo(0.1, 1);
  });
});

describe('demand that changed', () => {
  it('when it doubled within two weeks and no stock explains it, went up, and the checks say so', async () => {
    const farm = await startFarm();
    const systemId = givenDailyTests(farm, 45, (day) => (day < 33 ? 0.1 : 0.25));
    const viewer = await farm.as('viewer');

    const change = demandChangeOf(farm.db, systemRow(farm.db, systemId), farm.deps.clock.now());
    const { body } = await viewer.get(`/api/systems/${systemId}/demand`);

    expect(change).toMatchObject({ direction: 'up' });
    expect(body.checks).toMatchObject([{ code: 'changed', direction: 'up' }]);
  });

  it('when it stayed, or is not known, did not', async () => {
    const farm = await startFarm();
    const steady = givenDailyTests(farm, 45, () => 0.1);
    const young = givenDailyTests(farm, 5, () => 0.1);
    const changeOf = (systemId: string) => demandChangeOf(farm.db, systemRow(farm.db, systemId), farm.deps.clock.now());

    expect(changeOf(steady)).toMatchObject({ direction: 'none' });
    expect(changeOf(young)).toBeNull();
  });

  it('when the level jumps and stays, the step is told with its size', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm);
    for (let day = 0; day < 30; day += 1) {
      givenReading(farm, systemId, (day < 20 ? 8 : 11) - 0.02 * day);
      if (day < 29) farm.wait(DAY);
    }
    const viewer = await farm.as('viewer');

    const { body } = await viewer.get(`/api/systems/${systemId}/demand`);

    expect(body.flagged).toEqual([]);
    const [step] = body.checks;
    expect(step).toMatchObject({ code: 'stepped', at: farm.deps.clock.now() - 9 * DAY });
    expect(step.by / MEQ_PER_DKH).toBeCloseTo(3, 0);
  });
});
