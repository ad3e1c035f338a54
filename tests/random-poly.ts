/**
 * Random exact polynomials of the kernel and points to evaluate them at, for tests above the algebra. Numbers come from the
 * reproducible generator of the oracle; the kernel itself is tested in tests/algebra.
 */
import { evaluate } from '../src/algebra/collect.js';
import { monomial, type Poly, sum } from '../src/algebra/poly.js';
import { type Rational, rational } from '../src/algebra/rational.js';
import type { Ring } from '../src/algebra/ring.js';
import type { Random } from './oracle/random.js';

export interface PolyWishes {
  /** Terms at most. */
  readonly terms?: number;
  /** Generators in one term at most. */
  readonly factors?: number;
  /** Least and greatest exponent. */
  readonly exponents?: readonly [number, number];
}

export const toRational = ({ n, d }: { readonly n: bigint; readonly d: bigint }): Rational => rational(n, d);

/** A sum of random monomials in the named generators; may be zero. */
export function randomPoly(random: Random, ring: Ring, names: readonly string[], wishes: PolyWishes = {}): Poly {
  const { terms = 4, factors = 3, exponents = [0, 2] } = wishes;
  const [low, high] = exponents;
  return sum(
    ring,
    Array.from({ length: 1 + random.below(terms) }, () =>
      monomial(
        ring,
        toRational(random.rational()),
        random
          .shuffled(names)
          .slice(0, random.below(factors + 1))
          .map((name) => [name, low + random.below(high - low + 1)] as const),
      ),
    ),
  );
}

/** A value for every generator, none of them zero; a radical's square gets the square of its value. */
export function randomPoint(random: Random, ring: Ring): Map<string, Rational> {
  const point = new Map(ring.generators.map((g) => [g.name, toRational(random.rational(true))]));
  for (const [radical, square] of ring.radicals) {
    const root = point.get(ring.generators[radical]!.name)!;
    point.set(ring.generators[square]!.name, rational(root.num * root.num, root.den * root.den));
  }
  return point;
}

/** Value as an oracle number. */
export function valueAt(p: Poly, point: ReadonlyMap<string, Rational>): { n: bigint; d: bigint } {
  const { num, den } = evaluate(p, point);
  return { n: num, d: den };
}
