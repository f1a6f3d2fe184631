import { describe, expect, it } from 'vitest';
import type { Belief, Symmetric, Transition } from '../../../../shared/domain/state-space/belief.ts';
import { NOTHING } from '../../../../shared/domain/state-space/belief.ts';
import { observe, predict } from '../../../../shared/domain/state-space/kalman.ts';
import { smooth, type FilteredStep } from '../../../../shared/domain/state-space/smoother.ts';
import reference from '../../../reference/state-space.json' with { type: 'json' };

type Case = (typeof reference.cases)[number];

/** The three models of the file: level alone, level and slope by steps, and level and slope over continuous time. */
function transitionOf({ model, params }: Pick<Case, 'model' | 'params'>, days: number, jump: number): Transition {
  const qLevel = params.q_level;
  const qSlope = 'q_slope' in params ? (params.q_slope ?? 0) : 0;
  if (model === 'll') return { keep: 1, reach: 0, input: jump, noise: { ...NOTHING, ll: qLevel * days } };
  if (model === 'llt_discrete') return { keep: 1, reach: 1, input: jump, noise: { ll: qLevel, lr: 0, rr: qSlope } };
  const noise = { ll: qLevel * days + (qSlope * days ** 3) / 3, lr: (qSlope * days ** 2) / 2, rr: qSlope * days };
  return { keep: 1, reach: days, input: jump, noise };
}

function startOf({ initial, model }: Pick<Case, 'initial' | 'model'>): Belief {
  const known = typeof initial === 'string' ? null : initial;
  const number = (rows: readonly (readonly (string | number)[])[] | undefined, row: number, column: number) =>
    Number(rows?.[row]?.[column] ?? 0);
  if (!known) {
    const diffuse = { ll: 1, lr: 0, rr: model === 'll' ? 0 : 1 };
    return { level: 0, rate: 0, cov: NOTHING, diffuse };
  }
  const cov = { ll: number(known.P1, 0, 0), lr: number(known.P1, 0, 1), rr: number(known.P1, 1, 1) };
  return { level: Number(known.a1[0] ?? 0), rate: Number(known.a1[1] ?? 0), cov, diffuse: null };
}

/** Filtered and smoothed beliefs of a case, and its log-likelihood. */
function run(each: Pick<Case, 'model' | 'params' | 'H' | 'initial' | 'inputs' | 'rows'>) {
  const predicted: Belief[] = [];
  const steps: FilteredStep[] = [];
  let logLikelihood = 0;
  let belief = startOf(each);
  each.rows.forEach((row, index) => {
    const after = each.rows[index + 1];
    const jump = each.inputs.find((input) => input.index === index + 1)?.level_jump ?? 0;
    const next = transitionOf(each, after ? after.t - row.t : 1, Number(jump));
    predicted.push(belief);
    if (row.y !== null) {
      const variance = Array.isArray(each.H) ? (each.H[index] ?? Number.NaN) : each.H;
      const seen = observe(belief, row.y, variance);
      belief = seen.belief;
      logLikelihood += seen.logLikelihood;
    }
    steps.push({ filtered: belief, next });
    belief = predict(belief, next);
  });
  return { predicted, steps, smoothed: smooth(steps), logLikelihood, ahead: belief };
}

/** Agreement to 1e-8 of the value, as the file asks. */
function expectNear(found: number, published: number): void {
  expect(Math.abs(found - published)).toBeLessThanOrEqual(1e-8 * Math.max(1e-3, Math.abs(published)));
}

// The file writes numbers of level alone and matrices of level and slope, and null while the start is not known yet.
function expectState(belief: Belief | undefined, mean: unknown, variance: unknown): void {
  if (mean === null || mean === undefined || !belief) return;
  const means = [mean].flat().map(Number);
  const variances = [variance].flat(2).map(Number);
  const { ll, lr, rr }: Symmetric = belief.cov;
  [belief.level, belief.rate].slice(0, means.length).forEach((found, at) => expectNear(found, means[at] ?? Number.NaN));
  const found = means.length === 1 ? [ll] : [ll, lr, lr, rr];
  found.forEach((value, at) => expectNear(value, variances[at] ?? Number.NaN));
}

describe.each(reference.cases.map((each) => [each.id, each] as const))('the case %s', (_, each) => {
  const { predicted, steps, smoothed, logLikelihood } = run(each);

  it('agrees with the published filter', () => {
    expect(each.rows.length).toBeGreaterThan(10);
    each.rows.forEach((row, index) => {
      expectState(predicted[index], row.a_pred, row.P_pred);
      expectState(steps[index]?.filtered, row.a_filt, row.P_filt);
    });
  });

  it('agrees with the published smoother', () => {
    each.rows.forEach((row, index) => expectState(smoothed[index], row.a_smooth, row.P_smooth));
  });

  it('has the published log-likelihood', () => {
    expect(Math.abs(logLikelihood - each.loglik)).toBeLessThan(1e-8);
  });
});

it.each(reference.cases.filter(({ forecast }) => forecast.length > 0).map((each) => [each.id, each] as const))(
  'the case %s forecasts the state as published',
  (_, each) => {
    const [first] = each.forecast;

    expect(first?.step).toBe(1);
    expectState(run(each).ahead, first?.state_mean, first?.state_var);
  },
);

it('the variances of most likelihood for the Nile are where the reference has them', () => {
  const nile = reference.cases.find(({ id }) => id === 'nile_local_level_exact_diffuse');
  const best = reference.mle_local_level.cases.nile;
  const at = (sigma2: number, q: number) =>
    nile ? run({ ...nile, H: sigma2, params: { q_level: q * sigma2 } }).logLikelihood : Number.NaN;

  expect(Math.abs(at(best.sigma2_eps, best.q) - best.loglik)).toBeLessThan(1e-6);
  for (const off of [0.97, 1.03]) {
    expect(at(best.sigma2_eps * off, best.q)).toBeLessThan(best.loglik);
    expect(at(best.sigma2_eps, best.q * off)).toBeLessThan(best.loglik);
  }
});
