/**
 * The setting of a derivation: geometry, ring, relations and the reduced Lagrangian, before anything is varied.
 */
import { moveTo } from './algebra/collect.js';
import { remember } from './algebra/memo.js';
import {
  generator,
  isZero,
  monomial,
  multiply,
  negate,
  type Poly,
  power,
  product,
  scale,
  sum,
} from './algebra/poly.js';
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
import type { Geometry, GeometrySymbol } from './geometry/geometry.js';
import { MAX_JET_ORDER } from './geometry/read-geometry.js';
import { density, MAX_REDUCED_TERMS, ReductionLimitError } from './geometry/reduction.js';
import { type ConstrainedTensor, constrainedTensors } from './multipliers.js';
import { InputError } from './notation/diagnostics.js';
import { applyImposed, type Imposed, solveRelations } from './notation/impose.js';
import { printLagrangian } from './notation/print.js';
import { polyOfScalar } from './notation/scalar-poly.js';
import { UNIT } from './notation/scalar-term.js';
import type { LagrangianTerm, MatterComponent, Theory } from './notation/theory.js';
import { type SpinTensor, spinInteraction, spinTensors } from './spin.js';
import { spinAverage } from './spin-average.js';
import { ContractionLimitError } from './tensor/contraction.js';
import { dummyFreeKey, NoComponentsError } from './tensor/invariants.js';
import { expandParts } from './tensor/parts.js';
import type { Step } from './tensor/rewrite.js';

/** Symbol of the reduced Planck mass in the Friedmann form. */
export const PLANCK_MASS = 'M';

