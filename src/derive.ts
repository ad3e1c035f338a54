/**
 * The pipeline: theory → contractions → reduced Lagrangian → equations → scalar-tensor form. One direction; each stage a
 * pure function, each result checked by a second route before it is returned.
 */

import { eulerLagrange, timeDerivative } from './algebra/calculus.js';
import { moveTo, symbolsOf } from './algebra/collect.js';
import { fraction } from './algebra/fraction.js';
import { remember } from './algebra/memo.js';
import { add, equals, generator, isZero, monomial, multiply, negate, type Poly, scale, sum } from './algebra/poly.js';
import {
  addRational,
  multiplyRational,
  negateRational,
  ONE,
  printRational,
  type Rational,
  rational,
} from './algebra/rational.js';
import { constantsOf, exponentAt, type Generator, jetsOf, makeRing, type Ring } from './algebra/ring.js';
import type { Check, Derivation, FluidValue, FriedmannForm, ScalarTensorForm } from './derivation.js';
import { loadGeometry } from './geometry/build.js';
import type { Geometry } from './geometry/geometry.js';
import { MAX_JET_ORDER } from './geometry/read-geometry.js';
import { density, MAX_REDUCED_TERMS, ReductionLimitError, symbolicValue } from './geometry/reduction.js';
import { couplingCombinations, screeningConditions } from './mechanics/couplings.js';
import { conservationResidual, friedmannForm } from './mechanics/friedmann.js';
import { noetherResidual } from './mechanics/identities.js';
import { dropTotalDerivatives } from './mechanics/total-derivatives.js';
import { InputError } from './notation/diagnostics.js';
import { applyImposed, solveRelations } from './notation/impose.js';
import { printLagrangian } from './notation/print.js';
import { polyOfScalar } from './notation/scalar-poly.js';
import { UNIT } from './notation/scalar-term.js';
import type { LagrangianTerm, MatterComponent, Theory } from './notation/theory.js';
import { biScalarForm, type Gravity } from './scalartensor/biscalar.js';
import { ContractionLimitError } from './tensor/contraction.js';
import { dummyFreeKey, NoComponentsError } from './tensor/invariants.js';

/** Symbol of the reduced Planck mass in the Friedmann form. */
const PLANCK_MASS = 'M';

/**
 * Derives everything about a theory.
 * @param onStep is told what is about to be done, for a progress line.
 * @throws InputError when the theory is at fault (unknown geometry, contradictory relations, a limit exceeded);
 * Error when a check fails, which means that this program is wrong.
 */
