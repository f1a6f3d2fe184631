import { beforeEach, describe, expect, it } from 'vitest';
import { checkLedger, rebuildBalances } from '../../../server/db/check-ledger.ts';
import { undoAct } from '../../../server/services/undo-stock.ts';
import { givenCut, givenLoss, givenPlaced, givenRack } from '../../support/given-stock.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

describe('attempts to break the ledger from outside', () => {
  let farm: TestFarm;
  let batchId: string;
  let codes: string[];

  beforeEach(async () => {
    farm = await startFarm();
    const cut = givenCut(farm, { pieces: 3 });
    ({ batchId } = cut);
    codes = cut.plugs.map(({ code }) => code);
  });

  const run = (sql: string) => () => farm.deps.sqlite.exec(sql);
  const one = <T>(sql: string) => farm.deps.sqlite.prepare(sql).pluck().get() as T;
  const account = (kind: string) => one<string>(`SELECT id FROM stock_account WHERE kind = '${kind}'`);
  const movement = (fields: Record<string, string | number | null>) => {
    const row = {
      ...{ group_id: 'x', kind: 'move', batch_id: batchId, plug_code: codes[0] ?? '', pieces: 1 },
      ...{ from_account_id: account('rack'), to_account_id: account('cut'), from_position: 'A-1', to_position: null },
      ...{ at: 1, by: 'x', recorded_at: 1, reverses_id: null },
      ...fields,
    };
    const names = Object.keys(row);
    return () =>
      farm.deps.sqlite
        .prepare(`INSERT INTO stock_movement (${names.join()}) VALUES (${names.map((name) => `:${name}`).join()})`)
        .run(row);
  };

  it.each([
    ['edits a movement', 'UPDATE stock_movement SET pieces = 2'],
    ['deletes a movement', 'DELETE FROM stock_movement'],
    [
      'writes over a movement',
      `INSERT OR REPLACE INTO stock_movement
         (id, group_id, kind, batch_id, from_account_id, to_account_id, pieces, at, by, recorded_at)
       SELECT id, group_id, kind, batch_id, from_account_id, to_account_id, 1, 1, 'x', 1 FROM stock_movement LIMIT 1`,
    ],
    ['edits a balance', 'UPDATE stock_balance SET pieces = pieces + 1'],
    ['deletes balances', 'DELETE FROM stock_balance'],
    [
      'writes over a balance',
      'INSERT OR REPLACE INTO stock_balance SELECT batch_id, account_id, 99, is_source FROM stock_balance',
    ],
    ['opens the gate', 'UPDATE ledger_gate SET open = 1'],
    ['opens the gate and winds it back', 'UPDATE ledger_gate SET open = 1, posted_id = 0'],
    ['winds the gate back', 'UPDATE ledger_gate SET posted_id = 0'],
    ['takes the gate away', 'DELETE FROM ledger_gate'],
    ['puts another gate beside it', 'INSERT INTO ledger_gate (id, open) VALUES (2, 1)'],
    ['writes over the gate', 'INSERT OR REPLACE INTO ledger_gate (id, open) VALUES (1, 1)'],
    ['moves a plug by hand', `UPDATE plug SET position = 'H-12'`],
    ['renames a plug', `UPDATE plug SET code = 'ZZZZZZZ'`],
    ['deletes a plug', 'DELETE FROM plug'],
    [
      'writes over a plug',
      'INSERT OR REPLACE INTO plug (code, batch_id, number, created_at) SELECT code, batch_id, number, 1 FROM plug',
    ],
    ['turns a loss account into a source', `UPDATE stock_account SET kind = 'cut', rack_id = NULL WHERE kind = 'rack'`],
    ['deletes an account', 'DELETE FROM stock_account'],
  ])('when someone %s, the database refuses and the ledger stays sound', (_what, sql) => {
    expect(run(sql)).toThrow();

    expect(checkLedger(farm.deps.sqlite).problems).toEqual([]);
    expect(one('SELECT sum(pieces) FROM stock_balance WHERE is_source = 0')).toBe(3);
  });

  it.each([
    ['takes more than is there', { plug_code: null, from_position: null, pieces: 4 }],
    ['takes from a place where the plug is not', { from_position: 'A-2' }],
    ['moves half a piece', { plug_code: null, from_position: null, pieces: 0.5 }],
    ['moves no piece', { pieces: 0 }],
    ['moves a negative count', { plug_code: null, from_position: null, pieces: -1 }],
    ['moves two pieces on one plug', { pieces: 2 }],
    ['reverses nothing', { kind: 'reversal' }],
    ['reverses another movement than it mirrors', { kind: 'reversal', reverses_id: 2 }],
    ['names a movement without being a reversal', { reverses_id: 1 }],
    ['gives a position off a rack', { to_position: 'A-5' }],
    ['names a batch that is not the plug’s', { batch_id: 'other' }],
    ['takes a piece and leaves its plug behind', { plug_code: null, from_position: null }],
    ['puts pieces back to the cut without a reversal', {}],
  ])('when a movement %s, the database refuses it', (_what, fields) => {
    expect(movement(fields)).toThrow();

    expect(checkLedger(farm.deps.sqlite).problems).toEqual([]);
    expect(one('SELECT count(*) FROM stock_movement')).toBe(3);
  });

  it('when a piece that was lost comes back without a reversal, the database refuses it', () => {
    givenLoss(farm, codes.slice(0, 1));
    const back = { from_account_id: account('lost'), to_account_id: account('rack'), from_position: null };

    expect(movement(back)).toThrow('only by a reversal');
  });

  it.each(['', 'OR IGNORE', 'OR REPLACE'])(
    'when a plug is put where another stands (INSERT %s), the database refuses it and both stay',
    (conflict) => {
      const rackId = givenRack(farm);
      givenPlaced(farm, codes.slice(0, 1), rackId, { position: 'B-2' });
      const place = `INSERT ${conflict} INTO stock_movement
        (group_id, kind, batch_id, plug_code, from_account_id, to_account_id, from_position, to_position, pieces, at, by, recorded_at)
        SELECT 'x', 'move', p.batch_id, p.code, p.account_id, other.account_id, p.position, other.position, 1, 1, 'x', 1
        FROM plug AS p, plug AS other WHERE p.code = '${codes[1]}' AND other.code = '${codes[0]}'`;

      expect(run(place)).toThrow('Another plug already stands at that position.');

      expect(checkLedger(farm.deps.sqlite).problems).toEqual([]);
      expect(one(`SELECT position FROM plug WHERE code = '${codes[0]}'`)).toBe('B-2');
    },
  );

  it('when an act is undone twice, the second is refused by the database as well', () => {
    const groupId = givenLoss(farm, codes);
    farm.write((write) => undoAct(write, groupId, ''));
    const [original] = farm.deps.sqlite
      .prepare<[], Record<string, string | number | null>>(
        `SELECT batch_id, plug_code, to_account_id AS from_account_id, from_account_id AS to_account_id,
           to_position AS from_position, from_position AS to_position, id AS reverses_id
         FROM stock_movement WHERE kind = 'loss'`,
      )
      .all();

    expect(movement({ ...original, kind: 'reversal' })).toThrow('stock.already_reversed');
  });

  it('when someone writes over an audit entry, the database refuses', () => {
    const before = farm.deps.sqlite.prepare('SELECT * FROM audit_log').all();

    expect(
      run(`INSERT OR REPLACE INTO audit_log (id, at, actor_name, action, entity, entity_id)
        SELECT id, at, 'Someone else', action, entity, entity_id FROM audit_log LIMIT 1`),
    ).toThrow('The audit log is never edited.');

    expect(farm.deps.sqlite.prepare('SELECT * FROM audit_log').all()).toEqual(before);
  });

  it('when balances were damaged with the guards off, the check names the damage and a rebuild mends it', () => {
    givenPlaced(farm, codes.slice(0, 1), givenRack(farm), { position: 'B-2' });
    givenLoss(farm, codes.slice(1, 2));
    const sound = farm.deps.sqlite.prepare('SELECT * FROM stock_balance ORDER BY batch_id, account_id').all();
    for (const name of ['stock_balance_gate_update', 'plug_gate_update']) {
      const sql = one<string>(`SELECT sql FROM sqlite_schema WHERE name = '${name}'`);
      farm.deps.sqlite.exec(`DROP TRIGGER ${name}`);
      farm.deps.sqlite.exec(
        name === 'plug_gate_update'
          ? `UPDATE plug SET position = 'H-1' WHERE code = '${codes[2]}'`
          : `UPDATE stock_balance SET pieces = pieces + 5 WHERE is_source = 0 AND pieces = 1`,
      );
      farm.deps.sqlite.exec(sql);
    }
    const laws = new Set(checkLedger(farm.deps.sqlite).problems.map(({ law }) => law));
    expect([...laws].sort()).toEqual(['balance', 'batch_total', 'plug_place']);

    rebuildBalances(farm.deps.sqlite);

    expect(checkLedger(farm.deps.sqlite)).toMatchObject({ movements: 5, batches: 1, plugs: 3, problems: [] });
    expect(farm.deps.sqlite.prepare('SELECT * FROM stock_balance ORDER BY batch_id, account_id').all()).toEqual(sound);
    expect(run('UPDATE stock_balance SET pieces = 9')).toThrow();
    expect(run(`UPDATE plug SET position = 'H-2'`)).toThrow();
  });
});
