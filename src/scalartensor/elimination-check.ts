/**
 * Second route for everything that is integrated out: the Euler–Lagrange equations of the Lagrangian with all its fields, with
 * the solutions inserted, against those of the Lagrangian without them, on the background and for every spatial curvature.
 */
import { timeDerivative } from '../algebra/calculus.js';
import {
  equalFraction,
  type Fraction,
  multiplyFraction,
  negateFraction,
  partialOfFraction,
  timeDerivativeOfFraction,
} from '../algebra/fraction.js';
import { type Poly, power } from '../algebra/poly.js';
import { jetName } from '../algebra/ring.js';
import type { EliminationBranch, EliminationStep } from './auxiliary.js';
import {
  asFraction,
  type Background,
  insert,
  isZeroFraction,
  onBackground,
  sumFractions,
  type VectorForm,
} from './vector-form.js';

/** Highest derivative of a field that a first-order Lagrangian's equations contain. */
const MAX_ORDER = 2;

/** Σ (−d/dt)^n ∂L/∂D(q,n) of a fraction. */
export function eulerLagrangeOfFraction(lagrangian: Fraction, field: string): Fraction {
  const { ring } = lagrangian.numerator;
  const parts: Fraction[] = [];
  for (let n = 0; n <= MAX_ORDER && ring.position.has(jetName(field, n)); n++) {
    let moved = partialOfFraction(lagrangian, jetName(field, n));
    if (isZeroFraction(moved)) continue;
    for (let i = 0; i < n; i++) moved = timeDerivativeOfFraction(moved);
    parts.push(n % 2 === 0 ? moved : negateFraction(moved));
  }
  return sumFractions(ring, parts);
}

/** A scalar value of a vector form on the background, without the volume, which is a single term. */
const scalarOnBackground = (value: Fraction, form: VectorForm, background: Background): Fraction =>
  multiplyFraction(onBackground({ ...form, value }, background), asFraction(power(background.volume, -1)));

/** The solved fields and their derivatives as expressions in what is left, in the jets of the background. */
function images(
  steps: readonly EliminationStep[],
  scalars: readonly string[],
  background: Background,
): Map<string, Fraction> {
  const out = new Map<string, Fraction>();
  for (const { solved, before } of [...steps].reverse()) {
    if (!solved) continue;
    const own = scalarOnBackground(solved.value, { ...before, scalars }, background);
    let value = insert(own, out);
    for (let n = 0; n <= MAX_ORDER; n++) {
      out.set(jetName(solved.field, n), value);
      if (n < MAX_ORDER) value = timeDerivativeOfFraction(value);
    }
  }
  return out;
}

/** Whether the comparison can be made: every field that went has a value, and none is the root of an equation. */
export const isComparable = ({ steps }: EliminationBranch): boolean =>
  steps.every(
    ({ constraint, root, solved, field }) => !constraint && !root?.root && (!solved || solved.field === field),
  );

/**
 * Whether the equations of `start` with the solutions of a branch inserted are those of the branch, for the given fields, and
 * those of the fields that went hold identically.
 * @param fields lapse and scale factor first.
 */
export function sameEquations(
  start: VectorForm,
  branch: EliminationBranch,
  fields: readonly string[],
  background: Background,
): boolean {
  const all = onBackground(start, background);
  const left = onBackground({ ...branch.form, scalars: start.scalars }, background);
  const known = images(branch.steps, start.scalars, background);
  const gone = new Set(branch.steps.flatMap((s) => (s.solved ? [s.solved.field] : [])));
  return [...fields, ...start.scalars].every((q) => {
    const inserted = insert(eulerLagrangeOfFraction(all, q), known);
    return gone.has(q) ? isZeroFraction(inserted) : equalFraction(inserted, eulerLagrangeOfFraction(left, q));
  });
}

/** The same for a field that is given as an expression in the others: the way back from a linearised Lagrangian. */
export function sameOnSubstitution(
  extended: VectorForm,
  original: VectorForm,
  values: ReadonlyMap<string, Poly>,
  fields: readonly string[],
  background: Background,
): boolean {
  const known = new Map<string, Fraction>();
  for (const [field, value] of values) {
    let derivative = value;
    for (let n = 0; n <= MAX_ORDER; n++) {
      known.set(jetName(field, n), asFraction(derivative));
      if (n < MAX_ORDER) derivative = timeDerivative(derivative);
    }
  }
  const [wide, narrow] = [extended, original].map((f) => onBackground(f, background)) as [Fraction, Fraction];
  return [...fields, ...extended.scalars].every((q) => {
    const inserted = insert(eulerLagrangeOfFraction(wide, q), known);
    return values.has(q) ? isZeroFraction(inserted) : equalFraction(inserted, eulerLagrangeOfFraction(narrow, q));
  });
}
