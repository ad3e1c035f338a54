/**
 * Quotients of two polynomials of a jet space, as they are typed in claims and definitions. Not reduced: a claim is cleared
 * of its denominators once, and those are reported. Imports polynomials, jet spaces.
 */
import { add, constant, equals, isZero, multiply, negate, type Poly, power, subtract } from '../algebra/poly.js';
import type { JetSpace } from './jet-space.js';

export interface Quotient {
  readonly top: Poly;
  /** Never zero. */
  readonly bottom: Poly;
}

export const quotientOf = (p: Poly): Quotient => ({ top: p, bottom: constant(p.ring, 1) });

export const multiplyQuotients = (a: Quotient, b: Quotient): Quotient => ({
  top: multiply(a.top, b.top),
  bottom: multiply(a.bottom, b.bottom),
});

/** @throws RangeError when b is zero. */
export function divideQuotients(a: Quotient, b: Quotient): Quotient {
  if (isZero(b.top)) throw new RangeError('division by zero');
  return multiplyQuotients(a, { top: b.bottom, bottom: b.top });
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
