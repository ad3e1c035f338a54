/**
 * Linear algebra over the rationals with polynomials as vectors: their monomials are the coordinates.
 */

import { isZero, normalise, type Poly, scale, subtract, termsOf } from './poly.js';
import { divideRational, gcd, rational } from './rational.js';
import { compareKeys } from './terms.js';

/** Integer multiple of p with coprime integer coefficients and a positive leading one; zero stays zero. */
export function primitive(p: Poly): Poly {
  if (isZero(p)) return p;
  let content = 0n;
  for (const c of p.numerators) content = gcd(content, BigInt(c));
  const sign = BigInt(p.numerators[0]!) < 0n ? -1n : 1n;
  return scale(p, rational(p.denominator * sign, content));
}

const leadingCoefficient = (p: Poly) => rational(BigInt(p.numerators[0]!), p.denominator);

/** p minus the multiples of basis elements that cancel their leading monomials; zero exactly when p is in the span. */
function reduce(p: Poly, basis: readonly Poly[]): Poly {
  let rest = p;
  for (const b of basis) {
    const row = rowOf(rest, b);
    if (row < 0) continue;
    const ratio = divideRational(rational(BigInt(rest.numerators[row]!), rest.denominator), leadingCoefficient(b));
    rest = subtract(rest, scale(b, ratio));
  }
  return rest;
}

/** Row of p that holds the leading monomial of b, or -1. */
function rowOf(p: Poly, b: Poly): number {
  for (let i = 0; i < p.size; i++) if (compareKeys(p.keys, i * p.ring.words, b.keys, 0, p.ring.words) === 0) return i;
  return -1;
}

/**
 * The polynomials that are not linear combinations of those before them.
 * Invariant of the inner basis: leading monomials differ, and none occurs in a later element.
 */
export function independent(polys: readonly Poly[]): Poly[] {
  const basis: Poly[] = [];
  const chosen: Poly[] = [];
  for (const p of polys) {
    const rest = reduce(p, basis);
    if (isZero(rest)) continue;
    chosen.push(p);
    basis.push(rest);
  }
  return chosen;
}

/** Whether p is a linear combination of the others. */
export const dependsOn = (p: Poly, others: readonly Poly[]): boolean =>
  independent([...others, p]).every((q) => q !== p);

/**
 * Reduced echelon basis of a span, each element primitive: the same for every set of generators of the same span.
 */
export function echelon(polys: readonly Poly[]): Poly[] {
  let basis: Poly[] = [];
  for (const p of polys) {
    const rest = reduce(p, basis);
    if (isZero(rest)) continue;
    basis = [...basis.map((b) => reduce(b, [rest])), rest];
  }
  return basis.map(primitive).sort((a, b) => compareKeys(b.keys, 0, a.keys, 0, a.ring.words));
}

/**
 * The quotient p/q when it is exact in the ring of Laurent polynomials, else undefined.
 * @throws RangeError when q is zero.
 */
export function divideExactly(p: Poly, q: Poly): Poly | undefined {
  if (isZero(q)) throw new RangeError('division by zero');
  const { words } = p.ring;
  const quotient: Poly[] = [];
  let rest = p;
  // In Laurent polynomials leading terms can be cancelled for ever; an exact quotient has its lowest term here.
  const lowest = new Float64Array(words);
  for (let w = 0; w < words && p.size > 0; w++)
    lowest[w] = p.keys[(p.size - 1) * words + w]! - q.keys[(q.size - 1) * words + w]!;
  while (!isZero(rest)) {
    const keys = new Float64Array(words);
    for (let w = 0; w < words; w++) keys[w] = rest.keys[w]! - q.keys[w]!;
    if (compareKeys(keys, 0, lowest, 0, words) < 0) return undefined;
    const ratio = divideRational(leadingCoefficient(rest), leadingCoefficient(q));
    const term = normalise(p.ring, keys, [ratio.num], ratio.den, rest.reach + q.reach);
    quotient.push(term);
    rest = subtract(rest, multiplyTerm(q, term));
  }
  return quotient.length === 0 ? rest : quotient.reduce((a, b) => subtract(a, scale(b, -1)));
}

function multiplyTerm(q: Poly, term: Poly): Poly {
  const keys = q.keys.map((k, i) => k + term.keys[i % q.ring.words]!);
  const factor = rational(BigInt(term.numerators[0]!), term.denominator);
  return scale(normalise(q.ring, keys, q.numerators, q.denominator, q.reach + term.reach), factor);
}

/** Number of terms, then infix-independent canonical order: a stable way to put simple polynomials first. */
export function compareSimplicity(a: Poly, b: Poly): number {
  if (a.size !== b.size) return a.size - b.size;
  const weight = (p: Poly) => termsOf(p).reduce((n, t) => n + t.exponents.length, 0);
  const d = weight(a) - weight(b);
  if (d !== 0) return d;
  for (let i = 0; i < a.size; i++) {
    const c = compareKeys(b.keys, i * a.ring.words, a.keys, i * a.ring.words, a.ring.words);
    if (c !== 0) return c;
  }
  return 0;
}
