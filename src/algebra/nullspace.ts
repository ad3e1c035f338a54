/**
 * Exact solutions of sparse homogeneous linear equations over the rationals, for systems with thousands of unknowns of
 * which few survive. Invariant: no stored coefficient is zero. Imports exact rationals.
 */
import { divideRational, multiplyRational, negateRational, ONE, type Rational, subtractRational } from './rational.js';

/** Σ coefficient · unknown = 0, by the number of the unknown. */
export type SparseRow = ReadonlyMap<number, Rational>;

/** Row minus factor times another, in place. */
function subtractMultiple(row: Map<number, Rational>, factor: Rational, other: SparseRow): void {
  for (const [column, value] of other) {
    const product = multiplyRational(factor, value);
    const known = row.get(column);
    const next = known === undefined ? negateRational(product) : subtractRational(known, product);
    if (next.num === 0n) row.delete(column);
    else row.set(column, next);
  }
}

/** Each unknown that is bound, as a combination of free ones: pivot → row with coefficient 1 at the pivot. */
function reducedRows(rows: Iterable<SparseRow>): ReadonlyMap<number, SparseRow> {
  const pivots = new Map<number, Map<number, Rational>>();
  /** Unknown → pivots in whose rows it stands, so that a new pivot finds them. */
  const uses = new Map<number, Set<number>>();
  const enter = (pivot: number, row: Map<number, Rational>): void => {
    pivots.set(pivot, row);
    for (const column of row.keys()) {
      const at = uses.get(column);
      if (at) at.add(pivot);
      else uses.set(column, new Set([pivot]));
    }
  };
  for (const given of rows) {
    const row = new Map(given);
    for (const column of [...row.keys()]) {
      const pivotRow = pivots.get(column);
      const factor = row.get(column);
      // Rows in `pivots` contain no other pivot, so one pass leaves none.
      if (pivotRow && factor) subtractMultiple(row, factor, pivotRow);
    }
    const pivot = Math.max(...row.keys());
    const leading = row.get(pivot);
    if (leading === undefined) continue;
    for (const [column, value] of row) row.set(column, divideRational(value, leading));
    for (const other of [...(uses.get(pivot) ?? [])]) {
      const target = pivots.get(other)!;
      const factor = target.get(pivot);
      if (!factor) continue;
      subtractMultiple(target, factor, row);
      enter(other, target);
    }
    enter(pivot, row);
  }
  return pivots;
}

/**
 * A basis of the solutions for unknowns 0 … count − 1: each basis vector has coefficient 1 at its own free unknown, which
 * is the lowest that it involves, and 0 at the free unknowns of the others. In the order of the free unknowns.
 */
export function nullspace(count: number, rows: Iterable<SparseRow>): readonly SparseRow[] {
  const bound = reducedRows(rows);
  const basis = new Map<number, Map<number, Rational>>();
  for (let i = 0; i < count; i++) if (!bound.has(i)) basis.set(i, new Map([[i, ONE]]));
  for (const [pivot, row] of bound)
    for (const [column, value] of row) if (column !== pivot) basis.get(column)!.set(pivot, negateRational(value));
  return [...basis.values()];
}
