import { MICRO_PER_MAJOR, minorDigits } from '@shared/domain/money.ts';
import { EM_DASH, formatNumber } from '@/formatting/format-number.ts';

/** An amount of minor units with its currency, such as "EUR 1,204.50". */
export function formatMoney(minor: number | null | undefined, currency: string): string {
  if (minor === null || minor === undefined) return EM_DASH;
  return `${currency}\u00a0${formatMoneyValue(minor, currency)}`;
}

/** The same without the currency, for columns whose head names it. */
export function formatMoneyValue(minor: number, currency: string): string {
  const decimals = minorDigits(currency);
  return formatNumber(minor / 10 ** decimals, { decimals });
}

/** A cost in micro-units: as many decimals as the currency has, and up to three more for costs below one minor unit. */
export function formatMicro(micro: number | null | undefined, currency: string): string {
  if (micro === null || micro === undefined) return EM_DASH;
  const major = micro / MICRO_PER_MAJOR;
  const digits = minorDigits(currency);
  const isTiny = major !== 0 && Math.abs(major) < 10 ** -digits * 10;
  return formatNumber(major, { decimals: isTiny ? digits + 1 : digits });
}
