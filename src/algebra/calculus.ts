/**
 * Derivatives in a ring of jets: with respect to a generator, to a field through its jets and sources, and to time.
 * d/dt is one function because each generator carries its own rule. Values in and out are canonical polynomials.
 * Imports polynomials and their views.
 */

import { select } from './collect.js';
import { add, fromTable, generator, height, multiply, normalise, type Poly, scale, subtract, zero } from './poly.js';
import { rational } from './rational.js';
import {
  ExponentLimitError,
  exponentAt,
  jetName,
  MAX_EXPONENT,
  positionOf,
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
  const word = wordOf(g);
  const weight = weightOf(g);
  const exponents = new Int16Array(p.size);
  let n = 0;
  for (let i = 0; i < p.size; i++) {
    const e = exponentAt(p.keys, i * words, g);
    if (e === 0) continue;
    if (e === -MAX_EXPONENT) throw new ExponentLimitError();
    exponents[i] = e;
    n++;
  }
  if (n === 0) return zero(ring);
  const keys = new Float64Array(n * words);
  const { numerators } = p;
  const small = numerators instanceof Float64Array && height(p) * MAX_EXPONENT <= Number.MAX_SAFE_INTEGER;
  const doubles = new Float64Array(small ? n : 0);
  const bigs: bigint[] = [];
  for (let i = 0, t = 0; t < n; i++) {
    const e = exponents[i]!;
    if (e === 0) continue;
    for (let w = 0; w < words; w++) keys[t * words + w] = p.keys[i * words + w]!;
    keys[t * words + word]! -= weight;
    if (small) doubles[t] = numerators[i]! * e;
    else bigs.push(BigInt(numerators[i]!) * BigInt(e));
    t++;
  }
  return normalise(ring, keys, small ? doubles : bigs, p.denominator, Math.min(p.reach + 1, MAX_EXPONENT));
}

/**
 * Partial derivative with respect to a generator by name, all others held fixed (a radical and its square too);
 * a name that is not in the ring gives zero. @throws ExponentLimitError beyond ±511.
 */
export function partial(p: Poly, name: string): Poly {
  const g = p.ring.position.get(name);
  return g === undefined ? zero(p.ring) : partialAt(p, g);
}

/**
 * ∂/∂q of a polynomial at fixed velocities, with sources differentiated as the functions of q that they are.
 * @throws ExponentLimitError beyond ±511.
 */
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
  const atLimit = p.reach >= MAX_EXPONENT;
  const big = !(height(p) * MAX_EXPONENT * generators.length * Math.max(1, p.size) <= Number.MAX_SAFE_INTEGER);
  const table = new TermTable(words, p.size * 3, big);
  for (let g = 0; g < generators.length; g++) {
    if (generators[g]!.kind !== 'jet') continue;
    const w0 = wordOf(g);
    const d0 = weightOf(g);
    const up = next[g]!;
    const w1 = wordOf(up);
    const d1 = weightOf(up);
    for (let i = 0; i < p.size; i++) {
      const e = exponentAt(p.keys, i * words, g);
      if (e === 0) continue;
      if (up < 0) throw new Error(`the ring has no time derivative of ${generators[g]!.name}`);
      if (atLimit && (e === -MAX_EXPONENT || exponentAt(p.keys, i * words, up) === MAX_EXPONENT))
        throw new ExponentLimitError();
      for (let w = 0; w < words; w++) table.key[w] = p.keys[i * words + w]!;
      table.key[w0]! -= d0;
      table.key[w1]! += d1;
      const s = table.slot();
      if (table.bigs) table.bigs[s]! += BigInt(p.numerators[i]!) * BigInt(e);
      else table.numbers[s]! += (p.numerators[i] as number) * e;
    }
  }
  let result = fromTable(ring, table, p.denominator, Math.min(p.reach + 1, MAX_EXPONENT));
  generators.forEach((g, i) => {
    if (g.kind !== 'source') return;
    const by = partialAt(p, i);
    if (by.size > 0) result = add(result, multiply(by, sourceRate(ring, g)));
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

/**
 * Euler–Lagrange expression Σ_n (−d/dt)^n ∂L/∂D(q,n), with ∂L/∂q as in `fieldPartial`.
 * @throws as `timeDerivative`; the ring needs jets up to twice the order in which the field occurs.
 */
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
 * Antiderivative in one generator, all others held fixed, sources that depend on it too.
 * Terms with exponent -1, whose antiderivative is a logarithm, come back as `rest`: p = ∂primitive + rest.
 * @throws Error for an unknown name or a radical, whose powers are not free; ExponentLimitError beyond ±511.
 */
export function antiderivative(p: Poly, name: string): { primitive: Poly; rest: Poly } {
  const { ring } = p;
  const byExponent = new Map<number, number[]>();
  const g = positionOf(ring, name);
  if (ring.generators[g]!.kind === 'radical') throw new Error(`${name} is a radical`);
  for (let i = 0; i < p.size; i++) {
    const e = exponentAt(p.keys, i * ring.words, g);
    const rows = byExponent.get(e);
    if (rows) rows.push(i);
    else byExponent.set(e, [i]);
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
