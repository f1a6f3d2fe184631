import { daysBetween, type Day } from './days.ts';

/** What a supply is for; lime and vinegar are named apart because the water's demand foretells their use. */
export const ITEM_KINDS = [
  'lime',
  'vinegar',
  'salt',
  'supplement',
  'plug',
  'glue',
  'label',
  'packing',
  'other',
] as const;
export type ItemKind = (typeof ITEM_KINDS)[number];

export const ITEM_UNITS = ['g', 'mL', 'piece'] as const;
export type ItemUnit = (typeof ITEM_UNITS)[number];

/** What an amount was taken for; `dosing` is a day of a running rate, `solution` a batch of stock solution. */
export const USE_CAUSES = [
  ...(['refill', 'dose', 'dosing', 'solution', 'water_change', 'salt_batch', 'cartridge'] as const),
  ...(['cut', 'packing', 'count'] as const),
] as const;

/** How urgent a supply is: `out`, `order_now` (the last day to order is here), `order_soon` (within a week), else `ok`. */
export const SUPPLY_STATES = ['ok', 'order_soon', 'order_now', 'out'] as const;
export type SupplyState = (typeof SUPPLY_STATES)[number];

/** The unit that a kind is kept in where the chemistry or the act that uses it fixes it. */
const FIXED_UNITS: Partial<Record<ItemKind, ItemUnit>> = {
  lime: 'g',
  vinegar: 'mL',
  salt: 'g',
  plug: 'piece',
  label: 'piece',
};

const STRENGTHS: Partial<Record<ItemKind, { above: number; upTo: number; message: string }>> = {
  lime: { above: 0, upTo: 1, message: 'Enter the part that is calcium hydroxide, above 0 and up to 1, such as 0.95.' },
  vinegar: { above: 0, upTo: 30, message: 'Enter the acid of the vinegar in percent, above 0 and up to 30.' },
};

/** The most that one unit of a supplement can bring: pure salts stay below it. */
const MOST_MEQ = 100;
const MOST_MG = 1000;

export interface ItemProblem {
  path: 'unit' | 'strength' | 'calciumMg' | 'magnesiumMg';
  message: string;
}

/** What an item is, as far as its fields must fit together. */
export interface ItemCharacter {
  kind: ItemKind;
  unit: ItemUnit;
  strength: number | null;
  calciumMg: number | null;
  magnesiumMg: number | null;
}

/** What does not fit together about an item; empty when all does. */
export function itemProblems(item: ItemCharacter): ItemProblem[] {
  const problems: ItemProblem[] = [];
  const unit = FIXED_UNITS[item.kind];
  if (unit && item.unit !== unit) problems.push({ path: 'unit', message: `This kind is kept in ${unit}.` });
  if (item.kind === 'supplement') return [...problems, ...supplementProblems(item)];
  for (const path of ['calciumMg', 'magnesiumMg'] as const) {
    if (item[path] !== null) problems.push({ path, message: 'Only supplements bring it.' });
  }
  const range = STRENGTHS[item.kind];
  if (range && !(item.strength !== null && item.strength > range.above && item.strength <= range.upTo)) {
    problems.push({ path: 'strength', message: range.message });
  }
  if (!range && item.strength !== null) {
    problems.push({ path: 'strength', message: 'Only lime, vinegar and supplements have a strength.' });
  }
  return problems;
}

/** A supplement brings something: alkalinity, calcium or magnesium. */
function supplementProblems({ strength, calciumMg, magnesiumMg }: ItemCharacter): ItemProblem[] {
  const limits = [
    { path: 'strength', value: strength, most: MOST_MEQ, unit: 'meq' },
    { path: 'calciumMg', value: calciumMg, most: MOST_MG, unit: 'mg' },
    { path: 'magnesiumMg', value: magnesiumMg, most: MOST_MG, unit: 'mg' },
  ] as const;
  const problems = limits.flatMap(({ path, value, most, unit }): ItemProblem[] =>
    value !== null && !(value >= 0 && value <= most) ? [{ path, message: `Enter 0 to ${most} ${unit}.` }] : [],
  );
  if (problems.length > 0 || limits.some(({ value }) => (value ?? 0) > 0)) return problems;
  return [{ path: 'strength', message: 'Enter what one unit brings: alkalinity in meq, calcium or magnesium in mg.' }];
}

/** Whether a kind has a strength at all. */
export function hasStrength(kind: ItemKind): boolean {
  return kind === 'supplement' || STRENGTHS[kind] !== undefined;
}

const SOON_DAYS = 7;

/**
 * The one word for how a supply stands.
 *
 * @param orderByDay last day to order; null where nothing is used
 */
export function supplyState(onHand: number, orderByDay: Day | null, today: Day): SupplyState {
  if (onHand <= 0) return 'out';
  if (orderByDay === null) return 'ok';
  if (orderByDay <= today) return 'order_now';
  return daysBetween(today, orderByDay) <= SOON_DAYS ? 'order_soon' : 'ok';
}
