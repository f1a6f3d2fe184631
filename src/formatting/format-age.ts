import { MS_PER_DAY, MS_PER_HOUR } from '@shared/domain/days.ts';
import { plural } from '@/formatting/plural.ts';

/** How long ago something was, "5 h ago" or "3 days ago": hours for two days, for what is tested daily. */
export function formatAge(instant: number, now: number): string {
  const age = Math.max(0, now - instant);
  if (age < MS_PER_HOUR) return 'within the hour';
  if (age < 2 * MS_PER_DAY) return `${Math.floor(age / MS_PER_HOUR)} h ago`;
  return `${plural(Math.floor(age / MS_PER_DAY), 'day')} ago`;
}
