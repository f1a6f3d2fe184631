import { DomainError } from '../../errors.ts';
import { carry, sum, type Belief, type Symmetric, type Transition } from './belief.ts';

const LN_TWO_PI = Math.log(2 * Math.PI);

/** Below this part of itself a diffuse variance counts as used up; only rounding is left of it. */
const USED_UP = 1e-12;

/** What a step of time does to a belief. */
export function predict(belief: Belief, { keep, reach, input, noise }: Transition): Belief {
  return {
    level: keep * belief.level + reach * belief.rate + input,
    rate: belief.rate,
    cov: sum(carry(belief.cov, keep, reach), noise),
    diffuse: belief.diffuse && carry(belief.diffuse, keep, reach),
  };
}

export interface Observation {
  belief: Belief;
  /** Measured − expected level. */
  innovation: number;
  /** Its variance; null while the level was wholly unknown. */
  variance: number | null;
  /** What this value adds to the log-likelihood. */
  logLikelihood: number;
}

/**
 * What a measured level teaches: the Kalman update in Joseph's form, which keeps covariances positive, with the exact
 * diffuse start of Durbin & Koopman while a part of the state is wholly unknown.
 *
 * @param variance of the measurement, zero or more
 * @throws {DomainError} `domain.out_of_range` where neither the belief nor the measurement has any spread
 * @see Durbin & Koopman 2012, Time Series Analysis by State Space Methods, 2nd ed., ch. 4.3 and 5.2; Bucy & Joseph 1968
 */
export function observe(belief: Belief, value: number, variance: number): Observation {
  const innovation = value - belief.level;
  const unknown = belief.diffuse?.ll ?? 0;
  if (belief.diffuse && unknown > 0) {
    const gain = { level: 1, rate: belief.diffuse.lr / unknown };
    const diffuse = leftUnknown(belief.diffuse, gain.rate);
    const logLikelihood = -0.5 * (LN_TWO_PI + Math.log(unknown));
    return {
      belief: { ...updated(belief, gain, innovation, variance), diffuse },
      innovation,
      variance: null,
      logLikelihood,
    };
  }
  const spread = belief.cov.ll + variance;
  if (!(spread > 0)) {
    throw new DomainError('domain.out_of_range', 'A measurement needs an error above zero.', { details: { variance } });
  }
  const gain = { level: belief.cov.ll / spread, rate: belief.cov.lr / spread };
  const logLikelihood = -0.5 * (LN_TWO_PI + Math.log(spread) + innovation ** 2 / spread);
  return { belief: updated(belief, gain, innovation, variance), innovation, variance: spread, logLikelihood };
}

/** (I − K H) P (I − K H)ᵀ + K R Kᵀ with H = [1, 0]. */
function updated(belief: Belief, gain: { level: number; rate: number }, innovation: number, variance: number): Belief {
  const { ll, lr, rr } = belief.cov;
  const rest = 1 - gain.level;
  const across = lr - gain.rate * ll;
  return {
    level: belief.level + gain.level * innovation,
    rate: belief.rate + gain.rate * innovation,
    cov: {
      ll: rest * rest * ll + gain.level * gain.level * variance,
      lr: rest * across + gain.level * gain.rate * variance,
      rr: rr - gain.rate * (lr + across) + gain.rate * gain.rate * variance,
    },
    diffuse: belief.diffuse,
  };
}

/** A measured level leaves at most the rate unknown. */
function leftUnknown({ lr, rr }: Symmetric, gain: number): Symmetric | null {
  const left = rr - gain * lr;
  return left > USED_UP * rr ? { ll: 0, lr: 0, rr: left } : null;
}
