import type { Item } from '../../../shared/contracts/supplies.ts';
import type { TodayEntry, TodayText } from '../../../shared/contracts/today.ts';
import { daysBetween } from '../../../shared/domain/days.ts';
import type { Db } from '../../db/client.ts';
import { listItems } from '../supply-items.ts';
import { actOf, type TodayContext } from './source.ts';

const EXPIRES_WITHIN_DAYS = 14;

/** Supplies to order, the most urgent first, and those that expire. */
export function suppliesToday(db: Db, context: TodayContext): TodayEntry[] {
  const items = listItems(db, { retired: 'no' }, context.now);
  return [
    ...items.filter(({ state }) => state !== 'ok').map((item) => toOrder(context, item)),
    ...items.flatMap((item) => expiring(context, item)),
  ];
}

function toOrder(context: TodayContext, item: Item): TodayEntry {
  const { state } = item;
  return {
    id: `supply-${item.id}`,
    tone: state === 'out' ? 'brick' : state === 'order_now' ? 'ochre' : 'kelp',
    group: state === 'out' ? 'now' : state === 'order_now' ? 'today' : 'soon',
    title: titleOf(item),
    detail: [...lastsWords(item), `, lead time ${daysWord(item.leadTimeDays)}.`],
    act: actOf(context, 'supplies.work', 'Order', `/supplies/${item.id}`),
  };
}

function titleOf({ name, state, advice }: Item): TodayText {
  if (state === 'out') return [`${name} is used up`];
  if (state === 'order_now' || advice.orderByDay === null) return [`Order ${name} now`];
  return [`Order ${name} by `, { day: advice.orderByDay }];
}

function lastsWords({ advice, use, unit, state }: Item): TodayText {
  if (advice.daysLeft === null || use.perDay === null) return ['Nothing is on hand'];
  const rate = rateWords(use.perDay, unit);
  if (state === 'out') return [`It goes at ${rate}`];
  return [`${daysWord(Math.floor(advice.daysLeft))} left at ${rate}`];
}

/** A forecast of use is good to one or two figures: "0.7 pieces a day", "140 g a day"; below one a week by the week. */
function rateWords(perDay: number, unit: string): string {
  const [amount, period] = unit === 'piece' && perDay < 0.2 ? [perDay * 7, 'week'] : [perDay, 'day'];
  const shown = Number(amount.toPrecision(amount < 1 ? 1 : 2));
  return `${shown.toLocaleString('en')} ${unit === 'piece' && shown !== 1 ? 'pieces' : unit} a ${period}`;
}

function expiring(context: TodayContext, { id, name, nextExpiry }: Item): TodayEntry[] {
  if (nextExpiry === null) return [];
  const days = daysBetween(context.today, nextExpiry);
  if (days > EXPIRES_WITHIN_DAYS) return [];
  return [
    {
      id: `expiry-${id}`,
      tone: days < 0 ? 'ochre' : 'slate',
      group: days < 0 ? 'today' : 'soon',
      title: [days < 0 ? `${name} is past its date` : `${name} expires `, ...(days < 0 ? [] : [{ day: nextExpiry }])],
      detail: [days < 0 ? 'Take what is left off the books with a count.' : 'Use that lot first.'],
      act: actOf(context, 'supplies.work', days < 0 ? 'Count' : 'See', `/supplies/${id}`),
    },
  ];
}

function daysWord(days: number): string {
  return days === 1 ? '1 day' : `${days} days`;
}
