import { DomainError } from '../../shared/errors.ts';

const CURRENCIES = new Set(Intl.supportedValuesOf('currency'));

/** @throws {DomainError} `input.invalid` at `timeZone` unless it is an IANA zone */
export function assertTimeZone(timeZone: string): void {
  try {
    // Older names of zones are zones too, and no list has all of them.
    new Intl.DateTimeFormat('en', { timeZone });
  } catch {
    throw invalid('timeZone', 'Choose a time zone from the list.');
  }
}

/** @throws {DomainError} `input.invalid` at `currency` unless it is in ISO 4217 */
export function assertCurrency(currency: string): void {
  if (!CURRENCIES.has(currency)) throw invalid('currency', 'Choose a currency from the list.');
}

function invalid(path: string, message: string): DomainError {
  return new DomainError('input.invalid', message, { fields: [{ path, message }] });
}
