import { writeFileSync } from 'node:fs';
import { isNull, sql } from 'drizzle-orm';
import { pino } from 'pino';
import { addDays, dayOf, eachDay, type Day } from '../../shared/domain/days.ts';
import { readConfig } from '../config.ts';
import { openDatabase } from '../db/client.ts';
import { migrateDatabase } from '../db/migrate.ts';
import { outboxMails } from '../db/schema/index.ts';
import { inWrite, SYSTEM } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { bringCostsUpToDate } from '../services/cost-shares.ts';
import { hashPassword } from '../services/passwords.ts';
import { Agenda } from './agenda.ts';
import { chanceOf } from './chance.ts';
import {
  furnishLines,
  furnishListings,
  furnishMothers,
  furnishPeople,
  furnishSupplies,
  furnishSystems,
} from './furnish.ts';
import { HEAT_DAYS, HEAT_FROM, HEAT_SYSTEM } from './heat.ts';
import { planMistypedTest } from './mistyped-test.ts';
import { planOrders } from './order-days.ts';
import { planReservoirCare } from './reservoir-care-days.ts';
import { planAnswers } from './plan-days.ts';
import { cacheStatements } from './statement-cache.ts';
import { DEMO_PASSWORD, FARM } from './scenario/farm.ts';
import { WEAK_LINE } from './scenario/lines.ts';
import { LAST_HOURS, planScene } from './scene.ts';
import { ROUGH_DAY, stockWork } from './stock-days.ts';
import { LAST_LIME_DAYS, lastLime, reviewSupplies, stockUp } from './supply-days.ts';
import { planNewWater } from './new-water-days.ts';
import { planSupplements } from './supplement-days.ts';
import { furnishTestKits, planSlips, planTestKits } from './test-kits.ts';
import type { DemoTruth } from './truth.ts';
import { planWater, startLimewater } from './water-days.ts';
import { waterTests } from './water-tests.ts';
import { planWork } from './work-days.ts';
import { timeOn, type World } from './world.ts';

const EIGHTEEN_MONTHS = 546;

export interface DemoFarmOptions {
  /** Where the database is written; what was there is lost. */
  file: string;
  /** The end of the history, epoch ms. */
  now: number;
  /** The same seed and end give the same farm, but for the salt of the password's hash. */
  seed: number;
  /** Length of the history; eighteen months when left out. A short one lacks what happened before it. */
  days?: number;
  log?: (line: string) => void;
}

/**
 * Makes a farm with eighteen months of history up to an instant: a simulation does the farm's daily work through the
 * product's own services, so that its records obey every rule and carry their audit entries.
 *
 * @returns what was really so, for estimates to be compared with
 */
export async function makeDemoFarm(options: DemoFarmOptions): Promise<DemoTruth> {
  const { file, now, seed, days = EIGHTEEN_MONTHS, log = () => undefined } = options;
  // Made in memory and written at once in the end: it is faster, and an interruption leaves nothing half made.
  const { db, sqlite } = openDatabase(':memory:');
  cacheStatements(sqlite);
  const clock = { at: now };
  const chance = (name: string) => chanceOf(seed, name);
  const [ids, codes] = [chance('ids'), chance('codes')];
  const deps: Deps = {
    ...{ db, sqlite, config: readConfig({ LOG_LEVEL: 'silent' }), clock: { now: () => clock.at } },
    ...{
      newId: () => ids.uuid(),
      randomInt: (max: number) => codes.int(max),
      ...noOutside,
      log: pino({ level: 'silent' }),
    },
  };
  try {
    await migrateDatabase(sqlite, ':memory:', now);
    const passwordHash = await hashPassword(DEMO_PASSWORD);
    const world = furnish(deps, clock, passwordHash, { now, seed, chance, length: days });
    live(world, log);
    finish(world, clock);
    writeFileSync(file, sqlite.serialize());
    return withLosses(world);
  } finally {
    sqlite.close();
  }
}

const noOutside: Pick<Deps, 'payments' | 'mail'> = {
  payments: { createCheckout: refuse, expireCheckout: refuse, refund: refuse, readEvent: refuse },
  mail: { send: refuse },
};

function refuse(): never {
  throw new Error('The demo farm calls no service outside while it is made.');
}

