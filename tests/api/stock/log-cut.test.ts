import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import {
  auditLog,
  batches,
  colonies,
  consumptions,
  cuts,
  lots,
  plugs,
  stockBalances,
  stockMovements,
} from '../../../server/db/schema/index.ts';
import { isPlugCode } from '../../../shared/domain/plug-code.ts';
import { givenColony, givenCut, givenLine, givenLoss, givenRack, postOnce } from '../../support/given-stock.ts';
import { givenGlue, givenItem, givenLot } from '../../support/given-supplies.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

describe('logging a cut', () => {
  let farm: TestFarm;
  let grower: TestClient;
  let colonyId: string;
  let rackId: string;

  beforeEach(async () => {
    farm = await startFarm({ now: '2026-08-19T09:00:00Z' });
    grower = await farm.as('grower');
    rackId = givenRack(farm);
    colonyId = givenColony(farm, { lineId: givenLine(farm, { code: 'WIG' }), restDays: 70, lastCutOn: '2026-05-01' });
  });

  const aCut = (fields: object = {}) => ({
    ...{ colonyId, cutOn: '2026-08-19', pieces: 22, failedPieces: 2, minutes: 48, tool: 'Bone cutter' },
    ...{ target: { kind: 'rack', rackId } },
    ...fields,
  });

  it('when a rested mother is cut, makes the cut, a batch of the ISO week, labelled plugs and their places', async () => {
    const reply = await postOnce(grower, '/api/cuts', aCut());

    expect(reply.status).toBe(201);
    expect(reply.body).toMatchObject({ batchCode: 'WIG-2634-1' });
    expect(reply.body.plugs).toHaveLength(22);
    expect(reply.body.plugs[0]).toMatchObject({ number: 1, position: 'A-1' });
    expect(reply.body.plugs[21]).toMatchObject({ number: 22, position: 'B-10' });
    const stored = farm.db.select().from(plugs).all();
    expect(stored.map(({ code }) => isPlugCode(code))).not.toContain(false);
    expect(new Set(stored.map(({ code }) => code)).size).toBe(22);
    expect(farm.db.select().from(cuts).get()).toMatchObject({ pieces: 22, failedPieces: 2, minutes: 48 });
    expect(farm.db.select().from(batches).get()).toMatchObject({ pieces: 22, startMm: 25, cutOn: '2026-08-19' });
    expect(farm.db.select().from(colonies).get()).toMatchObject({ lastCutOn: '2026-08-19', version: 2 });
    expect(
      farm.db
        .select()
        .from(stockBalances)
        .all()
        .map(({ pieces }) => pieces)
        .sort(),
    ).toEqual([-22, 22]);
    expect(farm.db.select().from(auditLog).where(eq(auditLog.action, 'cut.logged')).all()).toHaveLength(1);
  });

  it('when the same line is cut again in the week, counts the batch on; another line starts at one', async () => {
    givenCut(farm, { colonyId, cutOn: '2026-08-19' });
    const second = givenCut(farm, { colonyId: givenColony(farm, { lineId: lineIdOf('WIG') }), cutOn: '2026-08-17' });
    const other = givenCut(farm, { colonyId: givenColony(farm, { lineId: givenLine(farm, { code: 'EMB' }) }) });
    const before = givenCut(farm, { colonyId: givenColony(farm, { lineId: lineIdOf('WIG') }), cutOn: '2026-08-16' });

    expect([second, other, before].map(({ batchCode }) => batchCode)).toEqual([
      'WIG-2634-2',
      'EMB-2634-1',
      'WIG-2633-1',
    ]);
  });

  it('when the request comes twice with one key, answers the same and cuts once', async () => {
    const first = await postOnce(grower, '/api/cuts', aCut(), 'key-1');
    const second = await postOnce(grower, '/api/cuts', aCut(), 'key-1');

    expect(second.body).toEqual(first.body);
    expect(farm.db.select().from(cuts).all()).toHaveLength(1);
    expect(farm.db.select().from(plugs).all()).toHaveLength(22);
  });

  it('when positions are taken, fills the free ones in order from the start given', async () => {
    givenCut(farm, { pieces: 2, target: { kind: 'rack', rackId, startPosition: 'A-3' } });

    const reply = await postOnce(
      grower,
      '/api/cuts',
      aCut({ pieces: 4, target: { kind: 'rack', rackId, startPosition: 'a2' } }),
    );

    expect(reply.body.plugs.map((plug: { position: string }) => plug.position)).toEqual(['A-2', 'A-5', 'A-6', 'A-7']);
  });

  it('when the mother has not rested, asks why; with a reason it goes through and keeps it', async () => {
    const tooSoon = { cutOn: '2026-07-09' };
    const refused = await postOnce(grower, '/api/cuts', aCut(tooSoon));
    expect(refused.status).toBe(409);
    expect(refused.body).toMatchObject({
      code: 'rule.refused',
      fields: [{ path: 'restOverride' }],
      details: { nextCutFrom: '2026-07-10' },
    });
    expect(farm.db.select().from(cuts).all()).toEqual([]);

    const reply = await postOnce(grower, '/api/cuts', aCut({ ...tooSoon, restOverride: 'Store order' }));

    expect(reply.status).toBe(201);
    expect(farm.db.select().from(cuts).get()?.note).toBe('Cut before it had rested: Store order');
    expect((await postOnce(grower, '/api/cuts', aCut({ cutOn: '2026-09-17' }))).status).toBe(400);
  });

  it('when the target is the bench, makes plugs that are nowhere yet', async () => {
    const reply = await postOnce(grower, '/api/cuts', aCut({ target: { kind: 'bench' } }));

    expect(reply.body).toMatchObject({ groupId: null });
    expect(farm.db.select().from(stockMovements).all()).toEqual([]);
    const batch = await grower.get(`/api/batches/${reply.body.batchId}`);
    expect(batch.body.counts).toMatchObject({ alive: 22, bench: 22, onRacks: 0, saleable: 0 });
  });

  it('when plugs and glue are named, takes them from their lots in the name of the cut', async () => {
    const plugItemId = givenItem(farm, { kind: 'plug', unit: 'piece', name: 'Ceramic plug', strength: null });
    const glueItemId = givenGlue(farm);
    givenLot(farm, plugItemId, { quantity: 100, costMinor: 2000 });
    givenLot(farm, glueItemId, { quantity: 300, costMinor: 1500 });

    const reply = await postOnce(grower, '/api/cuts', aCut({ plugItemId, glueItemId, gluePerPiece: 0.5 }));

    const used = farm.db.select().from(consumptions).all();
    expect(used.map(({ quantity, costMicro }) => [quantity, costMicro])).toEqual([
      [22, 4_400_000],
      [11, 550_000],
    ]);
    expect(used.every(({ cause, causeId }) => cause === 'cut' && causeId === reply.body.cutId)).toBe(true);
  });

  it.each([
    ['plugs run out', 409, 'supply.not_enough', { pieces: 22, plugItemId: 'item' }],
    ['the rack is full', 409, 'rule.refused', { pieces: 97 }],
    [
      'the start is off the rack',
      400,
      'input.invalid',
      { target: { kind: 'rack', rackId: 'rack', startPosition: 'J-1' } },
    ],
    ['the day is to come', 400, 'input.invalid', { cutOn: '2026-08-20' }],
    ['the day is before the mother came', 400, 'input.invalid', { cutOn: '2023-12-31' }],
    ['nothing is cut', 400, 'input.invalid', { pieces: 0 }],
    ['too much is cut', 400, 'input.invalid', { pieces: 501 }],
    ['half a piece is cut', 400, 'input.invalid', { pieces: 2.5 }],
    ['a size is not possible', 400, 'input.invalid', { startMm: -3 }],
    ['the mother is not known', 404, 'record.not_found', { colonyId: '00000000-0000-4000-8000-0000000fffff' }],
  ])('when %s, refuses and writes nothing at all', async (_what, status, code, fields: Record<string, unknown>) => {
    const itemId = givenItem(farm, { kind: 'plug', unit: 'piece', strength: null });
    givenLot(farm, itemId, { quantity: 10 });
    const filled = JSON.parse(
      JSON.stringify(fields).replace('"item"', `"${itemId}"`).replace('"rack","start', `"${rackId}","start`),
    );

    const reply = await postOnce(grower, '/api/cuts', aCut(filled));

    expect([reply.status, reply.body.code]).toEqual([status, code]);
    for (const table of [cuts, batches, plugs, stockMovements, consumptions]) {
      expect(farm.db.select().from(table).all()).toEqual([]);
    }
    expect(farm.db.select().from(lots).get()?.remaining).toBe(10);
    expect(farm.db.select().from(colonies).get()?.lastCutOn).toBe('2026-05-01');
  });

  it('when a cut is taken back, its plugs, supplies and the rest of the mother are as before', async () => {
    const plugItemId = givenItem(farm, { kind: 'plug', unit: 'piece', strength: null });
    givenLot(farm, plugItemId, { quantity: 100, costMinor: 2000 });
    givenCut(farm, { colonyId, cutOn: '2026-06-01', pieces: 1, restOverride: 'Trial' });
    const { body } = await postOnce(grower, '/api/cuts', aCut({ plugItemId }));

    const reply = await postOnce(grower, `/api/stock/acts/${body.groupId}/undo`, { note: 'Typed 22 for 12' });

    expect(reply.body).toEqual({ pieces: 22 });
    expect(farm.db.select().from(lots).get()).toMatchObject({ remaining: 100, remainingMicro: 20_000_000 });
    expect(farm.db.select().from(colonies).get()?.lastCutOn).toBe('2026-06-01');
    const batch = await grower.get(`/api/batches/${body.batchId}`);
    expect(batch.body).toMatchObject({ counts: { alive: 0, bench: 0 }, undoneAt: farm.deps.clock.now() });
    const moved = await postOnce(grower, '/api/stock/place', { codes: [body.plugs[0].code], rackId });
    expect([moved.status, moved.body.code]).toEqual([409, 'stock.not_there']);
    const again = await postOnce(grower, `/api/cuts/${body.cutId}/undo`, {});
    expect(again.body.code).toBe('stock.already_reversed');
  });

  it('when plugs of a cut moved on, it can not be taken back', async () => {
    const { cutId, plugs: made } = givenCut(farm, { colonyId });
    givenLoss(farm, [made[0]?.code ?? '']);

    const reply = await postOnce(grower, `/api/cuts/${cutId}/undo`, {});

    expect([reply.status, reply.body.code]).toEqual([409, 'rule.refused']);
    expect(farm.db.select().from(cuts).get()?.undoneAt).toBeNull();
  });

  const lineIdOf = (code: string) =>
    farm.db.query.lines.findFirst({ where: (line, { eq: is }) => is(line.code, code) }).sync()?.id ?? '';
});
