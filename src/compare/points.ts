/**
 * Random solutions modulo a prime: residues for couplings and for all generators that a chain leaves free, the others from
 * the chain, so that a solution of the equations begins with these jets. Invariant: where a point is returned, no initial,
 * separant or excluded factor vanishes at it. Imports eliminations and residues.
 */
import { coefficientOf, symbolsOf } from '../algebra/collect.js';
import { inverseMod, multiplyMod, residue } from '../algebra/modular.js';
import { type Poly, termsOf } from '../algebra/poly.js';
import type { Branch } from './branches.js';
import { type Arena, derivativeOf, type Link } from './elimination.js';
import { degreeIn } from './factors.js';

/** Residue by generator; undefined where it is not needed yet. */
export type Values = (number | undefined)[];

export type RandomResidue = (p: number) => number;

/** Deterministic residues from a seed: a multiplicative congruential generator modulo 2^31 − 1. */
export function randomResidues(seed: number): RandomResidue {
  let state = (seed % 2_147_483_646) + 1;
  return (p) => {
    state = Number((BigInt(state) * 48_271n) % 2_147_483_647n);
    return 1 + (state % (p - 1));
  };
}

export class Point {
  readonly values: Values;
  readonly prime: number;
  private readonly arena: Arena;
  private readonly byField: ReadonlyMap<string, Link>;
  private readonly random: RandomResidue;

  constructor(arena: Arena, links: readonly Link[], prime: number, random: RandomResidue, fixed: Values = []) {
    this.arena = arena;
    this.prime = prime;
    this.random = random;
    this.byField = new Map(links.map((link) => [link.field, link]));
    this.values = [...fixed];
  }

  /** Residue of p. @throws NoPoint when the chain has no root here; BoundError when higher jets are needed than there are. */
  at(p: Poly): number {
    const { prime } = this;
    for (const name of symbolsOf(p)) this.settle(p.ring.position.get(name)!);
    let total = 0;
    for (const { coefficient, exponents } of termsOf(p)) {
      let value = residue(coefficient, prime);
      for (const [g, e] of exponents) value = multiplyMod(value, powerMod(this.values[g]!, e, prime), prime);
      total += value;
      if (total >= prime) total -= prime;
    }
    return total;
  }

  /** Gives a generator its value. */
  private settle(g: number): void {
    if (this.values[g] !== undefined) return;
    const { space } = this.arena;
    const square = space.ring.radicals.find(([r, s]) => r === g || s === g);
    if (square) {
      const root = this.random(this.prime);
      this.values[square[0]] = root;
      this.values[square[1]] = multiplyMod(root, root, this.prime);
      return;
    }
    const { field, order, kind } = space.places[g]!;
    const link = kind === 'coupling' ? undefined : this.byField.get(field);
    if (!link || order < link.order) {
      this.values[g] = this.random(this.prime);
      return;
    }
    const { poly } = derivativeOf(this.arena, link, order - link.order);
    const { name } = space.ring.generators[g]!;
    const degree = degreeIn(poly, g);
    const coefficients = Array.from({ length: degree + 1 }, (_, n) => this.at(coefficientOf(poly, name, n)));
    this.values[g] = rootMod(coefficients, this.prime, this.random);
  }
}

/** Thrown where a random choice leads to no solution; another one is tried then. */
export class NoPoint extends Error {}

function powerMod(base: number, exponent: number, p: number): number {
  if (base === 0 && exponent < 0) throw new NoPoint();
  let b = exponent < 0 ? inverseMod(base, p) : base;
  let result = 1;
  for (let n = Math.abs(exponent); n > 0; n = Math.floor(n / 2)) {
    if (n % 2 === 1) result = multiplyMod(result, b, p);
    b = multiplyMod(b, b, p);
  }
  return result;
}

/** A root of Σ c_n x^n modulo p. @throws NoPoint when there is none, or when the degree drops. */
export function rootMod(coefficients: readonly number[], p: number, random: RandomResidue): number {
  const top = coefficients.at(-1)!;
  if (coefficients.length < 2 || top === 0) throw new NoPoint();
  const f = coefficients.map((c) => multiplyMod(c, inverseMod(top, p), p));
  if (f.length === 2) return (p - f[0]!) % p;
  // The product of the linear factors is gcd(f, x^p − x); random shifts split it.
  const linear = gcdMod(f, minus(powerOf([0, 1], p, f, p), [0, 1], p), p);
  if (linear.length < 2) throw new NoPoint();
  return splitRoot(linear, p, random);
}

