import { addDays, type Day } from './days.ts';
import { assertAboveZero, assertNotNegative } from './ranges.ts';

/** Standard normal point for 95 % service over a lead time. */
const SERVICE_Z = 1.6448536269514722;

/** Days of use that an order should last beyond the reorder point, unless the farm says otherwise. */
const USUAL_COVER_DAYS = 60;

/** A stock that outlasts ten years has no out day worth naming. */
const LONGEST_DAYS = 3652;

/** Relative slack for rounding in measured amounts, so that exactly two packs do not become three. */
const ROUNDING = 1e-9;

/** Amounts are in the item's canonical unit. */
export interface ReorderInputs {
  onHand: number;
  /** Ordered and not yet received. */
  onOrder?: number;
  usePerDay: number;
  /** Standard deviation of a day's use. */
  sdPerDay?: number;
  leadTimeDays: number;
  /** Standard deviation of the lead time, days. */
  leadSdDays?: number;
  safetyDays: number;
  packSize: number;
  /** Days of use that an order should last beyond the reorder point; 60 when left out. */
  coverDays?: number;
  today: Day;
}

export interface ReorderAdvice {
  /** Days that what is on hand lasts, fractional; null where nothing is used. */
  daysLeft: number | null;
  /** First day whose use is not fully covered; null where nothing is used or it is ten years away. */
  outDay: Day | null;
  /** Last day to order so that the buffer stays untouched, orders on the way counted in; today where that is past. */
  orderByDay: Day | null;
  orderNow: boolean;
  /** Whole packs that bring the stock to its reorder point and the cover days beyond; 0 where nothing is needed. */
  orderPacks: number;
  /** The same packs in units. */
  orderQuantity: number;
  reorderPoint: number;
}

/**
 * When and how much to order. The reorder point is the use of the lead time and a buffer: the safety days, or more where
 * use or lead time vary much (see {@link safetyStock}). A day's use is taken from the stock at the start of that day,
 * and what is ordered arrives in the morning.
 *
 * @throws {DomainError} `domain.out_of_range` for negative times or amounts
 */
export function reorderAdvice(inputs: ReorderInputs): ReorderAdvice {
  assertInputs(inputs);
  const { onHand, usePerDay, leadTimeDays, packSize, today, onOrder = 0, coverDays = USUAL_COVER_DAYS } = inputs;
  if (usePerDay === 0) {
    const never = { daysLeft: null, outDay: null, orderByDay: null, orderNow: false };
    return { ...never, orderPacks: 0, orderQuantity: 0, reorderPoint: 0 };
  }
  const bufferDays = Math.max(inputs.safetyDays, safetyStock(inputs) / usePerDay);
  const reorderPoint = usePerDay * (leadTimeDays + bufferDays);
  const daysLeft = Math.max(0, onHand) / usePerDay;
  const coveredDays = Math.floor((onHand + onOrder) / usePerDay + ROUNDING);
  const daysToOrder = coveredDays - Math.ceil(leadTimeDays) - Math.ceil(bufferDays);
  const wanted = reorderPoint + usePerDay * coverDays - onHand - onOrder;
  const orderPacks = Math.max(0, Math.ceil(wanted / packSize - ROUNDING));
  return {
    daysLeft,
    outDay: dayAfter(today, Math.floor(daysLeft + ROUNDING)),
    orderByDay: dayAfter(today, Math.max(0, daysToOrder)),
    orderNow: daysToOrder <= 0,
    orderPacks,
    orderQuantity: orderPacks * packSize,
    reorderPoint,
  };
}

/** Buffer for a use and a lead time that vary, 95 % service: z·√(L·σ² + d²·σ_L²). */
export function safetyStock(
  inputs: Pick<ReorderInputs, 'usePerDay' | 'sdPerDay' | 'leadTimeDays' | 'leadSdDays'>,
): number {
  const { usePerDay, sdPerDay = 0, leadTimeDays, leadSdDays = 0 } = inputs;
  return SERVICE_Z * Math.sqrt(leadTimeDays * sdPerDay ** 2 + (usePerDay * leadSdDays) ** 2);
}

function assertInputs(inputs: ReorderInputs): void {
  assertNotNegative('Use a day', inputs.usePerDay);
  assertNotNegative('Lead time (days)', inputs.leadTimeDays);
  assertNotNegative('Safety days', inputs.safetyDays);
  assertAboveZero('Pack size', inputs.packSize);
}

function dayAfter(today: Day, days: number): Day | null {
  return days > LONGEST_DAYS ? null : addDays(today, days);
}