export interface Setting {
  readonly theory: Theory;
  readonly geometry: Geometry;
  /** Those of the geometry, then the multipliers. */
  readonly fields: readonly GeometrySymbol[];
  readonly ring: Ring;
  readonly relations: Imposed;
  readonly terms: Derivation['terms'];
  /** How irreducible parts were written out. */
  readonly rewriting: readonly Step[];
  readonly fluids: readonly FluidValue[];
  readonly constrained: readonly ConstrainedTensor[];
  readonly spins: readonly SpinTensor[];
  /** Averages of spins, the last of the fluids. */
  readonly averages: readonly FluidValue[];
  /** Reduced Lagrangians: of torsion and curvature with the multipliers, of spin, of matter, and their sum. */
  readonly gravity: Poly;
  /** What couples spin to the connection; zero without it. */
  readonly spin: Poly;
  /** Fluids and averages of spins. */
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
export function settingOf(given: Theory, onStep: (what: string) => void): Setting {
  const geometry = loadGeometry(given.geometry, given.signature, given.geometryOrigin);
  const spins = spinTensors(given, geometry);
  // Components of spin tensors are symbols of the theory from here on.
  const theory: Theory =
    spins.length === 0 ? given : { ...given, symbols: [...given.symbols, ...spins.flatMap((s) => s.components)] };
  refuseFieldNames(theory, geometry);
  const fluidsWanted = theory.matter.map((m) => ({ ...m, exponents: dilution(geometry, m) }));
  refuseSteepDilution(fluidsWanted);
  const narrow = ringOf(theory, geometry, fluidsWanted);
  const constrained = constrainedTensors(theory, geometry, narrow, relationsIn(narrow, theory, geometry).couple);
  const multipliers = constrained.flatMap((c) => c.multipliers);
  refuseNames(theory, new Map(multipliers.map((m) => [m.name, m.meaning])));
  const ring = multipliers.length === 0 ? narrow : ringOf(theory, geometry, fluidsWanted, multipliers);
  const { relations, couple, fix } = relationsIn(ring, theory, geometry);

  const expanded = expandParts(theory.lagrangian);
  const terms = collectTerms(ring, expanded.terms, couple);
  let size = 0;
  const free = sum(
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
  const volume = moveTo(geometry.volume, ring);
  const gravity = sum(ring, [
    free,
    ...multipliers.map((m) => product(ring, [generator(ring, m.name), volume, moveTo(m.value, ring)])),
  ]);
  const averages = spinAverages(theory, geometry, terms, ring);
  const fluids = [...fluidsWanted.map((m) => fluidValue(ring, m, couple)), ...averages];
  const spatialVolume = moveTo(geometry.spatialVolume, ring);
  const lapse = generator(ring, geometry.lapse);
  const matter = sum(
    ring,
    fluids.map(({ rho }) => negate(multiply(multiply(spatialVolume, lapse), rho))),
  );
  const spin = spinInteraction(theory, geometry, ring, spins, couple);
  return {
    theory,
    geometry,
    fields: [...geometry.fields, ...multipliers],
    ring,
    relations,
    terms,
    rewriting: expanded.steps,
    fluids,
    constrained,
    spins,
    averages,
    gravity,
    spin,
    matter,
    lagrangian: sum(ring, [gravity, spin, matter]),
    couple,
    fix,
  };
}

/** Relations between couplings act at once; those for the geometry's parameters wait until the form is found. */
function relationsIn(
  ring: Ring,
  theory: Theory,
  geometry: Geometry,
): { readonly relations: Imposed; readonly couple: (p: Poly) => Poly; readonly fix: (p: Poly) => Poly } {
  const constants = theory.symbols.filter((s) => s.role === 'constant').map((s) => s.name);
  const relations = solveRelations(ring, theory.relations, constants);
  const isParameter = (name: string): boolean => geometry.parameters.some((p) => p.name === name);
  const inCouplings = new Map([...relations.eliminated].filter(([name]) => !isParameter(name)));
  const inParameters = new Map([...relations.eliminated].filter(([name]) => isParameter(name)));
  return {
    relations,
    couple: (p) => applyImposed(p, inCouplings, relations.origins),
    fix: (p) => applyImposed(p, inParameters, relations.origins),
  };
}

/** Averages of spins, as fluids of density −c s²/V² with p = ρ. */
function spinAverages(
  { spins = [] }: Theory,
  geometry: Geometry,
  terms: Derivation['terms'],
  ring: Ring,
): readonly FluidValue[] {
  return spins.flatMap((source): FluidValue[] => {
    if (source.kind !== 'weyssenhoff') return [];
    const coefficient = spinAverage(terms, geometry.tensors.metric, ring, source.origin);
    const diluted = power(moveTo(geometry.spatialVolume, ring), -2);
    const rho = negate(product(ring, [coefficient, generator(ring, source.name, 2), diluted]));
    return [{ name: source.name, density: source.name, rho, pressure: rho, isSource: false }];
  });
}

/** Users may not name a constant like a field or parameter of their geometry. */
function refuseFieldNames(theory: Theory, geometry: Geometry): void {
  const taken = new Map([...geometry.fields, ...geometry.parameters].map((s) => [s.name, s.meaning]));
  for (const [field, rate] of geometry.rates) taken.set(rate, `expansion rate of ${field}`);
  refuseNames(
    theory,
    new Map([...taken].map(([name, meaning]) => [name, `the ${meaning} of the geometry ${geometry.id}`])),
  );
}

function refuseNames(theory: Theory, taken: ReadonlyMap<string, string>): void {
  const clashes = theory.symbols.filter((s) => taken.has(s.name));
  if (clashes.length === 0) return;
  throw new InputError(
    clashes.map(({ name }) => ({
      code: 'reserved-name',
      severity: 'error',
      message: `${name} is ${taken.get(name)}`,
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
function ringOf(
  theory: Theory,
  geometry: Geometry,
  fluids: readonly Fluid[],
  multipliers: readonly GeometrySymbol[] = [],
): Ring {
  const fields = [...geometry.fields, ...multipliers].map((f) => f.name);
  const named = new Set([...geometry.parameters.map((p) => p.name), ...theory.symbols.map((s) => s.name), PLANCK_MASS]);
  const powerLaw = fluids.filter((f) => hasPowerLaw(f)).map((f) => f.density);
  for (const name of powerLaw) named.add(name);
  const sources = fluids
    .filter((f) => !hasPowerLaw(f))
    .map((f): Generator => ({ kind: 'source', name: f.density, exponents: f.exponents }));
  const key = JSON.stringify([
    geometry.id,
    fields,
    [...named],
    fluids.map((f) => [f.density, `${f.w.num}/${f.w.den}`]),
  ]);
  return remember(rings, key, () =>
    makeRing([...fields.flatMap((name) => jetsOf(name, MAX_JET_ORDER)), ...sources, ...constantsOf(named)]),
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
