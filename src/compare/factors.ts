/**
 * Polynomials of a jet space up to what never vanishes (couplings and scale factors to any power), and products kept in
 * factors. Invariant: variables (all generators with a rank) occur to powers ≥ 0 only. Imports algebra and jet spaces.
 */
import { divideExactly, splitUnit } from '../algebra/division.js';
import { constant, equals, generator, multiply, type Poly, power } from '../algebra/poly.js';
import { exponentAt, exponentRange } from '../algebra/ring.js';
import type { Budget } from './budget.js';
import type { JetSpace } from './jet-space.js';

export interface Factor {
  readonly base: Poly;
  readonly power: number;
}
export type Factors = readonly Factor[];

/** Whether the generator is one that may vanish and is solved for: a jet or a density. */
export const isVariable = ({ places }: JetSpace, g: number): boolean =>
  places[g]!.kind === 'jet' || places[g]!.kind === 'density';

/** p = unit · Π variable^n · rest, where the unit is one term in couplings and scale factors. */
export function splitFactors(
  space: JetSpace,
  p: Poly,
): { readonly unit: Poly; readonly variables: readonly (readonly [g: number, n: number])[]; readonly rest: Poly } {
  const { ring } = space;
  const { unit, reduced } = splitUnit(p);
  const variables: [number, number][] = [];
  let outside = unit;
  ring.generators.forEach(({ name }, g) => {
    const n = exponentAt(unit.keys, 0, g);
    if (n === 0 || !isVariable(space, g)) return;
    variables.push([g, n]);
    outside = multiply(outside, generator(ring, name, -n));
  });
  return { unit: outside, variables, rest: reduced };
}

/** What must not vanish for p not to vanish, besides couplings and scale factors: its variables, and the rest of it. */
export function basesOf(space: JetSpace, p: Poly): Poly[] {
  const { variables, rest } = splitFactors(space, p);
  const bases = variables.map(([g]) => generator(space.ring, space.ring.generators[g]!.name));
  return rest.size > 1 ? [...bases, rest] : bases;
}

/** Whether every variable occurs to powers ≥ 0. */
export function isPolynomial(space: JetSpace, p: Poly): boolean {
  const { low } = exponentRange(p.ring, p.keys);
  return low.every((n, g) => n >= 0 || !isVariable(space, g));
}

/** The quotient p/q when it is exact and has no variable in its denominator. */
export function divideIn(space: JetSpace, p: Poly, q: Poly): Poly | undefined {
  const quotient = divideExactly(p, q);
  return quotient && isPolynomial(space, quotient) ? quotient : undefined;
}

/** Whether p is one term in couplings and scale factors. */
export function isUnit(space: JetSpace, p: Poly): boolean {
  return p.size === 1 && space.places.every((_, g) => exponentAt(p.keys, 0, g) === 0 || !isVariable(space, g));
}

/** Exponent range of one generator in p. */
export function degreeIn(p: Poly, g: number): number {
  let degree = 0;
  for (let i = 0; i < p.size; i++) degree = Math.max(degree, exponentAt(p.keys, i * p.ring.words, g));
  return degree;
}

/** Divides by a base as often as it goes, at most `most` times. @throws BoundError beyond the bound. */
export function divideOut(
  space: JetSpace,
  budget: Budget,
  p: Poly,
  base: Poly,
  most = Number.POSITIVE_INFINITY,
): { readonly rest: Poly; readonly power: number } {
  let rest = p;
  let n = 0;
  if (isUnit(space, base)) throw new Error('a unit divides for ever');
  while (n < most && rest.size > 0) {
    budget.spend(rest.size);
    const quotient = divideIn(space, rest, base);
    if (!quotient) break;
    // Each term of the quotient is subtracted from all of what is left.
    budget.spend((rest.size * quotient.size) >> 1);
    rest = quotient;
    n++;
  }
  return { rest, power: n };
}

/** A product of two lists; equal bases are collected. */
export function mergeFactors(a: Factors, b: Factors): Factors {
  const out = a.map((f) => ({ ...f }));
  for (const { base, power: n } of b) {
    const twin = out.find((f) => equals(f.base, base));
    if (twin) twin.power += n;
    else out.push({ base, power: n });
  }
  return out;
}

/** What `have` lacks to be a multiple of `want`. */
export const lackingFactors = (have: Factors, want: Factors): Factors =>
  want.flatMap(({ base, power: n }) => {
    const missing = n - (have.find((f) => equals(f.base, base))?.power ?? 0);
    return missing > 0 ? [{ base, power: missing }] : [];
  });

/** The least common multiple of two lists whose bases are taken as independent. */
export const joinFactors = (a: Factors, b: Factors): Factors => mergeFactors(a, lackingFactors(a, b));

export const expandFactors = (space: JetSpace, factors: Factors): Poly =>
  factors.reduce((p, { base, power: n }) => multiply(p, power(base, n)), constant(space.ring, 1));
