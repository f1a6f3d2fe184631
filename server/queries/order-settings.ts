import type { FarmRow } from './farm.ts';

const USUAL_HOLD_MINUTES = 40;
/** The payment service keeps a checkout open for half an hour at least. */
export const SHORTEST_CHECKOUT_MS = 31 * 60_000;

/** How long an unpaid order keeps its pieces, minutes. */
export function holdMinutes({ settings }: Pick<FarmRow, 'settings'>): number {
  const { holdMinutes: chosen } = settings;
  const isUsable = typeof chosen === 'number' && Number.isInteger(chosen) && chosen >= 31 && chosen <= 24 * 60;
  return isUsable ? chosen : USUAL_HOLD_MINUTES;
}
