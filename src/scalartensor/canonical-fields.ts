/**
 * Canonical fields: where the kinetic term of one scalar A decouples, z = ∫ √|K| dA, case by case in the signs on which its
 * form depends, with its inverse and domains where one of the named functions fits, and a series otherwise.
 * Invariant: (dz/dA)² = |K| holds exactly for what is returned; antiderivatives of others are checked where they are found.
 */
import { type Fraction, multiplyFraction } from '../algebra/fraction.js';
import { fractionInFactors, type ProductForm, signOfProduct } from '../algebra/known-factors.js';
import { constant, isZero, multiply, type Poly, scale } from '../algebra/poly.js';
import { type Rational, rational } from '../algebra/rational.js';
import { type Knowledge, NEGATIVE, POSITIVE } from '../algebra/signs.js';
import type { SquaredIntegrand } from '../algebra/squared-integrand.js';
import { inverse, powerOf } from './conformal.js';
import type { SignStatement } from './frames.js';
import {
  dependsOnlyOn,
  type FieldSeries,
  type KineticShape,
  leadingCoefficientOf,
  type Rescaled,
  rebuilt,
  rescaled,
  shapeOf,
  slopeSeries,
} from './kinetic-shape.js';

/** Functions with a known inverse: z = factor · s · F(x), x = A/λ. */
export type NamedFunction =
  | 'linear'
  | 'log'
  | 'power'
  | 'artanh'
  | 'arcoth'
  | 'arctan'
  | 'arsinh'
  | 'arcsin'
  | 'arcosh';

/** One interval of the field. */
export interface Branch {
  readonly named: NamedFunction;
  /** x as a function of z/s: `tanh`, `coth`, `tan`, `sinh`, `sin`, `cosh`, `exp`, or empty for a power. */
  readonly inverse: string;
  /** The interval of x. */
  readonly domain: string;
  /** Sign of K there relative to that at small x. */
  readonly relativeSign: 1 | -1;
  /** For `power`: z = s x^exponent/exponent. */
  readonly exponent?: Rational;
}

export interface CanonicalCase {
  /** The sign that r has in this case, and what is known of it. Undefined when there is only one case. */
  readonly condition: { readonly of: SignStatement; readonly sign: 1 | -1 } | undefined;
  /** A = λx with λ^degree = unit; undefined when x is A itself. */
  readonly unit: { readonly degree: number; readonly value: Fraction } | undefined;
  /** s² = |value| λ^extra with z = s ∫ √square dx. */
  readonly scale: { readonly value: Fraction; readonly extra: number };
  /** Sign of K at small x in this case; undefined when it is not known, with the statement that decides it. */
  readonly kineticSign: 1 | -1 | undefined;
  readonly kinetic: SignStatement;
  readonly square: SquaredIntegrand;
  /** Empty when no named function fits. */
  readonly branches: readonly Branch[];
}

export interface CanonicalField {
  readonly scalar: string;
  /** K of −½ K (∂A)². */
  readonly slopeSquared: Fraction;
  readonly shape: KineticShape;
  readonly cases: readonly CanonicalCase[];
  /** Of dz/dA; undefined when a closed form was found in every case. */
  readonly series: FieldSeries;
}

const branch = (named: NamedFunction, inverse: string, domain: string, relativeSign: 1 | -1 = 1): Branch => ({
  named,
  inverse,
  domain,
  relativeSign,
});

/** Named functions whose derivative squared is (1 + τx²)^exponent up to sign, by `τ;exponent`. */
const OF_QUADRATIC: ReadonlyMap<string, readonly Branch[]> = new Map([
  ['-1;-2', [branch('artanh', 'tanh', 'x^2 < 1'), branch('arcoth', 'coth', 'x^2 > 1')]],
  ['1;-2', [branch('arctan', 'tan', 'all x')]],
  ['1;-1', [branch('arsinh', 'sinh', 'all x')]],
  ['-1;-1', [branch('arcsin', 'sin', 'x^2 < 1'), branch('arcosh', 'cosh', 'x^2 > 1', -1)]],
]);

