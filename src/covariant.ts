/**
 * Covariant field equations of a theory, checked on every bundled geometry: their components must equal the reduced
 * Euler–Lagrange expressions wherever varying after symmetry reduction is legitimate.
 */
import { eulerLagrange } from './algebra/calculus.js';
import { moveTo } from './algebra/collect.js';
import { constant, equals, multiply, type Poly, sum } from './algebra/poly.js';
import type { Check, CovariantTheory, Derivation } from './derivation.js';
import { geometryNames, loadGeometry } from './geometry/build.js';
import { componentEvaluator, equationComponents, projected, ringWith } from './geometry/covariant-components.js';
import type { Geometry } from './geometry/geometry.js';
import { density } from './geometry/reduction.js';
import { InputError } from './notation/diagnostics.js';
import { canonicalSum, type TensorSum } from './tensor/expression.js';
import { inMetricTerms, metricKinds } from './tensor/metric-decomposition.js';
import {
  type CovariantEquations,
  fieldEquations,
  fieldMomenta,
  momentumSymbols,
  variationKinds,
} from './tensor/variation.js';

/** What the covariant equations are derived from. */
export type CovariantInput = Pick<Derivation, 'theory' | 'ring' | 'terms'>;

/** Geometries on which varying after symmetry reduction is legitimate. */
const comparable = (d: CovariantInput): Geometry[] =>
  geometryNames()
    .map((id) => loadGeometry(id, d.theory.signature))
    .filter((g) => g.traceless);

/** The derivation with its covariant equations, whose checks join the others. @throws as `covariantTheory`. */
export function withCovariant(d: Derivation, keepMomenta: boolean, onStep?: (what: string) => void): Derivation {
  const covariant = covariantTheory(d, keepMomenta, onStep);
  return { ...d, covariant, checks: [...d.checks, ...covariant.checks] };
}

/**
 * Field equations of the Lagrangian of a derivation.
 * @throws Error when a component differs from the reduced equations on some geometry: the program would be wrong.
 */
export function covariantTheory(
  d: CovariantInput,
  keepMomenta = false,
  onStep: (what: string) => void = () => {},
): CovariantTheory {
  refuseMultipliersAndSpin(d.theory);
  const kinds = variationKinds();
  const lagrangian = canonicalSum(d.terms, kinds);
  const momenta = fieldMomenta(lagrangian, kinds);
  const equations = fieldEquations(lagrangian, momenta, kinds);
  const symbols = momentumSymbols(momenta, constant(d.ring, 1));
  const withMomenta = fieldEquations(lagrangian, symbols, kinds);
  const metricTerms = inMetricTerms(lagrangian, metricKinds());
  const checks = comparable(d).flatMap((geometry): Check[] => {
    const { id } = geometry;
    onStep(`comparing components on ${id}`);
    const { fields, sameValue } = compare(d, geometry, equations, metricTerms);
    if (fields.length > 0)
      throw new Error(`the covariant equations differ from the reduced ones of ${fields} on ${id}`);
    if (!sameValue) throw new Error(`the Lagrangian in metric terms has another value on ${id}`);
    const detail = `their components on the geometry ${id} equal the reduced Euler–Lagrange expressions`;
    const value = `on the geometry ${id} it has the value of the Lagrangian`;
    return [
      { name: 'covariant field equations', holds: true, detail },
      { name: 'Lagrangian in terms of the metric connection', holds: true, detail: value },
    ];
  });
  return { lagrangian, momenta, equations, withMomenta, inMetricTerms: metricTerms, keepMomenta, checks };
}

/** Their covariant equations would need the multiplier and spin tensors themselves, which only have components here. */
function refuseMultipliersAndSpin({ constraints = [], spins = [] }: CovariantInput['theory']): void {
  const [first] = [...constraints, ...spins];
  if (!first) return;
  const message = 'the covariant equations are those of the Lagrangian alone, without multipliers and spin';
  const hint = 'leave out constrain and spin, or --covariant; reduced equations with them need a class A geometry';
  throw new InputError([{ code: 'covariant-alone', severity: 'error', message, hint, ...first.origin }]);
}

/**
 * Where the components of field equations differ from the reduced equations, as `geometry: field`; empty when they agree.
 */
export const covariantMismatches = (d: CovariantInput, equations: CovariantEquations): string[] =>
  comparable(d).flatMap((geometry) => {
    return compare(d, geometry, equations, d.terms).fields.map((q) => `${geometry.id}: ${q}`);
  });

/** Fields whose reduced equation differs from the projection of the covariant ones; whether the metric form agrees. */
function compare(
  d: CovariantInput,
  geometry: Geometry,
  equations: CovariantEquations,
  metricTerms: TensorSum,
): { readonly fields: readonly string[]; readonly sameValue: boolean } {
  const ring = ringWith(geometry, d.ring);
  const reduced: Poly = sum(
    ring,
    d.terms.map(({ coefficient, factors }) =>
      multiply(moveTo(coefficient, ring), moveTo(density(geometry, factors), ring)),
    ),
  );
  const evaluator = componentEvaluator(geometry, ring);
  const projections = projected(geometry, ring, equationComponents(equations, evaluator));
  const value = evaluator.components(metricTerms, []).entries.get(0) ?? constant(ring, 0);
  return {
    fields: [...projections].filter(([q, e]) => !equals(e, eulerLagrange(reduced, q))).map(([q]) => q),
    sameValue: equals(reduced, multiply(moveTo(geometry.volume, ring), value)),
  };
}
