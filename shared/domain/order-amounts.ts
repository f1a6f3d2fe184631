import { addMoney, moneyOf, multiplyMoney, percentOf, sumMoney } from './money.ts';

export interface PricedLine {
  quantity: number;
  priceMinor: number;
}

export interface OrderAmounts {
  subtotalMinor: number;
  taxMinor: number;
  totalMinor: number;
}

/**
 * What an order costs. Tax is taken once from the sum, rounded half up, so that lines never disagree with the total.
 *
 * @param lines whole pieces and their prices in minor units
 * @param taxPercent percent, taken to four decimals
 */
export function orderAmounts(lines: readonly PricedLine[], currency: string, taxPercent: number): OrderAmounts {
  const subtotal = sumMoney(
    lines.map(({ quantity, priceMinor }) => multiplyMoney(moneyOf(priceMinor, currency), quantity)),
    currency,
  );
  const tax = percentOf(subtotal, taxPercent);
  return { subtotalMinor: subtotal.minor, taxMinor: tax.minor, totalMinor: addMoney(subtotal, tax).minor };
}
