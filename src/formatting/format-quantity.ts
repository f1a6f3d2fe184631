import { type Quantity, fromCanonical, unitOf } from '@shared/domain/units.ts';
import { EM_DASH, THIN_SPACE, decimalsForError, formatNumber } from '@/formatting/format-number.ts';

export interface QuantityOptions {
  /** Standard error or half width, in the canonical unit too. */
  error?: number | null | undefined;
  /** Decimals in the shown unit; from the error, else from the unit, when left out. */
  decimals?: number | undefined;
  /** The value is a change or a rate, not a level: offsets such as that of °F don't count. */
  difference?: boolean | undefined;
  signed?: boolean | undefined;
}

export interface QuantityParts {
  value: string;
  error: string | null;
  unit: string;
}

/** Where a unit is a curve, a difference is told as it is at the level that seawater has. */
const USUAL_LEVEL: Partial<Record<Quantity, number>> = { salinity: 35 };

/** A stored value in the unit a person chose, in parts. */
export function quantityParts(
  quantity: Quantity,
  unitName: string,
  canonical: number,
  options: QuantityOptions = {},
): QuantityParts {
  const unit = unitOf(quantity, unitName);
  const shown = options.difference
    ? differenceIn(quantity, unitName, canonical)
    : fromCanonical(quantity, canonical, unitName);
  const error = options.error ? Math.abs(errorIn(quantity, unitName, canonical, options)) : null;
  const decimals = options.decimals ?? (error ? decimalsForError(error) : unit.decimals);
  return {
    value: formatNumber(shown, { decimals, signed: options.signed ?? false }),
    error: error ? formatNumber(error, { decimals }) : null,
    unit: unit.label,
  };
}

/** The same in one text, for sentences and charts: "1.23 ± 0.09 dKH". */
export function formatQuantity(
  quantity: Quantity,
  unitName: string,
  canonical: number | null | undefined,
  options: QuantityOptions = {},
): string {
  if (canonical === null || canonical === undefined) return EM_DASH;
  const parts = quantityParts(quantity, unitName, canonical, options);
  const value = parts.error === null ? parts.value : `${parts.value} ± ${parts.error}`;
  return parts.unit === '' ? value : `${value}${THIN_SPACE}${parts.unit}`;
}

function differenceIn(quantity: Quantity, unitName: string, canonical: number): number {
  const from = USUAL_LEVEL[quantity] ?? 0;
  return fromCanonical(quantity, from + canonical, unitName) - fromCanonical(quantity, from, unitName);
}

/** Units that aren't multiples stretch an error by their slope at the value. */
function errorIn(quantity: Quantity, unitName: string, canonical: number, options: QuantityOptions): number {
  const error = options.error ?? 0;
  if (options.difference) return differenceIn(quantity, unitName, error);
  return fromCanonical(quantity, canonical + error, unitName) - fromCanonical(quantity, canonical, unitName);
}
