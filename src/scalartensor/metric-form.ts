/**
 * From a vector form to √−g [G4 R + Σ K_AB X^AB + √|J_μ J^μ| − V] by the rules of form-rules.ts, in their order: which step did
 * what, at which one it stops, and what is left of the spatial curvature. Functions are fractions, because fields that were
 * integrated out leave denominators.
 */
import { type Fraction, negateFraction } from '../algebra/fraction.js';
import type { Ring } from '../algebra/ring.js';
import {
  curvatureRemainder,
  expansionByParts,
  type FormRule,
  gradientProducts,
  movingNames,
  tradeExpansion,
  unitVector,
  withoutCurvature,
} from './form-rules.js';
import {
  CURRENT_ROOT,
  kineticName,
  METRIC_CURVATURE,
  occurs,
  pairsOf,
  ringOf,
  termsIn,
  type VectorForm,
  zeroFraction,
} from './vector-form.js';

/** The rules in the order in which they are tried, by the ids of rules/auxiliary/normal.yaml. */
export const FORM_RULES: ReadonlyMap<string, FormRule> = new Map([
  ['expansion-by-parts', expansionByParts],
  ['expansion-for-curvature', tradeExpansion],
  ['spatial-curvature', curvatureRemainder],
  ['products-of-gradients', gradientProducts],
  ['unit-timelike-vector', unitVector],
]);

/** One application: some terms of the form replaced by others. */
export interface FormStep {
  readonly rule: string;
  readonly taken: Fraction;
  readonly given: Fraction;
}

/** Where the rules stop. */
export interface FormStop {
  readonly rule: string;
  readonly reason: string;
  readonly offending: Fraction;
}

export interface MetricFunctions {
  readonly g4: Fraction;
  /** Keyed `A,B`, one entry for each unordered pair in the order of the scalars. */
  readonly kinetic: ReadonlyMap<string, Fraction>;
  readonly current: ReadonlyMap<string, Fraction>;
  readonly potential: Fraction;
}

export interface MetricForm {
  readonly steps: readonly FormStep[];
  /** The first stop. One at ³R does not end the derivation: it goes on at ³R = 0. */
  readonly stop: FormStop | undefined;
  /** Absent when the rules stopped for another reason than ³R. */
  readonly reached:
    | {
        readonly functions: MetricFunctions;
        readonly form: VectorForm;
        /** What the vector form has beyond these functions; zero when they hold for every k. */
        readonly remainder: Fraction;
      }
    | undefined;
}

const CURVATURE_RULE = 'spatial-curvature';

/** Applies the rules. */
export function metricForm(start: VectorForm): MetricForm {
  const ring = ringOf(start.value);
  const steps: FormStep[] = [];
  let form = start;
  let stop: FormStop | undefined;
  let remainder = zeroFraction(ring);
  for (const [rule, apply] of FORM_RULES) {
    const outcome = apply(form);
    if (outcome.kind === 'nothing') continue;
    if (outcome.kind === 'applied') {
      steps.push({ rule, taken: outcome.taken, given: outcome.given });
      form = outcome.after;
      continue;
    }
    const { reason, offending } = outcome;
    stop = { rule, reason, offending };
    if (rule !== CURVATURE_RULE) return { steps, stop, reached: undefined };
    remainder = offending;
    form = withoutCurvature(form);
  }
  if (movingNames(form.scalars).some((name) => occurs(form.value, name)))
    throw new Error('a vector form still contains n after all rules');
  return { steps, stop, reached: { functions: functionsOf(form, ring), form, remainder } };
}

function functionsOf(form: VectorForm, ring: Ring): MetricFunctions {
  const { scalars } = form;
  const pairs = pairsOf(scalars);
  const names = [METRIC_CURVATURE, CURRENT_ROOT, ...pairs.map(([a, b]) => kineticName(a, b))];
  const terms = termsIn(form.value, names) ?? [];
  const coefficient = (name: string): Fraction =>
    terms.find((t) => t.powers.has(name))?.coefficient ?? zeroFraction(ring);
  const rest = terms.find((t) => t.powers.size === 0)?.coefficient ?? zeroFraction(ring);
  return {
    g4: coefficient(METRIC_CURVATURE),
    kinetic: new Map(pairs.map(([a, b]) => [`${a},${b}`, coefficient(kineticName(a, b))])),
    current: form.current ?? new Map(scalars.map((q) => [q, zeroFraction(ring)])),
    potential: negateFraction(rest),
  };
}
