/**
 * The constraint-vector form, the way from it to the metric analogue and the auxiliary route as plain data for derivation.json,
 * documented in docs/formats.md. Names such as D(phi,n) and div(n) are generators of their own in these texts.
 */
import { symbolsOf } from '../algebra/collect.js';
import type { Fraction } from '../algebra/fraction.js';
import { infix } from '../algebra/infix.js';
import type { Poly } from '../algebra/poly.js';
import type { AuxiliaryRoute, Derivation, EveryK, RouteBranch } from '../derivation.js';
import type { SolvedConditions } from '../mechanics/linear-conditions.js';
import type { EliminationBranch, EliminationStep } from '../scalartensor/auxiliary.js';
import type { CurrentResult } from '../scalartensor/current-zeros.js';
import type { MetricForm } from '../scalartensor/metric-form.js';
import type { Root } from '../scalartensor/vector-form.js';
import { fractionText } from './scalar-fields-json.js';

const texts = (map: ReadonlyMap<string, Poly>): Record<string, string> =>
  Object.fromEntries([...map].map(([key, p]) => [key, infix(p)]));
const fractionTexts = (map: ReadonlyMap<string, Fraction>): Record<string, string> =>
  Object.fromEntries([...map].map(([key, f]) => [key, fractionText(f)]));

const conditionsObject = ({ impossible, solved, open }: SolvedConditions): Record<string, unknown> => ({
  impossible,
  solved: texts(solved),
  open: open.map(infix),
});

const currentObject = ({ branch, zeros, potential }: CurrentResult): Record<string, unknown> => ({
  branch,
  timelike: 'J_A n·∂A is not zero',
  zeros: zeros.map(({ vanishing, conditions }) => ({ vanishing, conditions: conditions.map(infix) })),
  ...(potential ? { potential: fractionText(potential) } : {}),
});

const metricObject = ({ steps, stop, reached }: MetricForm): Record<string, unknown> => ({
  steps: steps.map(({ rule, taken, given }) => ({ rule, taken: fractionText(taken), given: fractionText(given) })),
  ...(stop ? { stop: { rule: stop.rule, reason: stop.reason, terms: fractionText(stop.offending) } } : {}),
  ...(reached
    ? {
        G4: fractionText(reached.functions.g4),
        kinetic: fractionTexts(reached.functions.kinetic),
        current: fractionTexts(reached.functions.current),
        potential: fractionText(reached.functions.potential),
        remainder: fractionText(reached.remainder),
        validFor: reached.remainder.numerator.size === 0 ? 'every k' : 'k = 0',
      }
    : {}),
});

const rootObject = ({ name, coefficients }: Root): Record<string, unknown> => ({
  name,
  equation: coefficients.map(fractionText),
});

function stepObject(s: EliminationStep): Record<string, unknown> {
  return {
    rule: s.rule,
    field: s.field,
    ...(s.solved ? { solved: { field: s.solved.field, value: fractionText(s.solved.value) } } : {}),
    ...(s.constraint ? { [s.constraint.kind]: fractionText(s.constraint.value) } : {}),
    ...(s.root?.root ? { root: rootObject(s.root.root) } : {}),
    ...(s.root?.radicand ? { realWhereNotNegative: infix(s.root.radicand) } : {}),
    loses: s.loses.map(({ what, where }) => (where ? { what, where: `${fractionText(where)} = 0` } : { what })),
    lagrangian: fractionText(s.after.value),
  };
}

const branchObject = ({ form, steps, refused }: EliminationBranch): Record<string, unknown> => ({
  steps: steps.map(stepObject),
  scalars: form.scalars,
  lagrangian: fractionText(form.value),
  ...(form.roots ? { roots: form.roots.map(rootObject) } : {}),
  ...(refused.length > 0 ? { refused } : {}),
});

function everyKObject({ vector, metric, current, conditions, screening, integrated }: EveryK): Record<string, unknown> {
  return {
    components: texts(vector.components),
    lagrangian: fractionText(vector.form.value),
    constraint: 'n^2 + 1',
    ...(metric ? { toMetric: metricObject(metric) } : {}),
    ...(current ? { current: currentObject(current) } : {}),
    ...(conditions ? { conditions: conditionsObject(conditions) } : {}),
    ...(screening ? { screening: conditionsObject(screening) } : {}),
    ...(integrated
      ? { integrated: { ...branchObject(integrated.branch), toMetric: metricObject(integrated.metric) } }
      : {}),
  };
}

const routeBranchObject = ({ branch, metric, isCompared, current }: RouteBranch): Record<string, unknown> => ({
  ...branchObject(branch),
  ...(metric ? { toMetric: metricObject(metric) } : {}),
  ...(current ? { current: currentObject(current) } : {}),
  equationsCompared: isCompared,
});

const auxiliaryObject = ({
  fields,
  hessian,
  start,
  integrated,
  branches,
}: AuxiliaryRoute): Record<string, unknown> => ({
  fields: fields.map(({ name, scalar, value }) => ({ name, scalar, value: infix(value) })),
  ...(hessian ? { hessian: infix(hessian) } : {}),
  lagrangian: fractionText(start.value),
  integrated,
  branches: branches.map(routeBranchObject),
});

/** The keys `everyK` and `auxiliary`, as far as the derivation has them. */
export const vectorObjects = ({ everyK, auxiliary }: Derivation): Record<string, unknown> => ({
  ...(everyK ? { everyK: everyKObject(everyK) } : {}),
  ...(auxiliary ? { auxiliary: auxiliaryObject(auxiliary) } : {}),
});

/** Names of the symbols of these texts that are constants of the theory. */
export const vectorSymbols = ({ everyK, auxiliary, ring }: Derivation): string[] =>
  [everyK?.vector.form.value, auxiliary?.start.value]
    .flatMap((f) => (f ? symbolsOf(f.numerator) : []))
    .filter((name) => ring.position.has(name));
