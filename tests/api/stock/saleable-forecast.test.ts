import { beforeEach, describe, expect, it } from 'vitest';
import { givenColony, givenCut, givenLine, postOnce } from '../../support/given-stock.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const DAY_MS = 24 * 3_600_000;

describe('forecast of a batch', () => {
  let farm: TestFarm;
  let batchId: string;

  beforeEach(async () => {
    farm = await startFarm();
    const lineId = givenLine(farm, { startMm: 10, mmPerWeek: 1.5, healDays: 8 });
    ({ batchId } = givenCut(farm, { pieces: 40, colonyId: givenColony(farm, { lineId }) }));
  });

  async function forecast() {
    return (await (await farm.as('grower')).get(`/api/batches/${batchId}`)).body.forecast;
  }

  async function measured(sizesMm: number[]) {
    await postOnce(await farm.as('grower'), '/api/stock/measurements', { batchId, sizesMm });
  }

  it('when pieces are too small for sale, tells by which day most are ready, within a range', async () => {
    const told = await forecast();

    expect(told).toMatchObject({ grade: 'small', isFirstSale: true, of: 40 });
    expect(told.on > '2026-03-20' && told.on < '2026-05-15').toBe(true);
    expect(told.expected).toBeGreaterThanOrEqual(25);
    expect(told.low).toBeLessThan(told.expected);
    expect(told.high).toBeGreaterThan(told.expected);
    expect(told.points).toHaveLength(27);
    expect(told.points[0].expected).toBe(0);
  });

  it('when a sample shows fast growth, the day comes nearer', async () => {
    farm.wait(21 * DAY_MS);
    const before = await forecast();
    await measured([15, 16, 17, 14, 16]);

    expect((await forecast()).basis).toMatchObject({ batches: 1, sampled: 5 });
    expect((await forecast()).basis.ratio).toBeGreaterThan(before.basis.ratio);
  });

  it('when most can be sold already, looks for the next grade', async () => {
    farm.wait(30 * DAY_MS);
    await measured([20, 21, 22, 20]);

    expect(await forecast()).toMatchObject({ grade: 'frag', isFirstSale: false });
  });
});
