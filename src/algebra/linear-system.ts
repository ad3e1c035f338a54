/**
 * Square linear systems over a ring of polynomials, solved without fractions: every division of the elimination is exact.
 * Invariant: matrix · numerators = determinant · right side. Imports polynomials.
 */
import { divideExactly } from './division.js';
import { equals, isZero, multiply, negate, type Poly, subtract, sum } from './poly.js';

export interface LinearSolution {
  /** The solution is numerators / determinant. */
  readonly numerators: readonly Poly[];
  readonly determinant: Poly;
}

/**
 * The solution of matrix · x = right; undefined when the determinant vanishes identically.
 * Elimination as in Math. Comp. 22 (1968) 565: entries are minors of the matrix, so they stay polynomials.
 */
export function solveLinear(matrix: readonly (readonly Poly[])[], right: readonly Poly[]): LinearSolution | undefined {
  const n = matrix.length;
  const rows = matrix.map((row, i) => [...row, right[i]!]);
  let previous: Poly | undefined;
  for (let k = 0; k < n; k++) {
    const pivotRow = shortestPivot(rows, k);
    if (pivotRow === undefined) return undefined;
    // The sign that an exchange costs is moved into the row itself.
    if (pivotRow !== k) [rows[k], rows[pivotRow]] = [rows[pivotRow]!.map(negate), rows[k]!];
    const pivot = rows[k]![k]!;
    for (let i = 0; i < n; i++) {
      if (i === k) continue;
      const factor = rows[i]![k]!;
      rows[i] = rows[i]!.map((entry, j) => {
        const minor = subtract(multiply(pivot, entry), multiply(factor, rows[k]![j]!));
        return previous ? divideExactly(minor, previous)! : minor;
      });
    }
    previous = pivot;
  }
  const determinant = previous!;
  const numerators = rows.map((row) => row[n]!);
  matrix.forEach((row, i) => {
    const left = sum(
      determinant.ring,
      row.map((entry, j) => multiply(entry, numerators[j]!)),
    );
    if (!equals(left, multiply(determinant, right[i]!))) throw new Error('a linear system was solved wrongly');
  });
  return { numerators, determinant };
}

function shortestPivot(rows: readonly (readonly Poly[])[], k: number): number | undefined {
  let best: number | undefined;
  for (let i = k; i < rows.length; i++)
    if (!isZero(rows[i]![k]!) && (best === undefined || rows[i]![k]!.size < rows[best]![k]!.size)) best = i;
  return best;
}
