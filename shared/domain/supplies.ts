import { DomainError } from '../errors.ts';
import { addDays, MS_PER_DAY, type Day } from './days.ts';
import { CALCIUM_HYDROXIDE_G_PER_MOL } from './limewater.ts';

/** What is left of a received lot and what that rest has cost. */
export interface SupplyLot {
  lotId: string;
  /** In the item's canonical unit. */
  quantity: number;
  costMicro: number;
}

export interface LotTake {
  lotId: string;
  quantity: number;
  costMicro: number;
}

export interface FifoResult {
  takes: LotTake[];
  /** Cost of everything taken. */
  costMicro: number;
  /** The lots after it, those used up left out. */
  rest: SupplyLot[];
}

/** Quantities are measured amounts in doubles; a difference this small beside the amount is rounding. */
const ROUNDING = 1e-9;

/** Standard normal point for 95 % service over a lead time. */
const SERVICE_Z = 1.6448536269514722;

/** Days of use that an order should last beyond the reorder point, unless the farm says otherwise. */
const USUAL_COVER_DAYS = 60;

/**
 * Takes a quantity from lots in the order given, oldest first. A split lot's cost is split to the whole micro-unit and
 * the rest stays with the lot, so that all takes of a lot add up to exactly what it cost.
 *
 * @throws {DomainError} `supply.not_enough`, `input.invalid`
 */
export function fifo(lots: readonly SupplyLot[], quantity: number): FifoResult {
  if (!(Number.isFinite(quantity) && quantity >= 0)) {
    throw new DomainError('input.invalid', 'Enter an amount of zero or more.', { details: { quantity } });
  }
  const onHand = lots.reduce((sum, lot) => sum + lot.quantity, 0);
  if (quantity > onHand * (1 + ROUNDING)) {
    throw new DomainError('supply.not_enough', 'Not enough is in store. Record a receipt or count the lots first.', {
      details: { wanted: quantity, onHand },
    });
  }
  const result: FifoResult = { takes: [], costMicro: 0, rest: [] };
  let left = quantity;
  for (const lot of lots) {
    const take = takeFrom(lot, left);
    left = Math.max(0, left - take.quantity);
    if (take.quantity > 0) result.takes.push(take);
    result.costMicro += take.costMicro;
    if (take.quantity < lot.quantity) result.rest.push(lessTake(lot, take));
  }
  return result;
}

/** Mean use between two instants: all that was used in it, over its length in days. */
export function usePerDay(uses: readonly { at: number; quantity: number }[], from: number, to: number): number {
  if (!(to > from)) return 0;
  const used = uses.reduce((sum, { at, quantity }) => (at > from && at <= to ? sum + quantity : sum), 0);
  return used / ((to - from) / MS_PER_DAY);
}

export interface ReorderInputs {
  onHand: number;
  /** Ordered and not yet received. */
  onOrder?: number;
  usePerDay: number;
  /** Standard deviation of a day's use. */
  sdPerDay?: number;
  leadTimeDays: number;
  safetyDays: number;
  packSize: number;
  /** Days of use that an order should last beyond the reorder point; 60 when left out. */
  coverDays?: number;
  today: Day;
}

export interface ReorderAdvice {
  /** Days that what is on hand lasts, fractional; null where nothing is used. */
  daysLeft: number | null;
  /** First day whose use is not fully covered. */
  outDay: Day | null;
  /** Last day to order so that the safety days stay untouched; today where it is already past. */
  orderByDay: Day | null;
  orderNow: boolean;
  /** Whole packs to order, and the same in units; 0 where nothing is needed. */
  orderPacks: number;
  orderQuantity: number;
  reorderPoint: number;
}

/**
 * When and how much to order. The reorder point is use over the lead time and a buffer: the safety days, or more where
 * the use varies much (d·L + z·√L·σ, 95 % service). A day's use is taken at the start of that day.
 */
export function reorderAdvice(inputs: ReorderInputs): ReorderAdvice {
  const { onHand, usePerDay: perDay, leadTimeDays, safetyDays, packSize, today, onOrder = 0 } = inputs;
  if (!(packSize > 0)) {
    throw new DomainError('input.invalid', 'A pack holds more than zero.', { details: { packSize } });
  }
  if (!(perDay > 0)) {
    const none = { daysLeft: null, outDay: null, orderByDay: null };
    return { ...none, orderNow: false, orderPacks: 0, orderQuantity: 0, reorderPoint: 0 };
  }
  const buffer = Math.max(perDay * safetyDays, safetyStock(inputs));
  const reorderPoint = perDay * leadTimeDays + buffer;
  const daysLeft = Math.max(0, onHand) / perDay;
  const outDay = addDays(today, Math.floor(daysLeft));
  const daysToOrder = Math.floor((onHand + onOrder) / perDay) - Math.ceil(leadTimeDays) - Math.ceil(buffer / perDay);
  const wanted = reorderPoint + perDay * (inputs.coverDays ?? USUAL_COVER_DAYS) - onHand - onOrder;
  const orderPacks = Math.max(0, Math.ceil(wanted / packSize - ROUNDING));
  return {
    ...{ daysLeft, outDay, reorderPoint, orderPacks },
    orderByDay: addDays(today, Math.max(0, daysToOrder)),
    orderNow: daysToOrder <= 0,
    orderQuantity: orderPacks * packSize,
  };
}

/**
 * Powder that limewater needs to bring an amount of alkalinity, g (two equivalents for each mole of hydroxide).
 *
 * @param alkalinityMeq what is to be brought, meq (meq/L of demand times litres of the system)
 * @param purity part of the powder that is calcium hydroxide, above 0 up to 1
 */
export function limeForDemand(alkalinityMeq: number, purity: number): number {
  if (!(purity > 0 && purity <= 1)) {
    throw new DomainError('domain.out_of_range', 'Purity must be above 0 and at most 1.', { details: { purity } });
  }
  return ((alkalinityMeq / 2000) * CALCIUM_HYDROXIDE_G_PER_MOL) / purity;
}

/** Buffer for a variable use over a fixed lead time, 95 % service: z·σ·√L. */
export function safetyStock({ sdPerDay = 0, leadTimeDays }: { sdPerDay?: number; leadTimeDays: number }): number {
  return SERVICE_Z * sdPerDay * Math.sqrt(leadTimeDays);
}

function takeFrom({ lotId, quantity, costMicro }: SupplyLot, wanted: number): LotTake {
  if (wanted >= quantity * (1 - ROUNDING)) return { lotId, quantity, costMicro };
  return { lotId, quantity: wanted, costMicro: Math.round(costMicro * (wanted / quantity)) };
}

function lessTake(lot: SupplyLot, take: LotTake): SupplyLot {
  return { ...lot, quantity: lot.quantity - take.quantity, costMicro: lot.costMicro - take.costMicro };
}
