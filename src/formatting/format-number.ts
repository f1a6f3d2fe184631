/** Set between a value and its unit. */
export const THIN_SPACE = '\u2009';
export const EM_DASH = '—';
const MINUS = '\u2212';

/** A number with grouped thousands, a real minus sign and a fixed count of decimals. */
export function formatNumber(value: number, options: { decimals?: number; signed?: boolean } = {}): string {
  if (!Number.isFinite(value)) return EM_DASH;
  const { decimals = 0, signed = false } = options;
  const text = new Intl.NumberFormat('en', {
    minimumFractionDigits: decimals,
    maximumFractionDigits: decimals,
    signDisplay: signed ? 'exceptZero' : 'negative',
  }).format(value);
  return text.replace('-', MINUS);
}

/**
 * How many decimals of a value its error allows: the error keeps one figure, or two where it starts with 1
 * (±0.09, ±0.14), and the value ends at the same place.
 */
export function decimalsForError(error: number): number {
  if (!(error > 0) || !Number.isFinite(error)) return 0;
  const exponent = Math.floor(Math.log10(error));
  const lead = Number((error / 10 ** exponent).toFixed(1));
  return clampDecimals(lead < 2 ? 1 - exponent : -exponent);
}

function clampDecimals(decimals: number): number {
  return Math.min(6, Math.max(0, decimals));
}

/** A value and its error as texts that end at the same decimal. */
export function formatWithError(value: number, error: number): { value: string; error: string } {
  const decimals = decimalsForError(error);
  return { value: formatNumber(value, { decimals }), error: formatNumber(error, { decimals }) };
}

/** A number with this many figures that carry meaning, such as 0.014 or 1,230. */
export function formatFigures(value: number, figures = 3): string {
  if (!Number.isFinite(value)) return EM_DASH;
  if (value === 0) return '0';
  const decimals = figures - 1 - Math.floor(Math.log10(Math.abs(value)));
  return formatNumber(value, { decimals: clampDecimals(decimals) });
}
