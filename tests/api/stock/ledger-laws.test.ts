import { randomUUID } from 'node:crypto';
import { sql } from 'drizzle-orm';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { checkLedger } from '../../../server/db/check-ledger.ts';
import { batchTotal, balanceKey, type AccountKind } from '../../../shared/domain/ledger.ts';
import { LedgerModel } from '../../support/ledger-model.ts';
import { givenColony, givenLine, givenRack, postOnce } from '../../support/given-stock.ts';
import { startFarm, type TestClient, type TestFarm } from '../../support/start-farm.ts';

/** One act, its plugs, racks and earlier acts chosen by number among what there is. `again`: the request is repeated. */
const command = fc.record({
  act: fc.constantFrom('cut', 'cut to bench', 'place', 'place', 'lose', 'cull', 'give', 'undo', 'undo'),
  pieces: fc.integer({ min: 1, max: 4 }),
  pick: fc.nat(1000),
  rack: fc.nat(2),
  again: fc.boolean(),
});
type Command = typeof command extends fc.Arbitrary<infer C> ? C : never;

describe('the laws of the ledger', () => {
  it('when any acts come in any order and some twice, stock is always what a model without a database says', async () => {
    await fc.assert(
      fc.asyncProperty(fc.array(command, { minLength: 4, maxLength: 18 }), async (commands) => {
        const run = await startRun();
        for (const each of commands) {
          await run.obey(each);
          expectSame(run.farm, run.model);
        }
      }),
      { numRuns: 15 },
    );
  }, 120_000);

  it('when a chain of acts is undone backwards, every balance is as it was at each step', async () => {
    await fc.assert(
      fc.asyncProperty(fc.array(command, { minLength: 2, maxLength: 8 }), async (commands) => {
        const run = await startRun();
        await run.obey({ act: 'cut', pieces: 4, pick: 0, rack: 0, again: false });
        const before: Map<string, number>[] = [];
        for (const each of commands.filter(({ act }) => act !== 'undo' && act !== 'cut to bench')) {
          const balances = storedBalances(run.farm);
          const known = run.model.acts.length;
          await run.obey(each);
          if (run.model.acts.length > known) before.push(balances);
        }
        for (const balances of before.reverse()) {
          const last = run.model.acts.findLast(({ undone }) => !undone);
          const reply = await postOnce(run.client, `/api/stock/acts/${last?.groupId}/undo`, {});
          expect(reply.status).toBe(201);
          if (last) run.model.undo(last);
          expect(storedBalances(run.farm)).toEqual(balances);
        }
      }),
      { numRuns: 8 },
    );
  }, 120_000);
});

