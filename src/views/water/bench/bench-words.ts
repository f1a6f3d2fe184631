import { MEQ_PER_DKH } from '@shared/domain/units.ts';
import { decimalsForError, formatNumber, formatWithError } from '@/formatting/format-number.ts';
import type { useUnitChoicesStore } from '@/stores/unit-choices.ts';

/** A value with half of its 95 % interval; both end where the error still has two figures. */
export function withError(value: number, error: number): string {
  if (error < 10) {
    const shown = formatWithError(value, error);
    return `${shown.value} ± ${shown.error}`;
  }
  const place = 10 ** (Math.floor(Math.log10(error)) - 1);
  const round = (number: number) => formatNumber(Math.round(number / place) * place);
  return `${round(value)} ± ${round(error)}`;
}

/** A number with at most so many figures, and no zeros after the last that counts. */
export function plainFigures(value: number, figures: number): string {
  const rounded = Number(value.toPrecision(figures));
  return formatNumber(rounded, { decimals: String(rounded).split('.')[1]?.length ?? 0 });
}

/** Decimals that tell a fiftieth of a dKH apart, in the person's unit of alkalinity. */
export function fineDecimals(units: ReturnType<typeof useUnitChoicesStore>): number {
  return decimalsForError(units.toShown('alkalinity', MEQ_PER_DKH / 50));
}
