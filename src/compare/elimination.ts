/**
 * Pseudo-division by a chain: a set of polynomials with leaders in different functions, each the relation that gives its
 * leader, and by its derivatives all higher jets, in terms of lower generators. Invariant: every step is an exact identity
 * u · before = d · after + q · (a derivative of a link). Imports algebra, jet spaces, rankings, factors.
 */
import { coefficientOf } from '../algebra/collect.js';
import {
  constant,
  equals,
  generator,
  isZero,
  monomial,
  multiply,
  type Poly,
  power,
  subtract,
  zero,
} from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { exponentRange, jetName } from '../algebra/ring.js';
import type { Budget } from './budget.js';
import { divideOut, expandFactors, type Factor, type Factors, splitFactors } from './factors.js';
import type { JetSpace } from './jet-space.js';
import type { Known, Step } from './known.js';
import type { Ranking } from './ranking.js';

/** Where an elimination takes place. Pivots are learned as they are met: irreducible as far as it is known. */
export interface Arena {
  readonly space: JetSpace;
  readonly ranking: Ranking;
  readonly budget: Budget;
  readonly pivots: Poly[];
}

/** A coefficient that is divided by: unit · Π base^power with bases that are assumed not to vanish. */
export interface Pivot {
  readonly unit: Poly;
  readonly factors: Factors;
}

export interface Link {
  readonly known: Known;
  /** Generator, its field and order. */
  readonly leader: number;
  readonly field: string;
  readonly order: number;
  readonly degree: number;
  readonly initial: Pivot;
  /** Coefficient of the leader's jets in all derivatives. */
  readonly separant: Pivot;
  /** Derivatives by order, computed when needed. */
  readonly derivatives: Known[];
}

/** Highest-ranked generator of p; undefined when p has none but couplings. */
export function leaderOf({ ranking }: Arena, p: Poly): number | undefined {
  const { low, high } = exponentRange(p.ring, p.keys);
  let best: number | undefined;
  ranking.forEach((rank, g) => {
    if (rank >= 0 && (high[g] !== 0 || low[g] !== 0) && (best === undefined || rank > ranking[best]!)) best = g;
  });
  return isZero(p) ? undefined : best;
}

/** p in factors: known pivots first, and what remains as a new one. */
export function pivotOf(arena: Arena, p: Poly): Pivot {
  const { space } = arena;
  const { unit, variables, rest } = splitFactors(space, p);
  const factors: Factor[] = variables.map(([g, n]) => ({
    base: generator(space.ring, space.ring.generators[g]!.name),
    power: n,
  }));
  let left = rest;
  for (const base of arena.pivots) {
    if (left.size === 1) break;
    const out = divideOut(space, arena.budget, left, base);
    if (out.power > 0) factors.push({ base, power: out.power });
    left = out.rest;
  }
  const last = splitFactors(space, left);
  if (last.rest.size > 1) {
    arena.pivots.push(last.rest);
    factors.push({ base: last.rest, power: 1 });
  }
  return { unit: multiply(unit, last.unit), factors };
}

export function makeLink(arena: Arena, known: Known, leader: number): Link {
  const { space } = arena;
  const { poly } = known;
  const { name } = space.ring.generators[leader]!;
  const { high } = exponentRange(poly.ring, poly.keys);
  const degree = high[leader]!;
  const initial = pivotOf(arena, coefficientOf(poly, name, degree));
  const separant = degree === 1 ? initial : pivotOf(arena, separantOf(poly, name, degree));
  const { field, order } = space.places[leader]!;
  return { known, leader, field, order, degree, initial, separant, derivatives: [known] };
}

/** ∂p/∂x. */
function separantOf(p: Poly, name: string, degree: number): Poly {
  let out = coefficientOf(p, name, 1);
  for (let n = 2; n <= degree; n++) {
    const part = multiply(coefficientOf(p, name, n), generator(p.ring, name, n - 1));
    for (let i = 0; i < n; i++) out = subtract(out, multiply(constant(p.ring, -1), part));
  }
  return out;
}

/** The m-th time derivative of a link. */
export function derivativeOf({ space, budget }: Arena, link: Link, m: number): Known {
  for (let n = link.derivatives.length; n <= m; n++) {
    const of = link.derivatives[n - 1]!;
    budget.spend(of.poly.size * 8);
    link.derivatives.push({ kind: 'rate', poly: space.rate(of.poly), of });
  }
  return link.derivatives[m]!;
}

