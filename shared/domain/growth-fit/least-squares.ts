/** Solution of an overdetermined system and the inverse of R'R, from which its errors follow. */
export interface LeastSquares {
  solution: number[];
  /** (A'A)⁻¹. */
  inverseNormal: number[][];
}

/**
 * The least-squares solution of A x = b by Householder reflections, which lose far fewer digits than the normal equations.
 *
 * @returns null where the columns of A do not stand apart
 * @see Golub & Van Loan 2013, Matrix Computations, algorithm 5.2.1
 */
export function leastSquares(a: readonly (readonly number[])[], b: readonly number[]): LeastSquares | null {
  const rows = a.map((row, index) => [...row, b[index] ?? 0]);
  const size = a[0]?.length ?? 0;
  if (rows.length < size) return null;
  for (let column = 0; column < size; column += 1) {
    if (!reflect(rows, column, size)) return null;
  }
  const inverse = invertUpper(rows, size);
  const solution = inverse.map((row) => sum(row.map((value, index) => value * at(rows, index, size))));
  const inverseNormal = inverse.map((one) =>
    inverse.map((other) => sum(one.map((value, k) => value * (other[k] ?? 0)))),
  );
  return { solution, inverseNormal };
}

/** Brings a column below the diagonal to zero, in all columns to its right too; false where nothing stands in it. */
function reflect(rows: number[][], column: number, size: number): boolean {
  const below = rows.slice(column);
  const norm = Math.hypot(...below.map((row) => row[column] ?? 0));
  if (!(norm > 0 && Number.isFinite(norm))) return false;
  const first = at(rows, column, column);
  const alpha = first > 0 ? -norm : norm;
  const mirror = below.map((row, index) => (row[column] ?? 0) - (index === 0 ? alpha : 0));
  const length = sum(mirror.map((value) => value * value));
  for (let k = column; k <= size; k += 1) {
    const factor = (2 * sum(mirror.map((value, index) => value * (below[index]?.[k] ?? 0)))) / length;
    below.forEach((row, index) => {
      row[k] = (row[k] ?? 0) - factor * (mirror[index] ?? 0);
    });
  }
  return true;
}

function invertUpper(rows: number[][], size: number): number[][] {
  const inverse = Array.from({ length: size }, () => new Array<number>(size).fill(0));
  for (let column = size - 1; column >= 0; column -= 1) {
    for (let row = column; row >= 0; row -= 1) {
      const unit = row === column ? 1 : 0;
      const known = sum(
        inverse.slice(row + 1).map((each, index) => at(rows, row, row + 1 + index) * (each[column] ?? 0)),
      );
      const target = inverse[row];
      if (target) target[column] = (unit - known) / at(rows, row, row);
    }
  }
  return inverse;
}

function at(rows: readonly (readonly number[])[], row: number, column: number): number {
  return rows[row]?.[column] ?? 0;
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
