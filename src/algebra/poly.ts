/**
 * Sparse Laurent polynomials with exact rational coefficients: integer numerators over one common denominator.
 * Invariant (`isCanonical`): monomials strictly descending, no zero coefficient, numerators and denominator without a
 * common factor, numerators in doubles exactly when all of them are safe integers, radicals only to the powers 0 and 1.
 * Imports only exact rationals, rings and term tables.
 */
import { boxProduct, FEW_TERMS, mergedProduct, type TermList } from './products.js';
import { gcd, type Rational, rational } from './rational.js';
import {
  ExponentLimitError,
  exponentAt,
  exponentRange,
  MAX_EXPONENT,
  packMonomial,
  positionOf,
  type Ring,
  unpackMonomial,
  weightOf,
  wordOf,
} from './ring.js';
import { compareKeys, mergeBigs, mergeDoubles, TermTable } from './terms.js';

/** Numerators: doubles while all are safe integers, BigInts beyond. */
export type Numerators = Float64Array | readonly bigint[];

export interface Poly {
  readonly ring: Ring;
  /** Number of terms. */
  readonly size: number;
  /** Packed monomials, `ring.words` doubles each, descending. */
  readonly keys: Float64Array;
  readonly numerators: Numerators;
  /** Positive common denominator. */
  readonly denominator: bigint;
  /** No exponent exceeds this in absolute value (an upper bound, not always the least). */
  readonly reach: number;
}

const SAFE = Number.MAX_SAFE_INTEGER;
const BIG_SAFE = BigInt(SAFE);

const isBig = (n: Numerators): n is readonly bigint[] => !(n instanceof Float64Array);
const toBig = (n: Numerators): readonly bigint[] => (isBig(n) ? n : Array.from(n, BigInt));

/** Largest absolute numerator while all are safe integers, else infinity. */
export function height(p: Poly): number {
  let h = 0;
  if (isBig(p.numerators)) return Number.POSITIVE_INFINITY;
  for (const c of p.numerators) if (c > h || -c > h) h = Math.abs(c);
  return h;
}

function build(ring: Ring, keys: Float64Array, numerators: Numerators, denominator: bigint, reach: number): Poly {
  return Object.freeze({ ring, size: numerators.length, keys, numerators, denominator, reach });
}

/** Cancels common factors and chooses the representation of numerators. Monomials must be canonical already. */
export function normalise(
  ring: Ring,
  keys: Float64Array,
  numerators: Numerators,
  denominator: bigint,
  reach: number,
): Poly {
  let n = numerators;
  let d = denominator;
  if (n.length === 0) return build(ring, keys, new Float64Array(0), 1n, 0);
  if (d !== 1n) {
    let g = n instanceof Float64Array && d <= BIG_SAFE ? BigInt(contentWith(n, Number(d))) : d;
    for (let i = 0; i < n.length && g !== 1n; i++) g = gcd(g, BigInt(n[i]!));
    if (g !== 1n) {
      n = isBig(n) ? n.map((c) => c / g) : divideSafe(n, g);
      d /= g;
    }
  }
  if (isBig(n) && n.every((c) => c <= BIG_SAFE && c >= -BIG_SAFE)) n = Float64Array.from(n, Number);
  return build(ring, keys, n, d, reach);
}

/** Greatest common divisor of a positive number and all numerators. */
function contentWith(n: Float64Array, start: number): number {
  let g = start;
  for (let i = 0; i < n.length && g !== 1; i++) {
    let x = Math.abs(n[i]!);
    while (x !== 0) [g, x] = [x, g % x];
  }
  return g;
}

function divideSafe(n: Float64Array, g: bigint): Float64Array {
  const divisor = Number(g);
  return n.map((c) => c / divisor);
}

/** The polynomial that a filled table holds, over a denominator. */
export function fromTable(ring: Ring, table: TermTable, denominator: bigint, reach: number): Poly {
  const { keys, coefficients } = table.sorted();
  const p = normalise(ring, keys, coefficients, denominator, reach);
  return ring.radicals.length > 0 ? reduceRadicals(p) : p;
}

export const zero = (ring: Ring): Poly => build(ring, new Float64Array(0), new Float64Array(0), 1n, 0);

/** A constant polynomial. */
export function constant(ring: Ring, value: Rational | number): Poly {
  const r = typeof value === 'number' ? rational(value) : value;
  if (r.num === 0n) return zero(ring);
  return normalise(ring, new Float64Array(ring.words), [r.num], r.den, 0);
}

/**
 * One generator to an integer power.
 * @throws Error for an unknown name; RangeError for an exponent that is no integer; ExponentLimitError beyond ±511.
 */
