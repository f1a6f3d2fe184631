import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { isNull } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { checkLedger } from '../../server/db/check-ledger.ts';
import { openDatabase, type Db, type Sqlite } from '../../server/db/client.ts';
import { systems, users } from '../../server/db/schema/index.ts';
import { makeDemoFarm } from '../../server/demo/demo-farm.ts';
import type { DemoTruth } from '../../server/demo/truth.ts';
import { cuttingChoices } from '../../server/queries/colonies.ts';
import { systemDemand } from '../../server/queries/demand.ts';
import { listItems } from '../../server/queries/supply-items.ts';
import { todayOf } from '../../server/queries/today.ts';
import { waterOverview } from '../../server/queries/water-overview.ts';
import { isPassword } from '../../server/services/passwords.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { contentHash } from './demo-content.ts';

const NOW = Date.parse('2026-12-01T11:20:00Z');
const SEED = 7;

const folder = mkdtempSync(path.join(tmpdir(), 'limestead-demo-'));
const fileOf = (name: string) => path.join(folder, `${name}.sqlite`);
let truth: DemoTruth;
let db: Db;
let sqlite: Sqlite;

beforeAll(async () => {
  truth = await makeDemoFarm({ file: fileOf('farm'), now: NOW, seed: SEED });
  ({ db, sqlite } = openDatabase(fileOf('farm')));
});

afterAll(() => {
  sqlite.close();
  rmSync(folder, { recursive: true });
});

function count(table: string, where = '1 = 1'): number {
  return Number(sqlite.prepare(`SELECT count(*) FROM "${table}" WHERE ${where}`).pluck().get());
}

describe('what the demo farm holds', () => {
  it('when it is made, it has the size of a small commercial farm', () => {
    expect({ systems: count('system'), lines: count('line'), stores: count('store') }).toEqual({
      systems: 6,
      lines: 40,
      stores: 5,
    });
    const between = (value: number, low: number, high: number) => {
      expect(value).toBeGreaterThanOrEqual(low);
      expect(value).toBeLessThanOrEqual(high);
    };
    between(count('colony'), 85, 95);
    between(count('batch'), 130, 170);
    between(count('plug'), 5000, 7000);
    between(count('order', "state = 'shipped'"), 45, 75);
    between(count('reading'), 6000, 12_000);
    between(count('reservoir_event', "kind = 'refill'"), 350, 500);
    expect(count('invoice')).toBe(count('order', "state = 'shipped'"));
  });

  it('when someone looks for a role, there are people of each with the known password', async () => {
    const people = db.select().from(users).where(isNull(users.disabledAt)).all();

    expect(people.map(({ role }) => role).sort()).toEqual(
      ['owner', 'grower', 'grower', 'sales', 'viewer', ...Array.from({ length: 5 }, () => 'buyer')].sort(),
    );
    expect(people.every(({ demo, email }) => demo && email.endsWith('@example.com'))).toBe(true);
    expect(await isPassword(people[0]?.passwordHash ?? null, 'demo reef by the weir')).toBe(true);
  });

  it('when its ledger is checked, every balance and place follows from the movements', () => {
    expect(checkLedger(sqlite)).toMatchObject({ plugs: count('plug'), problems: [] });
  });

  it('when foreign keys are checked, no row points nowhere', () => {
    expect(sqlite.pragma('foreign_key_check')).toEqual([]);
  });

  it('when something was done, the audit log has it at its own time and nothing is later than the end', () => {
    for (const [table, action] of [
      ['cut', 'cut.logged'],
      ['reading', 'reading.logged'],
      ['water_change', 'water_change.logged'],
      ['dose', 'dose.logged'],
      ['lot', 'lot.received'],
      ['order', 'order.placed'],
      ['withhold', 'stock.withheld'],
    ] as const) {
      expect([action, count('audit_log', `action = '${action}'`)]).toEqual([action, count(table)]);
    }
    expect(count('audit_log', `at > ${NOW}`)).toBe(0);
    expect(
      count(
        'audit_log',
        'id > 1 AND at < (SELECT max(before.at) FROM audit_log AS before WHERE before.id = audit_log.id - 1)',
      ),
    ).toBe(0);
    expect(count('reading', `taken_at > ${NOW}`)).toBe(0);
    expect(count('stock_movement', `at > ${NOW}`)).toBe(0);
  });

  it('when mails were queued in the past, none is left to be sent now', () => {
    expect(count('outbox_mail')).toBeGreaterThan(150);
    expect(count('outbox_mail', 'sent_at IS NULL')).toBe(0);
  });
});

