import { MS_PER_DAY } from './days.ts';

/**
 * A dated fact about a reservoir: a look at its level, or a change other than by use (a mix, plain water added, sludge
 * taken out, a strength found). Instants are epoch ms; litres are what stood in it.
 */
export type ReservoirEvent =
  | { kind: 'level'; at: number; litres: number }
  | { kind: 'change'; at: number; litresBefore: number; litresAfter: number; alkalinityMeqL: number };

/** Limewater that left the reservoir between two looks at its level. */
export interface UseInterval {
  from: number;
  to: number;
  litres: number;
  /** Alkalinity that went with it, meq. */
  alkalinityMeq: number;
}

/** A level that stood higher than before although no change was logged: a missing mix or a wrong reading. */
export interface UnexplainedRise {
  at: number;
  litres: number;
}

export interface ReservoirUse {
  intervals: UseInterval[];
  rises: UnexplainedRise[];
  /** The last known level, or null before the first event. */
  level: { at: number; litres: number } | null;
  /** Strength of what stands in it now, meq/L. */
  alkalinityMeqL: number;
}

/** A stretch of supply to one system, in meq/L of its volume over the whole stretch. */
export interface SupplyInterval {
  from: number;
  to: number;
  meqL: number;
}

/**
 * What was used from a reservoir, from its level readings and changes in any order. A level that fell between two points
 * was used evenly between them at the strength that stood in it then.
 *
 * @param startAlkalinityMeqL strength before the first refill; 0 where nothing is known, so nothing is made up
 */
export function reservoirUse(events: readonly ReservoirEvent[], startAlkalinityMeqL = 0): ReservoirUse {
  const use: ReservoirUse = { intervals: [], rises: [], level: null, alkalinityMeqL: startAlkalinityMeqL };
  for (const event of [...events].sort((a, b) => a.at - b.at)) {
    notice(use, event.at, event.kind === 'level' ? event.litres : event.litresBefore);
    if (event.kind === 'change') {
      use.level = { at: event.at, litres: event.litresAfter };
      use.alkalinityMeqL = event.alkalinityMeqL;
    }
  }
  return use;
}

/**
 * Mean use over the last days, counting only the time that level readings cover.
 *
 * @returns litres a day, or null where less than half a day is covered
 */
export function litresPerDay(intervals: readonly UseInterval[], now: number, days = 7): number | null {
  const from = now - days * MS_PER_DAY;
  const covered = intervals.reduce((sum, interval) => sum + overlapMs(interval, from, now), 0);
  if (covered < MS_PER_DAY / 2) return null;
  const litres = intervals.reduce((sum, interval) => sum + interval.litres * partWithin(interval, from, now), 0);
  return litres / (covered / MS_PER_DAY);
}

/**
 * When a reservoir runs empty at its present use.
 *
 * @param level litres that may still be drawn, as read at `readAt`
 * @returns epoch ms, or null where nothing is being used
 */
export function emptyAt(level: number, usePerDay: number, readAt: number): number | null {
  if (!(usePerDay > 0)) return null;
  return Math.round(readAt + (Math.max(0, level) / usePerDay) * MS_PER_DAY);
}

/**
 * The supply that a reservoir's use meant for one system.
 *
 * @param share part of the reservoir's flow that this system gets, 0 to 1
 * @param systemVolumeL net water volume, L
 */
export function supplyToSystem(
  intervals: readonly UseInterval[],
  share: number,
  systemVolumeL: number,
): SupplyInterval[] {
  return intervals.map(({ from, to, alkalinityMeq }) => ({ from, to, meqL: (alkalinityMeq * share) / systemVolumeL }));
}

/** Supply that fell between two instants, meq/L, each interval counted by the part of its time inside. */
export function supplyWithin(supply: readonly SupplyInterval[], from: number, to: number): number {
  return supply.reduce((sum, interval) => sum + interval.meqL * partWithin(interval, from, to), 0);
}

/** Mean supply between two instants, meq/L a day; 0 for an empty window. */
export function supplyPerDay(supply: readonly SupplyInterval[], from: number, to: number): number {
  return to > from ? supplyWithin(supply, from, to) / ((to - from) / MS_PER_DAY) : 0;
}

function notice(use: ReservoirUse, at: number, litres: number): void {
  const { level } = use;
  if (level) {
    const used = level.litres - litres;
    if (used < 0) use.rises.push({ at, litres: -used });
    else if (at > level.at) {
      use.intervals.push({ from: level.at, to: at, litres: used, alkalinityMeq: used * use.alkalinityMeqL });
    }
  }
  use.level = { at, litres };
}

function overlapMs(span: { from: number; to: number }, from: number, to: number): number {
  return Math.max(0, Math.min(span.to, to) - Math.max(span.from, from));
}

/** A span without length happened at one instant: wholly inside from `from` (excluded) to `to` (included). */
function partWithin(span: { from: number; to: number }, from: number, to: number): number {
  if (span.to <= span.from) return span.to > from && span.to <= to ? 1 : 0;
  return overlapMs(span, from, to) / (span.to - span.from);
}
