import { DomainError } from '../errors.ts';
import { assertAboveZero } from './ranges.ts';

/** Beyond this drift since the last time the tube wants cleaning or replacing (common practice, no source). */
export const CLEAN_BEYOND = 0.1;

/** One check of a dosing pump: it was asked for an amount, and what came was measured, more than once if need be. */
export interface PumpCheck {
  askedMl: number;
  measuredMl: readonly number[];
}

export interface PumpFactor {
  /** What came of each mL asked for. */
  factor: number;
  /** Standard error of it; null for a single measurement. */
  error: number | null;
}

/** A check with the factor as found, and whether the pump was set right by it, so that it gave what was asked from then on. */
export interface DatedFactor {
  at: number;
  found: number;
  adjusted: boolean;
}

/**
 * The factor of a pump from one check.
 *
 * @throws {DomainError} `domain.out_of_range`; `input.invalid` without a measurement
 */
export function pumpFactor({ askedMl, measuredMl }: PumpCheck): PumpFactor {
  assertAboveZero('Amount asked for (mL)', askedMl);
  if (measuredMl.length === 0) throw new DomainError('input.invalid', 'Enter what was measured.');
  for (const measured of measuredMl) assertAboveZero('Amount measured (mL)', measured);
  const count = measuredMl.length;
  const mean = measuredMl.reduce((sum, measured) => sum + measured, 0) / count;
  const squares = measuredMl.reduce((sum, measured) => sum + (measured - mean) ** 2, 0);
  const error = count < 2 ? null : Math.sqrt(squares / (count - 1) / count) / askedMl;
  return { factor: mean / askedMl, error };
}

/** Whether a pump drifted so far since it was left that its tube wants care; `drift` is a part, negative for less. */
export function driftSince(foundNow: number, leftBefore: number): { drift: number; clean: boolean } {
  assertAboveZero('Factor before', leftBefore);
  const drift = foundNow / leftBefore - 1;
  // Noise of the division must not turn exactly 10 % into more.
  return { drift, clean: Math.abs(drift) > CLEAN_BEYOND + 1e-9 };
}

/** The factor that a check leaves behind: 1 where the pump was set by it. */
export function leftBy({ found, adjusted }: DatedFactor): number {
  return adjusted ? 1 : found;
}

/**
 * The factor of a pump at an instant. Between two checks it is taken to have drifted evenly from how the one left it to
 * how the other found it; before the first as that one found it, after the last as it left it; without any it is 1.
 *
 * @param checks oldest first
 */
export function factorAt(checks: readonly DatedFactor[], at: number): number {
  const after = checks.findIndex((check) => check.at > at);
  const next = checks[after];
  const before = after === -1 ? checks.at(-1) : checks[after - 1];
  if (!before) return next?.found ?? 1;
  const left = leftBy(before);
  if (!next) return left;
  return left + ((next.found - left) * (at - before.at)) / (next.at - before.at);
}
