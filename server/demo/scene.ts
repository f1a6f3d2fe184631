import { addDays, dayOf } from '../../shared/domain/days.ts';
import { SYSTEM, type Actor, type Write } from '../db/write.ts';
import { cancelOrder } from '../services/cancel-order.ts';
import { releaseStock, withholdStock } from '../services/withhold-stock.ts';
import type { Chance } from './chance.ts';
import { addMother } from './furnish.ts';
import { basket } from './order-days.ts';
import { FARM } from './scenario/farm.ts';
import { offersNow, order, pack, pay, pick, settleRefundsLater } from './sales.ts';
import { lose, place, type StockWork } from './stock-days.ts';
import { lookAtLevel, startDay } from './water-days.ts';
import type { WaterTests } from './water-tests.ts';
import { timeOn, type DemoPlug, type DemoRack, type World } from './world.ts';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;

/** The last hours, in which the morning's round is made whatever the clock says. */
export const LAST_HOURS = 3.5 * HOUR;

interface Cast {
  tests: WaterTests;
  stock: StockWork;
  chance: Chance;
}

/** Puts on the agenda what makes the farm's present: something of everything that a day can bring. */
export function planScene(world: World, cast: Cast): void {
  planPest(world);
  planNewcomers(world, cast.chance);
  planOpenOrders(world, cast.chance);
  planLastRound(world, cast);
}

/** An old pest that was cleared, and one that keeps a rack from sale now. */
function planPest(world: World): void {
  const { grower } = world.staff;
  const cleared: { id?: string } = {};
  put(world, 140 * DAY, grower, (write) => {
    const rack = rackOf(world, (plug) => plug.batch.line.form.code === 'plating');
    if (rack) cleared.id = withholdRack(write, rack, 'Nudibranch eggs under a plate; dipped');
  });
  put(world, 118 * DAY, grower, (write) => {
    if (cleared.id !== undefined) releaseStock(write, cleared.id);
    for (const rack of world.systems.flatMap(({ racks }) => racks)) rack.withheld = false;
  });
  put(world, 9 * DAY, grower, (write) => {
    const rack = rackOf(
      world,
      (plug) => plug.batch.line.form.code === 'staghorn' && plug.batch.system.spec.code === 'A',
    );
    if (!rack) return;
    const quarantine = world.systems.find(({ spec }) => spec.kind === 'quarantine')?.racks[0];
    const bitten = plugsOn(world, rack).slice(0, 12);
    if (quarantine) place(write, bitten, quarantine);
    withholdRack(write, rack, 'Flatworm bite marks on two plugs; dipped, look again in a week');
  });
}

/** Mothers that came lately and wait in quarantine. */
function planNewcomers(world: World, chance: Chance): void {
  put(world, 20 * DAY, world.staff.grower2, (write) => {
    const system = world.systems.find(({ spec }) => spec.kind === 'quarantine');
    if (!system) return;
    for (let number = 0; number < 3; number += 1) {
      const line = chance.pick(world.lines);
      const mother = { line, system, number: world.mothers.length + 1, from: world.days.length - 20 };
      world.mothers.push(addMother(write, mother, chance));
    }
  });
}

/** An order in each state that an order can be in. */
function planOpenOrders(world: World, chance: Chance): void {
  const { sales } = world.staff;
  const today = dayOf(world.now, FARM.timeZone);
  const tomorrow = addDays(today, 1);
  const place = (
    before: number,
    buyer: number,
    shipOn: string,
    pieces: number,
    then: (orderId: string) => void,
    note = '',
  ) =>
    put(world, before, buyerOf(world, buyer), (write) => {
      then(order(write, basket(offersNow(write), chance, pieces), shipOn, note));
    });
  const paidAfter = (before: number, orderId: string) => put(world, before, SYSTEM, (write) => pay(write, orderId));

  place(4 * DAY, 3, addDays(today, -1), 22, (orderId) => {
    paidAfter(4 * DAY - 9 * MINUTE, orderId);
    put(world, 2 * DAY, sales, (write) => {
      cancelOrder(write, orderId, 'The store is closed for repairs and asked us to cancel.');
      settleRefundsLater(world, write, orderId);
    });
  });
  place(3 * DAY, 0, today, 34, (orderId) => {
    paidAfter(3 * DAY - 12 * MINUTE, orderId);
    let picked = 0;
    put(world, 170 * MINUTE, sales, (write) => {
      picked = pick(world, write, orderId);
    });
    put(world, 125 * MINUTE, sales, (write) => pack(world, write, orderId, picked));
  });
  place(2.2 * DAY, 1, today, 30, (orderId) => {
    paidAfter(2.2 * DAY - 7 * MINUTE, orderId);
    put(world, 40 * MINUTE, sales, (write) => pick(world, write, orderId, 15));
  });
  place(1.6 * DAY, 2, tomorrow, 26, (orderId) => paidAfter(1.6 * DAY - 20 * MINUTE, orderId));
  planShortOrder(world, chance, tomorrow);
  place(
    3 * HOUR,
    4,
    addDays(today, 4),
    38,
    (orderId) => paidAfter(3 * HOUR - 6 * MINUTE, orderId),
    'Please no yellow pieces.',
  );
  place(25 * MINUTE, 0, addDays(today, 5), 18, () => undefined);
}

