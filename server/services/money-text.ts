import { minorDigits } from '../../shared/domain/money.ts';

/** An amount for mails, papers and messages, such as "1,204.50 EUR". */
export function moneyText(minor: number, currency: string): string {
  return `${amountText(minor, currency)}\u00a0${currency}`;
}

/** The same without the currency, for columns whose head names it. */
export function amountText(minor: number, currency: string): string {
  const digits = minorDigits(currency);
  return (minor / 10 ** digits).toLocaleString('en', { minimumFractionDigits: digits, maximumFractionDigits: digits });
}