export function derive(theory: Theory, onStep: (what: string) => void = () => {}): Derivation {
  const geometry = loadGeometry(theory.geometry, theory.signature);
  refuseFieldNames(theory, geometry);
  const fluidsWanted = theory.matter.map((m) => ({ ...m, exponents: dilution(geometry, m) }));
  refuseSteepDilution(fluidsWanted);
  const ring = ringOf(theory, geometry, fluidsWanted);
  const constants = theory.symbols.filter((s) => s.role === 'constant').map((s) => s.name);
  const relations = solveRelations(ring, theory.relations, constants);
  // Relations for the geometry's own parameters wait until the form that needs the parameter as a symbol is found.
  const isParameter = (name: string): boolean => geometry.parameters.some((p) => p.name === name);
  const inCouplings = new Map([...relations.eliminated].filter(([name]) => !isParameter(name)));
  const inParameters = new Map([...relations.eliminated].filter(([name]) => isParameter(name)));
  const couple = (p: Poly): Poly => applyImposed(p, inCouplings, relations.origins);
  const fix = (p: Poly): Poly => applyImposed(p, inParameters, relations.origins);

  const terms = collectTerms(ring, theory.lagrangian, couple);
  let size = 0;
  const gravity = sum(
    ring,
    terms.map(({ coefficient, factors }, i) => {
      onStep(`contracting product ${i + 1} of ${terms.length}`);
      return withinLimits(factors, () => {
        const value = density(geometry, factors, ring);
        size += coefficient.size * value.size;
        if (size > MAX_REDUCED_TERMS) throw new ReductionLimitError(MAX_REDUCED_TERMS);
        return multiply(coefficient, value);
      });
    }),
  );
  const fluids = fluidsWanted.map((m) => fluidValue(ring, m, couple));
  const spatialVolume = moveTo(geometry.spatialVolume, ring);
  const lapse = generator(ring, geometry.lapse);
  const matter = sum(
    ring,
    fluids.map(({ rho }) => negate(multiply(multiply(spatialVolume, lapse), rho))),
  );
  const lagrangian = add(gravity, matter);

  onStep('varying the Lagrangian');
  const fields = geometry.fields.map((f) => f.name);
  const variation = (of: Poly) => new Map(fields.map((q) => [q, eulerLagrange(of, q)] as const));
  const gravityEquations = variation(gravity);
  const matterEquations = variation(matter);
  const equations = new Map(fields.map((q) => [q, add(gravityEquations.get(q)!, matterEquations.get(q)!)] as const));

  const checks: Check[] = geometry.checks.map((c) => ({ ...c, detail: `geometry ${geometry.id}` }));
  const check = (name: string, detail: string, holds: boolean): void => {
    if (!holds) throw new Error(`check failed: ${name} (${detail})`);
    checks.push({ name, holds, detail });
  };
  check(
    'Noether identity of time reparametrisation',
    `the velocities times their equations add up to ${geometry.lapse} times the rate of the equation of ${geometry.lapse}`,
    isZero(noetherResidual(equations, geometry.lapse)),
  );
  for (const fluid of fluids)
    check('continuity of matter', `${fluid.name}: dρ/dt from its law of dilution`, continuity(fluid, geometry));

  const movable = fields.filter((q) => q !== geometry.lapse);
  const { reduced, primitive } = dropTotalDerivatives(gravity, movable, geometry.lapse);
  const boundary = timeDerivative(primitive);
  check(
    'total derivatives',
    'what was dropped is the time derivative of the stated expression',
    equals(gravity, add(reduced, boundary)),
  );
  check(
    'equations without total derivatives',
    'the time derivative that was dropped contributes to no Euler–Lagrange expression',
    fields.every((q) => isZero(eulerLagrange(boundary, q))),
  );

  const friedmann = friedmannOf(geometry, ring, gravityEquations, couple, check);
  onStep('looking for the scalar-tensor form');
  const scalarTensor = scalarTensorOf(geometry, ring, { reduced, equations: gravityEquations }, check);
  const parameters = geometry.parameters.map((p) => p.name);
  const scales = theory.symbols.filter((s) => s.role === 'scale').map((s) => s.name);
  const curvature = geometry.isotropic?.curvature;
  return Object.freeze({
    theory,
    geometry,
    ring,
    relations,
    terms,
    invariants: terms
      .filter((t) => t.factors.length > 0)
      .map(({ factors }) => ({ factors, value: symbolicValue(geometry, factors) })),
    gravity: fix(gravity),
    fluids,
    lagrangian: fix(lagrangian),
    reducedGravity: fix(reduced),
    dropped: fix(primitive),
    equations: new Map([...equations].map(([q, e]) => [q, fix(e)])),
    combinations: couplingCombinations(fix(reduced), parameters, scales).filter((p) => symbolsOf(p).length > 0),
    screening: curvature === undefined ? undefined : screeningConditions(reduced, curvature, parameters, scales),
    friedmann: friedmann && fixFriedmann(friedmann, fix),
    // The form speaks about other values of k too, so a value imposed on k is not put into its obstruction.
    scalarTensor,
    checks,
  });
}

/** Users may not name a constant like a field or parameter of their geometry. */
function refuseFieldNames(theory: Theory, geometry: Geometry): void {
  const taken = new Map([...geometry.fields, ...geometry.parameters].map((s) => [s.name, s.meaning]));
  for (const [field, rate] of geometry.rates) taken.set(rate, `expansion rate of ${field}`);
  const clashes = theory.symbols.filter((s) => taken.has(s.name));
  if (clashes.length === 0) return;
  throw new InputError(
    clashes.map(({ name }) => ({
      code: 'reserved-name',
      severity: 'error',
      message: `${name} is the ${taken.get(name)} of the geometry ${geometry.id}`,
      hint: 'choose another name',
    })),
  );
}

