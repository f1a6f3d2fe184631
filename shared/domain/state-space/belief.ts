/** A symmetric 2 × 2 matrix. */
export interface Symmetric {
  ll: number;
  lr: number;
  rr: number;
}

/** What is known of a level and its rate: mean and covariance, and which part of them is not known at all. */
export interface Belief {
  level: number;
  rate: number;
  cov: Symmetric;
  /** Covariance of what is wholly unknown (to be multiplied by infinity); null once data have told everything. */
  diffuse: Symmetric | null;
}

/**
 * A linear step of time: level ← keep × level + reach × rate + input, rate ← rate, with `noise` added.
 */
export interface Transition {
  keep: number;
  /** How far the rate moves the level, such as −days for a demand. */
  reach: number;
  input: number;
  noise: Symmetric;
}

export const NOTHING: Symmetric = { ll: 0, lr: 0, rr: 0 };

/** F M Fᵀ with F = [[keep, reach], [0, 1]]. */
export function carry({ ll, lr, rr }: Symmetric, keep: number, reach: number): Symmetric {
  const across = keep * lr + reach * rr;
  return { ll: keep * (keep * ll + reach * lr) + reach * across, lr: across, rr };
}

export function sum(a: Symmetric, b: Symmetric): Symmetric {
  return { ll: a.ll + b.ll, lr: a.lr + b.lr, rr: a.rr + b.rr };
}
