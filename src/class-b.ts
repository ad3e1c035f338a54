/**
 * Derivations on geometries whose structure constants have a trace. Varying after the symmetry has been imposed would give
 * wrong equations there, so they are taken from the components of the covariant field equations.
 */
import { eulerLagrange } from './algebra/calculus.js';
import { moveTo, symbolsOf } from './algebra/collect.js';
import { splitUnit } from './algebra/division.js';
import { add, equals, isZero, type Poly, zero } from './algebra/poly.js';
import { covariantTheory } from './covariant.js';
import type { Check, Derivation } from './derivation.js';
import { componentEvaluator, equationComponents, projected, ringWith } from './geometry/covariant-components.js';
import { maskOf } from './geometry/forms.js';
import type { Geometry } from './geometry/geometry.js';
import { symbolicValue } from './geometry/reduction.js';
import { couplingCombinations } from './mechanics/couplings.js';
import type { Theory } from './notation/theory.js';
import { settingOf } from './setting.js';
import { type SparseTensor, unpackIndices } from './tensor/components.js';

/**
 * The derivation of a theory from its covariant equations.
 * @throws as `derive` and `covariantTheory`.
 */
export function deriveClassB(
  theory: Theory,
  keepMomenta: boolean,
  onStep: (what: string) => void = () => {},
): Derivation {
  const setting = settingOf(theory, onStep);
  const { geometry, ring, relations, terms, fluids, fix } = setting;
  const covariant = covariantTheory({ theory, ring, terms }, keepMomenta, onStep);
  onStep('taking components of the covariant equations');
  const wide = ringWith(geometry, ring);
  const components = equationComponents(covariant.equations, componentEvaluator(geometry, wide));
  const gravityEquations = projected(geometry, wide, components);
  const equations = new Map(
    [...gravityEquations].map(([q, e]) => [q, fix(add(moveTo(e, ring), eulerLagrange(setting.matter, q)))]),
  );
  const checks: Check[] = [
    ...geometry.checks.map((c) => ({ ...c, detail: `geometry ${geometry.id}` })),
    ...covariant.checks,
  ];
  const constants = theory.symbols.filter((s) => s.role === 'scale').map((s) => s.name);
  const parameters = geometry.parameters.map((p) => p.name);
  const seen = [...gravityEquations.values()].map((e) => moveTo(e, ring));
  const combinations = seen.flatMap((e) => couplingCombinations(fix(e), parameters, constants));
  const derivation: Derivation = {
    theory,
    geometry,
    fields: geometry.fields,
    ring,
    relations,
    terms,
    ...(setting.rewriting.length > 0 ? { rewriting: setting.rewriting } : {}),
    invariants: terms
      .filter((t) => t.factors.length > 0)
      .map(({ factors }) => ({ factors, value: symbolicValue(geometry, factors) })),
    gravity: fix(setting.gravity),
    fluids,
    lagrangian: fix(setting.lagrangian),
    reducedGravity: fix(setting.gravity),
    dropped: zero(ring),
    equations,
    constraints: furtherComponents(geometry, components, seen, (p) => fix(moveTo(p, ring))),
    combinations: combinations.filter(
      (p, i) => symbolsOf(p).length > 0 && !combinations.slice(0, i).some((q) => equals(p, q)),
    ),
    screening: undefined,
    friedmann: undefined,
    scalarTensor: {
      form: 'none',
      reason: `a metric analogue is defined on an isotropic background; the geometry ${geometry.id} is none`,
      offending: undefined,
    },
    covariant,
    checks,
  };
  return Object.freeze(derivation);
}

/**
 * Components that no variation of a field reaches, each once: `E_01`, `E_120`. Comoving matter without spin does not enter
 * them; those along the fields' own directions follow from the equations of the fields.
 */
function furtherComponents(
  geometry: Geometry,
  { coframe, connection }: { readonly coframe: SparseTensor; readonly connection: SparseTensor },
  equations: readonly Poly[],
  finish: (p: Poly) => Poly,
): ReadonlyMap<string, Poly> {
  const found = new Map<string, Poly>();
  const known = equations.filter((e) => !isZero(e)).map((e) => splitUnit(e).reduced);
  for (const tensor of [coframe, connection])
    for (const [packed, value] of tensor.entries) {
      const indices = unpackIndices(packed, tensor.rank);
      const p = finish(value);
      if (isZero(p) || isVaried(geometry, indices)) continue;
      const { reduced } = splitUnit(p);
      if (known.some((e) => equals(e, reduced))) continue;
      known.push(reduced);
      found.set(`E_${indices.join('')}`, p);
    }
  return found;
}

/** Whether the ansatz has a function there: the diagonal of the coframe, or a component of the connection. */
const isVaried = ({ connection }: Geometry, [a, b, c]: readonly number[]): boolean =>
  c === undefined ? a === b : connection[a!]![b!]!.has(maskOf([c]));