/** All of a batch is promised to one order, and then some of it dies. */
function planShortOrder(world: World, chance: Chance, shipOn: string): void {
  put(world, 30 * HOUR, buyerOf(world, 2), (write) => {
    const offers = offersNow(write);
    const scarce = offers
      .filter(({ stock }) => stock.batches.length === 1 && stock.free === stock.saleable && stock.free >= 6)
      .sort((a, b) => a.stock.free - b.stock.free || (a.listingId < b.listingId ? -1 : 1))[0];
    const batch = world.batches.find(({ id }) => id === scarce?.stock.batches[0]?.batchId);
    if (!scarce || !batch) return;
    const more = basket(
      offers.filter((offer) => offer !== scarce),
      chance,
      8,
    );
    const orderId = order(write, [{ offer: scarce, quantity: scarce.stock.free }, ...more], shipOn);
    put(world, 30 * HOUR - 11 * MINUTE, SYSTEM, (later) => pay(later, orderId));
    put(world, 85 * MINUTE, world.staff.grower, (later) => {
      const there = batch.plugs.filter(({ state, rack }) => state === 'rack' && rack?.withheld === false);
      lose(later, there.slice(0, 3), 'rtn', 'unknown');
    });
  });
}

/** Today's tests, levels and a cut that still waits on the bench. */
function planLastRound(world: World, { tests, stock, chance }: Cast): void {
  const { grower, grower2 } = world.staff;
  const index = world.days.length;
  const start = world.now - LAST_HOURS;
  const today = dayOf(start, FARM.timeZone);
  world.agenda.put(start, grower, () => {
    for (const system of world.systems) startDay(world, system, chance, index, today);
  });
  world.systems.forEach((system, number) => {
    world.agenda.put(start + (20 + number * 11) * MINUTE, grower, (write) => {
      tests.round(system, index, today, write.now, grower);
    });
    world.agenda.put(world.now - (60 - number * 3) * MINUTE, grower, (write) => lookAtLevel(write, system));
  });
  put(world, 95 * MINUTE, grower2, (write) => {
    stock.cutNow(write, index, today, true);
  });
}

/** Puts an act so long before the end on the agenda; a shorter history than that goes without it. */
function put(world: World, before: number, actor: Actor, act: (write: Write) => void): void {
  const at = Math.round(world.now - before);
  if (at > timeOn(world.truth.firstDay, 12 * 60)) world.agenda.put(at, actor, act);
}

function buyerOf({ buyers }: World, index: number): Actor {
  const buyer = buyers[index % buyers.length];
  if (!buyer) throw new Error('There are no buyers.');
  return buyer;
}

function withholdRack(write: Write, rack: DemoRack, reason: string): string {
  rack.withheld = true;
  return withholdStock(write, { rackId: rack.id, reason }).id;
}

function plugsOn({ batches }: World, rack: DemoRack): DemoPlug[] {
  return batches.flatMap(({ plugs }) => plugs).filter((plug) => plug.state === 'rack' && plug.rack === rack);
}

/** The grow-out rack with most plugs of a kind. */
function rackOf(world: World, isKind: (plug: DemoPlug) => boolean): DemoRack | undefined {
  const racks = world.systems.flatMap((system) => system.racks.filter(({ stage }) => stage === 'grow'));
  const counted = racks.map((rack) => ({ rack, count: plugsOn(world, rack).filter(isKind).length }));
  return counted.sort((a, b) => b.count - a.count)[0]?.rack;
}
