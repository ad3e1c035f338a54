/**
 * The setting of a derivation: geometry, ring, relations and the reduced Lagrangian, before anything is varied.
 */
import { moveTo } from './algebra/collect.js';
import { remember } from './algebra/memo.js';
import { add, generator, isZero, monomial, multiply, negate, type Poly, scale, sum } from './algebra/poly.js';
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
import type { Derivation, FluidValue } from './derivation.js';
import { loadGeometry } from './geometry/build.js';
import type { Geometry } from './geometry/geometry.js';
import { MAX_JET_ORDER } from './geometry/read-geometry.js';
import { density, MAX_REDUCED_TERMS, ReductionLimitError } from './geometry/reduction.js';
import { InputError } from './notation/diagnostics.js';
import { applyImposed, type Imposed, solveRelations } from './notation/impose.js';
import { printLagrangian } from './notation/print.js';
import { polyOfScalar } from './notation/scalar-poly.js';
import { UNIT } from './notation/scalar-term.js';
import type { LagrangianTerm, MatterComponent, Theory } from './notation/theory.js';
import { ContractionLimitError } from './tensor/contraction.js';
import { dummyFreeKey, NoComponentsError } from './tensor/invariants.js';
import { expandParts } from './tensor/parts.js';

/** Symbol of the reduced Planck mass in the Friedmann form. */
export const PLANCK_MASS = 'M';

export interface Setting {
  readonly theory: Theory;
  readonly geometry: Geometry;
  readonly ring: Ring;
  readonly relations: Imposed;
  readonly terms: Derivation['terms'];
  readonly fluids: readonly FluidValue[];
  /** Reduced Lagrangians: of torsion and curvature, of matter, and their sum. */
  readonly gravity: Poly;
  readonly matter: Poly;
  readonly lagrangian: Poly;
  /** Applies the relations between couplings. */
  readonly couple: (p: Poly) => Poly;
  /** Applies the relations for parameters of the geometry, which wait until the last. */
  readonly fix: (p: Poly) => Poly;
}

/**
 * Reduces the Lagrangian of a theory on its geometry.
 * @param onStep is told what is about to be done, for a progress line.
 * @throws InputError when the theory is at fault (unknown geometry, contradictory relations, a limit exceeded).
 */
export function settingOf(theory: Theory, onStep: (what: string) => void): Setting {
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

  const terms = collectTerms(ring, expandParts(theory.lagrangian).terms, couple);
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
  return { theory, geometry, ring, relations, terms, fluids, gravity, matter, lagrangian, couple, fix };
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
