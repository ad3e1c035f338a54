/**
 * The exact linear dictionary between a Lagrangian and a coupling basis: every product that the basis spans is written along
 * its invariants, by relations that hold in four dimensions; the rest stays outside.
 */
import { add, constant, type Poly, scale } from '../algebra/poly.js';
import { ONE } from '../algebra/rational.js';
import type { Ring } from '../algebra/ring.js';
import type { BasisEntry, CouplingBasis } from './basis-file.js';
import { canonicalSum, type TensorSum, type TensorTerm } from './expression.js';
import { contentOf, type Density } from './identities.js';
import type { KindTable } from './kinds.js';
import { writeOutParts } from './parts.js';
import { relationsOfSums, type ScalarCombination } from './relations.js';

export interface Translation {
  readonly basis: CouplingBasis;
  /** The coefficient of every invariant of the basis, in its order. */
  readonly couplings: readonly { readonly entry: BasisEntry; readonly value: Poly }[];
  /** What is no combination of the basis. */
  readonly outside: TensorSum;
}

/**
 * Writes a sum in a basis. Densities count as zero; an invariant that is then a combination of earlier ones gets no coupling.
 * @throws InputError `parts-limit`; CanonicalLimitError; as relationsOfSums.
 */
export function translate(
  ring: Ring,
  terms: readonly TensorTerm[],
  basis: CouplingBasis,
  kinds: KindTable,
  densities: readonly Density[] = [],
): Translation {
  const sum = writeOutParts(canonicalSum(terms, kinds), kinds).value;
  const entries = basis.entries;
  const given = [...densities.map((d) => d.sum), ...entries.map((e) => e.sum)];
  const contents = new Set(given.flatMap((s) => s.map((t) => contentOf(t.factors))));
  const inside = sum.filter((t) => contents.has(contentOf(t.factors)));
  const products = inside.map((t): ScalarCombination => [{ coefficient: ONE, factors: t.factors }]);
  const relations = relationsOfSums([...given, ...products], kinds);
  const values = entries.map(() => constant(ring, 0));
  const outside = sum.filter((t) => !inside.includes(t));
  inside.forEach(({ coefficient }, i) => {
    const at = given.length + i;
    // An independent product is its own only component.
    const along = relations.dependent.get(at) ?? relations.basis.map((b) => (b === at ? ONE : undefined));
    along.forEach((c, n) => {
      if (c === undefined || c.num === 0n) return;
      const place = relations.basis[n]!;
      const part = scale(coefficient, c);
      const entry = place - densities.length;
      if (place >= given.length) outside.push({ coefficient: part, factors: inside[place - given.length]!.factors });
      else if (entry >= 0) values[entry] = add(values[entry]!, part);
    });
  });
  return {
    basis,
    couplings: entries.map((entry, i) => ({ entry, value: values[i]! })),
    outside: canonicalSum(outside, kinds),
  };
}
