/**
 * Functions of two scalars rewritten in a canonical field z of one of them and the rescaled field ζ of the current. With
 * x = A/λ, C and S stand for cosh and sinh (or cos and sin) of z/s, so that brackets 1 ± x² become single powers.
 * Invariant: what is returned goes back to the function exactly when C and S are expressed by x again.
 */
import { collect } from '../algebra/collect.js';
import { divideExactly, splitUnit } from '../algebra/division.js';
import { addFraction, equalFraction, type Fraction, fraction, multiplyFraction } from '../algebra/fraction.js';
import { constant, generator, isZero, multiply, type Poly, power } from '../algebra/poly.js';
import type { Branch, CanonicalCase } from './canonical-fields.js';
import { inverse, numberFraction, powerOf, scaledFraction } from './conformal.js';
import type { CurrentWeight } from './current-weight.js';
import { bracketOf, simplified } from './kinetic-shape.js';

/** coefficient · ζ^zeta · w^root · η^eta · λ^lambda · C^c · S^s; without named functions x^s. */
export interface FieldTerm {
  readonly coefficient: Fraction;
  readonly zeta: number;
  /** 1 when a factor w, the ratio φ/ζ, is left. */
  readonly root: 0 | 1;
  /** 1 when the sign η of the bracket in w is left. */
  readonly eta: 0 | 1;
  readonly lambda: number;
  readonly c: number;
  readonly s: number;
}

/** x and the bracket 1 + τx² as ± C^c S^s. */
interface Images {
  readonly x: readonly [c: number, s: number];
  readonly bracket: readonly [sign: 1 | -1, c: number, s: number];
}

const IMAGES: Readonly<Record<string, Images>> = {
  tanh: { x: [-1, 1], bracket: [1, -2, 0] },
  coth: { x: [1, -1], bracket: [-1, 0, -2] },
  tan: { x: [-1, 1], bracket: [1, -2, 0] },
  sinh: { x: [0, 1], bracket: [1, 2, 0] },
  sin: { x: [0, 1], bracket: [1, 2, 0] },
  cosh: { x: [1, 0], bracket: [-1, 0, 2] },
};

/** A function of one field only, as it multiplies ζ^zeta w^root η^eta. */
interface Group {
  readonly zeta: number;
  readonly root: 0 | 1;
  readonly eta: 0 | 1;
  readonly value: Fraction;
}

/** Whether φ² = ζ² w² is a polynomial in ψ up to a sign. */
const isPolynomialWeight = ({ ofField, ofBracket }: CurrentWeight): boolean =>
  ofField.den === 1n && ofField.num >= 0n && 2n % ofBracket.den === 0n && ofBracket.num >= 0n;

/**
 * The powers of φ in a function as powers of ζ. Even powers of w are polynomials in ψ times a power of η, the sign of g.
 * @param eta the sign of g when it is known.
 */
function groupsOf(
  f: Fraction,
  weight: CurrentWeight | undefined,
  other: string,
  eta: 1 | -1 | undefined,
): Group[] | undefined {
  const { ring } = f.numerator;
  const place = ring.position.get(other)!;
  const groups = new Map<string, { zeta: number; root: 0 | 1; eta: 0 | 1; parts: Poly[] }>();
  for (const { monomial, coefficient } of collect(f.numerator, (g) => g === place)) {
    const n = monomial[0]?.[1] ?? 0;
    if (n < 0 || (n > 0 && (!weight || !isPolynomialWeight(weight)))) return undefined;
    const half = n >> 1;
    const bracketPower = weight ? Number((2n * weight.ofBracket.num) / weight.ofBracket.den) * half : 0;
    const fieldPower = weight ? 2 * Number(weight.ofField.num) * half : 0;
    const squared = weight
      ? multiply(power(weight.g, bracketPower), power(generator(ring, weight.by), fieldPower))
      : constant(ring, 1);
    const open: 0 | 1 = bracketPower % 2 === 0 || eta !== undefined ? 0 : 1;
    const sign = bracketPower % 2 !== 0 && eta === -1 ? -1 : 1;
    const root: 0 | 1 = n % 2 === 0 ? 0 : 1;
    const key = `${n};${root};${open}`;
    const group = groups.get(key) ?? { zeta: n, root, eta: open, parts: [] };
    group.parts.push(multiply(multiply(coefficient, squared), constant(ring, sign)));
    groups.set(key, group);
  }
  return [...groups.values()].map(({ parts, ...rest }) => ({
    ...rest,
    value: parts.map((p) => fraction(p, f.denominator)).reduce(addFraction),
  }));
}

/** The bracket of the case: what 1 + τx² is in the field. */
function bracketIn(
  field: string,
  unit: Fraction,
  coefficient: Fraction,
): { readonly value: Fraction; readonly r: Fraction } {
  const r = multiplyFraction(coefficient, inverse(unit));
  const { ring } = unit.numerator;
  return { value: bracketOf({ coefficients: [numberFraction(ring, 0), r], exponent: 1 }, field, ring), r };
}

/**
 * A function of the field A and, through ζ, of the other scalar, in the variables of a case and a branch.
 * Undefined when it has denominators that the named functions do not simplify, or odd structure that no weight covers.
 */
