import { createHash } from 'node:crypto';
import { eq, notInArray } from 'drizzle-orm';
import { fragDays, shareMonth, type FragDays } from '../../shared/domain/costing.ts';
import { addDays, dayOf, type Day, type Month } from '../../shared/domain/days.ts';
import { costMonths, costShares } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { costPools, farmMonths, movementMarks, type CostPool, type MonthSpan } from '../queries/cost-pools.ts';
import { farmOf } from '../queries/farm.ts';
import { systemStays } from '../queries/system-stays.ts';

type ShareRow = typeof costShares.$inferInsert;

/** Keeps one INSERT well below the number of values that SQLite takes. */
const ROWS_AT_ONCE = 500;

/**
 * Shares what supplies used in each system and month have cost to the batches that stood there, by frag-days. A month is
 * worked out anew when anything that it is made from has changed since; the current one counts up to today. The shares
 * of a system's month add up to its cost exactly; where nothing stood there, its cost stays with the farm.
 */
export function bringCostsUpToDate(write: Write): void {
  const { tx, now } = write;
  const { timeZone } = farmOf(tx);
  const today = dayOf(now, timeZone);
  const spans = farmMonths(tx, now, timeZone);
  const pools = costPools(tx, spans);
  const fingerprints = fingerprintsOf(write, spans, pools, today);
  const stale = staleMonths(write, fingerprints);
  dropOtherMonths(write, [...fingerprints.keys()]);
  if (stale.size === 0) return;

  const presence = fragDays(systemStays(tx, addDays(today, 1), timeZone)).filter(({ month }) => stale.has(month));
  for (const month of stale) {
    const ofMonth = <Row extends { month: Month }>(row: Row) => row.month === month;
    rebuildMonth(write, month, pools.filter(ofMonth), presence.filter(ofMonth));
    const built = { builtAt: now, fingerprint: fingerprints.get(month) ?? '' };
    tx.insert(costMonths)
      .values({ month, ...built })
      .onConflictDoUpdate({ target: costMonths.month, set: built })
      .run();
  }
}

/** One text for each month that changes whenever its costs, or the movements up to its end, do. */
function fingerprintsOf(
  { tx }: Write,
  spans: readonly MonthSpan[],
  pools: readonly CostPool[],
  today: Day,
): Map<Month, string> {
  const current = spans.at(-1)?.month;
  let count = 0;
  let newest = 0;
  let reversed = 0;
  return new Map(
    movementMarks(tx, spans).map((mark) => {
      count += mark.count;
      newest = Math.max(newest, mark.newest);
      reversed += mark.reversed;
      const own = pools.filter(({ month }) => month === mark.month);
      const made = [own, count, newest, reversed, mark.month === current ? today : null];
      return [mark.month, createHash('sha256').update(JSON.stringify(made)).digest('base64url')];
    }),
  );
}

function staleMonths({ tx }: Write, fingerprints: ReadonlyMap<Month, string>): Set<Month> {
  const built = new Map(
    tx
      .select()
      .from(costMonths)
      .all()
      .map(({ month, fingerprint }) => [month, fingerprint]),
  );
  return new Set(
    [...fingerprints].flatMap(([month, fingerprint]) => (built.get(month) === fingerprint ? [] : [month])),
  );
}

/** Months that hold nothing any more, such as after a first entry with a wrong year was taken back. */
function dropOtherMonths({ tx }: Write, months: Month[]): void {
  tx.delete(costShares).where(notInArray(costShares.month, months)).run();
  tx.delete(costMonths).where(notInArray(costMonths.month, months)).run();
}

function rebuildMonth({ tx }: Write, month: Month, pools: readonly CostPool[], presence: readonly FragDays[]): void {
  tx.delete(costShares).where(eq(costShares.month, month)).run();
  const rows = pools.flatMap((pool) => sharesOf(pool, presence));
  for (let start = 0; start < rows.length; start += ROWS_AT_ONCE) {
    tx.insert(costShares)
      .values(rows.slice(start, start + ROWS_AT_ONCE))
      .run();
  }
}

function sharesOf({ month, systemId, part, costMicro }: CostPool, presence: readonly FragDays[]): ShareRow[] {
  const present = presence.filter((each) => each.systemId === systemId);
  const days = new Map(present.map(({ batchId, fragDays: count }) => [batchId, count]));
  return shareMonth(costMicro, present).shares.map((share) => ({
    month,
    systemId,
    part,
    batchId: share.batchId,
    fragDays: days.get(share.batchId) ?? 0,
    costMicro: share.costMicro,
  }));
}
