import { MICRO_PER_MAJOR, minorDigits } from '@shared/domain/money.ts';
import { EM_DASH, formatNumber, THIN_SPACE } from '@/formatting/format-number.ts';

/** An amount of minor units with its currency, such as "1,204.50 EUR". */
export function formatMoney(minor: number | null | undefined, currency: string): string {
  if (minor === null || minor === undefined) return EM_DASH;
  return `${formatMoneyValue(minor, currency)}${THIN_SPACE}${currency}`;
}

/** The same without the currency, for columns whose head names it. */
export function formatMoneyValue(minor: number, currency: string): string {
  const decimals = minorDigits(currency);
  return formatNumber(minor / 10 ** decimals, { decimals });
}

/** A cost in micro-units: as many decimals as the currency has, and two figures where those would show too little. */
export function formatMicro(micro: number | null | undefined, currency: string): string {
  if (micro === null || micro === undefined) return EM_DASH;
  const major = micro / MICRO_PER_MAJOR;
  const digits = minorDigits(currency);
  const size = Math.abs(major);
  const isTiny = size > 0 && size < 2 * 10 ** -digits;
  const decimals = isTiny ? Math.min(6, 1 - Math.floor(Math.log10(size))) : digits;
  return formatNumber(major, { decimals });
}
