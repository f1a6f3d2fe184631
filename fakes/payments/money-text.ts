/** An amount in minor units as a person reads it, such as `$1,234.50`. */
export function moneyText(minorUnits: number, currency: string): string {
  const format = new Intl.NumberFormat('en-US', { style: 'currency', currency });
  const digits = format.resolvedOptions().maximumFractionDigits ?? 2;
  return format.format(minorUnits / 10 ** digits);
}
