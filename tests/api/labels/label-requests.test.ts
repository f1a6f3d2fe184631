import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { auditLog, consumptions, items, lots } from '../../../server/db/schema/index.ts';
import { formatPlugCode } from '../../../shared/domain/plug-code.ts';
import { givenLabelledBatch } from '../../support/given-labels.ts';
import { sheetOf } from '../../support/label-sheet.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

function givenBlankLabels(farm: TestFarm, quantity: number): string {
  return farm.write(({ tx, newId, now }) => {
    const itemId = newId();
    tx.insert(items)
      .values({
        ...{ id: itemId, code: 'LAB-65', name: 'Vinyl labels', kind: 'label', unit: 'piece', packSize: 650 },
        ...{ leadTimeDays: 5, safetyDays: 7, createdAt: now },
      })
      .run();
    tx.insert(lots)
      .values({
        ...{ id: newId(), itemId, code: 'A', receivedOn: '2026-02-01', quantity, remaining: quantity, costMinor: 1300 },
        ...{ remainingMicro: 13_000_000, receivedBy: 'Test grower', createdAt: now },
      })
      .run();
    return itemId;
  });
}

describe('what labels say', () => {
  it('when asked for a batch, answers line, number, cut day and batch of every plug', async () => {
    const farm = await startFarm();
    const { batchId, codes } = givenLabelledBatch(farm, { pieces: 2 });
    const grower = await farm.as('grower');

    const reply = await grower.get(`/api/labels/contents?batchId=${batchId}`);

    expect(reply.status).toBe(200);
    expect(reply.body).toMatchObject({ title: 'Batch WIG-2609-1', batchId });
    expect(reply.body.labels[1]).toEqual({
      qrText: `HTTP://FARM.EXAMPLE.COM/P/${codes[1]}`,
      code: formatPlugCode(codes[1] ?? ''),
      glyphCode: 'WIG',
      rows: ['WIG 2', 'cut 2026-02-26', 'WIG-2609-1'],
    });
  });

  it('when plugs of two batches are asked for, names no single batch', async () => {
    const farm = await startFarm();
    const [first, second] = [givenLabelledBatch(farm), givenLabelledBatch(farm, { lineCode: 'EMB' })];
    const grower = await farm.as('grower');

    const reply = await grower.get(`/api/labels/contents?codes=${first.codes[0]},${second.codes[0]}`);

    expect(reply.body).toMatchObject({ title: 'Plugs of 2 batches', batchId: null });
    expect(reply.body.labels).toHaveLength(2);
  });

  it.each([
    ['', 400, 'input.invalid'],
    ['racks=R7&codes=X', 400, 'input.invalid'],
    ['codes=NOTACODE', 400, 'input.invalid'],
    ['codes=%00%F0%9F%90%A1', 400, 'input.invalid'],
    ['batchId=7', 400, 'input.invalid'],
    ['batchId=00000000-0000-4000-8000-00000000ffff', 404, 'record.not_found'],
    ['racks=NOWHERE', 404, 'record.not_found'],
    [`codes=${'A'.repeat(6001)}`, 400, 'input.invalid'],
    ['racks=R7&color=red', 400, 'input.invalid'],
  ])('when asked with "%s", is refused with %i %s', async (query, status, code) => {
    const farm = await startFarm();
    const grower = await farm.as('grower');

    const reply = await grower.get(`/api/labels/contents?${query}`);

    expect([reply.status, reply.body.code]).toEqual([status, code]);
  });

  it.each([
    [{ stockId: 'napkin' }, 404, 'stockId'],
    [{ stockId: 'a4-65', start: 0 }, 400, 'start'],
    [{ stockId: 'a4-65', start: 66 }, 400, 'start'],
    [{ stockId: 'roll-25', start: 2 }, 400, 'start'],
    [{ start: 1 }, 400, 'stockId'],
    [{ stockId: 'a4-65', printer: '' }, 400, 'printer'],
  ])('when printed with %j, says at the field what is wrong', async (fields, status, path) => {
    const farm = await startFarm();
    const { batchId } = givenLabelledBatch(farm);
    const grower = await farm.as('grower');

    const reply = await grower.post('/api/labels/prints').send({ subject: { batchId }, ...fields });

    expect([reply.status, reply.body.fields[0].path]).toEqual([status, path]);
  });

  it('when labels beyond the last are asked for, says which there are', async () => {
    const farm = await startFarm();
    const { batchId } = givenLabelledBatch(farm, { pieces: 4 });
    const grower = await farm.as('grower');

    const run = { subject: { batchId, from: 5, to: 9 }, stockId: 'a4-65' };
    const reply = await grower.post('/api/labels/prints').send(run);

    expect(reply.status).toBe(400);
    expect(reply.body.fields).toEqual([{ path: 'subject.from', message: 'There are labels 1 to 4.' }]);
  });
});

