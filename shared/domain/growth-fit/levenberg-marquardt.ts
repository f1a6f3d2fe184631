import { leastSquares } from './least-squares.ts';

/** A curve: its value at x for given parameters. */
export type Model = (parameters: readonly number[], x: number) => number;

export interface Point {
  x: number;
  y: number;
}

export interface Fit {
  parameters: number[];
  standardErrors: number[];
  /** Sum of squared residuals, in the square of y's unit. */
  rss: number;
  degreesOfFreedom: number;
}

const MOST_STEPS = 2000;
const FIRST_DAMPING = 1e-3;
const MOST_DAMPING = 1e20;
/** Relative step of the central differences: near the cube root of the double's precision. */
const STEP = 6e-6;
const SETTLED = 1e-12;

/**
 * Parameters of a curve with the least sum of squares, by Levenberg's damped steps with Marquardt's scaling.
 *
 * @param start guesses of the parameters, in the model's units
 * @returns null where there are no more points than parameters, or no minimum is found
 * @see Marquardt 1963, Journal of the Society for Industrial and Applied Mathematics 11:431–441
 * @see Moré 1978, Lecture Notes in Mathematics 630:105–116 (the scaling)
 */
export function fitCurve(model: Model, points: readonly Point[], start: readonly number[]): Fit | null {
  const degreesOfFreedom = points.length - start.length;
  let parameters = [...start];
  let rss = squares(model, points, parameters);
  if (degreesOfFreedom < 1 || !Number.isFinite(rss)) return null;
  let damping = FIRST_DAMPING;
  for (let step = 0; step < MOST_STEPS && damping < MOST_DAMPING; step += 1) {
    const move = dampedMove(model, points, parameters, damping);
    const moved = move && parameters.map((value, index) => value + (move[index] ?? 0));
    const next = moved ? squares(model, points, moved) : Infinity;
    if (!moved || !(next <= rss)) {
      damping *= 4;
      continue;
    }
    const isSettled = moved.every(
      (value, index) => Math.abs(value - (parameters[index] ?? 0)) <= SETTLED * Math.abs(value),
    );
    parameters = moved;
    rss = next;
    damping = Math.max(1e-18, damping / 8);
    if (isSettled) break;
  }
  return withErrors(model, points, parameters, rss, degreesOfFreedom);
}

function withErrors(
  model: Model,
  points: readonly Point[],
  parameters: number[],
  rss: number,
  degreesOfFreedom: number,
): Fit | null {
  const { slopes, scales } = scaledSlopes(model, points, parameters);
  const solved = leastSquares(slopes, residuals(model, points, parameters));
  if (!solved) return null;
  const variance = rss / degreesOfFreedom;
  const standardErrors = solved.inverseNormal.map(
    (row, index) => Math.sqrt(variance * (row[index] ?? 0)) / (scales[index] ?? 1),
  );
  return standardErrors.every(Number.isFinite) ? { parameters, standardErrors, rss, degreesOfFreedom } : null;
}

/** The step that a given damping allows; null where the curve does not answer to a parameter. */
function dampedMove(model: Model, points: readonly Point[], parameters: readonly number[], damping: number) {
  const { slopes, scales } = scaledSlopes(model, points, parameters);
  const held = scales.map((_, row) => scales.map((__, column) => (row === column ? Math.sqrt(damping) : 0)));
  const right = [...residuals(model, points, parameters), ...scales.map(() => 0)];
  const solved = leastSquares([...slopes, ...held], right);
  return solved && solved.solution.map((value, index) => value / (scales[index] ?? 1));
}

/** The curve's slopes by parameter at every point, each column brought to length 1, and the lengths. */
function scaledSlopes(model: Model, points: readonly Point[], parameters: readonly number[]) {
  const slopes = points.map(({ x }) => parameters.map((_, index) => slope(model, parameters, index, x)));
  const scales = parameters.map((_, index) => Math.hypot(...slopes.map((row) => row[index] ?? 0)) || 1);
  return { slopes: slopes.map((row) => row.map((value, index) => value / (scales[index] ?? 1))), scales };
}

function slope(model: Model, parameters: readonly number[], index: number, x: number): number {
  const value = parameters[index] ?? 0;
  const step = STEP * (Math.abs(value) || 1e-3);
  const shifted = (by: number) => model(parameters.with(index, value + by), x);
  return (shifted(step) - shifted(-step)) / (2 * step);
}

function residuals(model: Model, points: readonly Point[], parameters: readonly number[]): number[] {
  return points.map(({ x, y }) => y - model(parameters, x));
}

function squares(model: Model, points: readonly Point[], parameters: readonly number[]): number {
  return residuals(model, points, parameters).reduce((sum, value) => sum + value * value, 0);
}
