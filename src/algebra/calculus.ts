/**
 * Derivatives in a ring of jets: with respect to a generator, to a field through its jets and sources, and to time.
 * d/dt is one function because each generator carries its own rule. Values in and out are canonical polynomials.
 */

import { add, fromTable, generator, height, multiply, normalise, type Poly, scale, subtract, zero } from './poly.js';
import { rational } from './rational.js';
import {
  ExponentLimitError,
  exponentAt,
  jetName,
  MAX_EXPONENT,
  type Ring,
  type SourceGenerator,
  weightOf,
  wordOf,
} from './ring.js';
import { TermTable } from './terms.js';

/** Partial derivative with respect to one generator, all others held fixed. Keeps the order of terms. */
function partialAt(p: Poly, g: number): Poly {
  const { ring } = p;
  const { words } = ring;
  if (p.reach >= MAX_EXPONENT) throw new ExponentLimitError();
  const word = wordOf(g);
  const weight = weightOf(g);
  const rows: number[] = [];
  const factors: number[] = [];
  for (let i = 0; i < p.size; i++) {
    const e = exponentAt(p.keys, i * words, g);
    if (e === 0) continue;
    rows.push(i);
    factors.push(e);
  }
  if (rows.length === 0) return zero(ring);
  const keys = new Float64Array(rows.length * words);
  rows.forEach((row, i) => {
    for (let w = 0; w < words; w++) keys[i * words + w] = p.keys[row * words + w]!;
    keys[i * words + word]! -= weight;
  });
  const { numerators } = p;
  const small = numerators instanceof Float64Array && height(p) * MAX_EXPONENT <= Number.MAX_SAFE_INTEGER;
  const values = small
    ? Float64Array.from(rows, (row, i) => numerators[row]! * factors[i]!)
    : rows.map((row, i) => BigInt(numerators[row]!) * BigInt(factors[i]!));
  return normalise(ring, keys, values, p.denominator, p.reach + 1);
}

/** Partial derivative with respect to a generator by name; a name that is not in the ring gives zero. */
export function partial(p: Poly, name: string): Poly {
  const g = p.ring.position.get(name);
  return g === undefined ? zero(p.ring) : partialAt(p, g);
}

/** ∂/∂q of a polynomial at fixed velocities, with sources differentiated as the functions of q that they are. */
export function fieldPartial(p: Poly, field: string): Poly {
  let result = partial(p, field);
  for (const g of p.ring.generators) {
    const exponent = g.kind === 'source' ? g.exponents.get(field) : undefined;
    if (exponent === undefined) continue;
    const logarithmic = multiply(partial(p, g.name), generator(p.ring, g.name));
    result = add(result, scale(multiply(logarithmic, generator(p.ring, field, -1)), exponent));
  }
  return result;
}

/**
 * Total time derivative: D(q,n) → D(q,n+1), sources by their rule, constants to zero.
 * @throws Error when a jet has no successor in the ring; ExponentLimitError beyond ±511.
 */
export function timeDerivative(p: Poly): Poly {
  const { ring } = p;
  const { words, generators, next } = ring;
  if (p.reach >= MAX_EXPONENT) throw new ExponentLimitError();
  const rules = generators.map((g) => (g.kind === 'source' ? sourceRate(ring, g) : undefined));
  const active = generators.flatMap((g, i) => (g.kind === 'jet' ? [i] : []));
  const big = !(height(p) * MAX_EXPONENT * generators.length * Math.max(1, p.size) <= Number.MAX_SAFE_INTEGER);
  const table = new TermTable(words, p.size * 3, big);
  for (const g of active) {
    const w0 = wordOf(g);
    const d0 = weightOf(g);
    const up = next[g]!;
    for (let i = 0; i < p.size; i++) {
      const e = exponentAt(p.keys, i * words, g);
      if (e === 0) continue;
      if (up < 0) throw new Error(`the ring has no time derivative of ${generators[g]!.name}`);
      for (let w = 0; w < words; w++) table.key[w] = p.keys[i * words + w]!;
      table.key[w0]! -= d0;
      table.key[wordOf(up)]! += weightOf(up);
      const s = table.slot();
      if (table.bigs) table.bigs[s]! += BigInt(p.numerators[i]!) * BigInt(e);
      else table.numbers[s]! += (p.numerators[i] as number) * e;
    }
  }
  let result = fromTable(ring, table, p.denominator, p.reach + 1);
  rules.forEach((rate, g) => {
    if (!rate) return;
    const by = partialAt(p, g);
    if (by.size > 0) result = add(result, multiply(by, rate));
  });
  return result;
}