async function startRun() {
  const farm = await startFarm();
  const client = await farm.as('owner');
  const racks = [0, 1, 2].map(() => givenRack(farm, { rows: 2, columns: 4 }));
  const colonyId = givenColony(farm, { lineId: givenLine(farm), restDays: 0 });
  const model = new LedgerModel();

  return { farm, client, model, obey };

  async function obey(each: Command): Promise<void> {
    const rackId = racks[each.rack] ?? '';
    if (each.act === 'cut' || each.act === 'cut to bench') await cut(each, rackId);
    else if (each.act === 'undo') await undo(each);
    else await act(each, rackId);
  }

  async function cut(each: Command, rackId: string): Promise<void> {
    const onRack = each.act === 'cut';
    const fits = !onRack || model.freeOn(rackId).length >= each.pieces;
    const target = onRack ? { kind: 'rack', rackId } : { kind: 'bench' };
    const reply = await send(
      client,
      '/api/cuts',
      { colonyId, cutOn: '2026-03-02', pieces: each.pieces, target },
      each.again,
    );
    expect(reply.status).toBe(fits ? 201 : 409);
    if (!fits) return;
    const codes = reply.body.plugs.map(({ code }: { code: string }) => code);
    model.addBatch(reply.body.groupId, reply.body.batchId, codes, onRack ? rackId : null);
  }

  async function act(each: Command, rackId: string): Promise<void> {
    const codes = chosen([...model.plugs.keys()], each);
    if (codes.length === 0) return;
    const inStock = codes.every((code) => model.inStock(code));
    const free = model.freeOn(rackId);
    const [path, body, to] = {
      place: ['place', { rackId }, { kind: 'rack', ref: rackId }],
      lose: ['losses', { seen: 'rtn', cause: 'heat' }, { kind: 'lost', ref: 'heat' }],
      cull: ['culls', { reason: 'Bare base' }, { kind: 'culled', ref: null }],
      give: ['gifts', { to: 'A school' }, { kind: 'given', ref: null }],
    }[each.act as 'place' | 'lose' | 'cull' | 'give'] as [string, object, { kind: AccountKind; ref: string | null }];
    const may = inStock && (each.act !== 'place' || free.length >= codes.length);

    const reply = await send(client, `/api/stock/${path}`, { codes, ...body }, each.again);

    expect(reply.status).toBe(may ? 201 : 409);
    if (!may) return;
    model.move(reply.body.groupId, codes, (index) => ({
      account: to,
      position: each.act === 'place' ? (free[index] ?? null) : null,
    }));
  }

  async function undo(each: Command): Promise<void> {
    const known = model.acts[each.pick % Math.max(1, model.acts.length)];
    if (!known) return;
    const may = model.mayUndo(known);
    const reply = await send(client, `/api/stock/acts/${known.groupId}/undo`, { note: 'Mistake' }, each.again);
    expect(reply.status).toBe(may ? 201 : 409);
    if (may) model.undo(known);
  }
}

/** Sends a request, and where asked once more with the same key: the answer is the same and nothing happens twice. */
async function send(client: TestClient, path: string, body: object, again: boolean) {
  const key = randomUUID();
  const first = await postOnce(client, path, body, key);
  if (again) {
    const second = await postOnce(client, path, body, key);
    expect(second.status).toBe(first.status);
    if (first.status === 201) expect(second.body).toEqual(first.body);
  }
  return first;
}

function chosen(codes: readonly string[], { pick, pieces }: Command): string[] {
  const start = pick % Math.max(1, codes.length);
  return codes.slice(start, start + pieces);
}

function expectSame(farm: TestFarm, model: LedgerModel): void {
  expect(checkLedger(farm.deps.sqlite).problems).toEqual([]);
  expect(storedBalances(farm)).toEqual(new Map([...model.balances].filter(([, pieces]) => pieces !== 0)));
  for (const batchId of new Set([...model.plugs.values()].map((plug) => plug.batchId))) {
    expect(batchTotal(storedBalances(farm), batchId)).toBe(0);
  }
  const places = farm.db.all<{ code: string; kind: string; ref: string | null; position: string | null }>(sql`
    SELECT p.code, coalesce(a.kind, 'cut') AS kind, coalesce(a.rack_id, nullif(a.detail, '')) AS ref, p.position
    FROM plug AS p LEFT JOIN stock_account AS a ON a.id = p.account_id ORDER BY p.code`);
  const expected = [...model.plugs].map(([code, { place }]) => ({
    ...{ code, kind: place.account.kind, ref: place.account.ref, position: place.position },
  }));
  expect(places).toEqual(expected.sort((a, b) => (a.code < b.code ? -1 : 1)));
}

/** What the database holds, by the keys of the pure rules; accounts at zero are left out. */
function storedBalances(farm: TestFarm): Map<string, number> {
  const rows = farm.db.all<{ batchId: string; kind: AccountKind; ref: string | null; pieces: number }>(sql`
    SELECT b.batch_id AS batchId, a.kind, coalesce(a.rack_id, nullif(a.detail, '')) AS ref, b.pieces
    FROM stock_balance AS b JOIN stock_account AS a ON a.id = b.account_id WHERE b.pieces <> 0`);
  return new Map(rows.map(({ batchId, kind, ref, pieces }) => [balanceKey(batchId, { kind, ref }), pieces]));
}
