/** What is known of one level of a system, in its canonical unit. */
export interface LevelFacts {
  level: number;
  band: { low: number; high: number } | null;
  /** Change a day as things stand; null where it is not known. */
  changePerDay: number | null;
}

/** Nothing is known that would take the level out of its band. */
const NEVER = Number.MAX_VALUE;

/**
 * Days until a level leaves its target band at today's change: 0 when it is out already, the greatest number there is where it holds or
 * where band or change is not known.
 */
function daysInBand({ level, band, changePerDay }: LevelFacts): number {
  if (!band) return NEVER;
  if (level < band.low || level > band.high) return 0;
  if (changePerDay === null || changePerDay === 0) return NEVER;
  return (changePerDay < 0 ? level - band.low : band.high - level) / Math.abs(changePerDay);
}

/** How far a level is out of its band, in the unit of the level; 0 or less when it is inside or has no band. */
function distanceOut({ level, band }: LevelFacts): number {
  return band ? Math.max(band.low - level, level - band.high) : 0;
}

/**
 * The order in which levels want looking at, for `sort`: those out of their bands, the furthest first, then those that
 * leave them, the soonest first. A level that nobody has tested comes after all that are known.
 */
export function byUrgency(a: LevelFacts | null, b: LevelFacts | null): number {
  if (!a || !b) return Number(a === null) - Number(b === null);
  return daysInBand(a) - daysInBand(b) || (daysInBand(a) === 0 ? distanceOut(b) - distanceOut(a) : 0);
}
