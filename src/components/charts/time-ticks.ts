import { type Day, addDays, dayOf, daysBetween, startOfDay } from '@shared/domain/days.ts';

const STEPS_IN_DAYS = [1, 2, 7, 14, 28, 56, 91, 182, 364];

export interface TimeTick {
  at: number;
  day: Day;
}

/** Starts of days on the farm's clock, evenly apart and not more than `most` of them. */
export function timeTicks(from: number, to: number, most: number, timeZone: string): TimeTick[] {
  const first = dayOf(from, timeZone);
  const last = dayOf(to, timeZone);
  const length = daysBetween(first, last) + 1;
  const step = STEPS_IN_DAYS.find((days) => length / days <= most) ?? STEPS_IN_DAYS.at(-1) ?? length;
  const ticks: TimeTick[] = [];
  // Counted back from the newest day, the one that people look for.
  for (let day = last; ; day = addDays(day, -step)) {
    const at = startOfDay(day, timeZone);
    if (at < from) return ticks.reverse();
    ticks.push({ at, day });
  }
}
