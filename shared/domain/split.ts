import { DomainError } from '../errors.ts';

/**
 * Shares a whole total by weights so that the parts add up exactly (largest-remainder method): every part gets the floor
 * of its quota, and what is left goes one each to the largest fractions, ties to the lower index. A negative total is
 * shared as its size with the sign put back.
 *
 * @param total a whole number within ±2^53
 * @param weights zero or more each, at least one above zero; taken as the decimals they print as
 * @returns one whole number for each weight; a weight of zero gets nothing
 * @throws {DomainError} `domain.out_of_range`
 */
export function splitByWeights(total: number, weights: readonly number[]): number[] {
  if (!Number.isSafeInteger(total)) {
    throw new DomainError('domain.out_of_range', 'Only a whole amount can be shared.', { details: { total } });
  }
  const exactWeights = wholeWeights(weights);
  const sum = exactWeights.reduce((all, weight) => all + weight, 0n);
  if (sum === 0n) {
    throw new DomainError('domain.out_of_range', 'Nothing to share by: every weight is zero.');
  }
  const size = BigInt(Math.abs(total));
  const quotas = exactWeights.map((weight) => (size * weight) / sum);
  const fractions = exactWeights.map((weight) => (size * weight) % sum);
  const leftover = Number(size - quotas.reduce((all, quota) => all + quota, 0n));
  const lucky = new Set(indexesByLargest(fractions).slice(0, leftover));
  return quotas.map((quota, index) => {
    const part = Number(quota) + (lucky.has(index) ? 1 : 0);
    return total < 0 && part !== 0 ? -part : part;
  });
}

/** The weights as whole numbers in the same proportions, without rounding: 0.1 and 0.25 become 10 and 25. */
function wholeWeights(weights: readonly number[]): bigint[] {
  const decimals = weights.map(decimalOf);
  const lowest = decimals.reduce((least, { exponent }) => Math.min(least, exponent), 0);
  return decimals.map(({ digits, exponent }) => digits * 10n ** BigInt(exponent - lowest));
}

function decimalOf(weight: number): { digits: bigint; exponent: number } {
  if (!(Number.isFinite(weight) && weight >= 0)) {
    throw new DomainError('domain.out_of_range', 'Weights to share by are zero or more.', { details: { weight } });
  }
  const [mantissa = '0', exponent = '0'] = weight.toExponential().split('e');
  const [whole = '0', fraction = ''] = mantissa.split('.');
  return { digits: BigInt(whole + fraction), exponent: weight === 0 ? 0 : Number(exponent) - fraction.length };
}

function indexesByLargest(fractions: readonly bigint[]): number[] {
  return fractions
    .map((fraction, index) => ({ fraction, index }))
    .sort((a, b) => (a.fraction === b.fraction ? a.index - b.index : a.fraction > b.fraction ? -1 : 1))
    .map(({ index }) => index);
}