function furnish(
  deps: Deps,
  clock: { at: number },
  passwordHash: string,
  { now, seed, chance, length }: Pick<World, 'now' | 'chance'> & { seed: number; length: number },
): World {
  const lastDay = dayOf(now - LAST_HOURS, FARM.timeZone);
  const firstDay = addDays(lastDay, -length);
  const days = eachDay(firstDay, addDays(lastDay, -1));
  clock.at = timeOn(firstDay, 7 * 60);
  return deps.sqlite.transaction(() => {
    const people = furnishPeople(deps, passwordHash);
    return inWrite(deps, people.staff.owner, (write): World => {
      const systems = furnishSystems(write);
      const lines = furnishLines(write, chance('lines'));
      const mothers = furnishMothers(write, { systems, lines }, chance('mothers'));
      furnishListings(write, lines);
      const items = furnishSupplies(write);
      const kits = furnishTestKits(write);
      const truth: DemoTruth = {
        ...{ seed, firstDay, lastDay, losses: {}, weakLineCode: WEAK_LINE, roughDay: addDays(lastDay, -ROUGH_DAY) },
        systems: systems.map((system) => system.truth),
        lines: lines.map(({ spec, mmPerWeek, survival }) => ({ code: spec.code, mmPerWeek, survival })),
        heat: {
          systemCode: HEAT_SYSTEM,
          from: addDays(lastDay, -HEAT_FROM),
          to: addDays(lastDay, HEAT_DAYS - 1 - HEAT_FROM),
        },
      };
      const agenda = new Agenda(deps, clock);
      return {
        deps,
        sqlite: deps.sqlite,
        agenda,
        chance,
        now,
        days,
        ...people,
        items,
        kits,
        systems,
        lines,
        mothers,
        batches: [],
        truth,
      };
    });
  })();
}

/** Day by day, with one transaction for each. */
function live(world: World, log: (line: string) => void): void {
  const { agenda, staff, sqlite, days, chance } = world;
  const tests = waterTests(world);
  const stock = stockWork(world);
  const [water, orders] = [chance('water'), chance('orders')];
  const open = timeOn(world.truth.firstDay, 7 * 60 + 15);
  agenda.put(open, staff.owner, (write) => stockUp(world, write));
  agenda.put(open + 60_000, staff.grower, (write) => startLimewater(world, write));
  planSupplements(world);
  planNewWater(world);
  planScene(world, { tests, stock, chance: chance('scene') });
  planWork(world);
  planAnswers(world);
  planTestKits(world);
  planSlips(world);
  planMistypedTest(world);

  const endOf = (day: Day) => timeOn(addDays(day, 1), 0) - 1;
  days.forEach((day, index) => {
    if (index > 0) planWater(world, tests, water, index, day);
    planReservoirCare(world, index, day);
    stock.plan(index, day);
    planOrders(world, orders, index, day);
    planOffice(world, index, day);
    agenda.runUntil(sqlite, Math.min(endOf(day), world.now));
    if (index % 91 === 0) log(`  ${day}: ${world.batches.length} batches cut`);
  });
  agenda.runUntil(sqlite, world.now);
}

function planOffice(world: World, index: number, day: Day): void {
  const { agenda, staff, days } = world;
  if (index % 7 === 3)
    agenda.put(timeOn(day, 9 * 60), staff.owner, (write) => reviewSupplies(world, write, index, day));
  if (index === days.length - LAST_LIME_DAYS)
    agenda.put(timeOn(day, 9 * 60), staff.owner, (write) => lastLime(world, write));
}

/** Costs are shared, and the mails of the past count as sent. */
function finish({ deps, now }: World, clock: { at: number }): void {
  clock.at = now;
  inWrite(deps, SYSTEM, (write) => {
    bringCostsUpToDate(write);
    write.tx
      .update(outboxMails)
      .set({ sentAt: sql`${outboxMails.createdAt} + 2000`, attempts: 1 })
      .where(isNull(outboxMails.sentAt))
      .run();
  });
}

function withLosses({ deps, truth }: World): DemoTruth {
  const rows = deps.sqlite
    .prepare<[], { cause: keyof DemoTruth['losses']; pieces: number }>(
      `SELECT a.detail AS cause, sum(b.pieces) AS pieces FROM stock_balance AS b
       JOIN stock_account AS a ON a.id = b.account_id WHERE a.kind = 'lost' GROUP BY a.detail`,
    )
    .all();
  return { ...truth, losses: Object.fromEntries(rows.map(({ cause, pieces }) => [cause, pieces])) };
}
