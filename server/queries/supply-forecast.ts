import { and, gt, inArray } from 'drizzle-orm';
import type { SupplyUse } from '../../shared/contracts/supplies.ts';
import { MS_PER_DAY, startOfDay, type Day } from '../../shared/domain/days.ts';
import type { ItemKind } from '../../shared/domain/supply-items.ts';
import { limeForDemand } from '../../shared/domain/supplies.ts';
import type { Db } from '../db/client.ts';
import { consumptions } from '../db/schema/index.ts';
import { alkalinityTakenPerDay } from './lime-demand.ts';
import { limewaterUse, type LimewaterUse } from './limewater-use.ts';

/** The short window serves what is taken often; the long one what is taken now and then. */
const SHORT_WINDOW_DAYS = 28;
const LONG_WINDOW_DAYS = 56;
const OFTEN = 4;
/** Less history than this tells no rate. */
const FEWEST_DAYS = 7;

export interface ForecastItem {
  id: string;
  kind: ItemKind;
  strength: number | null;
  firstReceipt: Day | null;
}

interface Taken {
  itemId: string;
  quantity: number;
  cause: string;
  causeId: string;
  at: number;
}

/**
 * How fast each item goes. What limewater is mixed from is foretold by what the systems take each day and how
 * it was mixed, since a refill takes for many days at once; all other items by what was taken lately.
 */
export function supplyForecast(
  db: Db,
  items: readonly ForecastItem[],
  { now, timeZone }: { now: number; timeZone: string },
): Map<string, SupplyUse> {
  const since = now - LONG_WINDOW_DAYS * MS_PER_DAY;
  const taken = takenSince(db, items, since);
  const mixes = items.some(({ kind }) => isMixed(kind)) ? limewaterUse(db, now, SHORT_WINDOW_DAYS) : [];
  const demandMeq = items.some(({ kind }) => kind === 'lime') ? alkalinityTakenPerDay(db, now) : null;
  return new Map(
    items.map((item) => {
      const own = taken.filter(({ itemId }) => itemId === item.id);
      const history = item.firstReceipt === null ? 0 : (now - startOfDay(item.firstReceipt, timeZone)) / MS_PER_DAY;
      const byTakes = fromTakes(own, history, now);
      const demandPerDay =
        item.kind === 'lime' && demandMeq !== null ? limeForDemand(demandMeq, item.strength ?? 1) : null;
      return [item.id, { ...byTakes, ...(isMixed(item.kind) ? fromLimewater(own, mixes) : {}), demandPerDay }];
    }),
  );
}

function isMixed(kind: ItemKind): boolean {
  return kind === 'lime' || kind === 'vinegar';
}

function takenSince(db: Db, items: readonly ForecastItem[], since: number): Taken[] {
  const ids = items.map(({ id }) => id);
  const { itemId, quantity, cause, causeId, at } = consumptions;
  return db
    .select({ itemId, quantity, cause, causeId, at })
    .from(consumptions)
    .where(and(inArray(itemId, ids), gt(at, since)))
    .all();
}

/** The mean of all that was taken in the window, and how much single days differ from it. */
function fromTakes(taken: readonly Taken[], historyDays: number, now: number): SupplyUse {
  const within = (days: number) => taken.filter(({ at }) => at > now - days * MS_PER_DAY && at <= now);
  const isOften = countTakes(within(SHORT_WINDOW_DAYS)) >= OFTEN;
  // Begun days count whole, so that a use right after the first delivery is in it.
  const windowDays = Math.min(isOften ? SHORT_WINDOW_DAYS : LONG_WINDOW_DAYS, Math.ceil(historyDays));
  const uses = within(windowDays);
  const sum = uses.reduce((total, { quantity }) => total + quantity, 0);
  const known = { windowDays, taken: sum, takes: countTakes(uses), systems: [], demandPerDay: null };
  if (historyDays < FEWEST_DAYS) return { ...known, basis: 'none', perDay: null, sdPerDay: 0 };
  return { ...known, basis: 'consumption', perDay: sum / windowDays, sdPerDay: dailySpread(uses, windowDays, now) };
}

/** What is taken from two lots at once is one take. */
function countTakes(uses: readonly Taken[]): number {
  return new Set(uses.map(({ cause, causeId }) => `${cause} ${causeId}`)).size;
}

/** Standard deviation of a day's use over the days of the window, days without any included. */
function dailySpread(uses: readonly Taken[], days: number, now: number): number {
  const sums = Array.from({ length: days }, () => 0);
  for (const { at, quantity } of uses) {
    const day = Math.min(days - 1, Math.floor((now - at) / MS_PER_DAY));
    sums[day] = (sums[day] ?? 0) + quantity;
  }
  const mean = sums.reduce((total, sum) => total + sum, 0) / days;
  return Math.sqrt(sums.reduce((total, sum) => total + (sum - mean) ** 2, 0) / (days - 1));
}

/** Nothing where no system with a mix of this item has level readings to tell its use. */
function fromLimewater(taken: readonly Taken[], mixes: readonly LimewaterUse[]): Partial<SupplyUse> {
  const byRefill = new Map<string, number>();
  for (const { cause, causeId, quantity } of taken) {
    if (cause === 'refill') byRefill.set(causeId, (byRefill.get(causeId) ?? 0) + quantity);
  }
  const systems = mixes.flatMap(({ systemCode, litresPerDay, refills }) => {
    const water = refills.reduce((sum, { waterL }) => sum + waterL, 0);
    const mixed = refills.reduce((sum, { id }) => sum + (byRefill.get(id) ?? 0), 0);
    if (water === 0 || mixed === 0) return [];
    const perLitre = mixed / water;
    return [{ systemCode, litresPerDay, perLitre, perDay: litresPerDay * perLitre }];
  });
  if (systems.length === 0) return {};
  const perDay = systems.reduce((sum, system) => sum + system.perDay, 0);
  // How days differ from one another is in the level readings only, so the safety days alone make the buffer here.
  return { basis: 'limewater', windowDays: SHORT_WINDOW_DAYS, perDay, sdPerDay: 0, systems };
}
