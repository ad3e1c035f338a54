/**
 * Squares and higher powers replaced by an auxiliary field: F(X) = F(χ) + F'(χ)(X − χ), the rule square-linearised, for one
 * scalar or for several at once. On χ = X the new Lagrangian is the old one and the equation of χ holds; both are tested.
 */
import { partial } from '../algebra/calculus.js';
import { partition, substitute } from '../algebra/collect.js';
import { add, equals, generator, isZero, multiply, type Poly, subtract, sum } from '../algebra/poly.js';
import { positionOf } from '../algebra/ring.js';

export interface Linearised {
  readonly value: Poly;
  /** ∂²F/∂χ_i∂χ_j, row by row: where it is singular, χ is not determined. */
  readonly hessian: readonly (readonly Poly[])[];
}

/**
 * p with everything of second and higher degree in the given generators made linear in them.
 * @param pairs X and the generator of its field χ, which p must not contain.
 * @returns undefined when p is linear already.
 * @throws Error when the result does not become p again on χ = X: the program would be wrong.
 */
export function linearised(p: Poly, pairs: readonly (readonly [x: string, chi: string])[]): Linearised | undefined {
  const { ring } = p;
  const places = pairs.map(([x]) => positionOf(ring, x));
  const [curved] = partition(p, (exponent) => {
    const degrees = places.map(exponent);
    return degrees.some((d) => d < 0) || degrees.reduce((n, d) => n + d, 0) > 1;
  });
  if (isZero(curved)) return undefined;
  const forward = new Map(pairs.map(([x, chi]) => [x, generator(ring, chi)]));
  const atField = substitute(curved, forward);
  const slopes = pairs.map(([x, chi]) =>
    multiply(partial(atField, chi), subtract(generator(ring, x), generator(ring, chi))),
  );
  const value = sum(ring, [subtract(p, curved), atField, ...slopes]);
  const back = new Map(pairs.map(([x, chi]) => [chi, generator(ring, x)]));
  const holds =
    equals(substitute(value, back), p) && pairs.every(([, chi]) => isZero(substitute(partial(value, chi), back)));
  if (!holds) throw new Error('a linearised Lagrangian does not become the original one');
  const hessian = pairs.map(([, a]) => pairs.map(([, b]) => partial(partial(atField, a), b)));
  return { value, hessian };
}

/** The sum of p and the powers of one generator with the given coefficients, from the power 0. */
export const withPowers = (p: Poly, x: string, coefficients: readonly Poly[]): Poly =>
  coefficients.reduce((acc, c, n) => add(acc, multiply(c, generator(p.ring, x, n))), p);
