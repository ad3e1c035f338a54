/**
 * Fractions of Laurent polynomials whose denominators stay factored.
 * Invariant: denominator factors are primitive sums that no generator divides (single terms are absorbed into the
 * numerator), distinct, in a fixed order, and none of them divides the numerator. Factors need not be coprime to each
 * other or to the numerator, so equality is `equalFraction`, not sameness of form. Imports polynomials.
 */

import { partial, timeDerivative } from './calculus.js';
import { divideExactly, splitUnit } from './division.js';
import { compareSimplicity } from './linear.js';
import {
  constant,
  equals,
  isCanonical,
  isZero,
  multiply,
  negate,
  type Poly,
  power,
  scale,
  subtract,
  sum,
} from './poly.js';

export interface Factor {
  readonly base: Poly;
  readonly power: number;
}

export interface Fraction {
  readonly numerator: Poly;
  /** numerator / Π base^power, powers positive. */
  readonly denominator: readonly Factor[];
}

/** p · Π base^power. */
const expand = (p: Poly, factors: readonly Factor[]): Poly =>
  factors.reduce((acc, f) => multiply(acc, power(f.base, f.power)), p);

/**
 * numerator / Π base^power in canonical form.
 * @throws RangeError when a base is zero or a power is no integer ≥ 0; ExponentLimitError beyond ±511.
 */
export function fraction(numerator: Poly, factors: readonly Factor[] = []): Fraction {
  let top = numerator;
  const kept: { base: Poly; power: number }[] = [];
  for (const { base, power: n } of factors) {
    if (isZero(base)) throw new RangeError('division by zero');
    if (!Number.isSafeInteger(n) || n < 0) throw new RangeError(`a factor to the power ${n}`);
    const { unit, reduced } = splitUnit(base);
    top = multiply(top, power(unit, -n));
    if (reduced.size === 1) continue;
    let rest = n;
    while (rest > 0 && !isZero(top)) {
      const quotient = divideExactly(top, reduced);
      if (!quotient) break;
      top = quotient;
      rest--;
    }
    const twin = kept.find((f) => equals(f.base, reduced));
    if (twin) twin.power += rest;
    else if (rest > 0) kept.push({ base: reduced, power: rest });
  }
  if (isZero(top)) kept.length = 0;
  kept.sort((a, b) => compareSimplicity(a.base, b.base));
  return Object.freeze({ numerator: top, denominator: Object.freeze(kept.map((f) => Object.freeze(f))) });
}

/** What a list of factors lacks to be a multiple of another one. */
const lacking = (have: readonly Factor[], want: readonly Factor[]): Factor[] =>
  want.flatMap(({ base, power: n }) => {
    const missing = n - (have.find((f) => equals(f.base, base))?.power ?? 0);
    return missing > 0 ? [{ base, power: missing }] : [];
  });

export function addFraction(a: Fraction, b: Fraction): Fraction {
  const forA = lacking(a.denominator, b.denominator);
  const forB = lacking(b.denominator, a.denominator);
  const top = sum(a.numerator.ring, [expand(a.numerator, forA), expand(b.numerator, forB)]);
  return fraction(top, [...a.denominator, ...forA]);
}

export const negateFraction = (a: Fraction): Fraction => Object.freeze({ ...a, numerator: negate(a.numerator) });
export const multiplyFraction = (a: Fraction, b: Fraction): Fraction =>
  fraction(multiply(a.numerator, b.numerator), [...a.denominator, ...b.denominator]);

/** a / b. @throws RangeError when b is zero. */
export const divideFraction = (a: Fraction, b: Fraction): Fraction =>
  fraction(expand(a.numerator, b.denominator), [...a.denominator, { base: b.numerator, power: 1 }]);

/** Equality of values, by cross-multiplication. */
export const equalFraction = (a: Fraction, b: Fraction): boolean =>
  equals(
    expand(a.numerator, lacking(a.denominator, b.denominator)),
    expand(b.numerator, lacking(b.denominator, a.denominator)),
  );

/** A derivation applied by the quotient rule: (n/Πb^p)' = (n' Πb − n Σ p b' Π of the others) / Πb^(p+1). */
function derivative(a: Fraction, of: (p: Poly) => Poly): Fraction {
  const moving = a.denominator.filter((f) => !isZero(of(f.base)));
  const still = a.denominator.filter((f) => !moving.includes(f));
  const bases = moving.map((f) => f.base);
  const { ring } = a.numerator;
  const product = (factors: readonly Poly[]): Poly => factors.reduce(multiply, constant(ring, 1));
  const slopes = moving.map(({ base, power: n }, i) =>
    product([scale(of(base), n), ...bases.filter((_, j) => j !== i)]),
  );
  const top = subtract(multiply(of(a.numerator), product(bases)), multiply(a.numerator, sum(ring, slopes)));
  return fraction(top, [...moving.map(({ base, power: n }) => ({ base, power: n + 1 })), ...still]);
}

/** d/dt. */
export const timeDerivativeOfFraction = (a: Fraction): Fraction => derivative(a, timeDerivative);

/** Partial derivative with respect to one generator, all others held fixed. */
export const partialOfFraction = (a: Fraction, name: string): Fraction => derivative(a, (p) => partial(p, name));

/** Whether the value obeys the invariant stated at the top of this module. */
export const isCanonicalFraction = (a: Fraction): boolean =>
  isCanonical(a.numerator) &&
  a.denominator.every(
    (f, i) =>
      Number.isSafeInteger(f.power) &&
      f.power > 0 &&
      f.base.size > 1 &&
      isCanonical(f.base) &&
      equals(splitUnit(f.base).reduced, f.base) &&
      divideExactly(a.numerator, f.base) === undefined &&
      (i === 0 || compareSimplicity(a.denominator[i - 1]!.base, f.base) < 0),
  );
