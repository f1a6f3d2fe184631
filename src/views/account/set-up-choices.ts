/** Currencies that a farm is likely to want first, then every other one that the browser knows. */
const USUAL_CURRENCIES = ['EUR', 'USD', 'GBP', 'CHF', 'AUD', 'CAD'];

const names = new Intl.DisplayNames('en', { type: 'currency' });

export const CURRENCIES = [...new Set([...USUAL_CURRENCIES, ...Intl.supportedValuesOf('currency')])].map((code) => ({
  value: code,
  title: `${code}, ${names.of(code) ?? code}`,
}));

export const TIME_ZONES = [...new Set([...Intl.supportedValuesOf('timeZone'), 'UTC'])].map((zone) => ({
  value: zone,
  title: zone.replaceAll('_', ' '),
}));

export function deviceTimeZone(): string {
  return Intl.DateTimeFormat().resolvedOptions().timeZone;
}
