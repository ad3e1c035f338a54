/**
 * Linear relations between products of tensors, those special to four dimensions included: values on random exact
 * components modulo a prime, rank, rational reconstruction, and a test of every relation on fresh components modulo
 * another prime. A false relation survives one fresh point with probability about 1/p, so CHECKS points leave less than
 * 10^-30.
 */
import { echelonMod, multiplyMod, PRIMES, reconstruct, residue } from '../algebra/modular.js';
import type { Rational } from '../algebra/rational.js';
import type { TensorSymbol } from './expression.js';
import type { KindTable } from './kinds.js';
import { randomPoint } from './random-values.js';

/** Points in a row that must leave the rank alone, and fresh points on which relations are tested. */
const SPARE = 4;
const CHECKS = 4;

export interface Relations {
  /** Positions of an independent set: each product that is no combination of earlier ones. */
  readonly basis: readonly number[];
  /** Dependent product → its coefficients along `basis`. */
  readonly dependent: ReadonlyMap<number, readonly Rational[]>;
}

/**
 * The relations among scalar products; earlier ones are preferred as basis.
 * @throws RangeError when a coefficient cannot be reconstructed or a relation fails on fresh components.
 */
export function linearRelations(products: readonly (readonly TensorSymbol[])[], kinds: KindTable): Relations {
  const [prime, other] = PRIMES;
  const rows: Float64Array[] = [];
  let basis: number[] = [];
  // The rank is usually far below the number of products: stop when further points add nothing to it.
  for (let seed = 0, idle = 0; idle < SPARE && seed < products.length + SPARE; seed++) {
    const point = randomPoint(1000 + seed, prime, kinds);
    rows.push(Float64Array.from(products, (f) => point.value(f)));
    const before = basis.length;
    basis = echelonMod(rows, prime);
    rows.length = basis.length;
    idle = basis.length > before ? 0 : idle + 1;
  }
  const dependent = new Map<number, readonly Rational[]>();
  products.forEach((_, column) => {
    if (basis.includes(column)) return;
    const coefficients = basis.map((_, row) => reconstruct(rows[row]![column]!, prime));
    if (coefficients.some((c) => c === undefined))
      throw new RangeError('a coefficient of a relation is too large to be reconstructed');
    dependent.set(column, coefficients as Rational[]);
  });
  for (let i = 0; i < CHECKS; i++) {
    const point = randomPoint(9_000_000 + i, other, kinds);
    const values = basis.map((b) => point.value(products[b]!));
    for (const [column, coefficients] of dependent) {
      const sum = coefficients.reduce((s, c, n) => (s + multiplyMod(residue(c, other), values[n]!, other)) % other, 0);
      if (sum !== point.value(products[column]!)) throw new RangeError('a relation fails on fresh components');
    }
  }
  return { basis, dependent };
}
