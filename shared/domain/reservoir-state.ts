import { blendStrength } from './limewater.ts';

/** What an event left behind in a reservoir. Instants are epoch ms. */
export interface ReservoirStep {
  kind: 'refill' | 'level' | 'online' | 'offline';
  at: number;
  levelL: number;
  alkalinityMeqL: number;
}

export interface ReservoirStanding {
  state: 'standby' | 'settling' | 'online' | 'spent';
  levelL: number;
  /** Strength of what stands in it, meq/L. */
  alkalinityMeqL: number;
  /** When a new mix has settled; null where there is none to wait for. */
  readyAt: number | null;
}

/** Undissolved lime sinks in two hours or more (common practice, no source). */
export const SETTLING_MS = 2 * 3_600_000;

/** Below this part of its volume a reservoir that comes off is spent: the rest is sludge (common practice, no source). */
const SPENT_BELOW = 0.1;

const EMPTY: ReservoirStanding = { state: 'standby', levelL: 0, alkalinityMeqL: 0, readyAt: null };

/**
 * How a reservoir stands after everything that happened to it, in order. An empty history is an empty reservoir.
 *
 * @param before how it stood before these steps; an empty reservoir when left out
 */
export function standingAfter(
  steps: readonly ReservoirStep[],
  volumeL: number,
  before: ReservoirStanding = EMPTY,
): ReservoirStanding {
  let standing: ReservoirStanding = { ...before };
  for (const step of steps) {
    const { levelL, alkalinityMeqL } = step;
    standing = { ...standing, levelL, alkalinityMeqL };
    if (step.kind === 'refill') standing = { ...standing, state: 'settling', readyAt: step.at + SETTLING_MS };
    if (step.kind === 'online') standing = { ...standing, state: 'online', readyAt: null };
    if (step.kind === 'offline') {
      standing = { ...standing, state: levelL < SPENT_BELOW * volumeL ? 'spent' : 'standby', readyAt: null };
    }
  }
  return standing;
}

/** The state as people see it: what has settled stands by. */
export function stateAt(
  standing: Pick<ReservoirStanding, 'state' | 'readyAt'>,
  now: number,
): ReservoirStanding['state'] {
  const settled = standing.state === 'settling' && standing.readyAt !== null && standing.readyAt <= now;
  return settled ? 'standby' : standing.state;
}

/**
 * Strength after new water joined what was left.
 *
 * @param before what stood in the reservoir
 * @param added the new mix
 */
export function strengthAfterRefill(
  before: { levelL: number; alkalinityMeqL: number },
  added: { waterL: number; alkalinityMeqL: number },
): number {
  return blendStrength([
    { litres: before.levelL, alkalinityMeqL: before.alkalinityMeqL },
    { litres: added.waterL, alkalinityMeqL: added.alkalinityMeqL },
  ]);
}

/**
 * Times during which a reservoir fed its system; the last one may still be open.
 */
export function onlineSpans(steps: readonly ReservoirStep[]): { from: number; to: number | null }[] {
  const spans: { from: number; to: number | null }[] = [];
  for (const { kind, at } of steps) {
    const open = spans.at(-1);
    const isOpen = open?.to === null;
    if (kind === 'online' && !isOpen) spans.push({ from: at, to: null });
    if ((kind === 'offline' || kind === 'refill') && open && isOpen) open.to = at;
  }
  return spans;
}
