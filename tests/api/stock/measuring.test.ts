import { beforeEach, describe, expect, it } from 'vitest';
import { sizeReadings } from '../../../server/db/schema/index.ts';
import { givenCut, postOnce } from '../../support/given-stock.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

const DAY_MS = 24 * 3_600_000;

describe('measuring', () => {
  let farm: TestFarm;
  let grower: TestClient;
  let batchId: string;
  let codes: string[];
  const first = () => codes[0] ?? '';

  beforeEach(async () => {
    farm = await startFarm();
    grower = await farm.as('grower');
    const cut = givenCut(farm, { pieces: 5 });
    codes = cut.plugs.map(({ code }) => code);
    ({ batchId } = cut);
  });

  it('when a sample of a batch is measured, its mean is the size from then on, and growth goes on from it', async () => {
    farm.wait(14 * DAY_MS);
    const client = await farm.as('grower');

    const reply = await postOnce(client, '/api/stock/measurements', { batchId, sizesMm: [30, 31, 35] });

    expect(reply.body.meanMm).toBe(32);
    expect((await client.get(`/api/batches/${batchId}`)).body.size).toMatchObject({
      mm: 32,
      measuredOn: '2026-03-16',
    });
    farm.wait(7 * DAY_MS);
    const later = await (await farm.as('grower')).get(`/api/batches/${batchId}`);
    expect(later.body.size.mm).toBeCloseTo(33.8, 9);
  });

  it('when one plug is measured, its own page shows it, and taking it back leaves the expected size', async () => {
    const made = await postOnce(grower, '/api/stock/measurements', { plugCode: first(), sizesMm: [42] });
    expect((await grower.get(`/api/plugs/${first()}`)).body.size).toMatchObject({ mm: 42, grade: 'large' });

    await grower.delete(`/api/stock/measurements/${made.body.ids[0]}`);

    expect((await grower.get(`/api/plugs/${first()}`)).body.size).toMatchObject({ mm: 25, grade: 'frag' });
    expect(farm.db.select().from(sizeReadings).all()).toEqual([]);
  });

  it.each([
    ['no size', { sizesMm: [] }],
    ['zero', { sizesMm: [0] }],
    ['text', { sizesMm: ['12'] }],
    ['a time before the cut', { sizesMm: [20], at: Date.parse('2026-02-20T12:00:00Z') }],
  ])('when %s is given, refuses', async (_what, body) => {
    const reply = await postOnce(grower, '/api/stock/measurements', { batchId, ...body });

    expect(reply.status).toBe(400);
    expect(farm.db.select().from(sizeReadings).all()).toEqual([]);
  });

  it('when one or two plugs were measured, the batch keeps its own size; three of them speak for it', async () => {
    await postOnce(grower, '/api/stock/measurements', { batchId, sizesMm: [26, 28] });
    farm.wait(DAY_MS);
    const client = await farm.as('grower');
    const measure = (index: number, mm: number) =>
      postOnce(client, '/api/stock/measurements', { plugCode: codes[index], sizesMm: [mm] });
    const size = async () => (await client.get(`/api/batches/${batchId}`)).body.size;

    await measure(0, 40);
    await measure(1, 44);
    expect(await size()).toMatchObject({ mm: expect.closeTo(27 + 1.8 / 7, 9), measuredOn: '2026-03-02' });

    await measure(2, 48);
    expect(await size()).toMatchObject({ mm: 44, measuredOn: '2026-03-03' });
  });
});
