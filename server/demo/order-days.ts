import { addDays, weekdayOf, type Day } from '../../shared/domain/days.ts';
import type { Actor, Write } from '../db/write.ts';
import { cancelOrder, expireOrder } from '../services/cancel-order.ts';
import type { Chance } from './chance.ts';
import { offersNow, order, pack, pay, pick, ship, type Offer } from './sales.ts';
import { daysToEnd, timeOn, type World } from './world.ts';

/** Stores find the farm when its first frags are grown. */
const FIRST_ORDERS = 90;
/** The last ordinary orders are shipped before the end. */
const LAST_ORDERS = 7;
const SHIP_WEEKDAY = 2;
/** Orders in a week, by chance. */
const WEEKS: readonly number[] = [1, 1, 1, 1, 1, 1, 0, 1, 2, 1];
/** One buyer in so many forgets to pay. */
const FORGETS = 0.04;
const PIECES = { from: 26, to: 54 };

/** Puts this day's orders on the agenda, each with what follows from it. */
export function planOrders(world: World, chance: Chance, index: number, day: Day): void {
  if (weekdayOf(day) !== 4 || index < FIRST_ORDERS || daysToEnd(world, index) < LAST_ORDERS) return;
  const count = chance.pick(WEEKS);
  for (let number = 0; number < count; number += 1) {
    const buyer = chance.pick(world.buyers);
    const at = timeOn(day, 9 * 60 + 40 + chance.int(420));
    world.agenda.put(at, buyer, (write) => orderAndFollow(world, write, chance, day));
  }
}

function orderAndFollow(world: World, write: Write, chance: Chance, day: Day): void {
  const wanted = basket(offersNow(write), chance, PIECES.from + chance.int(PIECES.to - PIECES.from));
  if (wanted.length === 0) return;
  const shipOn = nextShipDay(day);
  const orderId = order(write, wanted, shipOn);
  if (chance.happens(FORGETS)) {
    world.agenda.put(write.now + 12.1 * 3_600_000, world.staff.sales, (later) => expireOrder(later, orderId));
    return;
  }
  world.agenda.put(write.now + (4 + chance.int(25)) * 60_000, write.actor, (later) => pay(later, orderId));
  fulfil(world, orderId, shipOn);
}

/** Picks, packs and ships an order on its day. */
function fulfil(world: World, orderId: string, shipOn: Day): void {
  const { sales } = world.staff;
  let picked = 0;
  const put = (minute: number, actor: Actor, act: (write: Write) => void) =>
    world.agenda.put(timeOn(shipOn, minute), actor, act);
  put(8 * 60 + 40, sales, (write) => {
    picked = pick(world, write, orderId);
    if (picked === 0) cancelOrder(write, orderId, 'None of it is fit to be sent any more.');
  });
  put(11 * 60, sales, (write) => {
    if (picked > 0) pack(world, write, orderId, picked);
  });
  put(14 * 60 + 30, sales, (write) => {
    if (picked > 0) ship(write, orderId);
  });
}

/** Some of several lines, about so many pieces; no line is bought up. */
export function basket(offers: readonly Offer[], chance: Chance, pieces: number): { offer: Offer; quantity: number }[] {
  const rich = offers.filter(({ stock }) => stock.free >= 4);
  const chosen: { offer: Offer; quantity: number }[] = [];
  let left = pieces;
  while (left > 0 && chosen.length < Math.min(9, rich.length)) {
    const offer = chance.pick(rich);
    if (chosen.some((each) => each.offer === offer)) continue;
    const quantity = Math.min(left, 3 + chance.int(8), Math.floor(offer.stock.free * 0.7));
    chosen.push({ offer, quantity });
    left -= quantity;
  }
  return chosen;
}

function nextShipDay(day: Day): Day {
  return addDays(day, ((SHIP_WEEKDAY - weekdayOf(day) + 6) % 7) + 1);
}