describe('printing again', () => {
  it('when labels were printed, they are listed, the latest first, and their PDF is made again', async () => {
    const farm = await startFarm();
    const { batchId } = givenLabelledBatch(farm, { pieces: 4 });
    const grower = await farm.as('grower');
    const print = (from: number) =>
      grower.post('/api/labels/prints').send({ subject: { batchId, from, to: from }, stockId: 'a4-65', start: from });
    for (const from of [1, 2, 3]) await print(from);

    const first = await grower.get('/api/labels/prints?limit=2');
    const rest = await grower.get(`/api/labels/prints?limit=2&cursor=${first.body.nextCursor}`);

    const all = [...first.body.items, ...rest.body.items];
    expect([first.body.total, all.length, new Set(all.map(({ id }) => id)).size]).toEqual([3, 3, 3]);
    expect(all.map(({ subject }) => subject.from).sort()).toEqual([1, 2, 3]);
    expect(all[0]).toMatchObject({
      title: 'Batch WIG-2609-1',
      labels: 1,
      stockName: sheetOf('a4-65').name,
      by: 'Test grower',
    });
    const again = await grower.get(`/api/labels/prints/${all[0].id}/file`);
    expect([again.status, again.headers['content-type']]).toEqual([200, 'application/pdf']);
    expect(farm.db.select().from(auditLog).where(eq(auditLog.action, 'labels.printed')).all()).toHaveLength(3);
  });

  it('when there is no such run, says so', async () => {
    const farm = await startFarm();
    const grower = await farm.as('grower');

    const reply = await grower.get('/api/labels/prints/00000000-0000-4000-8000-00000000ffff/file');

    expect([reply.status, reply.body.code]).toEqual([404, 'record.not_found']);
  });
});

describe('taking blank labels', () => {
  it('when labels are taken for a batch, they leave the lots once, at the cost of its cut', async () => {
    const farm = await startFarm();
    const { batchId, cutId } = givenLabelledBatch(farm);
    const itemId = givenBlankLabels(farm, 650);
    const grower = await farm.as('grower');
    const take = () =>
      grower.post('/api/labels/takings').set('Idempotency-Key', 'same-press').send({ itemId, batchId, labels: 65 });

    const [first, repeat] = [await take(), await take()];

    expect([first.status, repeat.status]).toEqual([201, 201]);
    expect(farm.db.select().from(consumptions).all()).toMatchObject([
      { itemId, quantity: 65, costMicro: 1_300_000, cause: 'cut', causeId: cutId },
    ]);
    expect(farm.db.select().from(auditLog).where(eq(auditLog.action, 'labels.taken')).all()).toHaveLength(1);
    const { body } = await grower.get('/api/labels/supplies');
    expect(body.items).toEqual([{ id: itemId, name: 'Vinyl labels', onHand: 585 }]);
  });

  it('when fewer are on hand, takes none and says so', async () => {
    const farm = await startFarm();
    const { batchId } = givenLabelledBatch(farm);
    const itemId = givenBlankLabels(farm, 10);
    const grower = await farm.as('grower');

    const reply = await grower.post('/api/labels/takings').send({ itemId, batchId, labels: 11 });

    expect([reply.status, reply.body.code]).toEqual([409, 'supply.not_enough']);
    expect(farm.db.select().from(consumptions).all()).toEqual([]);
  });

  it('when the item is no label or the batch is unknown, refuses', async () => {
    const farm = await startFarm();
    const { batchId } = givenLabelledBatch(farm);
    const itemId = givenBlankLabels(farm, 10);
    const grower = await farm.as('grower');

    const noItem = await grower.post('/api/labels/takings').send({ itemId: batchId, batchId, labels: 1 });
    const noBatch = await grower.post('/api/labels/takings').send({ itemId, batchId: itemId, labels: 1 });
    const none = await grower.post('/api/labels/takings').send({ itemId, batchId, labels: 0 });

    expect([noItem.status, noBatch.status, none.status]).toEqual([404, 404, 400]);
  });
});
