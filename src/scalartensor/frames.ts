/**
 * The Einstein frame of a bi-scalar form, or the frame of a conformal factor of the user: functions, determinant and signature
 * of the kinetic matrix, domain. Every frame is reduced again on the metric geometry before it is returned.
 * The signs found here are those of this form of the background equations; they say nothing about the particle spectrum of
 * the torsion theory.
 */
import { collect } from '../algebra/collect.js';
import { type Fraction, fraction } from '../algebra/fraction.js';
import { fractionInFactors, type ProductForm, type ProductSign, signOfProduct } from '../algebra/known-factors.js';
import { isZero, type Poly, scale } from '../algebra/poly.js';
import { type Knowledge, NEGATIVE, POSITIVE, signOf, VANISHING, type Verdict } from '../algebra/signs.js';
import type { BiScalarFunctions, BiScalarRoles } from './biscalar.js';
import { determinant, type FrameFunctions, jordanFrame, kineticMatrix, transformed } from './conformal.js';
import { verifyFrame } from './frame-check.js';

/** The value of which a sign is wanted, in factors, and what is known of it. */
export interface SignStatement {
  readonly value: ProductForm;
  readonly sign: ProductSign;
}

/**
 * positive: both fields have kinetic terms of the usual sign; negative: both of the other; indefinite: one each;
 * degenerate: a combination of the fields has none; undecided: it depends on the two signs, given as conditions.
 */
export type Signature = 'positive' | 'negative' | 'indefinite' | 'degenerate' | 'undecided';

export interface ConformalFrame {
  readonly kind: 'einstein' | 'chosen';
  /** Ω² of g̃ = Ω² g. */
  readonly omega2: Fraction;
  /** +1, or −1 when G4 is negative and Ω² = −2G4/M²: then gravity has the wrong sign in this frame. */
  readonly side: 1 | -1;
  readonly functions: FrameFunctions;
  readonly determinant: Fraction;
  readonly signature: {
    readonly verdict: Signature;
    readonly determinant: SignStatement;
    /** Keyed by scalar: K_AA. */
    readonly diagonal: ReadonlyMap<string, SignStatement>;
    /** Assumptions on which the verdict rests. */
    readonly used: readonly string[];
  };
  /** Ω² > 0: where the map exists. */
  readonly domain: Verdict;
  /** What is known on that domain. */
  readonly knowledge: Knowledge;
}

export type FrameOutcome =
  | { readonly found: true; readonly frame: ConformalFrame }
  | { readonly found: false; readonly reason: string };

/** The coefficients of the monomials in the fields: likely factors of other expressions. */
export const coefficientsIn = (polys: readonly Poly[]): Poly[] =>
  polys.flatMap((p) => collect(p, (g) => p.ring.generators[g]!.kind === 'jet').map((c) => c.coefficient));

/** What may divide a sign condition of a form. */
export const candidatesOf = (f: BiScalarFunctions): Poly[] => [
  f.g4,
  ...coefficientsIn([f.g4, ...f.kinetic.values(), ...f.current.values(), f.potential]),
];

/** What is known when a value is taken for positive, listed as `text`. */
export const withPositive = (knowledge: Knowledge, value: Poly, text: string): Knowledge => ({
  ...knowledge,
  assumptions: [...knowledge.assumptions, { value, relation: '>', text }],
});

/**
 * The frame in which the curvature scalar is multiplied by M²/2.
 * @param planckMassSquared M² in the ring of the form.
 * @throws Error when the frame does not reduce to the form again.
 */
export function einsteinFrame(
  form: BiScalarFunctions,
  roles: BiScalarRoles,
  planckMassSquared: Poly,
  knowledge: Knowledge,
): FrameOutcome {
  if (isZero(form.g4))
    return {
      found: false,
      reason:
        'there is no Einstein frame: G4 vanishes, so the metric curvature scalar does not occur in the form at all',
    };
  const verdict = signOf(form.g4, knowledge);
  const side = (verdict.signs & POSITIVE) === 0 ? -1 : 1;
  const omega2 = fraction(scale(form.g4, 2 * side), [{ base: planckMassSquared, power: 1 }]);
  const positive = scale(form.g4, side);
  const domain = side === 1 ? verdict : { signs: POSITIVE, used: verdict.used };
  const known = withPositive(knowledge, positive, side === 1 ? 'G4 > 0' : 'G4 < 0');
  return { found: true, frame: frameOf('einstein', side, form, omega2, roles, domain, known) };
}

/** The frame g̃ = Ω² g for a polynomial Ω² of the user. @throws as `einsteinFrame`. */
export function chosenFrame(
  form: BiScalarFunctions,
  roles: BiScalarRoles,
  omega2: Poly,
  knowledge: Knowledge,
): FrameOutcome {
  const domain = signOf(omega2, knowledge);
  if ((domain.signs & POSITIVE) === 0)
    return { found: false, reason: 'there is no such frame: Ω² is nowhere positive' };
  const known = withPositive(knowledge, omega2, 'Ω² > 0');
  return { found: true, frame: frameOf('chosen', 1, form, fraction(omega2), roles, domain, known) };
}

function frameOf(
  kind: ConformalFrame['kind'],
  side: 1 | -1,
  form: BiScalarFunctions,
  omega2: Fraction,
  roles: BiScalarRoles,
  domain: Verdict,
  knowledge: Knowledge,
): ConformalFrame {
  const functions = transformed(jordanFrame(form), omega2);
  verifyFrame(form, functions, omega2, roles);
  const matrix = kineticMatrix(functions.kinetic, roles.scalars);
  const det = determinant(matrix, form.g4.ring);
  // A denominator is a power of what is positive here, up to a number and couplings; it is a factor like any other.
  const candidates = [...candidatesOf(form), omega2.numerator];
  const statement = (f: Fraction): SignStatement => {
    const value = fractionInFactors(f, candidates);
    return { value, sign: signOfProduct(value, knowledge) };
  };
  const diagonal = new Map(roles.scalars.map((q, i) => [q, statement(matrix[i]![i]!)]));
  const ofDeterminant = statement(det);
  const first = [...diagonal.values()][0]?.sign;
  return {
    kind,
    omega2,
    side,
    functions,
    determinant: det,
    signature: { ...verdictOf(ofDeterminant.sign, first), determinant: ofDeterminant, diagonal },
    domain,
    knowledge,
  };
}

/** For two fields; with one field the determinant is its own kinetic coefficient. */
function verdictOf(
  det: Verdict,
  first: Verdict | undefined,
): { readonly verdict: Signature; readonly used: readonly string[] } {
  const used = [...new Set([...det.used, ...(first?.used ?? [])])];
  if (det.signs === VANISHING) return { verdict: 'degenerate', used: det.used };
  if (det.signs === NEGATIVE) return { verdict: 'indefinite', used: det.used };
  if (det.signs === POSITIVE && first?.signs === POSITIVE) return { verdict: 'positive', used };
  if (det.signs === POSITIVE && first?.signs === NEGATIVE) return { verdict: 'negative', used };
  return { verdict: 'undecided', used: [] };
}
