import { DomainError } from '../errors.ts';
import type { UseInterval } from './reservoir-use.ts';

/** The part of a reservoir's flow that a system gets, above 0 up to 1. */
export interface Feed {
  systemId: string;
  share: number;
}

/** Feeds that hold from an instant on, until the next set. */
export interface FeedSet {
  since: number;
  feeds: readonly Feed[];
}

/** Shares are typed as whole per cents or so: their sum may be off by as much as that rounds. */
const SUM_SLACK = 0.0051;

/**
 * Shares that make up the whole exactly, from ones that nearly do.
 *
 * @throws {DomainError} `domain.out_of_range` where they don't make up the whole, or name a system twice
 */
export function wholeShares(feeds: readonly Feed[]): Feed[] {
  const sum = feeds.reduce((total, { share }) => total + share, 0);
  const names = new Set(feeds.map(({ systemId }) => systemId));
  if (names.size !== feeds.length || feeds.some(({ share }) => !(share > 0)) || Math.abs(sum - 1) > SUM_SLACK) {
    throw new DomainError('domain.out_of_range', 'The shares of all systems must add up to 100 %.', {
      details: { sum },
    });
  }
  return feeds.map(({ systemId, share }) => ({ systemId, share: share / sum }));
}

/**
 * The feeds that hold at an instant. Before the first set, and without any, all goes to the reservoir's own system.
 *
 * @param sets oldest first
 */
export function feedsAt(sets: readonly FeedSet[], ownSystemId: string, at: number): readonly Feed[] {
  return sets.findLast(({ since }) => since <= at)?.feeds ?? [{ systemId: ownSystemId, share: 1 }];
}

/**
 * One system's part of what a reservoir gave. A stretch in which the shares changed is cut there, by time.
 *
 * @param sets oldest first
 */
export function partOfSystem(
  intervals: readonly UseInterval[],
  sets: readonly FeedSet[],
  { ownSystemId, systemId }: { ownSystemId: string; systemId: string },
): UseInterval[] {
  const shareAt = (at: number) => feedsAt(sets, ownSystemId, at).find((feed) => feed.systemId === systemId)?.share ?? 0;
  return intervals.flatMap((interval) =>
    cutAt(
      interval,
      sets.map(({ since }) => since),
    ).flatMap((piece) => {
      const share = shareAt(piece.from);
      if (share === 0) return [];
      return [{ ...piece, litres: piece.litres * share, alkalinityMeq: piece.alkalinityMeq * share }];
    }),
  );
}

/**
 * Shares by what likely evaporates: by open water surface where all are known, else by water volume.
 */
export function sharesByEvaporation(
  systems: readonly { systemId: string; surfaceM2: number | null; netVolumeL: number }[],
): { by: 'surface' | 'volume'; feeds: Feed[] } {
  const bySurface = systems.every(({ surfaceM2 }) => surfaceM2 !== null);
  const weightOf = (system: (typeof systems)[number]) => (bySurface ? (system.surfaceM2 ?? 0) : system.netVolumeL);
  const sum = systems.reduce((total, system) => total + weightOf(system), 0);
  return {
    by: bySurface ? 'surface' : 'volume',
    feeds: systems.map((system) => ({ systemId: system.systemId, share: weightOf(system) / sum })),
  };
}

function cutAt(interval: UseInterval, instants: readonly number[]): UseInterval[] {
  const inside = instants.filter((at) => at > interval.from && at < interval.to);
  if (inside.length === 0) return [interval];
  const edges = [interval.from, ...inside, interval.to];
  const length = interval.to - interval.from;
  return edges.slice(1).map((to, index) => {
    const from = edges[index] ?? interval.from;
    const part = (to - from) / length;
    return { from, to, litres: interval.litres * part, alkalinityMeq: interval.alkalinityMeq * part };
  });
}