export function generator(ring: Ring, name: string, exponent = 1): Poly {
  const g = positionOf(ring, name);
  const reach = Math.abs(integer(exponent));
  if (reach > MAX_EXPONENT || ring.generators[g]!.kind === 'radical')
    return monomial(ring, rational(1), [[name, exponent]]);
  const keys = new Float64Array(ring.words);
  keys[wordOf(g)] = exponent * weightOf(g);
  return build(ring, keys, Float64Array.of(1), 1n, reach);
}

/** coefficient · Π name^exponent; names may repeat. @throws as `generator`. */
export function monomial(
  ring: Ring,
  coefficient: Rational,
  powers: Iterable<readonly [name: string, exponent: number]>,
): Poly {
  if (coefficient.num === 0n) return zero(ring);
  const exponents = new Array<number>(ring.generators.length).fill(0);
  for (const [name, exponent] of powers) exponents[positionOf(ring, name)]! += integer(exponent);
  // A radical may occur to a power beyond the limit that its square stays below.
  for (const [r, square] of ring.radicals) {
    exponents[square]! += Math.floor(exponents[r]! / 2);
    exponents[r] = exponents[r]! & 1;
  }
  let reach = 0;
  for (const e of exponents) reach = Math.max(reach, Math.abs(e));
  return normalise(ring, packMonomial(ring, exponents), [coefficient.num], coefficient.den, reach);
}

function integer(n: number): number {
  if (!Number.isSafeInteger(n)) throw new RangeError(`an exponent must be an integer, not ${n}`);
  return n;
}

export const isZero = (p: Poly): boolean => p.size === 0;

function sameRing(a: Poly, b: Poly): void {
  if (a.ring !== b.ring) throw new Error('polynomials of different rings');
}

function scaled(p: Poly, factor: bigint): Numerators {
  if (factor === 1n) return p.numerators;
  if (!isBig(p.numerators) && height(p) * Math.abs(Number(factor)) <= SAFE) {
    const f = Number(factor);
    return p.numerators.map((c) => c * f);
  }
  return toBig(p.numerators).map((c) => c * factor);
}

/** a + sign·b by merging two sorted lists. */
function merge(a: Poly, b: Poly, sign: 1 | -1): Poly {
  sameRing(a, b);
  if (b.size === 0) return a;
  if (a.size === 0) return sign === 1 ? b : negate(b);
  const words = a.ring.words;
  const reach = Math.max(a.reach, b.reach);
  const keys = new Float64Array((a.size + b.size) * words);
  const done = (sums: Numerators, denominator: bigint): Poly => {
    const n = sums.length * words;
    return normalise(a.ring, n === keys.length ? keys : keys.slice(0, n), sums, denominator, reach);
  };
  let na = a.numerators;
  let nb = b.numerators;
  let denominator = a.denominator;
  if (denominator !== b.denominator) {
    denominator = (denominator / gcd(denominator, b.denominator)) * b.denominator;
    na = scaled(a, denominator / a.denominator);
    nb = scaled(b, denominator / b.denominator);
  }
  if (!isBig(na) && !isBig(nb)) {
    const sums = mergeDoubles(words, a.keys, na, b.keys, nb, sign, keys);
    if (sums) return done(sums, denominator);
  }
  return done(mergeBigs(words, a.keys, toBig(na), b.keys, toBig(nb), sign, keys), denominator);
}

export const add = (a: Poly, b: Poly): Poly => merge(a, b, 1);
export const subtract = (a: Poly, b: Poly): Poly => merge(a, b, -1);

export function negate(p: Poly): Poly {
  const n = p.numerators;
  return build(p.ring, p.keys, isBig(n) ? n.map((c) => -c) : n.map((c) => -c), p.denominator, p.reach);
}

/** factor · p for a rational factor. */
export function scale(p: Poly, factor: Rational | number): Poly {
  const f = typeof factor === 'number' ? rational(factor) : factor;
  if (f.num === 0n) return zero(p.ring);
  if (f.den === 1n && f.num === 1n) return p;
  return normalise(p.ring, p.keys, scaled(p, f.num), p.denominator * f.den, p.reach);
}

/**
 * Bound on the exponents of a product. Extreme exponents of two non-zero factors add up exactly, because a ring without
 * divisors of zero cancels no extreme part; so nothing is refused that would fit. @throws ExponentLimitError beyond ±511.
 */
function productReach(a: Poly, b: Poly): number {
  if (a.reach + b.reach <= MAX_EXPONENT) return a.reach + b.reach;
  const of = exponentRange(a.ring, a.keys);
  const by = exponentRange(b.ring, b.keys);
  let reach = 0;
  of.low.forEach((low, g) => {
    reach = Math.max(reach, Math.abs(low + by.low[g]!), Math.abs(of.high[g]! + by.high[g]!));
  });
  if (reach > MAX_EXPONENT) throw new ExponentLimitError();
  return reach;
}

