const STEPS = 100;

/**
 * Root of a rising function by Newton's method, kept inside a bracket that halves where a step would leave it.
 *
 * @param evaluate the function and its slope
 * @param bracket where the root is known to be: the function is below zero at `low` and above at `high`
 * @param start a first guess inside the bracket
 * @param precision the step that ends the search
 */
export function risingRoot(
  evaluate: (x: number) => { value: number; slope: number },
  bracket: { low: number; high: number },
  start: number,
  precision: number,
): number {
  let { low, high } = bracket;
  let x = start;
  for (let step = 0; step < STEPS; step += 1) {
    const { value, slope } = evaluate(x);
    if (value < 0) low = x;
    else high = x;
    const newton = x - value / slope;
    const next = newton >= low && newton <= high ? newton : (low + high) / 2;
    const moved = Math.abs(next - x);
    x = next;
    if (moved <= precision) break;
  }
  return x;
}
