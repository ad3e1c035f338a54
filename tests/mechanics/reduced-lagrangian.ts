/**
 * Random reduced Lagrangians for the tests of mechanics: a ring with lapse, scale factor and two scalars, and functions
 * that are invariant under a change of the time coordinate or are not.
 */
import { constant, generator, isZero, monomial, multiply, type Poly, product, sum } from '../../src/algebra/poly.js';
import { constantsOf, jetName, jetsOf, makeRing } from '../../src/algebra/ring.js';
import type { Random } from '../oracle/random.js';
import { randomPoly, toRational } from '../random-poly.js';

export const FIELDS = ['a', 'phi', 'psi'] as const;
export const LAPSE = 'N';
export const ring = makeRing([
  ...jetsOf(LAPSE, 4),
  ...FIELDS.flatMap((name) => jetsOf(name, 4)),
  ...constantsOf(['k', 'c', 'd', 'M']),
]);

/** Positive powers only, so that no antiderivative is a logarithm. */
export const randomFunction = (random: Random, names: readonly string[] = [...FIELDS, 'c', 'k']): Poly =>
  randomPoly(random, ring, names, { terms: 4, factors: 3, exponents: [0, 3] });

/** q̇/N. */
export const rate = (field: string): Poly =>
  product(ring, [generator(ring, jetName(field, 1)), generator(ring, LAPSE, -1)]);

/** N ℓ(q, q̇/N) with ℓ of degree up to `degree` in the rates: invariant under t → t'(t). */
export function invariantLagrangian(random: Random, degree = 3): Poly {
  const terms = Array.from({ length: 1 + random.below(4) }, () => {
    const rates = Array.from({ length: random.below(degree + 1) }, () => rate(random.pick(FIELDS)));
    return product(ring, [randomFunction(random), ...rates]);
  });
  return multiply(generator(ring, LAPSE), sum(ring, terms));
}

/** A Lagrangian of first order in all fields, with powers of the lapse that no symmetry ties to the velocities. */
export function anyLagrangian(random: Random): Poly {
  const velocities = FIELDS.map((q) => jetName(q, 1));
  const terms = Array.from({ length: 3 }, () =>
    product(ring, [
      randomFunction(random),
      monomial(ring, toRational(random.rational(true)), [
        [LAPSE, random.below(5) - 2],
        [random.pick(velocities), random.below(3)],
        [random.pick(velocities), random.below(2)],
      ]),
    ]),
  );
  return sum(ring, terms);
}

/** Not zero. */
export function nonZeroFunction(random: Random, names?: readonly string[]): Poly {
  for (;;) {
    const f = randomFunction(random, names);
    if (!isZero(f)) return f;
  }
}

export const one = constant(ring, 1);
