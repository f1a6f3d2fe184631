import { DomainError } from '../errors.ts';

const LANCZOS = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
  12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
];
const PRECISION = 1e-16;
const MOST_TERMS = 10_000;
const TINY = 1e-300;

/** Natural logarithm of the gamma function, x above zero. @see Lanczos 1964, SIAM Journal on Numerical Analysis B 1:86–96 */
export function logGamma(x: number): number {
  if (!(x > 0)) throw outOfRange({ x });
  if (x < 0.5) return Math.log(Math.PI / Math.sin(Math.PI * x)) - logGamma(1 - x);
  const shifted = x - 1;
  const series = LANCZOS.reduce((sum, term, index) => sum + (index === 0 ? term : term / (shifted + index)), 0);
  const t = shifted + 7.5;
  return 0.5 * Math.log(2 * Math.PI) + (shifted + 0.5) * Math.log(t) - t + Math.log(series);
}

/**
 * Regularised lower incomplete gamma function P(a, x): also the chance that a Poisson count of mean x is a or more.
 *
 * @param a above zero
 * @param x zero or more
 * @see DLMF 8.11.4 (series), 8.9.2 (continued fraction)
 */
export function gammaP(a: number, x: number): number {
  if (!(a > 0 && x >= 0)) throw outOfRange({ a, x });
  if (x === 0) return 0;
  return x < a + 1 ? gammaSeries(a, x) : 1 - gammaFraction(a, x);
}

/** 1 - P(a, x), without losing the digits of small values. */
export function gammaQ(a: number, x: number): number {
  if (!(a > 0 && x >= 0)) throw outOfRange({ a, x });
  if (x === 0) return 1;
  return x < a + 1 ? 1 - gammaSeries(a, x) : gammaFraction(a, x);
}

/** Chance that a standard normal value is at most z. */
export function normalCdf(z: number): number {
  const beyond = gammaQ(0.5, (z * z) / 2) / 2;
  return z > 0 ? 1 - beyond : beyond;
}

/** The value that a standard normal one stays below with chance p, 0 < p < 1. */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) throw outOfRange({ p });
  return bisect((z) => normalCdf(z) - p, -40, 40);
}

/**
 * Regularised incomplete beta function.
 *
 * @param x 0 to 1
 * @see DLMF 8.17.22 (continued fraction)
 */
export function betaI(x: number, a: number, b: number): number {
  if (!(a > 0 && b > 0 && x >= 0 && x <= 1)) throw outOfRange({ x, a, b });
  if (x === 0 || x === 1) return x;
  if (x > (a + 1) / (a + b + 2)) return 1 - betaI(1 - x, b, a);
  const front = Math.exp(logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log1p(-x)) / a;
  return front * betaFraction(x, a, b);
}

/** Where a rising function crosses zero between two bounds. */
export function bisect(rising: (x: number) => number, low: number, high: number): number {
  let [from, to] = [low, high];
  for (let turn = 0; turn < 200; turn += 1) {
    const middle = (from + to) / 2;
    if (rising(middle) < 0) from = middle;
    else to = middle;
  }
  return (from + to) / 2;
}

function gammaSeries(a: number, x: number): number {
  let term = 1 / a;
  let total = term;
  for (let n = 1; n < MOST_TERMS && Math.abs(term) > PRECISION * Math.abs(total); n += 1) {
    term *= x / (a + n);
    total += term;
  }
  return total * Math.exp(a * Math.log(x) - x - logGamma(a));
}

/** Lentz's method. */
function gammaFraction(a: number, x: number): number {
  let b = x + 1 - a;
  let c = 1 / TINY;
  let d = 1 / b;
  let h = d;
  for (let n = 1; n < MOST_TERMS; n += 1) {
    const an = n * (a - n);
    b += 2;
    d = 1 / notZero(an * d + b);
    c = notZero(b + an / c);
    h *= d * c;
    if (Math.abs(d * c - 1) < PRECISION) break;
  }
  return h * Math.exp(a * Math.log(x) - x - logGamma(a));
}

function betaFraction(x: number, a: number, b: number): number {
  let c = 1;
  let d = 1 / notZero(1 - ((a + b) * x) / (a + 1));
  let h = d;
  const turn = (factor: number) => {
    d = 1 / notZero(1 + factor * d);
    c = notZero(1 + factor / c);
    h *= d * c;
  };
  for (let m = 1; m < MOST_TERMS; m += 1) {
    const before = h;
    turn((m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m)));
    turn((-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1)));
    if (Math.abs(h - before) <= PRECISION * Math.abs(h)) break;
  }
  return h;
}

function notZero(value: number): number {
  return Math.abs(value) < TINY ? TINY : value;
}

function outOfRange(details: Record<string, number>): DomainError {
  return new DomainError('domain.out_of_range', 'This value lies outside what can be worked out.', { details });
}
