import { beforeEach, describe, expect, it } from 'vitest';
import { givenCut, givenLoss, postOnce } from '../../support/given-stock.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const DAY_MS = 24 * 3_600_000;

describe('losses of the farm', () => {
  let farm: TestFarm;

  beforeEach(async () => {
    farm = await startFarm();
  });

  async function asked(path: string) {
    return (await farm.as('grower')).get(path);
  }

  function givenCutWithLosses(pieces: number, losses: number): void {
    const codes = givenCut(farm, { pieces }).plugs.map(({ code }) => code);
    farm.wait(5 * DAY_MS);
    if (losses > 0) givenLoss(farm, codes.slice(0, losses));
  }

  it('when a line loses far more than the farm is used to, it is pointed out with its odds', async () => {
    for (let turn = 0; turn < 4; turn += 1) givenCutWithLosses(30, 0);
    farm.wait(40 * DAY_MS);
    givenCutWithLosses(30, 12);

    const { body } = await asked('/api/stock/loss-patterns');

    expect(body.patterns[0]).toMatchObject({ lost: 12 });
    expect(body.patterns[0].expected).toBeLessThan(1.5);
    expect(body.patterns[0].q).toBeLessThan(1e-4);
    expect(body.compared).toBeGreaterThanOrEqual(body.patterns.length);
  });

  it('when losses are few, or there is no stock, nothing is pointed out', async () => {
    expect((await asked('/api/stock/loss-patterns')).body.patterns).toEqual([]);
    givenCutWithLosses(30, 1);

    expect((await asked('/api/stock/loss-patterns')).body.patterns).toEqual([]);
  });

  it('when survivors are asked for by line, each has its curve and the test of their difference', async () => {
    givenCutWithLosses(20, 10);
    givenCutWithLosses(20, 0);

    const { body } = await asked('/api/stock/survival?by=line');

    expect(body.groups).toMatchObject([
      { plugs: 20, lost: 10, steps: [{ day: 5, atRisk: 20, lost: 10, survival: 0.5 }] },
      { plugs: 20, lost: 0, steps: [] },
    ]);
    expect(body.logRank.p).toBeLessThan(0.01);
  });

  it('when asked for by cause, all plugs are at risk of each, and causes are not tested against one another', async () => {
    givenCutWithLosses(20, 4);

    const { body } = await asked('/api/stock/survival?by=cause');

    expect(body).toMatchObject({ groups: [{ label: 'Not known', plugs: 20, lost: 4 }], logRank: null });
  });

  it.each(['cutter', 'system', 'season'])('when asked for by %s, every plug is in one group', async (by) => {
    givenCutWithLosses(20, 4);

    const { body } = await asked(`/api/stock/survival?by=${by}`);

    expect(body.groups).toMatchObject([{ plugs: 20, lost: 4 }]);
  });

  it('when plugs are sold, they still count for the system where they stood', async () => {
    const { plugs } = givenCut(farm, { pieces: 4 });
    await postOnce(await farm.as('grower'), '/api/stock/gifts', { codes: plugs.map(({ code }) => code).slice(0, 2) });

    const { body } = await asked('/api/stock/survival?by=system');

    expect(body.groups).toMatchObject([{ plugs: 4, lost: 0 }]);
    expect(body.groups[0].label).not.toBe('Never placed');
  });

  it('when asked for by something else, refuses', async () => {
    expect((await asked('/api/stock/survival?by=moon')).status).toBe(400);
  });
});
