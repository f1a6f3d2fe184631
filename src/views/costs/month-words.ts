/** "March 2026" of '2026-03'. */
export function monthWords(month: string): string {
  const start = Date.parse(`${month}-01T00:00:00Z`);
  return new Intl.DateTimeFormat('en', { month: 'long', year: 'numeric', timeZone: 'UTC' }).format(start);
}

/** "Mar" of '2026-03', for the ticks of a chart. */
export function shortMonth(month: string): string {
  return monthWords(month).slice(0, 3);
}