/** a · b. @throws ExponentLimitError beyond ±511. */
export function multiply(a: Poly, b: Poly): Poly {
  sameRing(a, b);
  if (a.size === 0 || b.size === 0) return zero(a.ring);
  if (a.size < b.size) return multiply(b, a);
  const { ring } = a;
  const { words } = ring;
  const reach = productReach(a, b);
  const denominator = a.denominator * b.denominator;
  const big = !(height(a) * height(b) * b.size <= SAFE);
  if (b.size === 1) {
    const keys = new Float64Array(a.keys.length);
    for (let i = 0, t = 0; i < a.size; i++) for (let w = 0; w < words; w++, t++) keys[t] = a.keys[t]! + b.keys[w]!;
    const by = b.numerators[0]!;
    const na = a.numerators;
    const numerators = big || isBig(na) ? scaled(a, BigInt(by)) : by === 1 ? na : na.map((c) => c * (by as number));
    const p = normalise(ring, keys, numerators, denominator, reach);
    return ring.radicals.length > 0 ? reduceRadicals(p) : p;
  }
  const terms = big ? undefined : doubleProduct(ring, a, b);
  if (terms) {
    const p = normalise(ring, terms.keys, terms.coefficients, denominator, reach);
    return ring.radicals.length > 0 ? reduceRadicals(p) : p;
  }
  const table = new TermTable(words, Math.min(a.size * b.size, 4 * (a.size + b.size)), big);
  const { key } = table;
  const na = a.numerators;
  const nb = b.numerators;
  const bigA = big ? toBig(na) : [];
  const bigB = big ? toBig(nb) : [];
  for (let j = 0; j < b.size; j++)
    for (let i = 0; i < a.size; i++) {
      for (let w = 0; w < words; w++) key[w] = a.keys[i * words + w]! + b.keys[j * words + w]!;
      const s = table.slot();
      if (big) table.bigs![s]! += bigA[i]! * bigB[j]!;
      else table.numbers[s]! += (na[i] as number) * (nb[j] as number);
    }
  return fromTable(ring, table, denominator, reach);
}

/** The product by one of the methods of products.ts, when one of them suits it. */
function doubleProduct(ring: Ring, a: Poly, b: Poly): TermList | undefined {
  const left = { keys: a.keys, coefficients: a.numerators as Float64Array };
  const right = { keys: b.keys, coefficients: b.numerators as Float64Array };
  return b.size <= FEW_TERMS ? mergedProduct(ring.words, left, right) : boxProduct(ring, left, right);
}

/**
 * p^n for an integer n; negative only for a single term.
 * @throws RangeError for an exponent that is no integer and for a negative power of zero or of a sum;
 * ExponentLimitError beyond ±511.
 */
export function power(p: Poly, n: number): Poly {
  if (integer(n) < 0) {
    if (p.size !== 1) throw new RangeError(p.size === 0 ? 'division by zero' : 'a sum has no inverse in this ring');
    return power(invertMonomial(p), -n);
  }
  if (p.size === 1) return powerOfMonomial(p, n);
  refuseLongPower(p, n);
  let result = constant(p.ring, 1);
  for (let i = 0; i < n && p.size > 0; i++) result = multiply(result, p);
  return n > 0 && p.size === 0 ? p : result;
}

/** By squaring, which for sums of several terms would cost more than it saves. */
function powerOfMonomial(p: Poly, n: number): Poly {
  if (n < 2) return n === 0 ? constant(p.ring, 1) : p;
  const half = powerOfMonomial(p, Math.floor(n / 2));
  const square = multiply(half, half);
  return n % 2 === 0 ? square : multiply(square, p);
}

/** Refuses before the work what would be refused at its end; the exponents of radicals do not grow. */
function refuseLongPower(p: Poly, n: number): void {
  if (n * p.reach <= MAX_EXPONENT) return;
  const { low, high } = exponentRange(p.ring, p.keys);
  p.ring.generators.forEach((g, i) => {
    if (g.kind !== 'radical' && n * Math.max(-low[i]!, high[i]!) > MAX_EXPONENT) throw new ExponentLimitError();
  });
}

function invertMonomial(p: Poly): Poly {
  const num = BigInt(p.numerators[0]!);
  const sign = num < 0n ? -1n : 1n;
  const inverse = normalise(
    p.ring,
    p.keys.map((w) => 0 - w),
    [p.denominator * sign],
    num * sign,
    p.reach,
  );
  return p.ring.radicals.length > 0 ? reduceRadicals(inverse) : inverse;
}