describe('the same seed', () => {
  it('when a farm is made twice for the same end, both hold the same', async () => {
    const options = { now: NOW, days: 130 };
    await makeDemoFarm({ ...options, seed: 3, file: fileOf('first') });
    await makeDemoFarm({ ...options, seed: 3, file: fileOf('second') });
    await makeDemoFarm({ ...options, seed: 4, file: fileOf('other') });

    expect(contentHash(fileOf('second'))).toBe(contentHash(fileOf('first')));
    expect(contentHash(fileOf('other'))).not.toBe(contentHash(fileOf('first')));
  });
});

describe('its present', () => {
  it('when orders are listed, each state has one', () => {
    const states = sqlite.prepare('SELECT DISTINCT state FROM "order" ORDER BY state').pluck().all();

    expect(states).toEqual(['cancelled', 'packed', 'paid', 'picking', 'placed', 'shipped']);
    expect(count('order', "state = 'paid'")).toBeGreaterThanOrEqual(2);
    expect(count('order', `state = 'placed' AND hold_until > ${NOW}`)).toBe(1);
    expect(count('refund', "state = 'succeeded'")).toBeGreaterThan(0);
    expect(count('refund', "state <> 'succeeded'")).toBe(0);
  });

  it('when promises are added up, a batch is short only where pieces were lost after the promise', () => {
    const short = sqlite
      .prepare<[], { code: string; promised: number; standing: number }>(
        `SELECT b.code, sum(h.pieces) AS promised,
           (SELECT sum(bal.pieces) FROM stock_balance bal JOIN stock_account a ON a.id = bal.account_id
            WHERE bal.batch_id = b.id AND a.kind = 'rack') AS standing
         FROM hold AS h JOIN batch AS b ON b.id = h.batch_id WHERE h.pieces > 0 GROUP BY b.id
         HAVING promised > standing`,
      )
      .all();

    expect(short).toHaveLength(1);
    expect(short[0]?.promised).toBe((short[0]?.standing ?? 0) + 3);
  });

  it('when no plug was sold twice, each shipped plug has one pick', () => {
    expect(count('stock_movement', "kind = 'ship'")).toBe(
      Number(sqlite.prepare("SELECT count(DISTINCT plug_code) FROM stock_movement WHERE kind = 'ship'").pluck().get()),
    );
  });

  it('when the owner opens Today, it names the slipping system, the empty reservoir and the lime to order', () => {
    const ids = todayOf(db, 'owner', NOW)
      .entries.filter(({ group }) => group !== 'soon')
      .map(({ id }) => id);
    const idIn = (table: string, code: string) =>
      sqlite.prepare(`SELECT id FROM ${table} WHERE code = ?`).pluck().get(code);

    expect(ids.filter((id) => id.startsWith('alkalinity-'))).toEqual([`alkalinity-${String(idIn('system', 'D'))}`]);
    expect(ids).toContain(`reservoir-${String(idIn('reservoir', 'LW-C1'))}`);
    expect(ids).toContain(`test-${String(idIn('system', 'E'))}`);
    for (const kind of ['short', 'bench', 'ship', 'pick'])
      expect(ids.some((id) => id.startsWith(`${kind}-`))).toBe(true);
    expect(count('withhold', 'ended_at IS NULL AND rack_id IS NOT NULL')).toBe(1);
    const lime = listItems(db, { retired: 'no' }, NOW).find(({ kind }) => kind === 'lime');
    expect(['order_soon', 'order_now']).toContain(lime?.state);
  });

  it('when water is looked at, each system plays its part', () => {
    const glances = new Map(waterOverview(db, NOW).items.map((glance) => [glance.system.code, glance]));
    const stateOf = (code: string) =>
      glances.get(code)?.latest.find(({ parameter }) => parameter === 'alkalinity')?.state;

    expect(['A', 'B', 'C', 'E', 'F'].map(stateOf)).toEqual(['in', 'in', 'in', 'in', 'in']);
    expect(stateOf('D')).toBe('below');
    const online = glances.get('C')?.online;
    expect(online?.emptyAt).toBeGreaterThan(NOW);
    expect(online?.emptyAt).toBeLessThan(NOW + 12 * 3_600_000);
    expect(glances.get('C')?.standby).toBe(1);
    expect(glances.get('E')?.demand.enough).toBe(false);
    const crowded = systemDemand(db, glances.get('A')?.system.id ?? '', NOW);
    const demand = crowded.demand.enough ? crowded.demand.demand : 0;
    expect(demand / (crowded.ceiling?.saturated ?? 1)).toBeGreaterThan(0.85);
    const quiet = glances.get('F')?.demand;
    expect(quiet?.enough && quiet.demand).toBeLessThan(0.12);
  });

  it('when cutting is planned, some mothers are rested and some are not', () => {
    const rested = cuttingChoices(db, NOW).filter(({ colony }) => colony.rested).length;

    expect(rested).toBeGreaterThan(10);
    expect(rested).toBeLessThan(80);
  });
});

