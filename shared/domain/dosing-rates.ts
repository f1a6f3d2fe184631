import { addDays, dayOf, instantAt, MS_PER_DAY, startOfDay, type Day } from './days.ts';
import { assertNotNegative } from './ranges.ts';

/** A steady dose: an amount a day from an instant until it was changed or stopped, all day or in a window. */
export interface DosingRate {
  from: number;
  /** Null while it runs. */
  to: number | null;
  /** In the supplement's unit, as the pump is set. */
  amountPerDay: number;
  /** Minutes after midnight on the farm's clock; null for all day. A window may go over midnight. */
  window: { startMinute: number; endMinute: number } | null;
}

/** A stretch in which an amount ran in evenly. */
export interface DosedInterval {
  from: number;
  to: number;
  amount: number;
}

/**
 * What a rate gave between two instants, cut at the farm's midnights or at its windows, so that a factor that drifts can
 * be applied to each stretch.
 *
 * @returns oldest first, none of them empty
 * @throws {DomainError} `domain.out_of_range` for a negative rate
 */
export function expandRate(rate: DosingRate, from: number, to: number, timeZone: string): DosedInterval[] {
  assertNotNegative('Amount a day', rate.amountPerDay);
  const start = Math.max(from, rate.from);
  const end = Math.min(to, rate.to ?? to);
  if (end <= start || rate.amountPerDay === 0) return [];
  const stretches: DosedInterval[] = [];
  // A window that goes over midnight may have begun the day before.
  const last = dayOf(end, timeZone);
  for (let day = addDays(dayOf(start, timeZone), -1); day <= last; day = addDays(day, 1)) {
    const whole = stretchOf(rate, day, timeZone);
    const inside = { from: Math.max(start, whole.from), to: Math.min(end, whole.to) };
    if (inside.to <= inside.from) continue;
    const part = (inside.to - inside.from) / (whole.to - whole.from);
    stretches.push({ ...inside, amount: whole.amount * part });
  }
  return stretches;
}

/** What a rate gave in all between two instants. */
export function amountBetween(rate: DosingRate, from: number, to: number, timeZone: string): number {
  return expandRate(rate, from, to, timeZone).reduce((sum, { amount }) => sum + amount, 0);
}

/** The stretch that belongs to a day; all of a window's amount comes in it, however long the clocks make it. */
function stretchOf({ amountPerDay, window }: DosingRate, day: Day, timeZone: string): DosedInterval {
  if (window === null) {
    const from = startOfDay(day, timeZone);
    const to = startOfDay(addDays(day, 1), timeZone);
    // A pump without a timer knows no days: a day of 23 hours gets less.
    return { from, to, amount: (amountPerDay * (to - from)) / MS_PER_DAY };
  }
  const { startMinute, endMinute } = window;
  return {
    from: instantAt(day, startMinute, timeZone),
    to: instantAt(endMinute > startMinute ? day : addDays(day, 1), endMinute, timeZone),
    amount: amountPerDay,
  };
}