function splitRoot(f: readonly number[], p: number, random: RandomResidue): number {
  if (f.length === 2) return (p - f[0]!) % p;
  for (let tries = 0; tries < 60; tries++) {
    const half = powerOf([random(p), 1], (p - 1) / 2, f, p);
    const part = gcdMod(f, minus(half, [1], p), p);
    if (part.length > 1 && part.length < f.length) return splitRoot(part, p, random);
  }
  throw new NoPoint();
}

const trimmed = (f: number[]): number[] => {
  while (f.length > 0 && f.at(-1) === 0) f.pop();
  return f;
};

const minus = (f: readonly number[], g: readonly number[], p: number): number[] =>
  trimmed(Array.from({ length: Math.max(f.length, g.length) }, (_, i) => ((f[i] ?? 0) - (g[i] ?? 0) + p) % p));

/** f modulo a monic g. */
function remainderMod(f: readonly number[], g: readonly number[], p: number): number[] {
  const rest = [...f];
  while (rest.length >= g.length) {
    const c = rest.pop()!;
    const shift = rest.length - g.length + 1;
    for (let i = 0; i < g.length - 1; i++) rest[shift + i] = (rest[shift + i]! + multiplyMod(p - c, g[i]!, p)) % p;
  }
  return trimmed(rest);
}

const monic = (f: readonly number[], p: number): number[] => {
  const inverse = f.length === 0 ? 0 : inverseMod(f.at(-1)!, p);
  return f.map((c) => multiplyMod(c, inverse, p));
};

function gcdMod(a: readonly number[], b: readonly number[], p: number): number[] {
  let [f, g] = [monic(a, p), monic(b, p)];
  while (g.length > 0) [f, g] = [g, monic(remainderMod(f, g, p), p)];
  return f;
}

function timesMod(f: readonly number[], g: readonly number[], modulus: readonly number[], p: number): number[] {
  const out = new Array<number>(Math.max(0, f.length + g.length - 1)).fill(0);
  f.forEach((a, i) => {
    g.forEach((b, j) => {
      out[i + j] = (out[i + j]! + multiplyMod(a, b, p)) % p;
    });
  });
  return remainderMod(trimmed(out), modulus, p);
}

/** base^n modulo a monic polynomial. */
function powerOf(base: readonly number[], n: number, modulus: readonly number[], p: number): number[] {
  let result: number[] = [1];
  let b = remainderMod(base, modulus, p);
  for (let rest = n; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = timesMod(result, b, modulus, p);
    b = timesMod(b, b, modulus, p);
  }
  return result;
}

const MAX_TRIES = 40;

/**
 * A random solution on a branch, on which all of `zero` vanish and none of the branch's initials, separants and excluded
 * factors does. Undefined when none was met.
 * @throws Error when the chain's solutions do not solve `zero`, which means that this program is wrong.
 */
export function pointOn(
  arena: Arena,
  branch: Branch,
  zero: readonly Poly[],
  prime: number,
  random: RandomResidue,
  fixed: Values = [],
): Point | undefined {
  for (let tries = 0; tries < MAX_TRIES; tries++) {
    const point = new Point(arena, branch.links, prime, random, fixed);
    try {
      const pivots = branch.links.flatMap((l) => [...l.initial.factors, ...l.separant.factors].map((f) => f.base));
      for (const base of [...branch.nonzero, ...branch.pivots, ...pivots])
        if (point.at(base) === 0) throw new NoPoint();
      for (const link of branch.links) if (point.at(link.known.poly) !== 0) throw new NoPoint();
    } catch (error) {
      if (error instanceof NoPoint) continue;
      throw error;
    }
    for (const p of zero)
      if (point.at(p) !== 0) throw new Error('a solution of the eliminated equations does not solve the equations');
    return point;
  }
  return undefined;
}
