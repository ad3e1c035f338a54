/**
 * The square of an integrand in one variable, x^power Π (1 + c₁x + c₂x² + …)^exponent with rational numbers c: what is left of
 * a kinetic coefficient when the variable has been rescaled. Invariant: factors are distinct, of positive degree, and their
 * exponents are not zero.
 */
import { type Fraction, fraction, multiplyFraction } from './fraction.js';
import { constant, generator, multiply, type Poly, scale, sum } from './poly.js';
import type { Rational } from './rational.js';
import type { Ring } from './ring.js';

export interface SquaredIntegrand {
  readonly power: number;
  readonly factors: readonly {
    /** c₁, c₂, …; the last one is not zero. */
    readonly coefficients: readonly Rational[];
    readonly exponent: number;
  }[];
}

/** 1 + c₁x + c₂x² + … */
export const factorPoly = (ring: Ring, x: string, coefficients: readonly Rational[]): Poly =>
  sum(ring, [constant(ring, 1), ...coefficients.map((c, i) => scale(generator(ring, x, i + 1), c))]);

/** The square as a rational function of a generator. */
export function squareAsFraction({ power, factors }: SquaredIntegrand, ring: Ring, x: string): Fraction {
  let out = fraction(generator(ring, x, power));
  for (const { coefficients, exponent } of factors) {
    const base = factorPoly(ring, x, coefficients);
    const one = constant(ring, 1);
    const factor =
      exponent > 0
        ? fraction(Array.from({ length: exponent }).reduce<Poly>((p) => multiply(p, base), one))
        : fraction(one, [{ base, power: -exponent }]);
    out = multiplyFraction(out, factor);
  }
  return out;
}

/** The product of what stands to an odd power: the root in the integrand is the root of it times a rational function. */
export function radicandOf({ power, factors }: SquaredIntegrand, ring: Ring, x: string): Poly {
  const odd = factors.filter((f) => f.exponent % 2 !== 0).map((f) => factorPoly(ring, x, f.coefficients));
  return odd.reduce(multiply, power % 2 === 0 ? constant(ring, 1) : generator(ring, x));
}

/** A text that is equal for equal integrands. */
export const integrandKey = ({ power, factors }: SquaredIntegrand): string =>
  [power, ...factors.map((f) => `${f.coefficients.map((c) => `${c.num}/${c.den}`).join()}^${f.exponent}`)].join(';');
