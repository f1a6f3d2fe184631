import { beforeEach, describe, expect, it } from 'vitest';
import { moveRack } from '../../../server/services/rack-service.ts';
import {
  givenColony,
  givenCut,
  givenLine,
  givenLoss,
  givenPlaced,
  givenRack,
  givenRackIn,
  givenSaleableBatch,
  givenWithheld,
  postOnce,
} from '../../support/given-stock.ts';
import { givenReading, givenSystem, givenTank } from '../../support/given-water.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

const DAY_MS = 24 * 3_600_000;

describe('pages of stock', () => {
  let farm: TestFarm;
  let grower: TestClient;

  beforeEach(async () => {
    farm = await startFarm();
    grower = await farm.as('grower');
  });

  it('when a line has stock, its row counts it by grade; the summary counts the farm', async () => {
    const lineId = givenLine(farm, { code: 'WIG', tradeName: 'Wicket Green' });
    const colonyId = givenColony(farm, { lineId, restDays: 0 });
    const { plugs } = givenSaleableBatch(farm, { colonyId });
    givenCut(farm, { colonyId, cutOn: '2026-02-27', pieces: 4, target: { kind: 'bench' } });
    givenWithheld(farm, { plugCode: plugs[0]?.code ?? '' });

    const list = await grower.get('/api/lines?search=wicket');

    const counts = { alive: 14, onRacks: 10, bench: 4, saleable: 9, held: 0, withheld: 1 };
    expect(list.body).toMatchObject({ total: 1, nextCursor: null });
    expect(list.body.items[0]).toMatchObject({
      ...{ code: 'WIG', colonies: 1, counts },
      grades: [
        { grade: 'frag', alive: 4, saleable: 0 },
        { grade: 'large', alive: 10, saleable: 9 },
      ],
      expected: { startMm: 25, mmPerWeek: 1.8, healDays: 8, restDays: 70 },
    });
    // Four pieces heal on 7 March, but the bench is no place to sell from.
    expect((await grower.get('/api/stock/summary')).body).toMatchObject({
      counts,
      lines: 1,
      batches: 2,
      saleableSoon: 0,
    });
  });

  it('when lines are many, pages follow each other by code; wildcards are letters; a made-up cursor is refused', async () => {
    for (const code of ['AAA', 'BBB', 'CCC']) givenLine(farm, { code, tradeName: `Under_score ${code}` });

    const one = await grower.get('/api/lines?limit=2');
    const two = await grower.get(`/api/lines?limit=2&cursor=${one.body.nextCursor}`);

    expect([one, two].map(({ body }) => body.items.map((line: { code: string }) => line.code))).toEqual([
      ['AAA', 'BBB'],
      ['CCC'],
    ]);
    expect((await grower.get('/api/lines?search=%25')).body.total).toBe(0);
    expect((await grower.get('/api/lines?search=r_s')).body.total).toBe(3);
    expect((await grower.get('/api/lines?cursor=bm9uc2Vuc2U')).status).toBe(400);
  });

  it('when batches are filtered by state, system and line, each comes where it belongs', async () => {
    const system = givenSystem(farm);
    const rackId = givenRack(farm, { tankId: givenTank(farm, system) });
    const ready = givenSaleableBatch(farm, { target: { kind: 'rack', rackId } });
    const young = givenCut(farm, { cutOn: '2026-03-01' });
    const lost = givenSaleableBatch(farm, { cutOn: '2025-12-01' });
    givenLoss(
      farm,
      lost.plugs.map(({ code }) => code),
    );
    const sick = givenSaleableBatch(farm, { cutOn: '2025-12-24' });
    givenWithheld(farm, { batchId: sick.batchId });
    const codesOf = async (query: string) =>
      (await grower.get(`/api/batches?${query}`)).body.items.map((batch: { code: string }) => batch.code);

    expect(await codesOf('')).toEqual([young, sick, ready].map(({ batchCode }) => batchCode));
    expect(await codesOf('state=saleable')).toEqual([ready.batchCode]);
    expect(await codesOf('state=growing')).toEqual([young.batchCode]);
    expect(await codesOf('state=withheld')).toEqual([sick.batchCode]);
    expect(await codesOf('state=finished')).toEqual([lost.batchCode]);
    expect(await codesOf('state=all')).toHaveLength(4);
    expect(await codesOf(`systemId=${system}`)).toEqual([ready.batchCode]);
    const page = await grower.get('/api/batches?limit=1&state=all');
    expect(await codesOf(`limit=5&state=all&cursor=${page.body.nextCursor}`)).toHaveLength(3);
  });

  it('when a plug moved between systems, its life and the water it lived in follow it, moves of the rack included', async () => {
    const [first, second, third] = [givenSystem(farm), givenSystem(farm), givenSystem(farm)] as const;
    const rackId = givenRack(farm, { tankId: givenTank(farm, first) });
    const cut = givenCut(farm, { target: { kind: 'rack', rackId } });
    const code = cut.plugs[0]?.code ?? '';
    givenReading(farm, first, 8);
    farm.wait(10 * DAY_MS);
    const moving = givenTank(farm, second);
    farm.write((write) => moveRack(write, rackId, { tankId: moving }));
    givenReading(farm, first, 12);
    givenReading(farm, second, 9);
    farm.wait(5 * DAY_MS);
    const elsewhere = givenRack(farm, { tankId: givenTank(farm, third) });
    givenPlaced(farm, [code], elsewhere, { position: 'C-11' });

    const { body } = await (await farm.as('grower')).get(`/api/plugs/${code.toLowerCase()}`);

    expect(body).toMatchObject({ state: 'saleable', position: 'C-11', batch: { alive: 10 } });
    const now = farm.deps.clock.now();
    expect(
      body.life.segments.map(({ kind, from, to }: { kind: string; from: number; to: number | null }) => [
        ...[kind, Math.round((from - now) / DAY_MS), to === null ? null : Math.round((to - now) / DAY_MS)],
      ]),
    ).toEqual([
      // Healed at the start of 10 March: the cut was at nine on the second.
      ['healing', -15, -7],
      ['growout', -7, -5],
      ['growout', -5, 0],
      ['growout', 0, null],
    ]);
    expect(body.life.pins.map(({ label }: { label: string }) => label)).toEqual(['cut', 'healed', 'moved']);
    const alkalinity = body.water.find(({ parameter }: { parameter: string }) => parameter === 'alkalinity');
    expect(alkalinity).toMatchObject({ readings: 2, mean: expect.closeTo((8.5 * 20) / 56.077, 3) });
  });

  it('when a plug is gone, unknown or badly typed, its page says so', async () => {
    const { plugs } = givenCut(farm);
    const code = plugs[0]?.code ?? '';
    givenLoss(farm, [code]);

    expect((await grower.get(`/api/plugs/${code}`)).body).toMatchObject({
      ...{ state: 'gone', rack: null, position: null },
      gone: { kind: 'lost', detail: 'Not known' },
    });
    const swapped = code.slice(0, 5) + code.charAt(6) + code.charAt(5);
    const wrong = await grower.get(`/api/plugs/${swapped}`);
    expect([wrong.status, wrong.body.code]).toEqual([404, 'record.not_found']);
    expect((await grower.get('/api/plugs/%20')).status).toBe(400);
  });

  it('when a rack is looked at, every plug has its place, days to grade and what keeps it from sale', async () => {
    const rackId = givenRack(farm);
    const lineId = givenLine(farm, { startMm: 11.4, mmPerWeek: 1.2, healDays: 5 });
    const growing = givenCut(farm, {
      ...{ colonyId: givenColony(farm, { lineId }), cutOn: '2026-02-23', pieces: 2 },
      target: { kind: 'rack', rackId, startPosition: 'B-1' },
    });
    const { plugs } = givenSaleableBatch(farm, { pieces: 3, target: { kind: 'rack', rackId } });
    givenWithheld(farm, { plugCode: plugs[2]?.code ?? '' });

    const { body } = await grower.get(`/api/racks/${rackId}`);

    expect(body).toMatchObject({ plugs: 5, rows: 8, columns: 12, saleable: 2, saleableIn14Days: 2 });
    expect(
      body.places.map((plug: { position: string; daysToGrade: number; withheld: boolean }) => [
        ...[plug.position, plug.daysToGrade, plug.withheld],
      ]),
    ).toEqual([
      ['A-1', 0, false],
      ['A-2', 0, false],
      ['A-3', 0, true],
      // 11.4 mm and 1.2 a week reach 15 mm after 21 days, 14 of them to come.
      ['B-1', 14, false],
      ['B-2', 14, false],
    ]);
    expect(body.lines.map(({ plugs: count }: { plugs: number }) => count)).toEqual([3, 2]);
    expect(growing.plugs).toHaveLength(2);
  });

  it('when mothers are ranked, rested and wanted ones come first', async () => {
    const resting = givenColony(farm, { restDays: 70, lastCutOn: '2026-02-01' });
    const poor = givenColony(farm, { health: 'poor' });
    const rested = givenColony(farm);

    const { body } = await grower.get('/api/cutting');

    expect(body.items.map(({ colony }: { colony: { id: string } }) => colony.id)).toEqual([rested, poor, resting]);
    expect(body.items[2].colony).toMatchObject({ rested: false, nextCutFrom: '2026-04-12' });
  });
});

