/** The polynomial that a parsed scalar expression means in a ring. */
import { monomial, type Poly, sum } from '../algebra/poly.js';
import type { Ring } from '../algebra/ring.js';
import type { ScalarSum } from './theory.js';

/**
 * @param rename maps a name in the text to a generator of the ring; by default they are the same.
 * @throws Error when the ring lacks a generator; ExponentLimitError beyond ±511.
 */
export const polyOfScalar = (ring: Ring, scalar: ScalarSum, rename: (name: string) => string = (n) => n): Poly =>
  sum(
    ring,
    scalar.map(({ coefficient, powers }) =>
      monomial(
        ring,
        coefficient,
        powers.map(([name, exponent]) => [rename(name), exponent] as const),
      ),
    ),
  );
