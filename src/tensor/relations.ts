/**
 * Linear relations between sums of products of tensors, those special to four dimensions included: values on random exact
 * components modulo a prime, rank, rational reconstruction, and a test of every relation on fresh components modulo
 * another prime. A false relation survives one fresh point with probability about 1/p, so CHECKS points leave less than
 * 10^-30.
 */
import { remember } from '../algebra/memo.js';
import { echelonMod, multiplyMod, PRIMES, reconstruct, residue } from '../algebra/modular.js';
import { ONE, type Rational } from '../algebra/rational.js';
import { factorsKey, type TensorSymbol } from './expression.js';
import type { KindTable } from './kinds.js';
import { type RandomPoint, randomPoint } from './random-values.js';

/** Points in a row that must leave the rank alone, and fresh points on which relations are tested. */
const SPARE = 4;
const CHECKS = 4;
const COMPUTING = PRIMES.slice(0, -1);
const CHECK_PRIME = PRIMES.at(-1)!;

/** Thrown when the coefficients of a relation are beyond what the primes can tell. */
export class RelationLimitError extends RangeError {
  constructor() {
    super('the coefficients of a linear relation are too large');
  }
}

/** Numbers times scalar products. */
export type ScalarCombination = readonly {
  readonly coefficient: Rational;
  readonly factors: readonly TensorSymbol[];
}[];

export interface Relations {
  /** Positions of an independent set: each sum that is no combination of earlier ones. */
  readonly basis: readonly number[];
  /** Dependent sum → its coefficients along `basis`. */
  readonly dependent: ReadonlyMap<number, readonly Rational[]>;
}

/** The relations among scalar products; earlier ones are preferred as basis. @throws as relationsOfSums. */
export const linearRelations = (products: readonly (readonly TensorSymbol[])[], kinds: KindTable): Relations =>
  relationsOfSums(
    products.map((factors) => [{ coefficient: ONE, factors }]),
    kinds,
  );

/** Values of sums at a point; a product that occurs in several is evaluated once. */
function valuesAt(point: RandomPoint, sums: readonly ScalarCombination[]): Float64Array {
  const known = new Map<string, number>();
  const { prime } = point;
  return Float64Array.from(sums, (sum) =>
    sum.reduce((total, { coefficient, factors }) => {
      const value = remember(known, factorsKey(factors), () => point.value(factors));
      return (total + multiplyMod(residue(coefficient, prime), value, prime)) % prime;
    }, 0),
  );
}

/** Echelon form of the values at as many points as are needed; the rank is usually far below the number of sums. */
function echelonAt(prime: number, sums: readonly ScalarCombination[], kinds: KindTable) {
  const rows: Float64Array[] = [];
  let basis: number[] = [];
  for (let seed = 0, idle = 0; idle < SPARE && seed < sums.length + SPARE; seed++) {
    rows.push(valuesAt(randomPoint(1000 + seed, prime, kinds), sums));
    const before = basis.length;
    basis = echelonMod(rows, prime);
    rows.length = basis.length;
    idle = basis.length > before ? 0 : idle + 1;
  }
  return { rows, basis };
}

function holds({ basis, dependent }: Relations, sums: readonly ScalarCombination[], kinds: KindTable): boolean {
  for (let i = 0; i < CHECKS; i++) {
    const values = valuesAt(randomPoint(9_000_000 + i, CHECK_PRIME, kinds), sums);
    for (const [column, coefficients] of dependent) {
      const sum = coefficients.reduce((total, c, n) => {
        const product = multiplyMod(residue(c, CHECK_PRIME), values[basis[n]!]!, CHECK_PRIME);
        return (total + product) % CHECK_PRIME;
      }, 0);
      if (sum !== values[column]!) return false;
    }
  }
  return true;
}

/**
 * The relations among sums of scalar products; earlier ones are preferred as basis. One prime serves for coefficients up to
 * about 5800 in numerator and denominator; others are taken in addition when it does not.
 * @throws RelationLimitError when the coefficients are beyond what all primes together can tell, about 4 · 10^11;
 * TooLargeError.
 */
export function relationsOfSums(sums: readonly ScalarCombination[], kinds: KindTable): Relations {
  const forms: ReturnType<typeof echelonAt>[] = [];
  for (const prime of COMPUTING) {
    forms.push(echelonAt(prime, sums, kinds));
    const { basis } = forms[0]!;
    if (forms.at(-1)!.basis.join() !== basis.join()) throw new RangeError('two primes disagree on a rank');
    const primes = COMPUTING.slice(0, forms.length);
    const dependent = new Map<number, Rational[]>();
    for (const column of sums.keys()) {
      if (basis.includes(column)) continue;
      const found = basis.map((_, row) =>
        reconstruct(
          forms.map((f) => f.rows[row]![column]!),
          primes,
        ),
      );
      const coefficients = found.filter((c) => c !== undefined);
      if (coefficients.length < basis.length) break;
      dependent.set(column, coefficients);
    }
    const relations = { basis, dependent };
    if (basis.length + dependent.size === sums.length && holds(relations, sums, kinds)) return relations;
  }
  throw new RelationLimitError();
}
