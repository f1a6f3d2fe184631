import { DomainError } from '../errors.ts';
import { MS_PER_DAY } from './days.ts';
import { CALCIUM_HYDROXIDE_G_PER_MOL } from './limewater.ts';
import { assertPurity } from './ranges.ts';

export { reorderAdvice, safetyStock, type ReorderInputs } from './reorder.ts';

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

/**
 * Powder that limewater needs to bring an amount of alkalinity, g (two equivalents for each mole of hydroxide).
 *
 * @param alkalinityMeq what is to be brought, meq (meq/L of demand times litres of the system)
 * @param purity part of the powder that is calcium hydroxide, above 0 up to 1
 */
export function limeForDemand(alkalinityMeq: number, purity: number): number {
  assertPurity(purity);
  return ((alkalinityMeq / 2000) * CALCIUM_HYDROXIDE_G_PER_MOL) / purity;
}

function takeFrom({ lotId, quantity, costMicro }: SupplyLot, wanted: number): LotTake {
  if (wanted >= quantity * (1 - ROUNDING)) return { lotId, quantity, costMicro };
  return { lotId, quantity: wanted, costMicro: Math.round(costMicro * (wanted / quantity)) };
}

function lessTake(lot: SupplyLot, take: LotTake): SupplyLot {
  return { ...lot, quantity: lot.quantity - take.quantity, costMicro: lot.costMicro - take.costMicro };
}
