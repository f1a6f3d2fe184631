import { DomainError } from '../errors.ts';
import { splitByWeights } from './split.ts';

export { splitByWeights };

/** An amount in the smallest unit of its currency: 1250 EUR is 12.50 euros, 1250 JPY is 1250 yen. */
export interface Money {
  minor: number;
  currency: string;
}

/** Costs are kept in millionths of the major unit, so that a share of a tub of lime is still a whole number. */
export const MICRO_PER_MAJOR = 1_000_000;

const USUAL_DIGITS = 2;
const MICRO_DIGITS = 6;

/** Currencies whose minor unit is not a hundredth (ISO 4217, list one). */
const UNUSUAL_DIGITS: Readonly<Record<string, number>> = {
  ...{ BHD: 3, IQD: 3, JOD: 3, KWD: 3, LYD: 3, OMR: 3, TND: 3, CLF: 4, UYW: 4 },
  ...{ BIF: 0, CLP: 0, DJF: 0, GNF: 0, ISK: 0, JPY: 0, KMF: 0, KRW: 0, PYG: 0, RWF: 0, UGX: 0, UYI: 0 },
  ...{ VND: 0, VUV: 0, XAF: 0, XOF: 0, XPF: 0 },
};

/**
 * Digits after the decimal point of a currency (ISO 4217).
 *
 * @throws {DomainError} `input.invalid` unless the code is three capital letters
 */
export function minorDigits(currency: string): number {
  if (!/^[A-Z]{3}$/.test(currency)) {
    throw new DomainError('input.invalid', 'Enter a currency as three letters, such as EUR.', {
      details: { currency },
    });
  }
  return UNUSUAL_DIGITS[currency] ?? USUAL_DIGITS;
}

/** Money from whole minor units, checked. */
export function moneyOf(minor: number, currency: string): Money {
  minorDigits(currency);
  return { minor: exact(minor), currency };
}

/** The sum of two amounts of one currency. */
export function addMoney(a: Money, b: Money): Money {
  if (a.currency !== b.currency) {
    throw new DomainError('input.invalid', 'Amounts in two currencies cannot be added.', {
      details: { currencies: [a.currency, b.currency] },
    });
  }
  return moneyOf(exact(a.minor) + exact(b.minor), a.currency);
}

/** The first amount less the second. */
export function subtractMoney(a: Money, b: Money): Money {
  return addMoney(a, { minor: -b.minor, currency: b.currency });
}

/** The sum of a list, zero of that currency when the list is empty. */
export function sumMoney(amounts: readonly Money[], currency: string): Money {
  return amounts.reduce(addMoney, moneyOf(0, currency));
}

/** An amount taken a whole number of times, such as a price and a count. */
export function multiplyMoney(money: Money, wholeNumber: number): Money {
  return moneyOf(exact(money.minor) * exact(wholeNumber), money.currency);
}

/**
 * A percentage of an amount, such as tax, rounded half up to a whole minor unit. A negative amount gives the same figure
 * with a minus, so that a credit takes back exactly what the invoice charged.
 *
 * @param percent taken to four decimals, so 8.875 is exact
 */
export function percentOf(money: Money, percent: number): Money {
  const tenThousandths = Math.round(percent * 10_000);
  return moneyOf(divideHalfUp(BigInt(exact(money.minor)) * BigInt(exact(tenThousandths)), 1_000_000n), money.currency);
}

/**
 * Minor units from what a person typed in major units: '12.5' EUR is 1250.
 *
 * @throws {DomainError} `input.invalid` for text that is no amount or has more decimals than the currency
 */
export function minorFromText(text: string, currency: string): number {
  const digits = minorDigits(currency);
  const parts = /^(-?)(\d{1,13})(?:\.(\d+))?$/.exec(text.trim());
  const fraction = parts?.[3] ?? '';
  if (!parts || fraction.length > digits) {
    throw new DomainError('input.invalid', amountMessage(digits), { details: { text, currency } });
  }
  const size = exact(Number(`${parts[2]}${fraction.padEnd(digits, '0')}`));
  return parts[1] === '-' && size !== 0 ? -size : size;
}

/** Micro-units from minor units; always exact. */
export function microFromMinor(minor: number, currency: string): number {
  return exact(exact(minor) * 10 ** (MICRO_DIGITS - minorDigits(currency)));
}

/** Minor units from micro-units, rounded half up (away from zero); use it only where a cost is shown or posted. */
export function minorFromMicro(micro: number, currency: string): number {
  return divideHalfUp(BigInt(exact(micro)), 10n ** BigInt(MICRO_DIGITS - minorDigits(currency)));
}

function exact(amount: number): number {
  if (!Number.isSafeInteger(amount)) {
    throw new DomainError('domain.out_of_range', 'This amount is not a whole number that can be kept exactly.', {
      details: { amount },
    });
  }
  return amount === 0 ? 0 : amount;
}

function divideHalfUp(dividend: bigint, divisor: bigint): number {
  const size = dividend < 0n ? -dividend : dividend;
  const rounded = Number((2n * size + divisor) / (2n * divisor));
  return exact(dividend < 0n ? -rounded : rounded);
}

function amountMessage(digits: number): string {
  return digits === 0 ? 'Enter a whole amount, such as 1250.' : `Enter an amount with up to ${digits} decimals.`;
}
