/**
 * Lagrangians √−g L of scalars, a unit timelike vector n and the curvature of the surfaces normal to it: L is a fraction over a
 * ring with the generators D(q,n) = n·∂q, div(n) = θ = ∇_μ n^μ, R3(n) = ³R and, once n is gone, R(g), X(A,B) = −½ ∂A·∂B and
 * the root √|J_μ J^μ|, beside the scalars. Calculus on such fractions and their value on a background. Imports the algebra only.
 */
import { antiderivative } from '../algebra/calculus.js';
import { collect, involves, moveTo, substitute } from '../algebra/collect.js';
import {
  addFraction,
  divideFraction,
  type Fraction,
  fraction,
  multiplyFraction,
  negateFraction,
  partialOfFraction,
} from '../algebra/fraction.js';
import { constant, generator, isZero, monomial, multiply, type Poly, scale, zero } from '../algebra/poly.js';
import { ONE, type Rational, rational } from '../algebra/rational.js';
import { constantsOf, jetName, makeRing, type Ring } from '../algebra/ring.js';

export interface VectorForm {
  readonly value: Fraction;
  readonly scalars: readonly string[];
  /** J_A by scalar, when the root √|J²| of J_μ = Σ J_A ∂_μ A occurs: the branch that is +J_A n·∂A. */
  readonly current?: ReadonlyMap<string, Fraction>;
  /** Generators that stand for the value of a field which is only known as a root of an equation. */
  readonly roots?: readonly Root[];
}

/** A generator r with Σ coefficients[i] r^i = 0. */
export interface Root {
  readonly name: string;
  /** By power, the last one not zero; in the ring of the form, free of r. */
  readonly coefficients: readonly Fraction[];
}

/** Names of generators that no user can spell. */
export const rateAlong = (q: string): string => `D(${q},n)`;
export const EXPANSION = 'div(n)';
export const SPATIAL_CURVATURE = 'R3(n)';
export const METRIC_CURVATURE = 'R(g)';
export const CURRENT_ROOT = 'root(J)';
/** X^AB for an unordered pair of scalars given in their order. */
export const kineticName = (a: string, b: string): string => `X(${a},${b})`;

/** Unordered pairs of scalars as [A, B], in order. */
export const pairsOf = (scalars: readonly string[]): [string, string][] =>
  scalars.flatMap((a, i) => scalars.slice(i).map((b): [string, string] => [a, b]));

/** The ring of vector forms with some scalars and constants. */
export const vectorRing = (scalars: readonly string[], constants: readonly string[]): Ring =>
  makeRing(
    constantsOf([
      ...scalars.map(rateAlong),
      EXPANSION,
      SPATIAL_CURVATURE,
      METRIC_CURVATURE,
      ...pairsOf(scalars).map(([a, b]) => kineticName(a, b)),
      CURRENT_ROOT,
      ...scalars,
      ...constants,
    ]),
  );

export const ringOf = (f: Fraction): Ring => f.numerator.ring;
export const isZeroFraction = (f: Fraction): boolean => isZero(f.numerator);
export const zeroFraction = (ring: Ring): Fraction => fraction(zero(ring));
export const asFraction = (p: Poly): Fraction => fraction(p);
export const subtractFraction = (a: Fraction, b: Fraction): Fraction => addFraction(a, negateFraction(b));
export const scaleFraction = (a: Fraction, by: Rational): Fraction =>
  multiplyFraction(a, fraction(constant(ringOf(a), by)));
export const sumFractions = (ring: Ring, terms: readonly Fraction[]): Fraction =>
  terms.reduce(addFraction, zeroFraction(ring));

/** Whether a generator occurs. */
export const occurs = (f: Fraction, name: string): boolean =>
  involves(f.numerator, name) || f.denominator.some(({ base }) => involves(base, name));

/** a^n for an integer n. @throws RangeError for a negative power of zero. */
export function powerFraction(a: Fraction, n: number): Fraction {
  if (n < 0) return divideFraction(fraction(constant(ringOf(a), 1)), powerFraction(a, -n));
  let out = fraction(constant(ringOf(a), 1));
  for (let i = 0; i < n; i++) out = multiplyFraction(out, a);
  return out;
}

/** One monomial in the chosen generators and what multiplies it. */
export interface FractionTerm {
  readonly powers: ReadonlyMap<string, number>;
  readonly coefficient: Fraction;
}

/** f as a Laurent polynomial in some generators; undefined when its denominators contain one of them. */
export function termsIn(f: Fraction, names: readonly string[]): FractionTerm[] | undefined {
  if (f.denominator.some(({ base }) => names.some((name) => involves(base, name)))) return undefined;
  const { ring } = f.numerator;
  const places = new Set(names.map((name) => ring.position.get(name)));
  return collect(f.numerator, (g) => places.has(g)).map(({ monomial: powers, coefficient }) => ({
    powers: new Map(powers.map(([g, e]) => [ring.generators[g]!.name, e])),
    coefficient: fraction(coefficient, f.denominator),
  }));
}

/** Π name^exponent as a fraction. */
export const productOf = (ring: Ring, powers: ReadonlyMap<string, number>): Fraction =>
  fraction(monomial(ring, ONE, powers));

