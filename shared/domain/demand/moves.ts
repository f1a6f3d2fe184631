import { MS_PER_DAY } from '../days.ts';
import { carry, NOTHING, sum, type Symmetric, type Transition } from '../state-space/belief.ts';
import type { DemandInputs, LevelReading, WaterChange } from './inputs.ts';
import type { Model } from './models.ts';
import { supplyClock, type Supplied } from './supply-clock.ts';

/** What happens to the level between two instants, whatever the noises are. */
export interface Move {
  keep: number;
  reach: number;
  input: number;
  /** Variances for a noise of one. */
  perDrift: Symmetric;
  perSupplyError: number;
  perLevelNoise: number;
}

/** An instant of interest: a test, or one that an estimate is wanted for. */
export interface Node {
  at: number;
  reading: LevelReading | null;
  /** From the node before it. */
  move: Move;
  /** Relative coral mass. */
  mass: number;
}

const STILL: Move = { keep: 1, reach: 0, input: 0, perDrift: NOTHING, perSupplyError: 0, perLevelNoise: 0 };

/**
 * The readings in order of time, with further instants between and after them, and what moved the level from each to
 * the next. A water change or a dose at the instant of a test comes after it: people test, then act.
 *
 * @param marks instants that estimates are wanted for; those before the first reading are left out
 */
export function nodesOf(inputs: DemandInputs, marks: readonly number[]): Node[] {
  const readings = [...inputs.readings].sort((a, b) => a.at - b.at);
  const first = readings[0];
  if (!first) return [];
  const points = [
    ...readings.map((reading) => ({ at: reading.at, reading })),
    ...marks.filter((at) => at >= first.at).map((at) => ({ at, reading: null })),
  ].sort((a, b) => a.at - b.at || Number(a.reading === null) - Number(b.reading === null));
  const mover = moverOf(inputs, first.at);
  const mass = inputs.massAt ?? (() => 1);
  return points.map(({ at, reading }) => ({ at, reading, mass: mass(at), move: mover(at) }));
}

/** Moves from one asked instant to the next; they must be asked in order of time. */
function moverOf(inputs: DemandInputs, start: number): (to: number) => Move {
  const supplied = supplyClock(inputs.supply);
  const changes = inputs.waterChanges.filter(({ at }) => at >= start).sort((a, b) => a.at - b.at);
  const mass = inputs.massAt ?? (() => 1);
  let [at, next] = [start, 0];
  return (to) => {
    let move = STILL;
    for (let change = changes[next]; change && change.at < to; change = changes[next]) {
      move = changed(passed(move, at, change.at, supplied(at, change.at), mass), change);
      at = change.at;
      next += 1;
    }
    move = passed(move, at, to, supplied(at, to), mass);
    at = to;
    return move;
  };
}

function passed(move: Move, from: number, to: number, supply: Supplied, mass: (at: number) => number): Move {
  const days = (to - from) / MS_PER_DAY;
  if (days === 0) return move;
  const pull = mass((from + to) / 2) * days;
  return {
    keep: move.keep,
    reach: move.reach - pull,
    input: move.input + supply.amount,
    // Exact for a demand that wanders as Brownian motion within the step.
    perDrift: sum(carry(move.perDrift, 1, -pull), { ll: (pull ** 2 * days) / 3, lr: (-pull * days) / 2, rr: days }),
    perSupplyError: move.perSupplyError + supply.square,
    perLevelNoise: move.perLevelNoise + days,
  };
}

function changed(move: Move, { fraction, value }: WaterChange): Move {
  const left = 1 - fraction;
  return {
    keep: left * move.keep,
    reach: left * move.reach,
    input: left * move.input + fraction * value,
    perDrift: carry(move.perDrift, left, 0),
    perSupplyError: left ** 2 * move.perSupplyError,
    perLevelNoise: left ** 2 * move.perLevelNoise,
  };
}

/** The step of a filter with given noises. */
export function transitionOf(move: Move, { driftVariance, supplyVariance, levelVariance }: Model): Transition {
  const { ll, lr, rr } = move.perDrift;
  const other = supplyVariance * move.perSupplyError + levelVariance * move.perLevelNoise;
  return {
    keep: move.keep,
    reach: move.reach,
    input: move.input,
    noise: { ll: driftVariance * ll + other, lr: driftVariance * lr, rr: driftVariance * rr },
  };
}
