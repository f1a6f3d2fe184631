import { assertAboveZero, assertNotNegative, assertWithin } from './ranges.ts';

/** A correction may take weeks where the limit a day is small; longer is a mistake in the numbers. */
const MOST_DAYS = 365;

export interface CorrectionInput {
  /** Level now and wanted, in one unit: meq/L of alkalinity, or mg/L of calcium or magnesium. */
  from: number;
  to: number;
  /** The most that the level may rise in a day, same unit. */
  maxPerDay: number;
  netVolumeL: number;
  /** What one unit (mL or g) of the supplement brings: meq, or mg. */
  perUnit: number;
}

export interface CorrectionDose {
  /** Whole days of equal doses; 0 where nothing is to be raised. */
  days: number;
  /** In the supplement's unit: in all, and each day. */
  total: number;
  amountPerDay: number;
  risePerDay: number;
  /** Level after each day's dose, if nothing else changes it. */
  levels: number[];
}

/**
 * What raises a level, in equal daily doses under a limit a day. It comes on top of what holds the level: what the
 * corals take in the meantime is not in it, nor the small volume of the doses themselves.
 *
 * @returns zero days where the level is already there: supplements only raise; lowering takes water changes or time
 * @throws {DomainError} `domain.out_of_range`, also where it would take more than a year
 */
export function correctionDose({ from, to, maxPerDay, netVolumeL, perUnit }: CorrectionInput): CorrectionDose {
  assertNotNegative('Level now', from);
  assertNotNegative('Level wanted', to);
  assertAboveZero('Limit a day', maxPerDay);
  assertAboveZero('Net volume (L)', netVolumeL);
  assertAboveZero('Strength of the supplement', perUnit);
  const rise = to - from;
  if (rise <= 0) return { days: 0, total: 0, amountPerDay: 0, risePerDay: 0, levels: [] };
  // Noise of conversion must not cost a day: 1 dKH at 1 dKH a day takes one.
  const days = Math.max(1, Math.ceil(rise / maxPerDay - 1e-9));
  assertWithin('Days that the correction takes', days, 1, MOST_DAYS);
  const total = (rise * netVolumeL) / perUnit;
  return {
    days,
    total,
    amountPerDay: total / days,
    risePerDay: rise / days,
    levels: Array.from({ length: days }, (_, day) => from + (rise * (day + 1)) / days),
  };
}