export interface Reduction {
  readonly rest: Poly;
  readonly steps: readonly Step[];
}

/** The remainder of p on division by the links: none of its generators can be replaced any more. */
export function reduce(arena: Arena, p: Poly, links: readonly Link[]): Reduction {
  const byField = new Map(links.map((link) => [link.field, link]));
  const steps: Step[] = [];
  let rest = p;
  for (;;) {
    const g = reducibleIn(arena, rest, byField);
    if (g === undefined) {
      const cleared = clearScale(arena, rest, byField);
      if (!cleared) return { rest, steps };
      rest = cleared.after;
      steps.push(cleared);
      continue;
    }
    const { field, order } = arena.space.places[g]!;
    const step = divideBy(arena, rest, byField.get(field)!, g, order);
    rest = step.after;
    steps.push(step);
  }
}

/** A scale factor that a link fixes must not hide in denominators: rest = a^-n · after. */
function clearScale(
  { space }: Arena,
  p: Poly,
  byField: ReadonlyMap<string, Link>,
): (Step & { readonly after: Poly }) | undefined {
  if (isZero(p)) return undefined;
  const { low } = exponentRange(p.ring, p.keys);
  const g = space.places.findIndex((place, i) => place.kind === 'scale' && low[i]! < 0 && byField.has(place.field));
  if (g < 0) return undefined;
  const { name } = space.ring.generators[g]!;
  const base = generator(space.ring, name, low[g]!);
  const after = multiply(p, generator(space.ring, name, -low[g]!));
  const { known } = byField.get(name)!;
  return { u: [], d: [{ base, power: 1 }], q: zero(space.ring), known, after };
}

/** Highest-ranked generator of p that a link can replace. */
export function reducibleIn(
  { space, ranking }: Arena,
  p: Poly,
  byField: ReadonlyMap<string, Link>,
): number | undefined {
  if (isZero(p)) return undefined;
  const { high } = exponentRange(p.ring, p.keys);
  let best: number | undefined;
  ranking.forEach((rank, g) => {
    if (rank < 0 || high[g]! <= 0 || (best !== undefined && rank <= ranking[best]!)) return;
    const { field, order } = space.places[g]!;
    const link = byField.get(field);
    if (!link || order < link.order || (order === link.order && high[g]! < link.degree)) return;
    best = g;
  });
  return best;
}

/** Lowers the degree of one generator by one pseudo-division step. */
function divideBy(arena: Arena, p: Poly, link: Link, g: number, order: number): Step & { readonly after: Poly } {
  const { space, budget } = arena;
  const { ring } = space;
  const { name } = ring.generators[g]!;
  const m = order - link.order;
  const known = derivativeOf(arena, link, m);
  const [degree, pivot] = m === 0 ? [link.degree, link.initial] : [1, link.separant];
  const { high } = exponentRange(ring, p.keys);
  const top = high[g]!;
  let c = coefficientOf(p, name, top);
  const u: Factor[] = [];
  for (const { base, power: n } of pivot.factors) {
    const out = divideOut(space, budget, c, base, n);
    c = out.rest;
    if (out.power < n) u.push({ base, power: n - out.power });
  }
  const shift = monomial(ring, rational(1), [[name, top - degree]]);
  const q = multiply(multiply(c, power(pivot.unit, -1)), shift);
  const scaled = u.length === 0 ? p : budget.multiply(p, expandFactors(space, u));
  let after = subtract(scaled, budget.multiply(known.poly, q));
  const d: Factor[] = [];
  if (u.length > 0)
    for (const { base } of pivot.factors) {
      const out = divideOut(space, budget, after, base);
      after = out.rest;
      if (out.power > 0) d.push({ base, power: out.power });
    }
  return { u, d, q, known, after };
}

export const sameLink = (a: Link, b: Link): boolean => equals(a.known.poly, b.known.poly);
export const orderedLinks = ({ ranking }: Arena, links: readonly Link[]): Link[] =>
  [...links].sort((a, b) => ranking[a.leader]! - ranking[b.leader]!);
export const leaderName = (link: Link): string => jetName(link.field, link.order);
