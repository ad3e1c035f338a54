/**
 * Whether a system of linear equations has a non-negative solution, by the simplex method with Bland's rule over exact
 * rationals. Invariant: a solution that is returned solves the system exactly; `undefined` means that there is none, and
 * `unknown` that the stated bound on pivots was reached. Imports exact rationals.
 */
import {
  addRational,
  divideRational,
  multiplyRational,
  negateRational,
  ONE,
  type Rational,
  signOfRational,
  subtractRational,
  ZERO,
} from './rational.js';

/** Pivots beyond which a system is given up. */
const MAX_PIVOTS = 400;

/**
 * x ≥ 0 with Σ_j columns[j][i] x_j = right[i] for every row i.
 * @param columns each as [row, value] pairs; rows that are not named hold zero.
 */
export function nonNegativeSolution(
  columns: readonly (readonly (readonly [row: number, value: Rational])[])[],
  right: readonly Rational[],
): readonly Rational[] | undefined | 'unknown' {
  const rows = right.length;
  const width = columns.length + rows;
  // One artificial variable per row; the right-hand side is the last entry and never negative.
  const table = right.map((value, i) => {
    const row: Rational[] = new Array<Rational>(width + 1).fill(ZERO);
    row[columns.length + i] = ONE;
    row[width] = value;
    return row;
  });
  for (const [j, column] of columns.entries()) for (const [i, value] of column) table[i]![j] = value;
  for (const [i, row] of table.entries())
    if (signOfRational(row[width]!) < 0)
      table[i] = row.map((x, j) => (j >= columns.length && j < width ? x : negateRational(x)));
  const basis = right.map((_, i) => columns.length + i);
  // The sum of the artificial variables is minimised; its row holds the reduced costs of the true ones.
  let cost: Rational[] = Array.from({ length: width + 1 }, (_, j) =>
    j >= columns.length && j < width ? ZERO : table.reduce((s, row) => subtractRational(s, row[j]!), ZERO),
  );
  for (let pivots = 0; ; pivots++) {
    const entering = cost.findIndex((c, j) => j < columns.length && signOfRational(c) < 0);
    if (entering < 0) break;
    if (pivots === MAX_PIVOTS) return 'unknown';
    const leaving = leavingRow(table, basis, entering, width);
    // Unbounded below is impossible for a sum that is never negative.
    if (leaving < 0) return 'unknown';
    const pivot = table[leaving]!.map((x) => divideRational(x, table[leaving]![entering]!));
    const eliminate = (row: Rational[]): Rational[] => {
      const factor = row[entering]!;
      return factor.num === 0n
        ? row
        : row.map((x, j) => (pivot[j]!.num === 0n ? x : subtractRational(x, multiplyRational(factor, pivot[j]!))));
    };
    table.forEach((row, i) => {
      table[i] = i === leaving ? pivot : eliminate(row);
    });
    cost = eliminate(cost);
    basis[leaving] = entering;
  }
  if (cost[width]!.num !== 0n) return undefined;
  const solution = new Array<Rational>(columns.length).fill(ZERO);
  basis.forEach((j, i) => {
    if (j < columns.length) solution[j] = addRational(solution[j]!, table[i]![width]!);
  });
  return solution;
}

/** The row that first becomes negative when the entering variable grows; the least basic variable among equals. */
function leavingRow(
  table: readonly (readonly Rational[])[],
  basis: readonly number[],
  entering: number,
  width: number,
): number {
  let best = -1;
  let least: Rational = ZERO;
  table.forEach((row, i) => {
    if (signOfRational(row[entering]!) <= 0) return;
    const ratio = divideRational(row[width]!, row[entering]!);
    const order = best < 0 ? -1 : signOfRational(subtractRational(ratio, least));
    if (order < 0 || (order === 0 && basis[i]! < basis[best]!)) {
      best = i;
      least = ratio;
    }
  });
  return best;
}
