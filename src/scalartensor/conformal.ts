/**
 * Conformal maps of √−g [F R + Σ K_AB X^AB + √|J_μ J^μ| − V] to g̃ = Ω² g, with Ω² any function of the scalars. All
 * functions are exact fractions; of the odd powers of Ω in the current only one root is left, kept as its square.
 * Invariant: `transformed` by Ω² and then by Ω^-2 gives back the same functions.
 */
import {
  addFraction,
  type Fraction,
  fraction,
  multiplyFraction,
  negateFraction,
  partialOfFraction,
} from '../algebra/fraction.js';
import { constant, type Poly } from '../algebra/poly.js';
import { type Rational, rational } from '../algebra/rational.js';
import type { Ring } from '../algebra/ring.js';
import type { BiScalarFunctions } from './biscalar.js';

/** The functions of a form in some conformal frame. */
export interface FrameFunctions {
  /** F, which multiplies the curvature scalar. */
  readonly coupling: Fraction;
  /** Keyed `A,B`: coefficient of X^AB = −½ ∂A·∂B, once for each unordered pair. */
  readonly kinetic: ReadonlyMap<string, Fraction>;
  /** J_A = √root · current_A. */
  readonly current: ReadonlyMap<string, Fraction>;
  readonly root: Fraction;
  readonly potential: Fraction;
}

export const numberFraction = (ring: Ring, value: Rational | number): Fraction => fraction(constant(ring, value));
export const scaledFraction = (f: Fraction, factor: Rational | number): Fraction =>
  multiplyFraction(f, numberFraction(f.numerator.ring, factor));

const mapped = <T>(of: ReadonlyMap<string, T>, by: (value: T, key: string) => Fraction): Map<string, Fraction> =>
  new Map([...of].map(([key, value]) => [key, by(value, key)]));

/** The form as it was found, matter coupled to its own metric. */
export const jordanFrame = (f: BiScalarFunctions): FrameFunctions => ({
  coupling: fraction(f.g4),
  kinetic: mapped(f.kinetic, (p: Poly) => fraction(p)),
  current: mapped(f.current, (p: Poly) => fraction(p)),
  root: numberFraction(f.g4.ring, 1),
  potential: fraction(f.potential),
});

/** numerator/Π base^power upside down. @throws RangeError for zero. */
export function inverse(f: Fraction): Fraction {
  const one = constant(f.numerator.ring, 1);
  const top = f.denominator.reduce(
    (p, { base, power }) => multiplyFraction(p, powerOf(fraction(base), power)),
    fraction(one),
  );
  return multiplyFraction(top, fraction(one, [{ base: f.numerator, power: 1 }]));
}

/** f^n for n ≥ 0. */
export const powerOf = (f: Fraction, n: number): Fraction =>
  Array.from({ length: n }, () => f).reduce(multiplyFraction, numberFraction(f.numerator.ring, 1));

const product = (first: Fraction, ...rest: readonly Fraction[]): Fraction => rest.reduce(multiplyFraction, first);

/** ∂_A ln Ω for Ω² = omega2. */
export const logarithmicSlope = (omega2: Fraction, field: string): Fraction =>
  scaledFraction(multiplyFraction(partialOfFraction(omega2, field), inverse(omega2)), rational(1, 2));

/**
 * The form in the metric g̃ = Ω² g, total derivatives dropped. With ω = ln Ω and F̃ = F/Ω²: K̃ gains 12 (F̃_A ω_B + F̃ ω_A ω_B)
 * symmetrised, because R = Ω² [R̃ + 6 □̃ω − 6 (∂̃ω)²] (Phys. Rev. D 81 (2010) 084044, arXiv:1003.1159).
 * @throws RangeError when Ω² is zero.
 */
export function transformed(form: FrameFunctions, omega2: Fraction): FrameFunctions {
  const one = inverse(omega2);
  const two = multiplyFraction(one, one);
  const coupling = multiplyFraction(form.coupling, one);
  const slopes = new Map<string, { readonly of: Fraction; readonly log: Fraction }>();
  for (const q of form.current.keys())
    slopes.set(q, { of: partialOfFraction(coupling, q), log: logarithmicSlope(omega2, q) });
  return {
    coupling,
    kinetic: mapped(form.kinetic, (k, key) => {
      const [a, b] = key.split(',').map((q) => slopes.get(q)!) as [Slope, Slope];
      const gain = addFraction(product(a.of, b.log), product(coupling, a.log, b.log));
      // An unordered pair of different scalars stands for two entries of the matrix.
      const whole =
        a === b ? gain : addFraction(gain, addFraction(product(b.of, a.log), product(coupling, a.log, b.log)));
      return addFraction(multiplyFraction(k, one), scaledFraction(whole, 12));
    }),
    current: mapped(form.current, (j) => multiplyFraction(j, two)),
    root: multiplyFraction(form.root, omega2),
    potential: multiplyFraction(form.potential, two),
  };
}

interface Slope {
  readonly of: Fraction;
  readonly log: Fraction;
}

/** The matrix K_AB of −½ K_AB ∂A·∂B, row by row. */
export function kineticMatrix(kinetic: ReadonlyMap<string, Fraction>, scalars: readonly string[]): Fraction[][] {
  const entry = (a: string, b: string): Fraction => {
    if (a === b) return kinetic.get(`${a},${b}`)!;
    return scaledFraction((kinetic.get(`${a},${b}`) ?? kinetic.get(`${b},${a}`))!, rational(1, 2));
  };
  return scalars.map((a) => scalars.map((b) => entry(a, b)));
}

/** Determinant by expansion along the first row. */
export function determinant(matrix: readonly (readonly Fraction[])[], ring: Ring): Fraction {
  const [first, ...rest] = matrix;
  if (!first) return numberFraction(ring, 1);
  return first
    .map((x, i) => {
      const minor = multiplyFraction(
        x,
        determinant(
          rest.map((row) => row.filter((_, j) => j !== i)),
          ring,
        ),
      );
      return i % 2 === 0 ? minor : negateFraction(minor);
    })
    .reduce(addFraction);
}
