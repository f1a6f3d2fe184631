import { carry, sum, type Belief, type Symmetric, type Transition } from './belief.ts';

/** A belief from the data up to a time, and the step that led to the next one. */
export interface FilteredStep {
  filtered: Belief;
  /** From this time to the next; not looked at for the last one. */
  next: Transition;
}

/**
 * Beliefs from all data, before and after each time: the fixed-interval smoother of Rauch, Tung & Striebel, in a form that
 * adds covariances only and so keeps them positive. Where data up to a time left a part unknown, its limit is taken.
 *
 * @param steps oldest first; the last one's belief must know level and rate, or nothing is smoothed
 * @see Rauch, Tung & Striebel 1965, AIAA Journal 3, 1445–1450
 */
export function smooth(steps: readonly FilteredStep[]): Belief[] {
  const smoothed: Belief[] = [];
  let later: Belief | undefined;
  for (let index = steps.length - 1; index >= 0; index -= 1) {
    const step = steps[index];
    if (!step) break;
    later = later ? smoothedOnce(step, later) : step.filtered;
    smoothed.push(later);
  }
  return smoothed.reverse();
}

function smoothedOnce({ filtered, next }: FilteredStep, later: Belief): Belief {
  const gain = smootherGain(filtered, next);
  const ahead = next.keep * filtered.level + next.reach * filtered.rate + next.input;
  const [level, rate] = [later.level - ahead, later.rate - filtered.rate];
  // Own part I − C F, with C the gain and F the step.
  const own: Matrix = {
    ll: 1 - gain.ll * next.keep,
    lr: -gain.ll * next.reach - gain.lr,
    rl: -gain.rl * next.keep,
    rr: 1 - gain.rl * next.reach - gain.rr,
  };
  return {
    level: filtered.level + gain.ll * level + gain.lr * rate,
    rate: filtered.rate + gain.rl * level + gain.rr * rate,
    cov: sum(turned(own, filtered.cov), turned(gain, sum(later.cov, next.noise))),
    diffuse: null,
  };
}

interface Matrix {
  ll: number;
  lr: number;
  rl: number;
  rr: number;
}

/** C = P Fᵀ (F P Fᵀ + Q)⁻¹, in the limit where a part of P is infinite. */
function smootherGain({ cov, diffuse }: Belief, { keep, reach, noise }: Transition): Matrix {
  const back = (p: Symmetric, inverse: Symmetric): Matrix => {
    const [ll, lr] = [keep * p.ll + reach * p.lr, p.lr];
    const [rl, rr] = [keep * p.lr + reach * p.rr, p.rr];
    return {
      ll: ll * inverse.ll + lr * inverse.lr,
      lr: ll * inverse.lr + lr * inverse.rr,
      rl: rl * inverse.ll + rr * inverse.lr,
      rr: rl * inverse.lr + rr * inverse.rr,
    };
  };
  const known = sum(carry(cov, keep, reach), noise);
  if (!diffuse) return back(cov, inverseOf(known));
  // (κ M + N)⁻¹ for a large κ is B₀ + B₁/κ, with M of rank one.
  const unknown = carry(diffuse, keep, reach);
  const across = known.ll * unknown.rr + known.rr * unknown.ll - 2 * known.lr * unknown.lr;
  const first = scaled(adjugate(unknown), 1 / across);
  const second = sum(scaled(adjugate(known), 1 / across), scaled(first, -determinant(known) / across));
  const [one, two] = [back(cov, first), back(diffuse, second)];
  return { ll: one.ll + two.ll, lr: one.lr + two.lr, rl: one.rl + two.rl, rr: one.rr + two.rr };
}

/** M S Mᵀ. */
function turned({ ll, lr, rl, rr }: Matrix, s: Symmetric): Symmetric {
  const [a, b] = [ll * s.ll + lr * s.lr, ll * s.lr + lr * s.rr];
  const [c, d] = [rl * s.ll + rr * s.lr, rl * s.lr + rr * s.rr];
  return { ll: a * ll + b * lr, lr: a * rl + b * rr, rr: c * rl + d * rr };
}

/** Where the rate is known exactly only the level is inverted. */
function inverseOf(s: Symmetric): Symmetric {
  if (s.rr === 0) return { ll: s.ll > 0 ? 1 / s.ll : 0, lr: 0, rr: 0 };
  return scaled(adjugate(s), 1 / determinant(s));
}

function determinant({ ll, lr, rr }: Symmetric): number {
  return ll * rr - lr * lr;
}

function adjugate({ ll, lr, rr }: Symmetric): Symmetric {
  return { ll: rr, lr: -lr, rr: ll };
}

function scaled({ ll, lr, rr }: Symmetric, by: number): Symmetric {
  return { ll: ll * by, lr: lr * by, rr: rr * by };
}