/** The sum of some terms. */
export const sumOfTerms = (ring: Ring, terms: readonly FractionTerm[]): Fraction =>
  sumFractions(
    ring,
    terms.map(({ powers, coefficient }) => multiplyFraction(coefficient, productOf(ring, powers))),
  );

/** A polynomial with generators replaced by fractions of a target ring; the others keep their names. */
export function insertInto(p: Poly, images: ReadonlyMap<string, Fraction>, target: Ring): Fraction {
  const { ring } = p;
  const powers = new Map<string, Fraction>();
  const powerOf = (name: string, e: number): Fraction => {
    const key = `${name}^${e}`;
    const known = powers.get(key) ?? powerFraction(images.get(name)!, e);
    powers.set(key, known);
    return known;
  };
  const terms = collect(p, (g) => images.has(ring.generators[g]!.name)).map(({ monomial: found, coefficient }) =>
    found.reduce(
      (acc, [g, e]) => multiplyFraction(acc, powerOf(ring.generators[g]!.name, e)),
      fraction(moveTo(coefficient, target)),
    ),
  );
  return sumFractions(target, terms);
}

/** f with generators replaced. @throws RangeError when a denominator becomes zero. */
export const insert = (f: Fraction, images: ReadonlyMap<string, Fraction>, target: Ring = ringOf(f)): Fraction =>
  f.denominator.reduce(
    (acc, { base, power: n }) => divideFraction(acc, powerFraction(insertInto(base, images, target), n)),
    insertInto(f.numerator, images, target),
  );

/** n·∂ of a function of the scalars and ³R. On a background without shear ³R goes as the inverse square of lengths, n·∂³R = −⅔ θ ³R. */
export function alongNormal(f: Fraction, scalars: readonly string[]): Fraction {
  const ring = ringOf(f);
  const g = (name: string): Fraction => fraction(generator(ring, name));
  const rates = scalars.map((q) => multiplyFraction(partialOfFraction(f, q), g(rateAlong(q))));
  const dilution = multiply(generator(ring, EXPANSION), generator(ring, SPATIAL_CURVATURE));
  const curvature = multiplyFraction(
    partialOfFraction(f, SPATIAL_CURVATURE),
    scaleFraction(fraction(dilution), { num: -2n, den: 3n }),
  );
  return sumFractions(ring, [...rates, curvature]);
}

/** Integral over one scalar; undefined when it is no Laurent polynomial there or has a logarithm. */
export function integralOver(f: Fraction, scalar: string): Fraction | undefined {
  if (f.denominator.some(({ base }) => involves(base, scalar))) return undefined;
  const { primitive, rest } = antiderivative(f.numerator, scalar);
  return isZero(rest) ? fraction(primitive, f.denominator) : undefined;
}

/** What a background makes of the generators. */
export interface Background {
  readonly ring: Ring;
  readonly lapse: string;
  /** θ and ³R there, and the determinant of the coframe, in `ring`. */
  readonly expansion: Poly;
  readonly spatialCurvature: Poly;
  /** Curvature scalar of the metric connection. */
  readonly metricCurvature: Poly;
  readonly volume: Poly;
}

/** √−g L on a background, as a fraction in the jets of lapse, scale factor and scalars. */
export function onBackground({ value, scalars, current }: VectorForm, background: Background): Fraction {
  const { ring, lapse } = background;
  const rate = (q: string): Poly => multiply(generator(ring, jetName(q, 1)), generator(ring, lapse, -1));
  const images = new Map<string, Poly>([
    [EXPANSION, background.expansion],
    [SPATIAL_CURVATURE, background.spatialCurvature],
    [METRIC_CURVATURE, background.metricCurvature],
    ...scalars.map((q): [string, Poly] => [rateAlong(q), rate(q)]),
    ...pairsOf(scalars).map(([a, b]): [string, Poly] => [
      kineticName(a, b),
      scale(multiply(rate(a), rate(b)), rational(1, 2)),
    ]),
  ]);
  const image = (p: Poly): Poly => substitute(p, images, ring);
  const imageOf = (f: Fraction): Fraction =>
    fraction(
      image(f.numerator),
      f.denominator.map(({ base, power: n }) => ({ base: image(base), power: n })),
    );
  const terms = current ? termsIn(value, [CURRENT_ROOT]) : [{ powers: new Map<string, number>(), coefficient: value }];
  if (!terms) throw new Error('the root of the current in a denominator');
  const branch = sumFractions(
    ring,
    [...(current ?? [])].map(([q, j]) => multiplyFraction(imageOf(j), fraction(rate(q)))),
  );
  const whole = sumFractions(
    ring,
    terms.map(({ powers, coefficient }) =>
      multiplyFraction(imageOf(coefficient), powerFraction(branch, powers.get(CURRENT_ROOT) ?? 0)),
    ),
  );
  return multiplyFraction(whole, fraction(background.volume));
}

/** f as a polynomial; undefined when it has a denominator. */
export const asPoly = (f: Fraction): Poly | undefined => (f.denominator.length === 0 ? f.numerator : undefined);
