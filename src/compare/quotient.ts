/**
 * Quotients of two polynomials of a jet space, as they are typed in claims and definitions. Not reduced: a claim is cleared
 * of its denominators once, and those are reported. Imports polynomials, jet spaces.
 */
import {
  add,
  constant,
  equals,
  generator,
  isZero,
  multiply,
  negate,
  type Poly,
  power,
  subtract,
} from '../algebra/poly.js';
import { exponentRange } from '../algebra/ring.js';
import { basesOf, divideIn, isVariable } from './factors.js';
import type { JetSpace } from './jet-space.js';

export interface Quotient {
  readonly top: Poly;
  /** Never zero. */
  readonly bottom: Poly;
}

export const quotientOf = (p: Poly): Quotient => ({ top: p, bottom: constant(p.ring, 1) });

/** One term is no denominator: it goes into the numerator, whose powers may be negative. */
function quotient(top: Poly, bottom: Poly): Quotient {
  return bottom.size === 1 ? quotientOf(multiply(top, power(bottom, -1))) : { top, bottom };
}

export const multiplyQuotients = (a: Quotient, b: Quotient): Quotient =>
  quotient(multiply(a.top, b.top), multiply(a.bottom, b.bottom));

/** @throws RangeError when b is zero. */
export function divideQuotients(a: Quotient, b: Quotient): Quotient {
  if (isZero(b.top)) throw new RangeError('division by zero');
  return quotient(multiply(a.top, b.bottom), multiply(a.bottom, b.top));
}

/** @throws RangeError for a negative power of zero. */
export function powerOfQuotient(a: Quotient, n: number): Quotient {
  if (n >= 0) return { top: power(a.top, n), bottom: power(a.bottom, n) };
  return divideQuotients({ top: power(a.bottom, -n), bottom: constant(a.top.ring, 1) }, quotientOf(power(a.top, -n)));
}

export const addQuotients = (a: Quotient, b: Quotient): Quotient =>
  equals(a.bottom, b.bottom)
    ? { top: add(a.top, b.top), bottom: a.bottom }
    : { top: add(multiply(a.top, b.bottom), multiply(b.top, a.bottom)), bottom: multiply(a.bottom, b.bottom) };

export const negateQuotient = (a: Quotient): Quotient => ({ top: negate(a.top), bottom: a.bottom });

/** (t/b)' = (t' b − t b')/b². @throws BoundError beyond the last jet. */
export function rateOfQuotient({ rate }: JetSpace, { top, bottom }: Quotient): Quotient {
  const slope = rate(bottom);
  if (isZero(slope)) return { top: rate(top), bottom };
  return {
    top: subtract(multiply(rate(top), bottom), multiply(top, slope)),
    bottom: multiply(bottom, bottom),
  };
}

/** All quotients over one denominator, which is dropped; variables are cleared from denominators too, and told. */
export function cleared(
  space: JetSpace,
  values: readonly Quotient[],
): { readonly polys: readonly Poly[]; readonly divisors: readonly Poly[] } {
  const { ring } = space;
  let common: Poly = constant(ring, 1);
  for (const { bottom } of values)
    if (!divideIn(space, common, bottom)) common = multiply(common, lacking(space, common, bottom));
  const polys = values.map(({ top, bottom }) => multiply(top, divideIn(space, common, bottom)!));
  const lowest = new Map<number, number>();
  for (const p of polys)
    exponentRange(ring, p.keys).low.forEach((n, g) => {
      if (p.size > 0 && n < 0 && isVariable(space, g)) lowest.set(g, Math.min(lowest.get(g) ?? 0, n));
    });
  let shift: Poly = constant(ring, 1);
  for (const [g, n] of lowest) shift = multiply(shift, power(generator(ring, ring.generators[g]!.name), -n));
  return { polys: polys.map((p) => multiply(p, shift)), divisors: basesOf(space, multiply(common, shift)) };
}

/** A factor that makes `have` a multiple of `want`: want itself, less what they obviously share. */
function lacking(space: JetSpace, have: Poly, want: Poly): Poly {
  const quotient = divideIn(space, want, have);
  return quotient ?? want;
}
