/**
 * Rules that act on a whole vector form and lead from n, θ and ³R to the metric alone: integrations by parts, the trade of θ²
 * for curvature, products of gradients, the root that is left of n. Each takes some terms and gives others, or says why it
 * cannot. What they hold for is stated in rules/auxiliary/normal.yaml, under the same names.
 */
import {
  addFraction,
  equalFraction,
  type Fraction,
  fraction,
  multiplyFraction,
  negateFraction,
  partialOfFraction,
} from '../algebra/fraction.js';
import { generator } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import type { Ring } from '../algebra/ring.js';
import {
  alongNormal,
  CURRENT_ROOT,
  EXPANSION,
  type FractionTerm,
  isZeroFraction,
  kineticName,
  METRIC_CURVATURE,
  pairsOf,
  rateAlong,
  ringOf,
  SPATIAL_CURVATURE,
  scaleFraction,
  subtractFraction,
  sumFractions,
  sumOfTerms,
  termsIn,
  type VectorForm,
  zeroFraction,
} from './vector-form.js';

/** What a rule does to a form. */
export type FormOutcome =
  | { readonly kind: 'applied'; readonly after: VectorForm; readonly taken: Fraction; readonly given: Fraction }
  /** The form has no terms of that kind. */
  | { readonly kind: 'nothing' }
  | { readonly kind: 'stopped'; readonly reason: string; readonly offending: Fraction };

export type FormRule = (form: VectorForm) => FormOutcome;

/** Everything that moves or curves, in which a form is taken apart. */
export const movingNames = (scalars: readonly string[]): string[] => [
  ...scalars.map(rateAlong),
  EXPANSION,
  SPATIAL_CURVATURE,
];

const NO_TERMS = 'the Lagrangian is no polynomial in the velocities, θ and ³R: they occur in a denominator';

/** Degree of a term in the rates, and in θ. */
const degreesOf = ({ powers }: FractionTerm): { readonly rates: number; readonly expansion: number } => {
  let total = 0;
  for (const [name, e] of powers) if (name !== SPATIAL_CURVATURE) total += e;
  const expansion = powers.get(EXPANSION) ?? 0;
  return { rates: total - expansion, expansion };
};

const hasCurvature = ({ powers }: FractionTerm): boolean => powers.has(SPATIAL_CURVATURE);

/** Terms of a form that a test picks; the rule stops when the form cannot be taken apart. */
function picked(
  { value, scalars }: VectorForm,
  test: (term: FractionTerm) => boolean,
): FractionTerm[] | Extract<FormOutcome, { kind: 'stopped' }> {
  const terms = termsIn(value, movingNames(scalars));
  return terms ? terms.filter(test) : { kind: 'stopped', reason: NO_TERMS, offending: value };
}

/** The form with some terms replaced by others. */
function exchanged(form: VectorForm, taken: Fraction, given: Fraction, more: Partial<VectorForm> = {}): FormOutcome {
  if (isZeroFraction(taken)) return { kind: 'nothing' };
  const value = addFraction(subtractFraction(form.value, taken), given);
  return { kind: 'applied', after: { ...form, ...more, value }, taken, given };
}

const symbol = (ring: Ring, name: string): Fraction => fraction(generator(ring, name));

/** f ³R^m θ = −³R^m n·∂f/(1 − 2m/3) + ∇_μ(…), for f a function of the scalars. */
export const expansionByParts: FormRule = (form) => {
  const ring = ringOf(form.value);
  const found = picked(form, (t) => degreesOf(t).expansion === 1 && degreesOf(t).rates === 0);
  if (!Array.isArray(found)) return found;
  const given = found.map(({ powers, coefficient }) => {
    const m = powers.get(SPATIAL_CURVATURE) ?? 0;
    const flow = sumOfTerms(ring, [
      { powers: new Map([[SPATIAL_CURVATURE, m]]), coefficient: alongNormal(coefficient, form.scalars) },
    ]);
    return scaleFraction(flow, rational(-3, 3 - 2 * m));
  });
  return exchanged(form, sumOfTerms(ring, found), sumFractions(ring, given));
};

