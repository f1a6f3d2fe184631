import { minorDigits } from '../../shared/domain/money.ts';

/** An amount for mails, papers and messages, such as "EUR 1,204.50". */
export function moneyText(minor: number, currency: string): string {
  return `${currency}\u00a0${amountText(minor, currency)}`;
}

/** The same without the currency, for columns whose head names it. */
export function amountText(minor: number, currency: string): string {
  const digits = minorDigits(currency);
  return (minor / 10 ** digits).toLocaleString('en', { minimumFractionDigits: digits, maximumFractionDigits: digits });
}