describe('records of stock', () => {
  let farm: TestFarm;
  let grower: TestClient;

  beforeEach(async () => {
    farm = await startFarm();
    grower = await farm.as('grower');
  });

  const aLine = { code: 'wig', tradeName: 'Wicket Green', taxon: 'Acropora tenuis', growthForm: 'staghorn' };

  it('when a line is started, its code is in capitals and once only; an edit on an old version is refused', async () => {
    const made = await postOnce(grower, '/api/lines', aLine);
    expect(made.body).toMatchObject({ code: 'WIG', version: 1, citesSource: '' });
    const twice = await postOnce(grower, '/api/lines', aLine);
    expect([twice.status, twice.body.fields[0].path]).toEqual([409, 'code']);

    const edit = (ifMatch: number, body: object) =>
      grower.patch(`/api/lines/${made.body.id}`).set('If-Match', `"${ifMatch}"`).send(body);
    expect((await edit(1, { tradeName: 'Wicket', retired: true })).body).toMatchObject({
      version: 2,
      tradeName: 'Wicket',
    });
    const stale = await edit(1, { tradeName: 'Other' });
    expect([stale.status, stale.body.details.current.tradeName]).toEqual([412, 'Wicket']);
    expect((await edit(2, { code: 'ABC' })).status).toBe(400);
    expect((await edit(2, { retired: false })).body.retiredAt).toBeNull();
  });

  it.each([
    ['code', 'WI'],
    ['code', 'WIGG'],
    ['tradeName', ' '],
    ['tradeName', 'x'.repeat(121)],
    ['growthForm', 'tree'],
    ['publicText', 'x'.repeat(2001)],
    ['citesSource', 'Z'],
    ['startMm', 0],
    ['mmPerWeek', 51],
    ['healDays', 1.5],
  ])('when the %s of a line is %j, refuses at the field', async (field, value) => {
    const reply = await postOnce(grower, '/api/lines', { ...aLine, [field]: value });

    expect([reply.status, reply.body.fields[0].path]).toEqual([400, field]);
  });

  it('when a mother is registered, it rests as its form does; days to come are refused', async () => {
    const body = {
      code: 'm-031',
      lineId: givenLine(farm),
      rackId: givenRack(farm),
      sizeMm: 120,
      acquiredOn: '2025-01-01',
    };
    const made = await postOnce(grower, '/api/colonies', body);
    expect(made.body).toMatchObject({ code: 'M-031', restDays: 70, rested: true, nextCutFrom: null });

    const later = await postOnce(grower, '/api/colonies', { ...body, code: 'M-032', lastCutOn: '2026-03-03' });

    expect([later.status, later.body.fields[0].path]).toEqual([400, 'lastCutOn']);
  });

  it('when a rack is made smaller or retired under its plugs, or moved, plugs stay safe', async () => {
    const rackId = givenRack(farm);
    givenCut(farm, { pieces: 1, target: { kind: 'rack', rackId, startPosition: 'H-12' } });
    const edit = (body: object) => grower.patch(`/api/racks/${rackId}`).set('If-Match', '"1"').send(body);
    expect((await edit({ rows: 7 })).body.code).toBe('record.in_use');
    expect((await edit({ retired: true })).body.code).toBe('record.in_use');

    const { body: target } = await grower.get(`/api/racks/${givenRackIn(farm, 'growout')}`);
    const moved = await postOnce(grower, `/api/racks/${rackId}/move`, { tankId: target.tankId });

    expect(moved.body).toMatchObject({ systemId: target.systemId, plugs: 1, version: 2 });
    expect((await postOnce(grower, `/api/racks/${rackId}/move`, { tankId: target.tankId })).status).toBe(409);
  });
});
