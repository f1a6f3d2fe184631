import type { Belief, Symmetric } from '../state-space/belief.ts';
import { observe } from '../state-space/kalman.ts';
import type { LevelReading } from './inputs.ts';
import type { Model } from './models.ts';
import type { Move } from './moves.ts';

/** What one model holds for true, and how much it counts. */
export interface Cell {
  readonly model: Model;
  level: number;
  rate: number;
  ll: number;
  lr: number;
  rr: number;
  /** Log-likelihood of the data under it, older data counting less. */
  evidence: number;
  /** All weights add to one. */
  weight: number;
}

/**
 * All models at one time. It is changed in place and takes the recursion of `state-space/kalman.ts` line by line, since
 * nearly all the time of an estimate goes here and new objects would cost most of it; a test holds the two together.
 */
export type Bank = Cell[];

/** What is known of level and rate together, over all models by their weights. */
export interface Mixed {
  level: number;
  levelVariance: number;
  rate: number;
  rateVariance: number;
}

/** All models after a first reading, before which they held the same. */
export function startBank(models: readonly Model[], start: Belief, { value, sd }: LevelReading): Bank {
  const bank = models.map((model): Cell => {
    const { level, rate, cov } = observe(start, value, (sd * model.testScale) ** 2).belief;
    return { model, level, rate, ll: cov.ll, lr: cov.lr, rr: cov.rr, evidence: 0, weight: 0 };
  });
  weigh(bank);
  return bank;
}

export function copyBank(bank: Bank): Bank {
  return bank.map((cell) => ({ ...cell }));
}

/** Lets time pass up to a node. */
export function advanceBank(bank: Bank, move: Move): void {
  const { keep, reach, input, perDrift, perSupplyError, perLevelNoise } = move;
  for (const cell of bank) {
    const { driftVariance, supplyVariance, levelVariance } = cell.model;
    const across = keep * cell.lr + reach * cell.rr;
    cell.level = keep * cell.level + reach * cell.rate + input;
    cell.ll =
      keep * (keep * cell.ll + reach * cell.lr) +
      reach * across +
      driftVariance * perDrift.ll +
      supplyVariance * perSupplyError +
      levelVariance * perLevelNoise;
    cell.lr = across + driftVariance * perDrift.lr;
    cell.rr += driftVariance * perDrift.rr;
  }
}

/**
 * What a reading teaches every model, and which of them it speaks for.
 *
 * @param kept part of the evidence so far that still counts
 */
export function observeBank(bank: Bank, { value, sd }: LevelReading, kept: number): void {
  for (const cell of bank) {
    const variance = sd * sd * cell.model.testVariance;
    const spread = cell.ll + variance;
    const innovation = value - cell.level;
    learn(cell, innovation, variance);
    cell.evidence = cell.evidence * kept - 0.5 * (Math.log(spread) + (innovation * innovation) / spread);
  }
  weigh(bank);
}

/** Lets a reading in that is not trusted: with its own gap for an error, and no say about the models. */
export function glimpse(bank: Bank, value: number, variance: number): void {
  for (const cell of bank) learn(cell, value - cell.level, variance);
}

/** Joseph's form, with H = [1, 0]. */
function learn(cell: Cell, innovation: number, variance: number): void {
  const { ll, lr, rr } = cell;
  const spread = ll + variance;
  const byLevel = ll / spread;
  const byRate = lr / spread;
  const rest = 1 - byLevel;
  const across = lr - byRate * ll;
  cell.level += byLevel * innovation;
  cell.rate += byRate * innovation;
  cell.ll = rest * rest * ll + byLevel * byLevel * variance;
  cell.lr = rest * across + byLevel * byRate * variance;
  cell.rr = rr - byRate * (lr + across) + byRate * byRate * variance;
}

/** Adds uncertainty to all beliefs, as after a step that nobody logged. */
export function loosenBank(bank: Bank, by: Symmetric): void {
  for (const cell of bank) {
    cell.ll += by.ll;
    cell.lr += by.lr;
    cell.rr += by.rr;
  }
}

function weigh(bank: Bank): void {
  let most = -Infinity;
  for (const { model, evidence } of bank) most = Math.max(most, model.logPrior + evidence);
  let all = 0;
  for (const cell of bank) {
    cell.weight = Math.exp(cell.model.logPrior + cell.evidence - most);
    all += cell.weight;
  }
  for (const cell of bank) cell.weight /= all;
}

/** Mean and variance over the models: of each and between them. */
export function mixed(bank: readonly Omit<Cell, 'model' | 'evidence'>[]): Mixed {
  // Squares are taken about the first model, so that nothing is lost where the mean is far from zero.
  const { level: aroundLevel, rate: aroundRate } = bank[0] ?? { level: 0, rate: 0 };
  let [level, rate, levelSquare, rateSquare] = [0, 0, 0, 0];
  for (const cell of bank) {
    const { weight } = cell;
    const offLevel = cell.level - aroundLevel;
    const offRate = cell.rate - aroundRate;
    level += weight * offLevel;
    rate += weight * offRate;
    levelSquare += weight * (cell.ll + offLevel * offLevel);
    rateSquare += weight * (cell.rr + offRate * offRate);
  }
  return {
    level: aroundLevel + level,
    levelVariance: levelSquare - level * level,
    rate: aroundRate + rate,
    rateVariance: rateSquare - rate * rate,
  };
}