/** What keeps a product from being reduced is the theory's fault, and the product is named. */
function withinLimits(factors: LagrangianTerm['factors'], reduce: () => Poly): Poly {
  try {
    return reduce();
  } catch (error) {
    if (error instanceof NoComponentsError) {
      const message = `${printLagrangian([{ scalar: UNIT, factors }])} cannot be reduced: ${error.message} on a geometry`;
      const hint = 'a Lagrangian that is reduced is made of R, T, A, \\epsilon, \\eta and \\delta';
      throw new InputError([{ code: 'unknown-tensor', severity: 'error', message, hint }]);
    }
    if (!(error instanceof ReductionLimitError || error instanceof ContractionLimitError)) throw error;
    const product = printLagrangian([{ scalar: UNIT, factors }]);
    const message = `the product ${product} is too large for this program: ${error.message}`;
    const hint = 'lower the degree of the Lagrangian, use fewer couplings, or a geometry with more symmetry';
    throw new InputError([{ code: 'terms-limit', severity: 'error', message, hint }]);
  }
}

type Fluid = MatterComponent & { readonly exponents: ReadonlyMap<string, Rational> };

/** ρ ∝ V^-(1+w) by field: the exponent −(1+w)n of each field that the spatial volume contains to the power n. */
function dilution(geometry: Geometry, { w }: MatterComponent): ReadonlyMap<string, Rational> {
  const power = negateRational(addRational(ONE, w));
  const out = new Map<string, Rational>();
  geometry.ring.generators.forEach((g, i) => {
    const n = exponentAt(geometry.spatialVolume.keys, 0, i);
    if (n !== 0) out.set(g.name, multiplyRational(power, rational(n)));
  });
  return out;
}

/** The kernel has powers up to ±511, and the equations need a few more than the density itself. */
const MAX_DILUTION = 500;

function refuseSteepDilution(fluids: readonly Fluid[]): void {
  const steep = fluids.filter(
    (f) => hasPowerLaw(f) && [...f.exponents.values()].some((e) => Math.abs(Number(e.num)) > MAX_DILUTION),
  );
  if (steep.length === 0) return;
  throw new InputError(
    steep.map(({ name, w }) => ({
      code: 'exponent-limit',
      severity: 'error',
      message: `the density of ${name} with w = ${printRational(w)} goes with a power of the scale factor beyond ${MAX_DILUTION}`,
      hint: 'choose a smaller w',
    })),
  );
}

const hasPowerLaw = (fluid: Fluid): boolean => [...fluid.exponents.values()].every((e) => e.den === 1n);

const rings = new Map<string, Ring>();

/** One ring per set of symbols, so that theories of one survey share it. */
function ringOf(theory: Theory, geometry: Geometry, fluids: readonly Fluid[]): Ring {
  const named = new Set([...geometry.parameters.map((p) => p.name), ...theory.symbols.map((s) => s.name), PLANCK_MASS]);
  const powerLaw = fluids.filter((f) => hasPowerLaw(f)).map((f) => f.density);
  for (const name of powerLaw) named.add(name);
  const sources = fluids
    .filter((f) => !hasPowerLaw(f))
    .map((f): Generator => ({ kind: 'source', name: f.density, exponents: f.exponents }));
  const key = JSON.stringify([geometry.id, [...named], fluids.map((f) => [f.density, `${f.w.num}/${f.w.den}`])]);
  return remember(rings, key, () =>
    makeRing([...geometry.fields.flatMap((f) => jetsOf(f.name, MAX_JET_ORDER)), ...sources, ...constantsOf(named)]),
  );
}

