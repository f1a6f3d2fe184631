import type { Sqlite } from './client.ts';

/** One thing that is not as the ledger's laws want it, in words for the owner. */
export interface LedgerProblem {
  law: 'balance' | 'batch_total' | 'below_zero' | 'plug_place' | 'plug_count';
  about: string;
  found: string;
  expected: string;
}

export interface LedgerReport {
  movements: number;
  batches: number;
  plugs: number;
  problems: LedgerProblem[];
}

const SUMS = `
  SELECT batch_id, account_id, sum(pieces) AS pieces FROM (
    SELECT batch_id, to_account_id AS account_id, pieces FROM stock_movement
    UNION ALL SELECT batch_id, from_account_id, -pieces FROM stock_movement)
  GROUP BY batch_id, account_id`;

/** The movement that a plug's place comes from, found by the index on its code. */
const LAST_MOVEMENT = `(SELECT max(id) FROM stock_movement WHERE plug_code = plug.code)`;

const CHECKS: readonly { law: LedgerProblem['law']; sql: string }[] = [
  {
    law: 'balance',
    sql: `SELECT batch_id || ' ' || account_id AS about, sum(found) AS found, sum(expected) AS expected FROM (
        SELECT batch_id, account_id, 0 AS found, pieces AS expected FROM (${SUMS})
        UNION ALL SELECT batch_id, account_id, pieces, 0 FROM stock_balance)
      GROUP BY batch_id, account_id HAVING sum(found) <> sum(expected)`,
  },
  {
    law: 'batch_total',
    sql: `SELECT batch_id AS about, sum(pieces) AS found, 0 AS expected FROM stock_balance
      GROUP BY batch_id HAVING sum(pieces) <> 0`,
  },
  {
    law: 'below_zero',
    sql: `SELECT b.batch_id || ' ' || b.account_id AS about, b.pieces AS found, 'zero or more' AS expected
      FROM stock_balance AS b JOIN stock_account AS a ON a.id = b.account_id
      WHERE b.pieces < 0 AND NOT a.is_source`,
  },
  {
    law: 'plug_place',
    sql: `SELECT plug.code AS about,
        coalesce(plug.account_id, 'nowhere') || ' ' || coalesce(plug.position, '') AS found,
        coalesce(last.to_account_id, 'nowhere') || ' ' || coalesce(last.to_position, '') AS expected
      FROM plug LEFT JOIN stock_movement AS last ON last.id = ${LAST_MOVEMENT}
      WHERE plug.account_id IS NOT last.to_account_id OR plug.position IS NOT last.to_position`,
  },
  {
    law: 'plug_count',
    sql: `SELECT b.id AS about, count(p.code) AS found, b.pieces AS expected
      FROM batch AS b LEFT JOIN plug AS p ON p.batch_id = b.id
      GROUP BY b.id HAVING count(p.code) <> b.pieces`,
  },
];

/** Compares balances and plug places with the movements that they come from. Reads only. */
export function checkLedger(sqlite: Sqlite): LedgerReport {
  const count = (table: string) => Number(sqlite.prepare(`SELECT count(*) FROM ${table}`).pluck().get());
  return {
    movements: count('stock_movement'),
    batches: count('batch'),
    plugs: count('plug'),
    problems: CHECKS.flatMap(({ law, sql }) =>
      sqlite
        .prepare<[], { about: string; found: unknown; expected: unknown }>(sql)
        .all()
        .map(({ about, found, expected }) => ({
          law,
          about,
          found: String(found).trim(),
          expected: String(expected).trim(),
        })),
    ),
  };
}

/**
 * Makes balances and plug places anew from the movements, which are the truth. The guards are set aside and put back
 * within one transaction.
 */
export function rebuildBalances(sqlite: Sqlite): void {
  const rebuild = sqlite.transaction(() => {
    const guards = sqlite
      .prepare<[], { name: string; sql: string }>(
        `SELECT name, sql FROM sqlite_schema WHERE type = 'trigger' AND tbl_name IN ('stock_balance', 'plug')`,
      )
      .all();
    for (const { name } of guards) sqlite.exec(`DROP TRIGGER "${name}"`);
    sqlite.exec(`
      DELETE FROM stock_balance;
      INSERT INTO stock_balance (batch_id, account_id, pieces, is_source)
        SELECT s.batch_id, s.account_id, s.pieces, a.is_source
        FROM (${SUMS}) AS s JOIN stock_account AS a ON a.id = s.account_id;
      -- Positions first of all go, so that two plugs may change places.
      UPDATE plug SET position = NULL;
      UPDATE plug SET account_id = last.to_account_id, position = last.to_position
        FROM stock_movement AS last WHERE last.id = ${LAST_MOVEMENT};`);
    for (const { sql } of guards) sqlite.exec(sql);
  });
  rebuild.immediate();
}
