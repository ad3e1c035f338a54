/**
 * A kinetic coefficient of one field A as K = c A^power Π (1 + r₁A + r₂A² + …)^exponent with exact coefficients in the
 * constants, and what becomes of it when A is measured in a unit λ that turns the brackets into polynomials with rational
 * numbers. Invariant: a shape that is returned multiplies to K exactly.
 */
import { collect, involves } from '../algebra/collect.js';
import { splitUnit } from '../algebra/division.js';
import {
  addFraction,
  equalFraction,
  type Fraction,
  fraction,
  multiplyFraction,
  negateFraction,
} from '../algebra/fraction.js';
import { fractionInFactors, type ProductForm } from '../algebra/known-factors.js';
import { constant, generator, isZero, multiply, type Poly, termsOf, zero } from '../algebra/poly.js';
import { type Rational, rational } from '../algebra/rational.js';
import type { Ring } from '../algebra/ring.js';
import type { SquaredIntegrand } from '../algebra/squared-integrand.js';
import { inverse, numberFraction, powerOf } from './conformal.js';

export interface ShapeFactor {
  /** r₁, r₂, …: the last one is not zero. */
  readonly coefficients: readonly Fraction[];
  readonly exponent: number;
}

export interface KineticShape {
  readonly field: string;
  /** c, in the constants. */
  readonly constant: Fraction;
  readonly power: number;
  readonly factors: readonly ShapeFactor[];
}

/** The product multiplied out, with common factors cancelled that the candidates show. */
export function rebuilt(form: ProductForm, ring: Ring): Fraction {
  let top = constant(ring, form.number);
  const bottom: { base: Poly; power: number }[] = [];
  for (const { base, power } of form.factors) {
    if (power < 0) bottom.push({ base, power: -power });
    else for (let i = 0; i < power; i++) top = multiply(top, base);
  }
  return fraction(top, bottom);
}

/** f with what numerator and denominator visibly share cancelled. */
export const simplified = (f: Fraction, candidates: readonly Poly[]): Fraction =>
  rebuilt(fractionInFactors(f, candidates), f.numerator.ring);

/** Coefficients of p by the power of a generator, lowest first; the lowest power is zero. */
function byPower(p: Poly, field: string): Poly[] {
  const place = p.ring.position.get(field)!;
  const out: Poly[] = [];
  for (const { monomial: powers, coefficient } of collect(p, (g) => g === place))
    out[powers[0]?.[1] ?? 0] = coefficient;
  return Array.from(out, (c) => c ?? zero(p.ring));
}

/** The polynomial 1 + Σ rᵢAⁱ of a polynomial that the field does not divide, and the value at A = 0. */
function normalised(p: Poly, field: string, candidates: readonly Poly[]): { at0: Poly; coefficients: Fraction[] } {
  const [at0, ...rest] = byPower(p, field);
  const coefficients = rest.map((c) => simplified(fraction(c, [{ base: at0!, power: 1 }]), candidates));
  return { at0: at0!, coefficients };
}

const sameFactor = (a: readonly Fraction[], b: readonly Fraction[]): boolean =>
  a.length === b.length && a.every((x, i) => equalFraction(x, b[i]!));

/** Σ over products of two series without constant term 1: (1 + Σaᵢ)(1 + Σbᵢ) up to a degree. */
export function seriesProduct(a: readonly Fraction[], b: readonly Fraction[], degree: number, ring: Ring): Fraction[] {
  const at = (s: readonly Fraction[], i: number): Fraction =>
    i === 0 ? numberFraction(ring, 1) : (s[i - 1] ?? numberFraction(ring, 0));
  return Array.from({ length: degree }, (_, k) =>
    Array.from({ length: k + 2 }, (_, i) => multiplyFraction(at(a, i), at(b, k + 1 - i))).reduce(addFraction),
  );
}

/** (1 + Σ aᵢAⁱ)^q up to a degree, by the recurrence n bₙ = Σ (q i − n + i) aᵢ bₙ₋ᵢ. */
export function seriesPower(a: readonly Fraction[], q: Rational, degree: number, ring: Ring): Fraction[] {
  const b: Fraction[] = [numberFraction(ring, 1)];
  for (let n = 1; n <= degree; n++) {
    let total = numberFraction(ring, 0);
    for (let i = 1; i <= Math.min(n, a.length); i++) {
      const weight = rational(q.num * BigInt(i) + q.den * BigInt(i - n), q.den * BigInt(n));
      total = addFraction(
        total,
        multiplyFraction(multiplyFraction(a[i - 1]!, b[n - i]!), numberFraction(ring, weight)),
      );
    }
    b.push(total);
  }
  return b.slice(1);
}

/** The polynomial whose square is 1 + Σ aᵢAⁱ, when there is one. */
function squareRootOfFactor(a: readonly Fraction[], ring: Ring): Fraction[] | undefined {
  if (a.length % 2 !== 0) return undefined;
  const root = seriesPower(a, rational(1, 2), a.length / 2, ring);
  return sameFactor(seriesProduct(root, root, a.length, ring), a) ? root : undefined;
}

/**
 * The shape of a coefficient that depends on constants and on one field only.
 * @param candidates polynomials that may divide its coefficients.
 */
