import { MS_PER_DAY } from '../days.ts';
import { DomainError } from '../../errors.ts';
import { NOTHING, type Belief } from '../state-space/belief.ts';
import type { Bank, Mixed } from './bank.ts';
import type { DemandInputs, DemandNoise, LevelReading } from './inputs.ts';
import { modelsFor, type Model } from './models.ts';
import { nodesOf } from './moves.ts';
import { smoothTrack } from './smooth-track.ts';
import { supplyClock } from './supply-clock.ts';
import { Tracker, type Tracked } from './track.ts';

/** A number with its standard deviation. */
export interface Estimate {
  value: number;
  sd: number;
}

/** What is known at one instant: a test, or one that was asked for. */
export interface DemandPoint {
  at: number;
  reading: LevelReading | null;
  /** From the data up to this instant. */
  level: Estimate;
  demand: Estimate;
  /** From all data, before and after it. */
  smoothedLevel: Estimate;
  smoothedDemand: Estimate;
  /** Level expected just before the reading; null without a reading, and for the first one. */
  expected: Estimate | null;
  /** Measured − expected, in standard deviations of that difference. */
  innovation: number | null;
  /** The reading is too far from what was expected: it is kept, and all but left out. */
  flagged: boolean;
  /** A step happened before it that supply, changes and drift do not explain. */
  stepped: boolean;
}

export interface DemandTrack {
  /** In order of time. Empty without readings. */
  points: DemandPoint[];
  /** The noises as the data have them, means over the models that were tried. */
  noise: DemandNoise & {
    /** Errors of tests beside those that were stated. */
    testScale: number;
    /** What each day without a test adds to the variance of the demand: the mean of drift², at a mass of one. */
    driftVariance: number;
  };
}

export interface TrackOptions {
  /**
   * Further instants to estimate for, such as days of a chart; after the last reading they are forecasts, which widen.
   * Those before the first reading are left out.
   */
  marks?: readonly number[];
  /** How large demand is beside that of alkalinity in meq/L: 20.04 for calcium in mg/L. Sets the usual drift. */
  scale?: number;
}

/** Two-sided 95 % of a normal error. */
export const REACH_95 = 1.959964;

/** Before any two tests tell it, demand is taken to be what was given, this uncertain (meq/L a day, times scale). */
const START_SD = 0.3;
const START_SUPPLY_DAYS = 7;

/**
 * Level and demand of a system through time, from its tests and all that was added between them.
 *
 * The state is the level A and the demand D: dA = (s − D) dt with s the supply, and D wanders as Brownian motion. Steps
 * of any length are exact, a water change of fraction f makes A into (1 − f) A + f A_new, and each test shows A with its
 * own error. Filtered by Kalman's recursion and smoothed by Rauch, Tung & Striebel's. How fast D wanders, how wrong the
 * logged supply and the stated errors of tests are is not known: a grid of models runs side by side, weighted by the
 * likelihood of the data under each, and the estimate is their mixture. So what is told at an instant stands on data up to
 * it alone, and its error holds that of the level, of the supply and of the noises. A test more than 4 standard deviations
 * from what was expected is flagged and all but left out, unless the next one is off to the same side too: then something
 * happened that nobody logged.
 *
 * @param inputs readings in any order, with errors above zero; all levels in one unit
 * @throws {DomainError} `domain.out_of_range` for a reading that is no number or has no error
 * @see Durbin & Koopman 2012, Time Series Analysis by State Space Methods, 2nd ed.; Smith & Key 1975, Limnology and
 * Oceanography 20, 493–495 (demand from the balance of alkalinity)
 */
export function trackDemand(inputs: DemandInputs, { marks = [], scale = 1 }: TrackOptions = {}): DemandTrack {
  inputs.readings.forEach(assertUsable);
  const models = modelsFor(scale);
  const [first, ...rest] = nodesOf(inputs, marks);
  if (!first?.reading) return { points: [], noise: noiseOf([]) };
  const start = startOf(inputs, first.at, scale);
  const tracker = new Tracker(models, start, { ...first, reading: first.reading });
  for (const node of rest) tracker.take(node);
  const { tracked, bank } = tracker;
  const smoothed = smoothTrack(tracked, bank, start);
  return { points: tracked.map((each, index) => pointOf(each, smoothed[index] ?? each.known)), noise: noiseOf(bank) };
}

function assertUsable({ at, value, sd }: LevelReading): void {
  if (Number.isFinite(at) && Number.isFinite(value) && sd > 0 && Number.isFinite(sd)) return;
  throw new DomainError('domain.out_of_range', 'A reading needs a time, a value and an error above zero.', {
    details: { at, value, sd },
  });
}

/** Nothing is known of the level; of the demand, that most systems are given about what they take. */
function startOf({ supply, massAt }: DemandInputs, at: number, scale: number): Belief {
  const before = at - START_SUPPLY_DAYS * MS_PER_DAY;
  const from = supply.reduce((earliest, each) => Math.min(earliest, each.from), at);
  const days = Math.min(START_SUPPLY_DAYS, Math.max(1, (at - from) / MS_PER_DAY));
  const covered = Math.min(days, Math.max(0, (at - from) / MS_PER_DAY)) || days;
  const given = supplyClock(supply)(before, at).amount / covered;
  const mass = massAt?.(at) ?? 1;
  const sd = START_SD * scale + Math.abs(given) / 4;
  return {
    level: 0,
    rate: given / mass,
    cov: { ...NOTHING, rr: (sd / mass) ** 2 },
    diffuse: { ...NOTHING, ll: 1 },
  };
}

function pointOf(each: Tracked, smoothed: Mixed): DemandPoint {
  const { at, reading, mass } = each.node;
  return {
    at,
    reading,
    level: levelOf(each.known),
    demand: demandOf(each.known, mass),
    smoothedLevel: levelOf(smoothed),
    smoothedDemand: demandOf(smoothed, mass),
    expected: each.expected && levelOf(each.expected),
    innovation: each.innovation,
    flagged: each.flagged,
    stepped: each.loosened !== null,
  };
}

function levelOf({ level, levelVariance }: Mixed): Estimate {
  return { value: level, sd: Math.sqrt(Math.max(0, levelVariance)) };
}

function demandOf({ rate, rateVariance }: Mixed, mass: number): Estimate {
  return { value: rate * mass, sd: Math.sqrt(Math.max(0, rateVariance)) * mass };
}

function noiseOf(bank: Bank): DemandTrack['noise'] {
  const mean = (of: (model: Model) => number) => bank.reduce((sum, { model, weight }) => sum + weight * of(model), 0);
  return {
    drift: mean(({ drift }) => drift),
    supplyError: mean(({ supplyError }) => supplyError),
    levelNoise: mean(({ levelNoise }) => levelNoise),
    testScale: mean(({ testScale }) => testScale),
    driftVariance: mean(({ driftVariance }) => driftVariance),
  };
}
