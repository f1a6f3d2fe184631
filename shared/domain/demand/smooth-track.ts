import { NOTHING, sum, type Belief, type Transition } from '../state-space/belief.ts';
import { observe, predict } from '../state-space/kalman.ts';
import { smooth, type FilteredStep } from '../state-space/smoother.ts';
import { mixed, type Bank, type Mixed } from './bank.ts';
import type { Model } from './models.ts';
import { transitionOf } from './moves.ts';
import type { Tracked } from './track.ts';

/** Models with less weight than this change nothing that is shown. */
const COUNTS_FROM = 1e-3;
const END: Transition = { keep: 1, reach: 0, input: 0, noise: NOTHING };

/**
 * What is known at every node from all data, before and after it.
 *
 * @param bank after the last node: how much each model counts
 * @param start what was believed before the first reading
 */
export function smoothTrack(tracked: readonly Tracked[], bank: Bank, start: Belief): Mixed[] {
  const used = bank.filter(({ weight }) => weight > COUNTS_FROM);
  const all = used.reduce((total, { weight }) => total + weight, 0);
  const paths = used.map(({ model, weight }) => ({
    weight: weight / all,
    beliefs: smooth(pathOf(tracked, model, start)),
  }));
  return tracked.map((_, index) =>
    mixed(
      paths.flatMap(({ weight, beliefs }) => {
        const belief = beliefs[index];
        if (!belief) return [];
        const { ll, lr, rr } = belief.cov;
        return [{ level: belief.level, rate: belief.rate, ll, lr, rr, weight }];
      }),
    ),
  );
}

/** The filter of one model over readings that are trusted or doubted as they were in the end. */
function pathOf(tracked: readonly Tracked[], model: Model, start: Belief): FilteredStep[] {
  let belief = start;
  return tracked.map(({ node, flagged, expected }, index) => {
    const { reading } = node;
    if (reading) {
      const variance = flagged ? (reading.value - (expected?.level ?? 0)) ** 2 : reading.sd ** 2 * model.testVariance;
      belief = observe(belief, reading.value, variance).belief;
    }
    const filtered = belief;
    const next = nextStep(tracked[index + 1], model);
    belief = predict(belief, next);
    return { filtered, next };
  });
}

function nextStep(next: Tracked | undefined, model: Model): Transition {
  if (!next) return END;
  const transition = transitionOf(next.node.move, model);
  return next.loosened ? { ...transition, noise: sum(transition.noise, next.loosened) } : transition;
}