/** dρ/dt = Σ exponent · ρ q̇/q. */
function sourceRate(ring: Ring, source: SourceGenerator): Poly {
  let rate = zero(ring);
  for (const [field, exponent] of source.exponents) {
    const term = multiply(generator(ring, source.name), generator(ring, field, -1));
    rate = add(rate, scale(multiply(term, generator(ring, jetName(field, 1))), exponent));
  }
  return rate;
}

/** Highest order of a field's jets that occurs; -1 when the field does not occur at all. */
export function orderIn(p: Poly, field: string): number {
  let order = -1;
  p.ring.generators.forEach((g, i) => {
    if (g.kind !== 'jet' || g.field !== field || g.order <= order) return;
    for (let t = 0; t < p.size; t++)
      if (exponentAt(p.keys, t * p.ring.words, i) !== 0) {
        order = g.order;
        return;
      }
  });
  return order;
}

/** Euler–Lagrange expression Σ_n (−d/dt)^n ∂L/∂D(q,n). */
export function eulerLagrange(lagrangian: Poly, field: string): Poly {
  let result = fieldPartial(lagrangian, field);
  for (let n = orderIn(lagrangian, field); n >= 1; n--) {
    let moved = partial(lagrangian, jetName(field, n));
    for (let i = 0; i < n; i++) moved = timeDerivative(moved);
    result = n % 2 === 0 ? add(result, moved) : subtract(result, moved);
  }
  return result;
}

/**
 * Antiderivative in one generator, all others held fixed.
 * Terms with exponent -1, whose antiderivative is a logarithm, come back as `rest`.
 */
export function antiderivative(p: Poly, name: string): { primitive: Poly; rest: Poly } {
  const { ring } = p;
  const byExponent = new Map<number, number[]>();
  const g = ring.position.get(name)!;
  for (let i = 0; i < p.size; i++) {
    const e = exponentAt(p.keys, i * ring.words, g);
    byExponent.set(e, [...(byExponent.get(e) ?? []), i]);
  }
  let primitive = zero(ring);
  let rest = zero(ring);
  for (const [e, rows] of byExponent) {
    const part = select(p, rows);
    if (e === -1) rest = part;
    else primitive = add(primitive, scale(multiply(part, generator(ring, name)), rational(1, e + 1)));
  }
  return { primitive, rest };
}

/** The terms at the given rows (ascending), as a polynomial. */
export function select(p: Poly, rows: readonly number[]): Poly {
  const { words } = p.ring;
  const keys = new Float64Array(rows.length * words);
  rows.forEach((row, i) => {
    keys.set(p.keys.subarray(row * words, (row + 1) * words), i * words);
  });
  const { numerators } = p;
  const chosen =
    numerators instanceof Float64Array
      ? Float64Array.from(rows, (r) => numerators[r]!)
      : rows.map((r) => numerators[r]!);
  return normalise(p.ring, keys, chosen, p.denominator, p.reach);
}

/** The terms for which a test on their exponents holds; the second part is the remainder. */
export function partition(p: Poly, test: (exponent: (generator: number) => number) => boolean): [Poly, Poly] {
  const yes: number[] = [];
  const no: number[] = [];
  for (let i = 0; i < p.size; i++) {
    const offset = i * p.ring.words;
    (test((g) => exponentAt(p.keys, offset, g)) ? yes : no).push(i);
  }
  return [select(p, yes), select(p, no)];
}