/** The named functions for an integrand. */
export function namedBranches({ power, factors }: SquaredIntegrand): readonly Branch[] {
  if (factors.length === 0) {
    if (power === 0) return [branch('linear', '', 'all x')];
    if (power === -2) return [branch('log', 'exp', 'x > 0, or x < 0 with -x for x')];
    return [{ ...branch('power', '', 'x > 0, or x < 0 with -x for x'), exponent: rational(power + 2, 2) }];
  }
  const [only, ...others] = factors;
  if (others.length > 0 || power !== 0 || only!.coefficients.length !== 2) return [];
  const [linear, quadratic] = only!.coefficients as [Rational, Rational];
  if (linear.num !== 0n || quadratic.den !== 1n) return [];
  return OF_QUADRATIC.get(`${quadratic.num};${only!.exponent}`) ?? [];
}

/** The open factors multiplied out: a polynomial with the sign of the product. */
export const signPoly = ({ number, factors }: ProductForm, like: Poly): Poly =>
  factors.reduce((p, { base, power }) => (power % 2 === 0 ? p : multiply(p, base)), constant(like.ring, number));

/**
 * The canonical field of a scalar, when its kinetic coefficient decouples; undefined when it does not or vanishes.
 * @param kinetic by pair, as in a frame.
 * @param candidates polynomials that may divide coefficients.
 */
export function canonicalField(
  scalar: string,
  kinetic: ReadonlyMap<string, Fraction>,
  candidates: readonly Poly[],
  knowledge: Knowledge,
  order: number,
): CanonicalField | undefined {
  const mixes = [...kinetic].some(([key, k]) => {
    const [a, b] = key.split(',');
    return a !== b && (a === scalar || b === scalar) && !isZero(k.numerator);
  });
  const k = kinetic.get(`${scalar},${scalar}`);
  if (mixes || !k || isZero(k.numerator) || !dependsOnlyOn(k, scalar)) return undefined;
  const shape = shapeOf(k, scalar, candidates);
  return {
    scalar,
    slopeSquared: k,
    shape,
    cases: casesOf(shape, candidates, knowledge),
    series: slopeSeries(shape, order),
  };
}

function casesOf(shape: KineticShape, candidates: readonly Poly[], knowledge: Knowledge): CanonicalCase[] {
  const leading = leadingCoefficientOf(shape);
  if (!leading) {
    const square: SquaredIntegrand = { power: shape.power, factors: [] };
    return [caseOf(shape, undefined, undefined, square, candidates, knowledge)];
  }
  const value = fractionInFactors(leading.r, candidates);
  const of: SignStatement = { value, sign: signOfProduct(value, knowledge) };
  return ([-1, 1] as const).flatMap((sign) => {
    if ((of.sign.signs & (sign === 1 ? POSITIVE : NEGATIVE)) === 0) return [];
    const unit = rescaled(shape, sign);
    if (!unit) return [];
    const known = of.sign.signs === POSITIVE || of.sign.signs === NEGATIVE;
    const open = signPoly(of.sign.open, shape.constant.numerator);
    const here = known
      ? knowledge
      : {
          ...knowledge,
          assumptions: [...knowledge.assumptions, { value: scale(open, sign), relation: '>' as const, text: '' }],
        };
    return [caseOf(shape, { of, sign }, unit, unit.square, candidates, here)];
  });
}

function caseOf(
  shape: KineticShape,
  condition: CanonicalCase['condition'],
  unit: Rescaled | undefined,
  square: SquaredIntegrand,
  candidates: readonly Poly[],
  knowledge: Knowledge,
): CanonicalCase {
  const degree = unit?.degree ?? 1;
  const whole = unit ? Math.floor((shape.power + 2) / degree) : 0;
  const factor = unit ? powerOf(whole < 0 ? inverse(unit.unit) : unit.unit, Math.abs(whole)) : undefined;
  const product = fractionInFactors(factor ? multiplyFraction(shape.constant, factor) : shape.constant, candidates);
  const sign = signOfProduct(product, knowledge);
  return {
    condition,
    unit: unit && { degree, value: unit.unit },
    scale: {
      value: rebuilt(product, shape.constant.numerator.ring),
      extra: unit ? shape.power + 2 - whole * degree : 0,
    },
    kineticSign: sign.signs === POSITIVE ? 1 : sign.signs === NEGATIVE ? -1 : undefined,
    kinetic: { value: product, sign },
    square,
    branches: namedBranches(square),
  };
}
