import { type DosedInterval, expandRate } from '../../shared/domain/dosing-rates.ts';
import { type DatedFactor, factorAt } from '../../shared/domain/pump-calibration.ts';
import type { dosingRates } from '../db/schema/index.ts';

export type RateRow = typeof dosingRates.$inferSelect;

/** What a running dose gave between two instants as it came: each stretch by the factor of its pump in its middle. */
export function dosedBetween(
  rate: RateRow,
  factors: ReadonlyMap<string, DatedFactor[]>,
  { from, to, timeZone }: { from: number; to: number; timeZone: string },
): DosedInterval[] {
  const checks = rate.pumpId === null ? [] : (factors.get(rate.pumpId) ?? []);
  return expandRate(
    { from: rate.fromAt, to: rate.toAt, amountPerDay: rate.amountPerDay, window: windowOf(rate) },
    ...([from, to, timeZone] as const),
  ).map((stretch) => ({
    ...stretch,
    amount: stretch.amount * factorAt(checks, (stretch.from + stretch.to) / 2),
  }));
}

export function windowOf({
  startMinute,
  endMinute,
}: Pick<RateRow, 'startMinute' | 'endMinute'>): { startMinute: number; endMinute: number } | null {
  return startMinute === null || endMinute === null ? null : { startMinute, endMinute };
}
