import { addDays, dayOf, type Day } from '../../shared/domain/days.ts';
import type { Write } from '../db/write.ts';
import { receive } from '../services/supply-lots.ts';
import { FARM } from './scenario/farm.ts';
import { daysToEnd, timeOn, type DemoItem, type World } from './world.ts';

/** An order covers so many days. */
const COVER_DAYS = 45;
/** Prices rise by so much in a year. */
const INFLATION = 0.09;
/** Lime is bought for the last time so long before the end, for so many days beyond it, so that it is soon to be ordered. */
export const LAST_LIME_DAYS = 24;
const LIME_LEFT_DAYS = 21;

/** What stands on the shelves on the first day. */
export function stockUp(world: World, write: Write): void {
  for (const item of Object.values(world.items)) deliver(world, write, item, packsFor(item, item.usePerDay * 60));
}

/** Monday's look at the shelves: what runs short is ordered and comes after the lead time. */
export function reviewSupplies(world: World, write: Write, index: number, day: Day): void {
  for (const item of Object.values(world.items)) {
    const toEnd = daysToEnd(world, index);
    if (item.ordered || (item.key === 'lime' && toEnd < LAST_LIME_DAYS + item.leadTimeDays + 7)) continue;
    // A quiet season is no reason to run out in the next one.
    const perDay = Math.max(usedPerDay(world, item, write.now) ?? 0, item.usePerDay);
    const onHand = onHandOf(world, item);
    if (onHand > perDay * (item.leadTimeDays + item.safetyDays + 7)) continue;
    item.ordered = true;
    const arrival = timeOn(addDays(day, item.leadTimeDays), 9 * 60 + 20);
    world.agenda.put(arrival, world.staff.owner, (later) => {
      item.ordered = false;
      deliver(world, later, item, packsFor(item, perDay * COVER_DAYS));
    });
  }
}

/** The last lime before the end: enough until then and a little beyond. */
export function lastLime(world: World, write: Write): void {
  const item = world.items.lime;
  const perDay = usedPerDay(world, item, write.now) ?? item.usePerDay;
  const wanted = perDay * (LAST_LIME_DAYS + LIME_LEFT_DAYS) - onHandOf(world, item);
  if (wanted > 0) deliver(world, write, item, packsFor(item, wanted));
}

/** Makes sure that an act has what it takes; someone drives to town where an order is late. */
export function needSupply(world: World, write: Write, item: DemoItem, quantity: number): void {
  const missing = quantity - onHandOf(world, item);
  if (missing > 0) deliver(world, write, item, packsFor(item, missing));
}

function deliver(world: World, write: Write, item: DemoItem, packs: number): void {
  const today = dayOf(write.now, FARM.timeZone);
  const years = (write.now - timeOn(world.truth.firstDay, 0)) / (365 * 86_400_000);
  // Suppliers raise prices twice a year.
  const price = item.packPrice * (1 + INFLATION * (Math.floor(years * 2) / 2));
  receive(write, {
    itemId: item.id,
    code: `${item.code}-${today.slice(2).replaceAll('-', '')}`.slice(0, 16),
    receivedOn: today,
    expiresOn: item.keepsDays === null ? null : addDays(today, item.keepsDays),
    quantity: packs * item.packSize,
    costMinor: Math.round(price * packs),
  });
}

function packsFor({ packSize }: DemoItem, quantity: number): number {
  return Math.max(1, Math.ceil(quantity / packSize));
}

function onHandOf({ sqlite }: World, { id }: DemoItem): number {
  return Number(sqlite.prepare('SELECT total(remaining) FROM lot WHERE item_id = ?').pluck().get(id));
}

/** Mean use of the last eight weeks; null while nothing was used. */
function usedPerDay({ sqlite }: World, { id }: DemoItem, now: number): number | null {
  const days = 56;
  const used = Number(
    sqlite
      .prepare('SELECT total(quantity) FROM consumption WHERE item_id = ? AND at > ?')
      .pluck()
      .get(id, now - days * 86_400_000),
  );
  return used > 0 ? used / days : null;
}
