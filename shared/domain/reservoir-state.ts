import { blendStrength } from './limewater.ts';

/**
 * What can happen to a reservoir: mixed (refill), level read, put online, taken off for another (offline), topped up with
 * plain water, strength checked, sludge taken out, marked spent, emptied and cleaned.
 */
export const RESERVOIR_EVENT_KINDS = [
  ...(['refill', 'level', 'online', 'offline', 'topped_up'] as const),
  ...(['strength', 'sludge_removed', 'spent', 'cleaned'] as const),
] as const;
export type ReservoirEventKind = (typeof RESERVOIR_EVENT_KINDS)[number];

/** What an event left behind in a reservoir. Instants are epoch ms. */
export interface ReservoirStep {
  kind: ReservoirEventKind;
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
  return steps.reduce<ReservoirStanding>(
    (standing, step) => ({
      ...standing,
      ...{ levelL: step.levelL, alkalinityMeqL: step.alkalinityMeqL },
      ...stateAfter(step, volumeL),
    }),
    { ...before },
  );
}

/** The state that an event brings; a level, a top-up, a strength check or less sludge leaves it as it is. */
function stateAfter(
  { kind, at, levelL }: ReservoirStep,
  volumeL: number,
): Partial<Pick<ReservoirStanding, 'state' | 'readyAt'>> {
  switch (kind) {
    case 'refill':
      return { state: 'settling', readyAt: at + SETTLING_MS };
    case 'online':
      return { state: 'online', readyAt: null };
    case 'offline':
      return { state: levelL < SPENT_BELOW * volumeL ? 'spent' : 'standby', readyAt: null };
    case 'spent':
      return { state: 'spent', readyAt: null };
    case 'cleaned':
      return { state: 'standby', readyAt: null };
    default:
      return {};
  }
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
 * Strength after new water joined what was left. Plain water has a strength of zero, so it only dilutes.
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

/** Events after which a reservoir feeds nothing until it is put online again. */
const ENDS_FEEDING: ReadonlySet<ReservoirEventKind> = new Set(['offline', 'refill', 'spent', 'cleaned']);

/**
 * Times during which a reservoir fed its system; the last one may still be open.
 */
export function onlineSpans(
  steps: readonly Pick<ReservoirStep, 'kind' | 'at'>[],
): { from: number; to: number | null }[] {
  const spans: { from: number; to: number | null }[] = [];
  for (const { kind, at } of steps) {
    const open = spans.at(-1);
    const isOpen = open?.to === null;
    if (kind === 'online' && !isOpen) spans.push({ from: at, to: null });
    if (ENDS_FEEDING.has(kind) && open && isOpen) open.to = at;
  }
  return spans;
}
