/**
 * Between the terms that the notation reads and sums in canonical form: coefficients become polynomials and back.
 */
import { type Poly, termsOf } from '../algebra/poly.js';
import { constantsOf, makeRing, type Ring } from '../algebra/ring.js';
import { polyOfScalar } from '../notation/scalar-poly.js';
import type { DeclaredTensor, LagrangianTerm, ScalarTerm } from '../notation/theory.js';
import { canonicalSum, type TensorSum, type TensorTerm } from './expression.js';
import { type KindTable, kindTable, makeKind } from './kinds.js';
import type { ScalarCombination } from './relations.js';

/** A ring with these names as constants. */
export const ringOfNames = (names: Iterable<string>): Ring => makeRing(constantsOf(new Set(names)));

/** Names of the symbols that occur in the terms, in order of appearance. */
export const namesIn = (terms: readonly LagrangianTerm[]): string[] => [
  ...new Set(terms.flatMap((t) => t.scalar.powers.map(([name]) => name))),
];

/** Built-in kinds and the tensors of the user. @throws SymmetryError when a symmetry group is too large. */
export const kindsWith = (tensors: readonly DeclaredTensor[]): KindTable =>
  kindTable(tensors.map((t) => makeKind(t.name, t.slots, t.generators)));

/** Terms over a ring that has their symbols; not canonical. */
export const tensorTerms = (ring: Ring, terms: readonly LagrangianTerm[]): TensorTerm[] =>
  terms.map(({ scalar, factors }) => ({ coefficient: polyOfScalar(ring, [scalar]), factors }));

/** The sum that terms mean, in canonical form. */
export const sumOf = (ring: Ring, terms: readonly LagrangianTerm[], kinds: KindTable): TensorSum =>
  canonicalSum(tensorTerms(ring, terms), kinds);

/** A polynomial in constants as a sum of named monomials. */
export const scalarsOf = (p: Poly): ScalarTerm[] =>
  termsOf(p).map(({ coefficient, exponents }) => ({
    coefficient,
    powers: exponents
      .map(([g, e]) => [p.ring.generators[g]!.name, e] as const)
      .sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0)),
  }));

/** A sum whose coefficients are numbers. @throws RangeError when one contains a symbol. */
export const combinationOf = (sum: TensorSum): ScalarCombination =>
  sum.map(({ coefficient, factors }) => {
    const [only, more] = scalarsOf(coefficient);
    if (!only || more || only.powers.length > 0) throw new RangeError('a coefficient is no number');
    return { coefficient: only.coefficient, factors };
  });

/** The sum as terms that the notation prints and reads back, one for each monomial of a coefficient. */
export const lagrangianOf = (sum: TensorSum): LagrangianTerm[] =>
  sum.flatMap(({ coefficient, factors }) => scalarsOf(coefficient).map((scalar) => ({ scalar, factors })));
