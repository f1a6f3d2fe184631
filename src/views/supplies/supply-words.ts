import type { Item, Use } from '@shared/contracts/supplies.ts';
import type { Day } from '@shared/domain/days.ts';
import type { ItemKind, ItemUnit, SupplyState } from '@shared/domain/supply-items.ts';
import type { Sentence } from '@/components/sentence.ts';
import type { Tone } from '@/components/tone.ts';
import { nearDay } from '@/formatting/format-day.ts';
import { formatNumber } from '@/formatting/format-number.ts';
import { plural } from '@/formatting/plural.ts';

export const STATE_WORDS: Record<SupplyState, { word: string; tone: Tone }> = {
  ok: { word: 'ok', tone: 'kelp' },
  order_soon: { word: 'order soon', tone: 'ochre' },
  order_now: { word: 'order now', tone: 'brick' },
  out: { word: 'out', tone: 'brick' },
};

export const KIND_WORDS: Record<ItemKind, string> = {
  lime: 'Lime',
  vinegar: 'Vinegar',
  salt: 'Salt mix',
  supplement: 'Supplement',
  plug: 'Plugs',
  glue: 'Glue or putty',
  label: 'Labels',
  packing: 'Packing',
  other: 'Other',
};

export const CAUSE_WORDS: Record<Use['cause'], string> = {
  refill: 'Limewater mix',
  dose: 'Dose',
  dosing: 'Steady dosing',
  solution: 'Stock solution',
  salt_batch: 'New salt water',
  cartridge: 'Cartridge',
  water_change: 'Water change',
  cut: 'A cut batch',
  packing: 'Packing',
  count: 'Count',
};

type SayAmount = (value: number, unit: ItemUnit) => string;

/** The opening sentence of all supplies: what runs out first, and what to do about it. */
export function suppliesSentence(items: readonly Item[], today: Day): Sentence {
  const [first] = items;
  if (!first) {
    return plain('Nothing is kept here yet. Add lime, vinegar, plugs and glue, then receive what is on the shelf.');
  }
  const urgent = items.filter(({ state }) => state === 'out' || state === 'order_now');
  if (urgent.length > 0) return urgentSentence(urgent);

  const running = items.filter(({ advice }) => advice.daysLeft !== null);
  const next = running.reduce<Item | undefined>(sooner, undefined);
  if (!next)
    return plain('Not enough was used yet to say how long things last. Log mixes, cuts and counts as they happen.');
  const lasts = { before: `First to run out: ${next.name}, in `, number: daysWords(next.advice.daysLeft) };
  if (next.state === 'order_soon') return { ...lasts, after: `. ${orderWords(next, today)}` };
  const soon = items.find(({ state }) => state === 'order_soon');
  if (soon) return { ...lasts, after: `. ${soon.name} takes longer to come: ${lowerFirst(orderWords(soon, today))}` };
  return { ...lasts, after: '. Nothing needs to be ordered this week.' };
}

/** The opening sentence of one supply. */
export function itemSentence(item: Item, today: Day, say: SayAmount): Sentence {
  const { use, advice, state, unit } = item;
  if (state === 'out') {
    const order = advice.orderPacks > 0 ? `Order ${packs(item)} today` : 'Receive a delivery';
    return { before: 'None is ', number: 'left', after: `. ${order}, or count again if there is some on the shelf.` };
  }
  if (use.perDay === null) return plain('Not enough was used yet to say how long it lasts.');
  if (use.perDay === 0 || advice.daysLeft === null) {
    return plain(`None was used in ${plural(use.windowDays, 'day')}, so it lasts until someone takes it.`);
  }
  const rate = ` at ${say(use.perDay, unit)} a day. `;
  const act = state === 'ok' ? `Order by ${nearDay(advice.orderByDay ?? today, today)}.` : orderWords(item, today);
  return { before: 'Lasts ', number: daysWords(advice.daysLeft), after: rate + act };
}

/** "Order 2 packs by Thursday." */
function orderWords(item: Item, today: Day): string {
  const { orderByDay } = item.advice;
  const by = orderByDay === null || orderByDay <= today ? 'today' : `by ${nearDay(orderByDay, today)}`;
  return `Order ${packs(item)} ${by}.`;
}

function urgentSentence(urgent: readonly Item[]): Sentence {
  const [first, ...others] = urgent;
  if (!first) return plain('');
  const more =
    others.length > 0 ? ` ${plural(others.length, 'other supply', 'other supplies')} can't wait either.` : '';
  if (first.state === 'out') {
    const order = first.advice.orderPacks > 0 ? `Order ${packs(first)} today.` : 'Receive a delivery or retire it.';
    return { before: `${first.name}: `, number: 'none left', after: `. ${order}${more}` };
  }
  return {
    before: `${first.name}: `,
    number: `${daysWords(first.advice.daysLeft)} left`,
    after: `, and a delivery takes ${plural(first.leadTimeDays, 'day')}. Order ${packs(first)} today.${more}`,
  };
}

function packs({ advice }: Item): string {
  return plural(advice.orderPacks, 'pack');
}

function daysWords(days: number | null): string {
  if (days === null) return '';
  return days < 2 ? `${formatNumber(days, { decimals: 1 })} days` : plural(Math.floor(days), 'day');
}

function sooner(first: Item | undefined, item: Item): Item {
  return first && (first.advice.daysLeft ?? 0) <= (item.advice.daysLeft ?? 0) ? first : item;
}

function plain(before: string): Sentence {
  return { before, number: '', after: '' };
}

function lowerFirst(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}
