/**
 * The differential ring in which equations are compared: lapse 1, scale factors through their expansion rates (ȧ = aH), all
 * other fields with their jets, densities with their laws of dilution. Scale factors never vanish; couplings are generic.
 * Invariant: every generator has a rate, except the last jet of a field. Imports algebra, geometries, derivations.
 */
import { eulerLagrange, fieldPartial, partial } from '../algebra/calculus.js';
import { involves, moveTo, substitute } from '../algebra/collect.js';
import { add, constant, generator, multiply, negate, type Poly, scale, subtract, sum, zero } from '../algebra/poly.js';
import {
  constantsOf,
  type Generator,
  jetName,
  jetsOf,
  makeRing,
  type Ring,
  type SourceGenerator,
} from '../algebra/ring.js';
import type { Derivation } from '../derivation.js';
import { BoundError } from './budget.js';

/** Highest order of the jets of a field; a question that needs more is undecided. */
export const MAX_ORDER = 8;

/**
 * What a generator is: a coupling (generic constant, densities at a = 1 among them), a scale factor or diluting density
 * (never zero), the density that the constraint is solved for, or the jet of a field. `field` groups the jets of a function.
 */
export interface Place {
  readonly kind: 'coupling' | 'scale' | 'density' | 'jet';
  readonly field: string;
  readonly order: number;
  /** Where the field comes from, for rankings. */
  readonly role: 'rate' | 'connection' | 'multiplier' | 'matter' | 'unknown' | 'none';
}

export interface JetSpace {
  readonly ring: Ring;
  /** By generator. */
  readonly places: readonly Place[];
  /** Scale factor → its expansion rate. */
  readonly rates: ReadonlyMap<string, string>;
  readonly lapse: string;
  /** Names of the total energy density and pressure of matter, which are functions of time of their own. */
  readonly totals: { readonly rho: string; readonly p: string };
  /** Time derivative. @throws BoundError beyond the last jet. */
  readonly rate: (p: Poly) => Poly;
  /** A polynomial of a derivation at lapse 1. */
  readonly translate: (p: Poly) => Poly;
}

export interface SpaceOptions {
  /** Further functions of time with jets, such as symbols of the user. */
  readonly unknowns?: readonly string[];
}

/** Fields of the derivation's equations besides the lapse: those of the geometry, then multipliers. */
export const movingFields = (d: Derivation): string[] => [...d.equations.keys()].filter((q) => q !== d.geometry.lapse);

/**
 * The space that several derivations on one geometry share.
 * @throws Error when they are on different geometries, or a name would mean two things.
 */
export function jetSpace(derivations: readonly Derivation[], options: SpaceOptions = {}): JetSpace {
  const { geometry } = derivations[0]!;
  const { rates, lapse } = geometry;
  const own = new Set(geometry.fields.map((f) => f.name));
  const generators: Generator[] = [];
  const places: Place[] = [];
  const known = new Set<string>();
  const enter = (g: Generator, place: Omit<Place, 'field' | 'order'>): void => {
    if (known.has(g.name)) return;
    known.add(g.name);
    generators.push(g);
    const jet = g.kind === 'jet' ? { field: g.field, order: g.order } : { field: g.name, order: 0 };
    places.push({ ...place, ...jet });
  };
  const enterJets = (field: string, role: Place['role']): void => {
    for (const jet of jetsOf(field, MAX_ORDER)) enter(jet, { kind: 'jet', role });
  };
  for (const name of options.unknowns ?? []) enterJets(name, 'unknown');
  const totals = totalsOf(derivations);
  for (const name of [totals.p, totals.rho]) enterJets(name, 'matter');
  const fields = [...new Set(derivations.flatMap(movingFields))];
  const moving = fields.filter((q) => !rates.has(q)).reverse();
  for (const q of moving) enterJets(q, own.has(q) ? 'connection' : 'multiplier');
  for (const q of fields) if (rates.has(q)) enterJets(rates.get(q)!, 'rate');
  for (const q of fields)
    if (rates.has(q)) enter({ kind: 'jet', name: q, field: q, order: 0 }, { kind: 'scale', role: 'none' });
  const laws = new Map<string, SourceGenerator>();
  const solvedFor = solvedDensity(derivations);
  for (const d of derivations)
    for (const g of d.ring.generators) {
      if (g.kind === 'jet') continue;
      if (g.kind === 'source') laws.set(g.name, g);
      const plain: Generator = g.kind === 'radical' ? g : constantsOf([g.name])[0]!;
      const kind = g.name === solvedFor ? 'density' : g.kind === 'source' ? 'scale' : 'coupling';
      enter(plain, { kind, role: kind === 'density' ? 'matter' : 'none' });
    }
  const ring = makeRing(generators);
  const speeds = generators.map((g, i) => speedOf(ring, g, places[i]!, rates, laws));
  const rate = (p: Poly): Poly => derivative(p, speeds);
  return Object.freeze({
    ring,
    places,
    rates,
    lapse,
    totals,
    rate,
    translate: translator(ring, { lapse, rates, fields, rate }),
  });
}