export function shapeOf(k: Fraction, field: string, candidates: readonly Poly[]): KineticShape {
  const { ring } = k.numerator;
  const { unit, reduced } = splitUnit(k.numerator);
  const place = ring.position.get(field)!;
  const [single] = termsOf(unit);
  const power = single!.exponents.find(([g]) => g === place)?.[1] ?? 0;
  let c = fraction(multiply(unit, generator(ring, field, -power)));
  const factors: { coefficients: readonly Fraction[]; exponent: number }[] = [];
  const take = (base: Poly, exponent: number): void => {
    const { at0, coefficients } = normalised(base, field, candidates);
    const value = fraction(at0);
    c = multiplyFraction(c, powerOf(exponent < 0 ? inverse(value) : value, Math.abs(exponent)));
    if (coefficients.length === 0) return;
    const root = squareRootOfFactor(coefficients, ring);
    const [own, n] = root ? [root, 2 * exponent] : [coefficients, exponent];
    const twin = factors.find((f) => sameFactor(f.coefficients, own));
    if (twin) twin.exponent += n;
    else factors.push({ coefficients: own, exponent: n });
  };
  take(reduced, 1);
  for (const { base, power: n } of k.denominator) take(base, -n);
  const shape: KineticShape = {
    field,
    constant: simplified(c, candidates),
    power,
    factors: factors.filter((f) => f.exponent !== 0),
  };
  if (!equalFraction(multipliedOut(shape), k))
    throw new Error('the shape of a kinetic coefficient does not multiply to it');
  return shape;
}

/** A bracket as a fraction. */
export function bracketOf({ coefficients }: ShapeFactor, field: string, ring: Ring): Fraction {
  return coefficients
    .map((r, i) => multiplyFraction(r, fraction(generator(ring, field, i + 1))))
    .reduce(addFraction, numberFraction(ring, 1));
}

/** The shape multiplied out. */
function multipliedOut(shape: KineticShape): Fraction {
  const { ring } = shape.constant.numerator;
  return shape.factors.reduce(
    (f, factor) => {
      const base = bracketOf(factor, shape.field, ring);
      return multiplyFraction(f, powerOf(factor.exponent < 0 ? inverse(base) : base, Math.abs(factor.exponent)));
    },
    multiplyFraction(shape.constant, fraction(generator(ring, shape.field, shape.power))),
  );
}

/** The unit of the field for a sign of r: A = λx with λ^degree = sign/r, so that r A^degree = sign · x^degree. */
export interface Rescaled {
  readonly sign: 1 | -1;
  readonly degree: number;
  /** λ^degree, positive when r has the sign. */
  readonly unit: Fraction;
  /** dz² = (K-scale) · square(x) dx². */
  readonly square: SquaredIntegrand;
}

/** r and its degree: the first coefficient of the bracket that has the lowest one. */
export function leadingCoefficientOf(
  shape: KineticShape,
): { readonly r: Fraction; readonly degree: number } | undefined {
  const found = shape.factors.map(({ coefficients }) => coefficients.findIndex((c) => !isZero(c.numerator)));
  if (found.length === 0) return undefined;
  const degree = Math.min(...found);
  return { r: shape.factors[found.indexOf(degree)]!.coefficients[degree]!, degree: degree + 1 };
}

/** The rational number that a fraction is, if it is one. */
function rationalOf(f: Fraction): Rational | undefined {
  if (isZero(f.numerator)) return rational(0);
  if (f.denominator.length > 0 || f.numerator.size > 1) return undefined;
  const [term] = termsOf(f.numerator);
  return term!.exponents.length === 0 ? term!.coefficient : undefined;
}

/** The shape in the unit λ, when all brackets become polynomials with rational numbers; for one sign of r. */
export function rescaled(shape: KineticShape, sign: 1 | -1): Rescaled | undefined {
  const leading = leadingCoefficientOf(shape);
  if (!leading) return undefined;
  const { r, degree } = leading;
  const unit = sign === 1 ? inverse(r) : negateFraction(inverse(r));
  const factors: { coefficients: Rational[]; exponent: number }[] = [];
  for (const { coefficients, exponent } of shape.factors) {
    const numbers: Rational[] = [];
    for (const [i, c] of coefficients.entries()) {
      if (isZero(c.numerator)) {
        numbers.push(rational(0));
        continue;
      }
      if ((i + 1) % degree !== 0) return undefined;
      const n = rationalOf(multiplyFraction(c, powerOf(unit, (i + 1) / degree)));
      if (!n) return undefined;
      numbers.push(n);
    }
    factors.push({ coefficients: numbers, exponent });
  }
  return { sign, degree, unit, square: { power: shape.power, factors } };
}

/** Σ sₙ A^(n + power/2) with the root of the constant left out. */
export interface FieldSeries {
  /** Power of A in front of the series of dz/dA; a half-integer when odd. */
  readonly halves: number;
  /** Of dz/dA divided by √|c| A^(power/2): coefficients of 1, A, A², … up to the order. */
  readonly slope: readonly Fraction[];
}

/** The root of K as a series about A = 0, squared and compared with K up to its order. */
export function slopeSeries(shape: KineticShape, order: number): FieldSeries {
  const { ring } = shape.constant.numerator;
  let root: Fraction[] = Array.from({ length: order }, () => numberFraction(ring, 0));
  let whole = root;
  for (const { coefficients, exponent } of shape.factors) {
    root = seriesProduct(root, seriesPower(coefficients, rational(exponent, 2), order, ring), order, ring);
    whole = seriesProduct(whole, seriesPower(coefficients, rational(exponent), order, ring), order, ring);
  }
  if (!sameFactor(seriesProduct(root, root, order, ring), whole))
    throw new Error('the series of the canonical field does not square to the kinetic coefficient');
  return { halves: shape.power, slope: [numberFraction(ring, 1), ...root] };
}

/** Whether a fraction contains no field but the given one. */
export function dependsOnlyOn(f: Fraction, field: string): boolean {
  const polys = [f.numerator, ...f.denominator.map((d) => d.base)];
  return polys.every((p) =>
    p.ring.generators.every((g) => g.kind !== 'jet' || g.name === field || !involves(p, g.name)),
  );
}
