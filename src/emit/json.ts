/**
 * The derivation as JSON for other programs, documented in docs/formats.md. Expressions are infix texts in φ, ψ and the
 * lapse, whatever variables the printed outputs use.
 */
import { symbolsOf } from '../algebra/collect.js';
import { infix } from '../algebra/infix.js';
import type { Poly } from '../algebra/poly.js';
import { printRational } from '../algebra/rational.js';
import type { CovariantTheory, Derivation, ScalarTensorForm } from '../derivation.js';
import { printLagrangian } from '../notation/print.js';
import type { TensorSum } from '../tensor/expression.js';
import { constrainedObject, constrainedSymbols } from './constrained-json.js';
import { vectorObjects, vectorSymbols } from './every-k-json.js';
import { factorsTex } from './latex-tensors.js';
import { scalarFieldSymbols, scalarFieldsObject } from './scalar-fields-json.js';

/** Version of the format; it grows when a key changes its meaning. */
export const FORMAT_VERSION = 1;

const texts = (map: ReadonlyMap<string, Poly>): Record<string, string> =>
  Object.fromEntries([...map].map(([key, p]) => [key, infix(p)]));

function scalarTensorObject(form: ScalarTensorForm): Record<string, unknown> {
  if (form.form === 'none')
    return { form: 'none', reason: form.reason, ...(form.offending ? { offending: infix(form.offending) } : {}) };
  return {
    form: form.form,
    validFor: form.validFor,
    G4: infix(form.g4),
    kinetic: texts(form.kinetic),
    current: texts(form.current),
    potential: infix(form.potential),
    curvatureObstruction: infix(form.obstruction),
  };
}

const tensorSum = (sum: TensorSum): { coefficient: string; tensors: string }[] =>
  sum.map(({ coefficient, factors }) => ({ coefficient: infix(coefficient), tensors: factorsTex(factors).join(' ') }));

const covariantObject = (c: CovariantTheory): Record<string, unknown> => ({
  lagrangian: tensorSum(c.lagrangian),
  momenta: { P_abc: tensorSum(c.momenta.torsion), Q_abcd: tensorSum(c.momenta.curvature) },
  E_ab: tensorSum(c.equations.coframe),
  E_abc: tensorSum(c.equations.connection),
  withMomenta: { E_ab: tensorSum(c.withMomenta.coframe), E_abc: tensorSum(c.withMomenta.connection) },
  metricTerms: tensorSum(c.inMetricTerms),
});

const covariantCoefficients = (c: CovariantTheory): Poly[] =>
  [c.lagrangian, c.momenta.torsion, c.momenta.curvature, c.equations.coframe, c.equations.connection, c.inMetricTerms]
    .flat()
    .map((t) => t.coefficient);

/** Every polynomial that the JSON prints. */
function expressions(d: Derivation): Poly[] {
  const form = d.scalarTensor;
  return [
    d.lagrangian,
    ...d.equations.values(),
    d.reducedGravity,
    d.dropped,
    ...(d.constraints?.values() ?? []),
    ...d.combinations,
    ...(d.screening ?? []),
    ...(d.friedmann ? [d.friedmann.rhoT, d.friedmann.pT] : []),
    ...(d.covariant ? covariantCoefficients(d.covariant) : []),
    ...d.relations.eliminated.values(),
    ...d.relations.conditions.map((c) => c.value),
    ...(form.form === 'none'
      ? form.offending
        ? [form.offending]
        : []
      : [form.g4, ...form.kinetic.values(), ...form.current.values(), form.potential, form.obstruction]),
  ];
}

/** Names of all symbols of any printed expression that are not fields, in the order of the ring. */
export function parametersOf(d: Derivation): string[] {
  const used = new Set([
    ...expressions(d).flatMap(symbolsOf),
    ...constrainedSymbols(d),
    ...scalarFieldSymbols(d),
    ...vectorSymbols(d),
  ]);
  return d.ring.generators.filter((g) => g.kind !== 'jet' && used.has(g.name)).map((g) => g.name);
}

/** Plain data, ready for JSON.stringify; key order is fixed. */
export function derivationObject(d: Derivation): Record<string, unknown> {
  return {
    untwist: FORMAT_VERSION,
    theory: d.theory.name,
    geometry: d.geometry.id,
    variables: d.fields.map((f) => f.name),
    parameters: parametersOf(d),
    sources: d.fluids.filter((f) => f.isSource && !d.relations.eliminated.has(f.density)).map((f) => f.density),
    fluids: d.theory.matter.map((m) => ({ name: m.name, density: m.density, w: printRational(m.w) })),
    eliminated: texts(d.relations.eliminated),
    conditions: d.relations.conditions.map((c) => `${infix(c.value)} = 0`),
    ...(d.elsewhere
      ? {
          lagrangianIn: d.elsewhere.map((e) => ({
            conventions: e.name,
            text: printLagrangian(e.terms, { symbols: e.symbols }),
          })),
        }
      : {}),
    lagrangian: infix(d.lagrangian),
    reduced: infix(d.reducedGravity),
    dropped: infix(d.dropped),
    equations: texts(d.equations),
    ...(d.constraints ? { constraints: texts(d.constraints) } : {}),
    combinations: d.combinations.map(infix),
    ...(d.screening ? { screening: d.screening.map(infix) } : {}),
    ...(d.friedmann ? { friedmann: { rho_T: infix(d.friedmann.rhoT), p_T: infix(d.friedmann.pT) } } : {}),
    scalarTensor: scalarTensorObject(d.scalarTensor),
    ...vectorObjects(d),
    ...scalarFieldsObject(d),
    ...constrainedObject(d, scalarTensorObject),
    ...(d.covariant ? { covariant: covariantObject(d.covariant) } : {}),
    checks: d.checks.map(({ name, holds, detail }) => ({ name, holds, detail })),
    warnings: d.theory.warnings.map((w) => w.message),
  };
}

/** The JSON text, indented, with a final newline. */
export const derivationJson = (d: Derivation): string => `${JSON.stringify(derivationObject(d), null, 2)}\n`;