/** `rho` and `p`, or longer names where the theories use these for something else. */
function totalsOf(derivations: readonly Derivation[]): JetSpace['totals'] {
  const taken = new Set(derivations.flatMap((d) => d.ring.generators.map((g) => g.name)));
  return { rho: taken.has('rho') ? 'rho_total' : 'rho', p: taken.has('p') ? 'p_total' : 'p' };
}

/** The density that the constraint is solved for; all others are as generic as couplings. */
function solvedDensity(derivations: readonly Derivation[]): string | undefined {
  const fluids = derivations.flatMap((d) => d.fluids);
  return (fluids.find((f) => !f.isSource) ?? fluids[0])?.density;
}

/** Rate of one generator; undefined for the last jet of a field. */
function speedOf(
  ring: Ring,
  g: Generator,
  place: Place,
  rates: ReadonlyMap<string, string>,
  laws: ReadonlyMap<string, SourceGenerator>,
): Poly | undefined {
  const hubble = rates.get(g.name);
  if (hubble !== undefined) return multiply(generator(ring, g.name), generator(ring, hubble));
  if (place.kind === 'jet') {
    const next = jetName(place.field, place.order + 1);
    return ring.position.has(next) ? generator(ring, next) : undefined;
  }
  const law = laws.get(g.name);
  if (!law) return zero(ring);
  const terms = [...law.exponents].map(([q, n]) => scale(generator(ring, rates.get(q) ?? q), n));
  return multiply(generator(ring, g.name), sum(ring, terms));
}

function derivative(p: Poly, speeds: readonly (Poly | undefined)[]): Poly {
  const { ring } = p;
  const parts: Poly[] = [];
  ring.generators.forEach(({ name }, g) => {
    const speed = speeds[g];
    if (speed && speed.size === 0) return;
    const slope = partial(p, name);
    if (slope.size === 0) return;
    if (!speed) throw new BoundError(`time derivatives beyond the order ${MAX_ORDER}`);
    parts.push(multiply(slope, speed));
  });
  return sum(ring, parts);
}

function translator(
  ring: Ring,
  of: Pick<JetSpace, 'lapse' | 'rates' | 'rate'> & { readonly fields: readonly string[] },
): (p: Poly) => Poly {
  // D(a,n)/a as a polynomial in the rate and its jets: b(n+1) = ḃ(n) + H b(n).
  const images = new Map<string, Poly>([[of.lapse, constant(ring, 1)]]);
  for (let n = 1; n <= MAX_ORDER; n++) images.set(jetName(of.lapse, n), zero(ring));
  for (const [q, name] of of.rates) {
    if (!of.fields.includes(q)) continue;
    let ratio = constant(ring, 1);
    for (let n = 1; n <= MAX_ORDER; n++) {
      ratio = add(of.rate(ratio), multiply(generator(ring, name), ratio));
      images.set(jetName(q, n), multiply(generator(ring, q), ratio));
    }
  }
  return (p) => {
    const present = new Map([...images].filter(([name]) => involves(p, name)));
    return present.size === 0 ? moveTo(p, ring) : substitute(p, present, ring);
  };
}

/**
 * The equations of a derivation at lapse 1, name → expression that vanishes. Matter enters by its totals ρ and p, as the
 * perfect fluid −(volume) ρ does: −V ρ in the equation of the lapse, p ∂V/∂a in that of a scale factor. What the totals are
 * is said by two more equations, unless the matter may have any pressure.
 */
export function equationsIn(space: JetSpace, d: Derivation, anyMatter: boolean): ReadonlyMap<string, Poly> {
  const { ring, totals } = space;
  const volume = moveTo(d.geometry.spatialVolume, d.ring);
  const density = sum(
    d.ring,
    d.fluids.map((f) => f.rho),
  );
  const fluids = negate(multiply(multiply(volume, generator(d.ring, space.lapse)), density));
  const out = new Map<string, Poly>();
  for (const [q, e] of d.equations) {
    const gravity = space.translate(subtract(e, eulerLagrange(fluids, q)));
    const isLapse = q === space.lapse;
    const load = space.translate(isLapse ? negate(volume) : fieldPartial(volume, q));
    out.set(q, add(gravity, multiply(load, generator(ring, isLapse ? totals.rho : totals.p))));
  }
  for (const [name, e] of d.constraints ?? []) out.set(name, space.translate(e));
  if (anyMatter) return out;
  const total = (of: 'rho' | 'pressure'): Poly =>
    sum(
      ring,
      d.fluids.map((f) => space.translate(f[of])),
    );
  out.set('density', subtract(generator(ring, totals.rho), total('rho')));
  out.set('pressure', subtract(generator(ring, totals.p), total('pressure')));
  return out;
}