/** F θ² + 3 θ n·∂F = −3/2 F (R − ³R) + ∇_μ(…), F a function of the scalars: Gauss' equation without shear. */
export const tradeExpansion: FormRule = (form) => {
  const ring = ringOf(form.value);
  const { scalars } = form;
  const found = picked(form, (t) => degreesOf(t).expansion > 0 && !hasCurvature(t));
  if (!Array.isArray(found)) return found;
  const steep = found.filter((t) => degreesOf(t).expansion + degreesOf(t).rates > 2);
  if (steep.length > 0)
    return {
      kind: 'stopped',
      reason: 'terms of more than second degree in the velocities have no counterpart in this class',
      offending: sumOfTerms(ring, steep),
    };
  const square = found.find((t) => degreesOf(t).expansion === 2)?.coefficient ?? zeroFraction(ring);
  const mixed = (q: string): Fraction =>
    found.find((t) => t.powers.has(rateAlong(q)))?.coefficient ?? zeroFraction(ring);
  const wrong = scalars.map((q) => ({
    q,
    excess: subtractFraction(mixed(q), scaleFraction(partialOfFraction(square, q), rational(3))),
  }));
  if (wrong.some(({ excess }) => !isZeroFraction(excess)))
    return {
      kind: 'stopped',
      reason:
        'the coefficient of θ times a velocity must be three times the derivative of the coefficient of θ² and is not',
      offending: sumFractions(
        ring,
        wrong.map(({ q, excess }) =>
          multiplyFraction(multiplyFraction(excess, symbol(ring, rateAlong(q))), symbol(ring, EXPANSION)),
        ),
      ),
    };
  const curvature = subtractFraction(symbol(ring, METRIC_CURVATURE), symbol(ring, SPATIAL_CURVATURE));
  const given = scaleFraction(multiplyFraction(square, curvature), rational(-3, 2));
  return exchanged(form, sumOfTerms(ring, found), given);
};

/** What is left of ³R must vanish; where it does not, the form holds at ³R = 0 only. */
export const curvatureRemainder: FormRule = (form) => {
  const found = picked(form, hasCurvature);
  if (!Array.isArray(found)) return found;
  if (found.length === 0) return { kind: 'nothing' };
  const steep = found.some((t) => (t.powers.get(SPATIAL_CURVATURE) ?? 0) !== 1);
  const isMoving = found.some((t) => degreesOf(t).expansion + degreesOf(t).rates > 0);
  const isFunction = found.some(({ coefficient }) =>
    form.scalars.some((q) => !isZeroFraction(partialOfFraction(coefficient, q))),
  );
  const reason = isMoving
    ? 'curvature obstruction: ³R is multiplied by velocities'
    : steep
      ? 'curvature obstruction: ³R occurs in more than first degree'
      : isFunction
        ? 'curvature obstruction: ³R is multiplied by a function of the scalars that is not the one in front of R'
        : 'curvature obstruction: ³R is left with a constant coefficient that is not the one in front of R';
  return { kind: 'stopped', reason, offending: sumOfTerms(ringOf(form.value), found) };
};

/** (n·∂A)(n·∂B) = −∂A·∂B = 2 X^AB, both gradients being along n. */
export const gradientProducts: FormRule = (form) => {
  const ring = ringOf(form.value);
  const found = picked(form, (t) => degreesOf(t).rates > 1 && degreesOf(t).expansion === 0 && !hasCurvature(t));
  if (!Array.isArray(found)) return found;
  const steep = found.filter((t) => degreesOf(t).rates > 2);
  if (steep.length > 0)
    return {
      kind: 'stopped',
      reason: 'terms of more than second degree in the velocities have no counterpart in this class',
      offending: sumOfTerms(ring, steep),
    };
  const given = pairsOf(form.scalars).flatMap(([a, b]) => {
    const term = found.find(({ powers }) =>
      a === b ? powers.get(rateAlong(a)) === 2 : powers.has(rateAlong(a)) && powers.has(rateAlong(b)),
    );
    return term
      ? [scaleFraction(multiplyFraction(term.coefficient, symbol(ring, kineticName(a, b))), rational(2))]
      : [];
  });
  return exchanged(form, sumOfTerms(ring, found), sumFractions(ring, given));
};

/** J_A n·∂A + λ(n² + 1) = √|J_μ J^μ| on the branch where it is +J_A n·∂A. */
export const unitVector: FormRule = (form) => {
  const ring = ringOf(form.value);
  const found = picked(form, (t) => degreesOf(t).rates === 1 && degreesOf(t).expansion === 0 && !hasCurvature(t));
  if (!Array.isArray(found)) return found;
  const current = new Map(
    form.scalars.map((q) => [
      q,
      found.find(({ powers }) => powers.has(rateAlong(q)))?.coefficient ?? zeroFraction(ring),
    ]),
  );
  return exchanged(form, sumOfTerms(ring, found), symbol(ring, CURRENT_ROOT), { current });
};

/** What is left of a rule's reading when nothing moves any more: whether two forms have equal values. */
export const sameForm = (a: VectorForm, b: VectorForm): boolean => equalFraction(a.value, b.value);

/** The form without its terms in ³R. */
export function withoutCurvature(form: VectorForm): VectorForm {
  const found = picked(form, hasCurvature);
  if (!Array.isArray(found)) return form;
  return { ...form, value: addFraction(form.value, negateFraction(sumOfTerms(ringOf(form.value), found))) };
}