/** Terms of the Lagrangian with equal products of tensors collected and the imposed relations applied. */
function collectTerms(
  ring: Ring,
  lagrangian: readonly LagrangianTerm[],
  couple: (p: Poly) => Poly,
): Derivation['terms'] {
  const byProduct = new Map<string, { factors: LagrangianTerm['factors']; parts: Poly[] }>();
  for (const { scalar, factors } of lagrangian) {
    const entry = remember(byProduct, dummyFreeKey(factors), () => ({ factors, parts: [] as Poly[] }));
    entry.parts.push(polyOfScalar(ring, [scalar]));
  }
  return [...byProduct.values()]
    .map(({ factors, parts }) => ({ factors, coefficient: couple(sum(ring, parts)) }))
    .filter(({ coefficient }) => !isZero(coefficient));
}

function fluidValue(ring: Ring, fluid: Fluid, couple: (p: Poly) => Poly): FluidValue {
  const isSource = !hasPowerLaw(fluid);
  const amount = generator(ring, fluid.density);
  const law = isSource ? [] : [...fluid.exponents].map(([q, e]) => [q, Number(e.num)] as const);
  const rho = couple(multiply(amount, monomial(ring, ONE, law)));
  return { name: fluid.name, density: fluid.density, rho, pressure: scale(rho, fluid.w), isSource };
}

/** V dρ/dt + (ρ + p) dV/dt = 0 for the spatial volume V. */
function continuity({ rho, pressure }: FluidValue, geometry: Geometry): boolean {
  const volume = moveTo(geometry.spatialVolume, rho.ring);
  return isZero(add(multiply(volume, timeDerivative(rho)), multiply(add(rho, pressure), timeDerivative(volume))));
}

type Checker = (name: string, detail: string, holds: boolean) => void;

function friedmannOf(
  geometry: Geometry,
  ring: Ring,
  gravityEquations: ReadonlyMap<string, Poly>,
  couple: (p: Poly) => Poly,
  check: Checker,
): Pick<FriedmannForm, 'rhoT' | 'pT'> | undefined {
  if (!geometry.isotropic) return undefined;
  const { lapse, isotropic } = geometry;
  const planckMassSquared = couple(generator(ring, PLANCK_MASS, 2));
  const roles = { lapse, scale: isotropic.scale, curvature: isotropic.curvature, planckMassSquared };
  const form = friedmannForm(gravityEquations, roles);
  check(
    'conservation of the effective fluid',
    'dρ_T/dt + 3H(ρ_T + p_T) vanishes on the equations of the connection',
    isZero(conservationResidual(form, gravityEquations, roles)),
  );
  return form;
}

function fixFriedmann(form: Pick<FriedmannForm, 'rhoT' | 'pT'>, fix: (p: Poly) => Poly): FriedmannForm {
  const rhoT = fix(form.rhoT);
  const pT = fix(form.pT);
  return {
    rhoT,
    pT,
    get wT() {
      return isZero(rhoT) ? undefined : fraction(pT, [{ base: rhoT, power: 1 }]);
    },
  };
}

function scalarTensorOf(geometry: Geometry, ring: Ring, gravity: Gravity, check: Checker): ScalarTensorForm {
  const { isotropic, lapse } = geometry;
  if (!isotropic)
    return {
      form: 'none',
      reason: `a metric analogue is defined on an isotropic background; the geometry ${geometry.id} is none`,
      offending: undefined,
    };
  const outcome = biScalarForm(gravity, {
    lapse,
    ...isotropic,
    metricCurvature: moveTo(geometry.metricCurvature, ring),
    volume: moveTo(geometry.volume, ring),
  });
  if (!outcome.found) return { form: 'none', reason: outcome.reason, offending: outcome.offending };
  check(
    'scalar-tensor form',
    'reduced again from its covariant form on the metric geometry it has the same Euler–Lagrange expressions at k = 0',
    true,
  );
  const everywhere = isZero(outcome.obstruction);
  if (everywhere) check('scalar-tensor form at every k', 'the curvature obstruction vanishes identically', true);
  return {
    form: 'bi-scalar',
    validFor: everywhere ? 'every k' : 'k = 0',
    ...outcome.functions,
    obstruction: outcome.obstruction,
  };
}
