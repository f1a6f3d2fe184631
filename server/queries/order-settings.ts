import { HOLD_MINUTES } from '../../shared/contracts/farm.ts';
import type { FarmRow } from './farm.ts';

const USUAL_HOLD_MINUTES = 40;
/** The payment service keeps a checkout open for half an hour at least. */
export const SHORTEST_CHECKOUT_MS = HOLD_MINUTES.least * 60_000;

/** How long an unpaid order keeps its pieces, minutes. */
export function holdMinutes({ settings }: Pick<FarmRow, 'settings'>): number {
  const { holdMinutes: chosen } = settings;
  const { least, most } = HOLD_MINUTES;
  const isUsable = typeof chosen === 'number' && Number.isInteger(chosen) && chosen >= least && chosen <= most;
  return isUsable ? chosen : USUAL_HOLD_MINUTES;
}
