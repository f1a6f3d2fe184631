import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { auditLog, plugs, stockMovements, withholds } from '../../../server/db/schema/index.ts';
import { rackPlace } from '../../../server/queries/places.ts';
import {
  givenCut,
  givenLoss,
  givenPlaced,
  givenRack,
  givenRackIn,
  givenWithheld,
  postOnce,
} from '../../support/given-stock.ts';
import { givenTank } from '../../support/given-water.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

const DAY_MS = 24 * 3_600_000;

describe('acts on plugs', () => {
  let farm: TestFarm;
  let grower: TestClient;
  let rackId: string;
  let codes: string[];
  let batchId: string;
  const first = () => codes[0] ?? '';

  beforeEach(async () => {
    farm = await startFarm();
    grower = await farm.as('grower');
    rackId = givenRack(farm, { code: 'R7' });
    const cut = givenCut(farm, { pieces: 5, target: { kind: 'rack', rackId } });
    codes = cut.plugs.map(({ code }) => code);
    ({ batchId } = cut);
  });

  const placeOf = (code: string) => farm.db.select().from(plugs).where(eq(plugs.code, code)).get();
  const movements = () => farm.db.select().from(stockMovements).all().length;

  describe('placing', () => {
    it('when plugs go to another rack, fills its free positions in the order of the scans', async () => {
      const other = givenRack(farm);
      givenCut(farm, { pieces: 1, target: { kind: 'rack', rackId: other, startPosition: 'A-2' } });

      const reply = await postOnce(grower, '/api/stock/place', { codes: [codes[2], codes[0]], rackId: other });

      expect(reply.status).toBe(201);
      expect(reply.body.plugs).toEqual([
        { code: codes[2], position: 'A-1' },
        { code: codes[0], position: 'A-3' },
      ]);
      expect(placeOf(first())?.position).toBe('A-3');
    });

    it('when a code is typed with look-alikes, spaces or as its address, or scanned twice, it is one plug', async () => {
      const typed = `${first().slice(0, 3)}-${first().slice(3)}`.toLowerCase();
      const url = `HTTPS://FARM.EXAMPLE.COM/P/${first()}`;

      const reply = await postOnce(grower, '/api/stock/place', { codes: [typed, url], rackId, position: 'H12' });

      expect(reply.status).toBe(400);
      const alone = await postOnce(grower, '/api/stock/place', { codes: [url], rackId, position: 'H12' });
      expect(alone.body.plugs).toEqual([{ code: first(), position: 'H-12' }]);
    });

    it('when plugs wait on the bench, they are placed from there', async () => {
      const { plugs: waiting } = givenCut(farm, { pieces: 2, target: { kind: 'bench' } });
      const reply = await postOnce(grower, '/api/stock/place', {
        ...{ codes: waiting.map(({ code }) => code), rackId, startPosition: 'C-1' },
      });

      expect(reply.body.plugs.map((plug: { position: string }) => plug.position)).toEqual(['C-1', 'C-2']);
      expect(farm.db.select().from(stockMovements).where(eq(stockMovements.kind, 'place')).all()).toHaveLength(2);
    });

    it('when they are put down loose, they stand on the rack without a position', async () => {
      const other = givenRack(farm);

      await postOnce(grower, '/api/stock/place', { codes, rackId: other, loose: true });

      const page = await grower.get(`/api/racks/${other}`);
      expect(page.body.places).toHaveLength(5);
      expect(page.body.places[0].position).toBeNull();
    });

    it.each([
      ['the position is taken', 409, 'rule.refused', { codes: [0], position: 'A-2' }],
      ['it stands there already', 409, 'rule.refused', { codes: [0], position: 'A-1' }],
      ['the rack has no such position', 400, 'input.invalid', { codes: [0], position: 'K-1' }],
      ['two plugs are to share a position', 400, 'input.invalid', { codes: [0, 1], position: 'B-1' }],
      ['too few positions are free', 409, 'rule.refused', { codes: [0, 1], startPosition: 'H-12' }],
      ['no plug is named', 400, 'input.invalid', { codes: [] }],
      ['the time is to come', 400, 'input.invalid', { codes: [0], at: Date.parse('2026-03-02T09:06:00Z') }],
      ['a field is not known', 400, 'input.invalid', { codes: [0], rack: 'R7' }],
    ])('when %s, refuses and moves nothing', async (_what, status, code, body: { codes: number[] }) => {
      const reply = await postOnce(grower, '/api/stock/place', {
        ...{ rackId, ...body, codes: body.codes.map((index) => codes[index]) },
      });

      expect([reply.status, reply.body.code]).toEqual([status, code]);
      expect(movements()).toBe(5);
    });

    it('when one of many codes is wrong, names it, offers the near one and moves nothing', async () => {
      const wrong = `${first().slice(0, 5)}${first().charAt(6)}${first().charAt(5)}`;

      const reply = await postOnce(grower, '/api/stock/place', {
        codes: [codes[1], wrong],
        rackId,
        startPosition: 'C-1',
      });

      expect(reply.status).toBe(404);
      expect(reply.body.fields).toMatchObject([{ path: 'codes.1' }]);
      expect(movements()).toBe(5);
    });
  });

  describe('losses, culls and gifts', () => {
    it('when plugs are lost, keeps what was seen and the likely cause, at the time of the act', async () => {
      const at = Date.parse('2026-03-02T07:40:00Z');

      const reply = await postOnce(grower, '/api/stock/losses', {
        ...{ codes: codes.slice(0, 3), seen: 'rtn', cause: 'water_event', at, note: 'Row A' },
      });

      expect(reply.body.pieces).toBe(3);
      const rows = farm.db.select().from(stockMovements).where(eq(stockMovements.kind, 'loss')).all();
      expect(rows).toHaveLength(3);
      expect(rows[0]).toMatchObject({ seen: 'rtn', note: 'Row A', at, recordedAt: farm.deps.clock.now() });
      const page = await grower.get(`/api/batches/${batchId}`);
      expect(page.body).toMatchObject({
        counts: { alive: 2 },
        left: [{ kind: 'lost', detail: 'Alkalinity or salinity event', pieces: 3 }],
        survival: [{ day: 0, atRisk: 5, lost: 3, survival: 0.4 }],
      });
    });

    it('when a lost plug is lost, moved or measured again, says that it has left', async () => {
      givenLoss(farm, [first()]);

      for (const [path, body] of [
        ['losses', { codes: [first()], seen: 'stn' }],
        ['place', { codes: [first()], rackId }],
        ['measurements', { plugCode: first(), sizesMm: [30] }],
        ['withholds', { plugCode: first(), reason: 'Pest' }],
      ] as const) {
        const reply = await postOnce(grower, `/api/stock/${path}`, body);
        expect([path, reply.status, reply.body.code]).toEqual([path, 409, 'stock.not_there']);
      }
    });

    it('when plugs are culled and given away, the batch says so', async () => {
      await postOnce(grower, '/api/stock/culls', { codes: codes.slice(0, 1), reason: 'Bare base' });
      await postOnce(grower, '/api/stock/gifts', { codes: codes.slice(1, 3), to: 'A school' });

      const page = await grower.get(`/api/batches/${batchId}`);
      expect(page.body.left).toEqual([
        { kind: 'culled', detail: '', pieces: 1 },
        { kind: 'given', detail: '', pieces: 2 },
      ]);
      // The cull ends a life, the gift ends only the watching.
      expect(page.body.survival).toMatchObject([{ atRisk: 5, lost: 1 }]);
    });
  });

  describe('undo', () => {
    it('when an act is undone, every plug is back at its place, and not twice', async () => {
      const groupId = givenPlaced(farm, codes, givenRack(farm));

      const reply = await postOnce(grower, `/api/stock/acts/${groupId}/undo`, {});

      expect(reply.body).toEqual({ pieces: 5 });
      expect(codes.map((code) => placeOf(code)?.position)).toEqual(['A-1', 'A-2', 'A-3', 'A-4', 'A-5']);
      const again = await postOnce(grower, `/api/stock/acts/${groupId}/undo`, {});
      expect([again.status, again.body.code]).toEqual([409, 'stock.already_reversed']);
      expect(farm.db.select().from(auditLog).where(eq(auditLog.action, 'stock.undone')).all()).toHaveLength(1);
    });

    it('when another plug stands at the old position, refuses and undoes nothing', async () => {
      const groupId = givenPlaced(farm, [first()], givenRack(farm));
      givenPlaced(farm, [codes[4] ?? ''], rackId, { position: 'A-1' });

      const reply = await postOnce(grower, `/api/stock/acts/${groupId}/undo`, {});

      expect([reply.status, reply.body.detail]).toEqual([409, 'Another plug already stands at that position.']);
    });

    it('when a day has passed, only the owner may undo', async () => {
      const groupId = givenLoss(farm, [first()]);
      farm.wait(DAY_MS + 1);
      const late = await postOnce(await farm.as('grower'), `/api/stock/acts/${groupId}/undo`, {});
      expect([late.status, late.body.code]).toEqual([409, 'rule.refused']);

      const owner = await postOnce(await farm.as('owner'), `/api/stock/acts/${groupId}/undo`, {});

      expect(owner.status).toBe(201);
      expect(placeOf(first())?.position).toBe('A-1');
    });
  });

  describe('withholding', () => {
    it.each(['plug', 'batch', 'rack', 'system'])(
      'when the %s is withheld, its plugs stay in their system',
      async (scope) => {
        const { system } = rackPlace(farm.db, rackId);
        givenWithheld(
          farm,
          scope === 'plug'
            ? { plugCode: first() }
            : scope === 'batch'
              ? { batchId }
              : scope === 'rack'
                ? { rackId }
                : { systemId: system.id },
        );
        const near = givenRack(farm, { tankId: givenTank(farm, system.id) });
        const far = givenRackIn(farm, 'growout');

        const away = await postOnce(grower, '/api/stock/place', { codes: [first()], rackId: far });
        expect([away.status, away.body.code]).toEqual([409, 'stock.withheld']);
        const gift = await postOnce(grower, '/api/stock/gifts', { codes: [first()], to: 'A school' });
        expect(gift.body.code).toBe('stock.withheld');
        const wholeRack = await postOnce(grower, `/api/racks/${rackId}/move`, {
          tankId: rackPlace(farm.db, far).tank.id,
        });
        expect(wholeRack.body.code).toBe('stock.withheld');

        expect((await postOnce(grower, '/api/stock/place', { codes: [first()], rackId: near })).status).toBe(201);
      },
    );

    it('when sick stock is set apart in quarantine, it may go; a loss may always be recorded', async () => {
      givenWithheld(farm, { batchId });

      const apart = await postOnce(grower, '/api/stock/place', {
        ...{ codes: codes.slice(0, 2), rackId: givenRackIn(farm, 'quarantine') },
      });

      expect(apart.status).toBe(201);
      expect((await postOnce(grower, '/api/stock/losses', { codes: [codes[3]], seen: 'stn' })).status).toBe(201);
    });

    it('when it is released, it is free again and the list is empty; a second release is refused', async () => {
      const made = await postOnce(grower, '/api/stock/withholds', { rackId, reason: 'Flatworm seen' });
      expect(made.body).toMatchObject({ scope: 'rack', of: 'R7', reason: 'Flatworm seen', startedBy: 'Test grower' });
      expect((await grower.get('/api/stock/withholds')).body.items).toHaveLength(1);

      const done = await postOnce(grower, `/api/stock/withholds/${made.body.id}/release`, {});

      expect(done.body).toMatchObject({ endedBy: 'Test grower' });
      expect((await grower.get('/api/stock/withholds')).body.items).toEqual([]);
      expect((await postOnce(grower, `/api/stock/withholds/${made.body.id}/release`, {})).status).toBe(409);
      expect(farm.db.select().from(withholds).all()).toHaveLength(1);
    });

    it.each([
      ['nothing', {}],
      [
        'two things',
        { rackId: '00000000-0000-4000-8000-000000000001', batchId: '00000000-0000-4000-8000-000000000002' },
      ],
    ])('when %s is named, refuses', async (_what, body) => {
      const reply = await postOnce(grower, '/api/stock/withholds', { reason: 'Pest', ...body });

      expect(reply.status).toBe(400);
    });
  });
});