describe('its patterns', () => {
  it('when losses are counted by cause, the heat and the rough day show, and the weak line fares worst', () => {
    expect(truth.losses.heat).toBeGreaterThan(10);
    expect(truth.losses.handling).toBeGreaterThan(10);
    const byLine = sqlite
      .prepare<[], { code: string; part: number }>(
        `SELECT l.code, 1.0 * sum(bal.pieces) / (SELECT sum(pieces) FROM batch WHERE line_id = l.id) AS part
         FROM line AS l JOIN batch AS b ON b.line_id = l.id JOIN stock_balance AS bal ON bal.batch_id = b.id
         JOIN stock_account AS a ON a.id = bal.account_id AND a.kind = 'lost' GROUP BY l.id ORDER BY part DESC`,
      )
      .all();
    expect(byLine[0]?.code).toBe(truth.weakLineCode);
  });

  it('when sizes are measured, the farm’s growth agrees with the truth within its spread', () => {
    const sizes = sqlite
      .prepare<[], { code: string; pace: number }>(
        `SELECT l.code, avg((s.size_mm - b.start_mm) * 7 / ((s.at / 86400000.0) - julianday(b.cut_on) + 2440587.5)) AS pace
         FROM size_reading AS s JOIN batch AS b ON b.id = s.batch_id JOIN line AS l ON l.id = b.line_id
         WHERE s.at / 86400000.0 - (julianday(b.cut_on) - 2440587.5) > 80 GROUP BY l.id HAVING count(*) >= 20`,
      )
      .all();
    const differences = sizes.map(({ code, pace }) => {
      const real = truth.lines.find((line) => line.code === code)?.mmPerWeek ?? 0;
      return Math.abs(pace / real - 1);
    });
    expect(differences.length).toBeGreaterThan(20);
    expect(differences.filter((difference) => difference < 0.25).length / differences.length).toBeGreaterThan(0.9);
  });
});

describe('estimates against the truth', () => {
  /** What was really taken on the day of the last test that an estimate stands on. */
  function trueOn(code: string, at: number): number {
    const days = truth.systems.find((system) => system.code === code)?.days ?? [];
    const found = days.find(({ day }) => Math.abs(Date.parse(`${day}T12:00:00Z`) - at) <= MS_PER_DAY / 2);
    if (!found) throw new Error(`Nothing is known of system ${code} then.`);
    return found.demandMeqLPerDay;
  }

  it.each(['A', 'B', 'C', 'D', 'E', 'F'])(
    'when system %s is estimated week by week, the true demand lies within its interval in 90 of 100 weeks or more',
    (code) => {
      const system = db
        .select()
        .from(systems)
        .all()
        .find((each) => each.code === code);
      const estimates = Array.from(
        { length: 74 },
        (_, week) => systemDemand(db, system?.id ?? '', NOW - week * 7 * MS_PER_DAY, { historyDays: 7 }).demand,
      );
      const known = estimates.filter((estimate) => estimate.enough);
      const right = known.filter(({ to, low, high }) => {
        const real = trueOn(code, to);
        return real >= low && real <= high;
      });

      expect(known.length).toBeGreaterThan(60);
      expect(right.length / known.length).toBeGreaterThanOrEqual(0.9);
    },
  );
});
