/**
 * A ring of Laurent polynomials: its generators, what each of them is, and how exponents are packed.
 * Five exponents share one double as signed digits in base 1024, so that multiplying monomials is adding words and the
 * numeric order of words is the lexicographic order of exponents. Invariant: every exponent lies in [-511, 511].
 * Imports only exact rationals.
 */
import type { Rational } from './rational.js';

/** A symbol whose time derivative is zero: coupling, scale, spatial curvature, density at a = 1. */
export interface ConstantGenerator {
  readonly kind: 'constant';
  readonly name: string;
}

/** The n-th time derivative of a field; its name is the field's own for n = 0 and `D(field,n)` above. */
export interface JetGenerator {
  readonly kind: 'jet';
  readonly name: string;
  readonly field: string;
  readonly order: number;
}

/** A function ρ of some fields with ∂ρ/∂q = exponent · ρ/q, for instance the density of a fluid, −3(1+w)ρ/a. */
export interface SourceGenerator {
  readonly kind: 'source';
  readonly name: string;
  readonly exponents: ReadonlyMap<string, Rational>;
}

/** A constant s with s² = a constant of the ring. */
export interface RadicalGenerator {
  readonly kind: 'radical';
  readonly name: string;
  readonly square: string;
}

export type Generator = ConstantGenerator | JetGenerator | SourceGenerator | RadicalGenerator;

export interface Ring {
  readonly generators: readonly Generator[];
  /** Doubles per monomial. */
  readonly words: number;
  readonly position: ReadonlyMap<string, number>;
  /** Position of the jet one order up, or -1 when the ring ends there or the generator is no jet. */
  readonly next: readonly number[];
  /** Positions of [radical, its square]. */
  readonly radicals: readonly (readonly [number, number])[];
}

export const MAX_EXPONENT = 511;
const BASE = 1024;
const DIGITS = 5;
const WEIGHTS = [BASE ** 4, BASE ** 3, BASE ** 2, BASE, 1];

/** Thrown when a result would have an exponent beyond the stated limit of the packed form. */
export class ExponentLimitError extends RangeError {
  constructor() {
    super(`an exponent beyond ${MAX_EXPONENT} would be needed`);
    this.name = 'ExponentLimitError';
  }
}

/** Name of the n-th time derivative of a field. */
export const jetName = (field: string, order: number): string => (order === 0 ? field : `D(${field},${order})`);

/** The jets of a field up to an order, highest first. */
export const jetsOf = (field: string, maxOrder: number): JetGenerator[] =>
  Array.from({ length: maxOrder + 1 }, (_, i) => ({
    kind: 'jet',
    name: jetName(field, maxOrder - i),
    field,
    order: maxOrder - i,
  }));

export const constantsOf = (names: Iterable<string>): ConstantGenerator[] =>
  [...names].map((name) => ({ kind: 'constant', name }));

/**
 * A ring over the given generators; the first is the most significant in the order of monomials.
 * @throws Error when a name occurs twice, a radical's square is no constant of the ring or is that of another radical
 * (the ring would have divisors of zero), or a source depends on a field that is missing.
 */
export function makeRing(generators: readonly Generator[]): Ring {
  const position = new Map(generators.map((g, i) => [g.name, i]));
  if (position.size !== generators.length) throw new Error('a ring generator is named twice');
  const at = (name: string): number => {
    const i = position.get(name);
    if (i === undefined) throw new Error(`no generator ${name} in the ring`);
    return i;
  };
  const radicals = generators.flatMap((g, i) => (g.kind === 'radical' ? [[i, at(g.square)] as const] : []));
  for (const [, square] of radicals)
    if (generators[square]!.kind !== 'constant') throw new Error(`${generators[square]!.name} is no constant`);
  if (new Set(radicals.map(([, square]) => square)).size !== radicals.length)
    throw new Error('two radicals have the same square');
  for (const g of generators) if (g.kind === 'source') for (const field of g.exponents.keys()) at(field);
  return Object.freeze({
    generators: Object.freeze([...generators]),
    words: Math.max(1, Math.ceil(generators.length / DIGITS)),
    position,
    next: Object.freeze(
      generators.map((g) => (g.kind === 'jet' ? (position.get(jetName(g.field, g.order + 1)) ?? -1) : -1)),
    ),
    radicals: Object.freeze(radicals),
  });
}

/** Position of a generator. @throws Error when the ring has none of that name. */
export function positionOf(ring: Ring, name: string): number {
  const i = ring.position.get(name);
  if (i === undefined) throw new Error(`no generator ${name} in the ring`);
  return i;
}

/** Word that holds a generator's exponent. */
export const wordOf = (generator: number): number => Math.floor(generator / DIGITS);
/** What one unit of the generator's exponent adds to its word. */
export const weightOf = (generator: number): number => WEIGHTS[generator % DIGITS]!;

/** Exponent of a generator in the monomial whose words start at `offset`. */
export function exponentAt(keys: Float64Array, offset: number, generator: number): number {
  const digits = Math.round(keys[offset + Math.floor(generator / DIGITS)]! / WEIGHTS[generator % DIGITS]!);
  return digits - BASE * Math.round(digits / BASE);
}

/** All exponents of one monomial, in the order of the generators. */
export function unpackMonomial(ring: Ring, keys: Float64Array, offset: number): Int16Array {
  const n = ring.generators.length;
  const exponents = new Int16Array(n);
  for (let w = 0; w < ring.words; w++) {
    let rest = keys[offset + w]!;
    if (rest === 0) continue;
    for (let d = DIGITS - 1; d >= 0; d--) {
      const higher = Math.round(rest / BASE);
      const g = w * DIGITS + d;
      if (g < n) exponents[g] = rest - higher * BASE;
      rest = higher;
    }
  }
  return exponents;
}

/** Least and greatest exponent of each generator among the monomials of a list; all zero for an empty list. */
export function exponentRange(ring: Ring, keys: Float64Array): { low: Int16Array; high: Int16Array } {
  const low = keys.length > 0 ? unpackMonomial(ring, keys, 0) : new Int16Array(ring.generators.length);
  const high = low.slice();
  for (let offset = ring.words; offset < keys.length; offset += ring.words)
    unpackMonomial(ring, keys, offset).forEach((e, g) => {
      if (e < low[g]!) low[g] = e;
      if (e > high[g]!) high[g] = e;
    });
  return { low, high };
}

/** The packed form of exponents given in the order of the generators. @throws ExponentLimitError beyond ±511. */
export function packMonomial(ring: Ring, exponents: ArrayLike<number>): Float64Array {
  const keys = new Float64Array(ring.words);
  for (let g = 0; g < exponents.length; g++) {
    const e = exponents[g]!;
    if (e > MAX_EXPONENT || e < -MAX_EXPONENT) throw new ExponentLimitError();
    keys[wordOf(g)]! += e * weightOf(g);
  }
  return keys;
}