/** Sum of many polynomials; cheaper than repeated `add` when there are many short ones. */
export function sum(ring: Ring, terms: readonly Poly[]): Poly {
  if (terms.length === 0) return zero(ring);
  if (terms.length === 1) return terms[0]!;
  const half = terms.length >> 1;
  return add(sum(ring, terms.slice(0, half)), sum(ring, terms.slice(half)));
}

export const product = (ring: Ring, factors: readonly Poly[]): Poly =>
  factors.reduce((p, f) => multiply(p, f), constant(ring, 1));

/** Structural equality, which canonical form makes equality of values. */
export function equals(a: Poly, b: Poly): boolean {
  sameRing(a, b);
  if (a.size !== b.size || a.denominator !== b.denominator) return false;
  for (let i = 0; i < a.size; i++) if (a.numerators[i] !== b.numerators[i]) return false;
  return a.keys.every((w, i) => w === b.keys[i]);
}

/** Replaces s² by its value for every radical s. */
function reduceRadicals(p: Poly): Poly {
  const { ring } = p;
  const needs = (i: number, r: number): boolean => {
    const e = exponentAt(p.keys, i * ring.words, r);
    return e !== 0 && e !== 1;
  };
  let any = false;
  for (let i = 0; i < p.size && !any; i++) any = ring.radicals.some(([r]) => needs(i, r));
  if (!any) return p;
  const table = new TermTable(ring.words, p.size, true);
  let reach = p.reach;
  const numerators = toBig(p.numerators);
  for (let i = 0; i < p.size; i++) {
    table.key.set(p.keys.subarray(i * ring.words, (i + 1) * ring.words));
    for (const [r, square] of ring.radicals) {
      const halves = Math.floor(exponentAt(table.key, 0, r) / 2);
      const total = exponentAt(table.key, 0, square) + halves;
      if (Math.abs(total) > MAX_EXPONENT) throw new ExponentLimitError();
      reach = Math.max(reach, Math.abs(total));
      table.key[wordOf(r)]! -= 2 * halves * weightOf(r);
      table.key[wordOf(square)]! += halves * weightOf(square);
    }
    table.bigs![table.slot()]! += numerators[i]!;
  }
  const { keys, coefficients } = table.sorted();
  return normalise(ring, keys, coefficients, p.denominator, reach);
}

/** Coefficient of the highest monomial of a polynomial that is not zero. */
export const leadingCoefficient = (p: Poly): Rational => rational(BigInt(p.numerators[0]!), p.denominator);

/** One term, unpacked: its rational coefficient and the non-zero exponents by generator position. */
export interface Term {
  readonly coefficient: Rational;
  readonly exponents: readonly (readonly [generator: number, exponent: number])[];
}

/** The terms in canonical order. */
export function termsOf(p: Poly): Term[] {
  const out: Term[] = [];
  for (let i = 0; i < p.size; i++) {
    const exponents: [number, number][] = [];
    unpackMonomial(p.ring, p.keys, i * p.ring.words).forEach((e, g) => {
      if (e !== 0) exponents.push([g, e]);
    });
    out.push({ coefficient: rational(BigInt(p.numerators[i]!), p.denominator), exponents });
  }
  return out;
}

/** Whether the value obeys the invariant stated at the top of this module. */
export function isCanonical(p: Poly): boolean {
  const { ring, keys, numerators, denominator } = p;
  const { words } = ring;
  if (keys.length !== p.size * words || numerators.length !== p.size || denominator < 1n) return false;
  if (p.reach > MAX_EXPONENT || (!isBig(numerators) && !numerators.every(Number.isSafeInteger))) return false;
  let g = denominator;
  for (let i = 0; i < p.size; i++) {
    const c = BigInt(numerators[i]!);
    if (c === 0n) return false;
    g = gcd(g, c);
    if (i > 0 && compareKeys(keys, (i - 1) * words, keys, i * words, words) <= 0) return false;
    if (ring.radicals.some(([r]) => ![0, 1].includes(exponentAt(keys, i * words, r)))) return false;
    const exponents = unpackMonomial(ring, keys, i * words);
    if (exponents.some((e) => Math.abs(e) > p.reach)) return false;
    // Also refuses a negative zero, and digits that belong to no generator.
    if (!packMonomial(ring, exponents).every((w, at) => Object.is(w, keys[i * words + at]))) return false;
  }
  const allSafe = toBig(numerators).every((c) => c <= BIG_SAFE && c >= -BIG_SAFE);
  return g === 1n && isBig(numerators) !== allSafe && (p.size > 0 || denominator === 1n);
}
