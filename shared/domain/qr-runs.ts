/** Dark modules side by side, in modules from the top left of the code. */
export interface QrRun {
  x: number;
  y: number;
  length: number;
}

/**
 * Joins the dark modules of each row to runs, so that a drawing needs few rectangles and shows no seams between them.
 *
 * @param size side of the code in modules
 * @param isDark whether the module in this row and column, from 0, is dark
 */
export function qrRuns(size: number, isDark: (row: number, column: number) => boolean): QrRun[] {
  const runs: QrRun[] = [];
  for (let y = 0; y < size; y += 1) {
    let start = -1;
    for (let x = 0; x <= size; x += 1) {
      const dark = x < size && isDark(y, x);
      if (dark && start < 0) start = x;
      if (!dark && start >= 0) {
        runs.push({ x: start, y, length: x - start });
        start = -1;
      }
    }
  }
  return runs;
}
