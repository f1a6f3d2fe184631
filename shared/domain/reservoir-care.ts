import { MS_PER_DAY } from './days.ts';
import type { ReservoirEventKind } from './reservoir-state.ts';

/** Sludge is taken out every 4 to 8 weeks (common practice, no source). */
export const SLUDGE_WEEKS = { least: 1, usual: 6, most: 26 } as const;

/** Limewater that a check finds below this part of what was mixed is low: air has got to it (common practice, no source). */
const LOW_STRENGTH = 0.85;

/** What the care of a reservoir is told from. Instants are epoch ms. */
export interface CareEvent {
  kind: ReservoirEventKind;
  at: number;
  /** What a strength check found, as a part of what was expected. */
  strengthLeft: number | null;
}

export interface ReservoirCare {
  /** Since when it is online; null where it isn't. */
  onlineSince: number | null;
  /** When it should be replaced, by the farm's habit; null where there is no habit or it is not online. */
  replaceAt: number | null;
  /** The last check of what stands in it now; null where nobody checked since it was mixed. */
  lastCheck: { at: number; strengthLeft: number } | null;
  strengthLow: boolean;
}

/**
 * How a reservoir fares, from its events in order of time.
 *
 * @param replaceDays days online before the farm replaces it; null where it runs until it is low
 */
export function careOf(events: readonly CareEvent[], replaceDays: number | null): ReservoirCare {
  const change = events.findLast(({ kind }) => CHANGES_STATE.has(kind));
  const onlineSince = change?.kind === 'online' ? change.at : null;
  const lastCheck = checkOfThisMix(events);
  return {
    onlineSince,
    replaceAt: onlineSince === null || replaceDays === null ? null : onlineSince + replaceDays * MS_PER_DAY,
    lastCheck,
    strengthLow: lastCheck !== null && lastCheck.strengthLeft < LOW_STRENGTH,
  };
}

/**
 * When the sludge should be taken out.
 *
 * @param since the last removal, or the first mix; null before it
 */
export function sludgeDueAt(since: number | null, weeks: number): number | null {
  return since === null ? null : since + weeks * 7 * MS_PER_DAY;
}

const CHANGES_STATE: ReadonlySet<ReservoirEventKind> = new Set(['online', 'offline', 'refill', 'spent', 'cleaned']);

function checkOfThisMix(events: readonly CareEvent[]): ReservoirCare['lastCheck'] {
  const mixed = events.findLastIndex(({ kind }) => kind === 'refill' || kind === 'cleaned');
  const check = events.slice(mixed + 1).findLast(({ kind }) => kind === 'strength');
  return check && check.strengthLeft !== null ? { at: check.at, strengthLeft: check.strengthLeft } : null;
}
