import { plural } from '@/formatting/plural.ts';

/** A span of minutes as people say it: "40 minutes", "12 hours", "2 hours and 30 minutes". */
export function formatMinutes(minutes: number): string {
  const hours = Math.floor(minutes / 60);
  const rest = minutes % 60;
  if (hours === 0 || (hours === 1 && rest > 0)) return plural(minutes, 'minute');
  const whole = plural(hours, 'hour');
  return rest === 0 ? whole : `${whole} and ${plural(rest, 'minute')}`;
}
