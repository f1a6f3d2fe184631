import { MS_PER_DAY } from '../days.ts';
import { sum, type Belief, type Symmetric } from '../state-space/belief.ts';
import { observe, predict } from '../state-space/kalman.ts';
import type { LevelReading } from './inputs.ts';
import type { Model } from './models.ts';
import { transitionOf, type Node } from './moves.ts';

/**
 * The beliefs of all models at one time, and how likely the data so far make each. Never changed, only replaced, so that
 * an earlier one can be gone back to.
 */
export interface Bank {
  at: number;
  beliefs: readonly Belief[];
  /** Log-likelihood of each model beside its prior, older data counting less. */
  evidence: readonly number[];
  /** Weights that add to one. */
  weights: readonly number[];
}

/** What is known of level and rate together, over all models by their weights. */
export interface Mixed {
  level: number;
  levelVariance: number;
  rate: number;
  rateVariance: number;
}

/** Evidence fades with this time, so that a farm that changes its ways is learnt anew. */
const MEMORY_DAYS = 730;

export function startBank(models: readonly Model[], at: number, belief: Belief): Bank {
  const evidence = models.map(() => 0);
  return { at, beliefs: models.map(() => belief), evidence, weights: weightsOf(models, evidence) };
}

/** The bank at the next node, before what is read there. */
export function advanceBank(bank: Bank, models: readonly Model[], { at, move }: Node): Bank {
  const beliefs = bank.beliefs.slice();
  for (let index = 0; index < models.length; index += 1) {
    const [belief, model] = [beliefs[index], models[index]];
    if (belief && model) beliefs[index] = predict(belief, transitionOf(move, model));
  }
  return { at, beliefs, evidence: bank.evidence, weights: bank.weights };
}

/** What a reading teaches every model, and which of them it speaks for. */
export function observeBank(bank: Bank, models: readonly Model[], reading: LevelReading, since: number): Bank {
  const kept = Math.exp((since - bank.at) / (MEMORY_DAYS * MS_PER_DAY));
  const beliefs = bank.beliefs.slice();
  const evidence = bank.evidence.slice();
  models.forEach(({ testScale }, index) => {
    const belief = beliefs[index];
    if (!belief) return;
    const seen = observe(belief, reading.value, (reading.sd * testScale) ** 2);
    beliefs[index] = seen.belief;
    evidence[index] = (evidence[index] ?? 0) * kept + seen.logLikelihood;
  });
  return { at: bank.at, beliefs, evidence, weights: weightsOf(models, evidence) };
}

/** Lets a reading in that is not trusted: with its own gap for an error, and no say about the models. */
export function glimpse(bank: Bank, value: number, variance: number): Bank {
  return { ...bank, beliefs: bank.beliefs.map((belief) => observe(belief, value, variance).belief) };
}

/** Adds uncertainty to all beliefs, as after a step that nobody logged. */
export function loosenBank(bank: Bank, by: Symmetric): Bank {
  return { ...bank, beliefs: bank.beliefs.map((belief) => ({ ...belief, cov: sum(belief.cov, by) })) };
}

function weightsOf(models: readonly Model[], evidence: readonly number[]): number[] {
  const raw = models.map(({ logPrior }, index) => logPrior + (evidence[index] ?? 0));
  const most = Math.max(...raw);
  let all = 0;
  for (let index = 0; index < raw.length; index += 1) {
    const weight = Math.exp((raw[index] ?? 0) - most);
    raw[index] = weight;
    all += weight;
  }
  return raw.map((weight) => weight / all);
}

/** Mean and variance over the models: of each and between them. */
export function mixed(beliefs: readonly Belief[], weights: readonly number[]): Mixed {
  let [level, rate, levelSquare, rateSquare] = [0, 0, 0, 0];
  // Squares are taken about the first model, so that nothing is lost where the mean is far from zero.
  const { level: aroundLevel, rate: aroundRate } = beliefs[0] ?? { level: 0, rate: 0 };
  for (let index = 0; index < beliefs.length; index += 1) {
    const belief = beliefs[index];
    const weight = weights[index];
    if (!belief || !weight) continue;
    const [offLevel, offRate] = [belief.level - aroundLevel, belief.rate - aroundRate];
    level += weight * offLevel;
    rate += weight * offRate;
    levelSquare += weight * (belief.cov.ll + offLevel * offLevel);
    rateSquare += weight * (belief.cov.rr + offRate * offRate);
  }
  return {
    level: aroundLevel + level,
    levelVariance: levelSquare - level * level,
    rate: aroundRate + rate,
    rateVariance: rateSquare - rate * rate,
  };
}
