import type { Day } from './days.ts';

/**
 * How work comes due again, on the farm's days. `days`, `weeks` and `months` are counted from the day that the work
 * starts on; `after_done` from the day that it was last done.
 */
export type RepeatRule =
  | { every: 'days'; interval: number }
  /** `weekdays` as ISO numbers: 1 is Monday. Weeks begin on Monday. */
  | { every: 'weeks'; interval: number; weekdays: number[] }
  /** A day that a month lacks falls on its last one. */
  | { every: 'months'; interval: number; monthDay: number }
  /** Such as the first Monday (1) or the last Friday (-1) of a month. */
  | { every: 'months_on'; interval: number; week: number; weekday: number }
  | { every: 'dates'; dates: Day[] }
  | { every: 'after_done'; days: number };