export function inNewFields(
  f: Fraction,
  field: string,
  other: string,
  at: CanonicalCase,
  by: Branch,
  weight: CurrentWeight | undefined,
  eta: 1 | -1 | undefined,
  candidates: readonly Poly[],
): readonly FieldTerm[] | undefined {
  const images = IMAGES[by.inverse];
  if (!images || at.unit?.degree !== 2) return undefined;
  const groups = groupsOf(f, weight, other, eta);
  if (!groups) return undefined;
  const { ring } = f.numerator;
  const [only] = at.square.factors;
  const tau = only!.coefficients[1]!;
  const unit = at.unit.value;
  const { value: bracket } = bracketIn(field, unit, numberFraction(ring, tau));
  const place = ring.position.get(field)!;
  const out: FieldTerm[] = [];
  for (const group of groups) {
    // Every base is a constant times the bracket, or there is no power of C or S for it.
    let outer = numberFraction(ring, 1);
    let brackets = 0;
    for (const { base, power: n } of group.value.denominator) {
      const constantPart = fraction(constantOf(base, place));
      const isBracket = equalFraction(fraction(base), multiplyFraction(constantPart, bracket));
      const isConstant = equalFraction(fraction(base), constantPart);
      if (isZero(constantPart.numerator) || (!isBracket && !isConstant)) return undefined;
      outer = multiplyFraction(outer, powerOf(inverse(constantPart), n));
      if (isBracket && !isConstant) brackets -= n;
    }
    // Brackets above the line are powers of C or S too.
    let top = group.value.numerator;
    const base = splitUnit(bracket.numerator).reduced;
    const unitOfBracket = fractionInverse(bracket, base);
    for (let quotient = divideExactly(top, base); quotient && !isZero(top); quotient = divideExactly(top, base)) {
      top = quotient;
      outer = multiplyFraction(outer, unitOfBracket);
      brackets++;
    }
    const [sign, bc, bs] = images.bracket;
    const terms = new Map<string, FieldTerm>();
    for (const { monomial, coefficient } of collect(top, (g) => g === place)) {
      const n = monomial[0]?.[1] ?? 0;
      if (n < 0) return undefined;
      const whole = powerOf(unit, n >> 1);
      const value = simplified(multiplyFraction(multiplyFraction(fraction(coefficient), whole), outer), candidates);
      const c = n * images.x[0] + brackets * bc;
      const s = n * images.x[1] + brackets * bs;
      const signed = sign === -1 && brackets % 2 !== 0 ? scaledFraction(value, -1) : value;
      const key = `${n & 1};${c};${s}`;
      const before = terms.get(key);
      terms.set(key, {
        coefficient: before ? addFraction(before.coefficient, signed) : signed,
        zeta: group.zeta,
        root: group.root,
        eta: group.eta,
        lambda: n & 1,
        c,
        s,
      });
    }
    const list = [...terms.values()].filter((t) => !isZero(t.coefficient.numerator));
    if (!equalFraction(backTo(list, field, unit, bracket, images), group.value))
      throw new Error('a function in canonical fields does not go back to the function that it comes from');
    out.push(...list);
  }
  return out;
}

/** What a primitive polynomial is in terms of the bracket that is a multiple of it. */
const fractionInverse = (bracket: Fraction, base: Poly): Fraction => multiplyFraction(fraction(base), inverse(bracket));

/** Coefficient of the zeroth power of a generator. */
function constantOf(p: Poly, place: number): Poly {
  const found = collect(p, (g) => g === place).find(({ monomial }) => monomial.length === 0);
  return found ? found.coefficient : multiply(p, constant(p.ring, 0));
}

/** Σ coefficient λ^l C^c S^s as a function of the field, by C² and S² in terms of the bracket. */
function backTo(
  terms: readonly FieldTerm[],
  field: string,
  unit: Fraction,
  bracket: Fraction,
  { x, bracket: [sign, bc, bs] }: Images,
): Fraction {
  const { ring } = unit.numerator;
  let total = numberFraction(ring, 0);
  for (const { coefficient, lambda, c, s } of terms) {
    // C^c S^s = x^n (± bracket)^m with n x + m (exponents of the bracket) = (c, s).
    const determinant = x[0] * bs - x[1] * bc;
    const n = (c * bs - s * bc) / determinant;
    const m = (x[0] * s - x[1] * c) / determinant;
    if (!Number.isInteger(n) || !Number.isInteger(m) || (n - lambda) % 2 !== 0 || n < 0)
      throw new Error('a term in canonical fields has no counterpart in the field');
    const units = (lambda - n) / 2;
    const pieces = [
      coefficient,
      fraction(generator(ring, field, n)),
      powerOf(units < 0 ? inverse(unit) : unit, Math.abs(units)),
      powerOf(m < 0 ? inverse(bracket) : bracket, Math.abs(m)),
    ].reduce(multiplyFraction);
    total = addFraction(total, sign === -1 && m % 2 !== 0 ? scaledFraction(pieces, -1) : pieces);
  }
  return total;
}
