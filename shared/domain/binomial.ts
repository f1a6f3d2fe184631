import { DomainError } from '../errors.ts';
import { betaI, bisect, normalQuantile } from './special-functions.ts';

export interface Interval {
  low: number;
  high: number;
}

/**
 * Wilson's interval of a share.
 *
 * @param count how many of `of`, whole numbers
 * @param confidence between 0 and 1
 * @throws {DomainError} `domain.out_of_range`
 * @see Wilson 1927, Journal of the American Statistical Association 22:209–212
 */
export function wilsonInterval(count: number, of: number, confidence = 0.95): Interval {
  check(count, of);
  const z = normalQuantile((1 + confidence) / 2);
  const share = count / of;
  const middle = share + (z * z) / (2 * of);
  const reach = z * Math.sqrt((share * (1 - share)) / of + (z * z) / (4 * of * of));
  const whole = 1 + (z * z) / of;
  return {
    low: count === 0 ? 0 : (middle - reach) / whole,
    high: count === of ? 1 : (middle + reach) / whole,
  };
}

/**
 * Clopper's and Pearson's exact interval of a share, never too narrow.
 *
 * @throws {DomainError} `domain.out_of_range`
 * @see Clopper & Pearson 1934, Biometrika 26:404–413
 */
export function exactInterval(count: number, of: number, confidence = 0.95): Interval {
  check(count, of);
  const tail = (1 - confidence) / 2;
  return {
    low: count === 0 ? 0 : bisect((p) => betaI(p, count, of - count + 1) - tail, 0, 1),
    high: count === of ? 1 : bisect((p) => betaI(p, count + 1, of - count) - (1 - tail), 0, 1),
  };
}

function check(count: number, of: number): void {
  if (Number.isInteger(count) && Number.isInteger(of) && of > 0 && count >= 0 && count <= of) return;
  throw new DomainError('domain.out_of_range', 'A share is so many of at least one.', { details: { count, of } });
}
