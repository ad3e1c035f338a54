/**
 * Linear algebra over the rationals with polynomials as vectors: their monomials are the coordinates.
 * Imports polynomials.
 */
import { isZero, leadingCoefficient, type Poly, scale, subtract, termsOf } from './poly.js';
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

/** p minus the multiples of basis elements that cancel their leading monomials. */
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
  const { words } = p.ring;
  let from = 0;
  let to = p.size;
  while (from < to) {
    const middle = (from + to) >> 1;
    const c = compareKeys(p.keys, middle * words, b.keys, 0, words);
    if (c === 0) return middle;
    if (c > 0) from = middle + 1;
    else to = middle;
  }
  return -1;
}

/**
 * Adds to the basis what is new in p and says whether there was anything.
 * Invariant: the leading monomial of an element is that of no other and occurs in none after it; so what `reduce`
 * leaves of a polynomial has none of them, and vanishes exactly when the polynomial is in the span.
 */
function extend(basis: Poly[], p: Poly): boolean {
  const rest = reduce(p, basis);
  if (isZero(rest)) return false;
  basis.push(rest);
  return true;
}

/** The polynomials that are not linear combinations of those before them. */
export function independent(polys: readonly Poly[]): Poly[] {
  const basis: Poly[] = [];
  return polys.filter((p) => extend(basis, p));
}

/** Whether p is a linear combination of the others. */
export function dependsOn(p: Poly, others: readonly Poly[]): boolean {
  const basis: Poly[] = [];
  for (const q of others) extend(basis, q);
  return isZero(reduce(p, basis));
}

/**
 * Reduced echelon basis of a span, each element primitive: the same for every set of generators of the same span.
 */
export function echelon(polys: readonly Poly[]): Poly[] {
  let basis: Poly[] = [];
  for (const p of polys) {
    const rest = reduce(p, basis);
    if (!isZero(rest)) basis = [...basis.map((b) => reduce(b, [rest])), rest];
  }
  return basis.map(primitive).sort((a, b) => compareKeys(b.keys, 0, a.keys, 0, a.ring.words));
}

/** Total order of polynomials of one ring that puts simple ones first: by number of terms, of factors, then canonical. */
export function compareSimplicity(a: Poly, b: Poly): number {
  if (a.size !== b.size) return a.size - b.size;
  const weight = (p: Poly) => termsOf(p).reduce((n, t) => n + t.exponents.length, 0);
  const d = weight(a) - weight(b);
  if (d !== 0) return d;
  const { words } = a.ring;
  for (let i = 0; i < a.size; i++) {
    const c = compareKeys(b.keys, i * words, a.keys, i * words, words);
    if (c !== 0) return c;
  }
  for (let i = 0; i < a.size; i++) {
    const c = BigInt(b.numerators[i]!) * a.denominator - BigInt(a.numerators[i]!) * b.denominator;
    if (c !== 0n) return c < 0n ? -1 : 1;
  }
  return 0;
}
