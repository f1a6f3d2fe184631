import type { OrderListItem } from '../../../shared/contracts/orders.ts';
import type { TodayEntry, TodayText } from '../../../shared/contracts/today.ts';
import { MS_PER_HOUR } from '../../../shared/domain/days.ts';
import type { Db } from '../../db/client.ts';
import type { BatchStock } from '../batch-stock.ts';
import { listOrders } from '../orders.ts';
import { actOf, type TodayContext } from './source.ts';

/** More than this of one state is a list to open, not a list of things to do. */
const MOST_OF_A_STATE = 20;

/** Orders to pick and to ship, promises that stock no longer keeps, and unpaid orders about to end. */
export function ordersToday(db: Db, context: TodayContext): TodayEntry[] {
  const inState = (state: OrderListItem['state']) => listOrders(db, { limit: MOST_OF_A_STATE, state }).items.reverse();
  return [
    ...context.stock.filter(({ counts }) => counts.held > counts.saleable).map((each) => short(each)),
    ...inState('packed').map((order) => toShip(context, order)),
    ...inState('picking').map((order) => toPick(context, order)),
    ...inState('paid').map((order) => toPick(context, order)),
    ...inState('placed').flatMap((order) => unpaid(context, order)),
  ];
}

function short({ batch, line, counts }: BatchStock): TodayEntry {
  return {
    id: `short-${batch.id}`,
    tone: 'brick',
    group: 'now',
    title: [`Batch ${batch.code}: ${counts.held} promised, ${counts.saleable} fit for sale`],
    detail: [`Let another batch of ${line.tradeName} stand in, or tell the store.`],
    act: { label: 'See', to: `/stock/batches/${batch.id}` },
  };
}

function toPick(context: TodayContext, order: OrderListItem): TodayEntry {
  const isBegun = order.state === 'picking';
  return {
    id: `pick-${order.id}`,
    ...urgencyOf(context, order),
    title: [`Pick order ${order.number}, ${fragsWord(order.pieces)}`],
    detail: [
      order.storeName,
      ...(isBegun ? [`, ${order.picked} of ${order.pieces} picked`] : []),
      ...shipWords(order),
      '.',
    ],
    act: actOf(context, 'orders.work', 'Pick', `/orders/${order.id}/pick`, `/orders/${order.id}`),
  };
}

function toShip(context: TodayContext, order: OrderListItem): TodayEntry {
  return {
    id: `ship-${order.id}`,
    ...urgencyOf(context, order),
    title: [`Ship order ${order.number}, ${fragsWord(order.pieces)}`],
    detail: [`${order.storeName}; packed`, ...shipWords(order), '.'],
    act: actOf(context, 'orders.work', 'Ship', `/orders/${order.id}`),
  };
}

/** Overdue boxes can't wait; those without a ship day, or with today's, are today's work. */
function urgencyOf({ today }: TodayContext, { shipOn }: OrderListItem): Pick<TodayEntry, 'tone' | 'group'> {
  if (shipOn === null || shipOn === today) return { tone: 'ochre', group: 'today' };
  return shipOn < today ? { tone: 'brick', group: 'now' } : { tone: 'slate', group: 'soon' };
}

function shipWords({ shipOn }: OrderListItem): TodayText {
  return shipOn === null ? [] : ['; to leave ', { day: shipOn }];
}

function unpaid(context: TodayContext, { id, number, storeName, pieces, holdUntil }: OrderListItem): TodayEntry[] {
  if (holdUntil === null || holdUntil - context.now > MS_PER_HOUR) return [];
  return [
    {
      id: `unpaid-${id}`,
      tone: 'slate',
      group: 'soon',
      title: [`Order ${number} is not paid`],
      detail: [`${storeName}; ${fragsWord(pieces)} kept until `, { clock: holdUntil }, '.'],
      act: { label: 'See', to: `/orders/${id}` },
    },
  ];
}

function fragsWord(pieces: number): string {
  return pieces === 1 ? '1 frag' : `${pieces} frags`;
}
