/**
 * Fractions of Laurent polynomials whose denominators stay factored.
 * Invariant: denominator factors are primitive sums (single terms are absorbed into the numerator), distinct, in a fixed
 * order, and none of them divides the numerator.
 */

import { timeDerivative } from './calculus.js';
import { compareSimplicity, divideExactly, primitive } from './linear.js';
import { add, constant, equals, isCanonical, isZero, multiply, negate, type Poly, power, subtract } from './poly.js';

export interface Factor {
  readonly base: Poly;
  readonly power: number;
}

export interface Fraction {
  readonly numerator: Poly;
  /** numerator / Π base^power, powers positive. */
  readonly denominator: readonly Factor[];
}

const one = (p: Poly): Poly => constant(p.ring, 1);
const expand = (p: Poly, factors: readonly Factor[]): Poly =>
  factors.reduce((acc, f) => multiply(acc, power(f.base, f.power)), one(p));

/** numerator / Π base^power in canonical form. @throws RangeError when a base is zero. */
export function fraction(numerator: Poly, factors: readonly Factor[] = []): Fraction {
  let top = numerator;
  const kept: { base: Poly; power: number }[] = [];
  for (const { base, power: n } of factors) {
    if (isZero(base)) throw new RangeError('division by zero');
    if (base.size === 1) {
      top = multiply(top, power(base, -n));
      continue;
    }
    const { unit, reduced } = split(base);
    top = multiply(top, power(unit, -n));
    let rest = n;
    for (let quotient = divideExactly(top, reduced); rest > 0 && quotient; quotient = divideExactly(top, reduced)) {
      top = quotient;
      rest--;
      if (isZero(top)) rest = 0;
    }
    const twin = kept.find((f) => equals(f.base, reduced));
    if (twin) twin.power += rest;
    else if (rest > 0) kept.push({ base: reduced, power: rest });
  }
  if (isZero(top)) return { numerator: top, denominator: [] };
  return { numerator: top, denominator: kept.sort((a, b) => compareSimplicity(a.base, b.base)) };
}

/** base = unit · reduced with a one-term unit and a reduced part that no monomial divides. */
function split(base: Poly): { unit: Poly; reduced: Poly } {
  const { ring } = base;
  const shift = new Float64Array(ring.words);
  for (let w = 0; w < ring.words; w++) shift[w] = base.keys[(base.size - 1) * ring.words + w]!;
  const last: Poly = { ...one(base), keys: shift, reach: base.reach };
  const shifted = multiply(base, power(last, -1));
  const reduced = primitive(shifted);
  const unit = multiply(last, divideExactly(shifted, reduced)!);
  return { unit, reduced };
}

export const addFraction = (a: Fraction, b: Fraction): Fraction =>
  fraction(
    add(
      multiply(a.numerator, expand(a.numerator, b.denominator)),
      multiply(b.numerator, expand(b.numerator, a.denominator)),
    ),
    [...a.denominator, ...b.denominator],
  );
export const negateFraction = (a: Fraction): Fraction => ({ ...a, numerator: negate(a.numerator) });
export const multiplyFraction = (a: Fraction, b: Fraction): Fraction =>
  fraction(multiply(a.numerator, b.numerator), [...a.denominator, ...b.denominator]);

/** a / b. @throws RangeError when b is zero. */
export const divideFraction = (a: Fraction, b: Fraction): Fraction =>
  fraction(multiply(a.numerator, expand(a.numerator, b.denominator)), [
    ...a.denominator,
    { base: b.numerator, power: 1 },
  ]);

/** Equality of values, by cross-multiplication. */
export const equalFraction = (a: Fraction, b: Fraction): boolean =>
  isZero(
    subtract(
      multiply(a.numerator, expand(a.numerator, b.denominator)),
      multiply(b.numerator, expand(b.numerator, a.denominator)),
    ),
  );

/** d/dt by the quotient rule. */
export function timeDerivativeOfFraction(a: Fraction): Fraction {
  const bottom = expand(a.numerator, a.denominator);
  const top = subtract(multiply(timeDerivative(a.numerator), bottom), multiply(a.numerator, timeDerivative(bottom)));
  return fraction(
    top,
    a.denominator.map((f) => ({ base: f.base, power: 2 * f.power })),
  );
}

/** Whether the value obeys the invariant stated at the top of this module. */
export const isCanonicalFraction = (a: Fraction): boolean =>
  isCanonical(a.numerator) &&
  a.denominator.every(
    (f, i) =>
      f.power > 0 &&
      f.base.size > 1 &&
      equals(primitive(f.base), f.base) &&
      divideExactly(a.numerator, f.base) === undefined &&
      (i === 0 || compareSimplicity(a.denominator[i - 1]!.base, f.base) < 0),
  );
