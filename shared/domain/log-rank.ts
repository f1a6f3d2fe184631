import { gammaQ } from './special-functions.ts';
import type { FollowedPlug } from './survival.ts';

/** How likely groups as different as these are if all had the same losses. */
export interface LogRank {
  chiSquare: number;
  degreesOfFreedom: number;
  p: number;
  observed: number[];
  expected: number[];
}

/**
 * Whether groups of plugs were lost at different rates over their lives: losses of each day are expected by the share of
 * plugs at risk.
 *
 * @returns null with fewer than two groups that were at risk together, or without losses
 * @see Mantel 1966, Cancer Chemotherapy Reports 50:163–170
 */
export function logRank(groups: readonly (readonly FollowedPlug[])[]): LogRank | null {
  const size = groups.length;
  const observed = new Array<number>(size).fill(0);
  const expected = new Array<number>(size).fill(0);
  const covariance = Array.from({ length: size }, () => new Array<number>(size).fill(0));
  for (const { atRisk, lost } of lossDays(groups)) {
    const [all, losses] = [total(atRisk), total(lost)];
    const scale = all > 1 ? (losses * (all - losses)) / (all - 1) : 0;
    const shares = atRisk.map((count) => count / all);
    shares.forEach((share, i) => {
      observed[i] = (observed[i] ?? 0) + (lost[i] ?? 0);
      expected[i] = (expected[i] ?? 0) + share * losses;
      shares.forEach((other, j) => {
        const row = covariance[i];
        if (row) row[j] = (row[j] ?? 0) + scale * ((i === j ? share : 0) - share * other);
      });
    });
  }
  const kept = observed.map((_, index) => index).filter((index) => (covariance[index]?.[index] ?? 0) > 0);
  if (kept.length < 2) return null;
  const chiSquare = quadraticForm(
    covariance,
    observed.map((count, i) => count - (expected[i] ?? 0)),
    kept.slice(1),
  );
  const degreesOfFreedom = kept.length - 1;
  return { chiSquare, degreesOfFreedom, p: gammaQ(degreesOfFreedom / 2, chiSquare / 2), observed, expected };
}

/** Each day with a loss: of every group, how many were followed when it began, and how many it lost. */
function lossDays(groups: readonly (readonly FollowedPlug[])[]): { atRisk: number[]; lost: number[] }[] {
  const leaving = new Map<number, { left: number[]; lost: number[] }>();
  groups.forEach((plugs, group) => {
    for (const { day, lost, count = 1 } of plugs) {
      const today = leaving.get(day) ?? { left: groups.map(() => 0), lost: groups.map(() => 0) };
      leaving.set(day, today);
      today.left[group] = (today.left[group] ?? 0) + count;
      if (lost) today.lost[group] = (today.lost[group] ?? 0) + count;
    }
  });
  let atRisk = groups.map((plugs) => total(plugs.map(({ count = 1 }) => count)));
  return [...leaving]
    .sort(([a], [b]) => a - b)
    .map(([, { left, lost }]) => {
      const day = { atRisk, lost };
      atRisk = atRisk.map((count, index) => count - (left[index] ?? 0));
      return day;
    })
    .filter(({ lost }) => total(lost) > 0);
}

/** d' V⁻¹ d over the chosen groups, by elimination; one group is left out since all differences add up to zero. */
function quadraticForm(matrix: readonly (readonly number[])[], vector: readonly number[], chosen: readonly number[]) {
  const rows = chosen.map((i) => [...chosen.map((j) => matrix[i]?.[j] ?? 0), vector[i] ?? 0]);
  let sum = 0;
  rows.forEach((pivot, k) => {
    const head = pivot[k] ?? 0;
    const value = pivot.at(-1) ?? 0;
    if (!(head > 1e-12)) return;
    sum += value ** 2 / head;
    for (const row of rows.slice(k + 1)) {
      const factor = (row[k] ?? 0) / head;
      pivot.forEach((each, column) => (row[column] = (row[column] ?? 0) - factor * each));
    }
  });
  return sum;
}

function total(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0);
}
