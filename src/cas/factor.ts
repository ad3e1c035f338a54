/**
 * Factors of a polynomial over the rationals. Computer algebra packages propose, the kernel verifies.
 * Invariant: the product of what is returned is the polynomial, multiplied out exactly. That no factor can be split
 * further is not claimed unless the kernel itself answered. Imports the algebra only; the packages are loaded by `ask`.
 */
import { coefficientOf, symbolsOf } from '../algebra/collect.js';
import { splitUnit } from '../algebra/division.js';
import type { Factor } from '../algebra/fraction.js';
import { compareSimplicity } from '../algebra/linear.js';
import { constant, equals, generator, isZero, multiply, type Poly, power, termsOf } from '../algebra/poly.js';
import { exponentRange, MAX_EXPONENT } from '../algebra/ring.js';
import { ask, type Question } from './ask.js';
import { factorsOfReply, ReplyError, readReply, valueOfReply } from './reply.js';

export interface Factorisation {
  /** A single term: rational number times a Laurent monomial. */
  readonly unit: Poly;
  /** Distinct primitive sums that no generator divides, simple ones first; none for a single term. */
  readonly factors: readonly Factor[];
  /** Who found the factors. `kernel`: there is nothing to split, and that is proved. */
  readonly by: Question['library'] | 'kernel';
}

/** Someone who may know the factors of a polynomial in v1, v2, … with integer coefficients. */
export interface Proposer {
  readonly name: Question['library'];
  /** A product as text, or undefined. */
  propose(polynomial: string, symbols: readonly string[], timeLimitMs: number): Promise<string | undefined>;
}

const packaged = (library: Question['library']): Proposer => ({
  name: library,
  async propose(polynomial, symbols, timeLimitMs) {
    const answer = await ask({ library, polynomial, symbols }, timeLimitMs);
    return 'reply' in answer ? answer.reply : undefined;
  },
});
const PROPOSERS: readonly Proposer[] = [packaged('nerdamer'), packaged('algebrite')];

/**
 * p = unit · Π base^power with unit and bases as described above, a radical counted as a symbol of its own.
 * Undefined when nobody proposed a product that is p. A proposal that splits nothing counts only when no other splits.
 * Each proposer has `timeLimitMs` milliseconds, loading included.
 */
export async function factor(
  p: Poly,
  { timeLimitMs, proposers = PROPOSERS }: { timeLimitMs: number; proposers?: readonly Proposer[] },
): Promise<Factorisation | undefined> {
  if (isZero(p)) return { unit: p, factors: [], by: 'kernel' };
  const { unit, reduced } = splitUnit(p);
  if (reduced.size === 1) return { unit: p, factors: [], by: 'kernel' };
  if (isPlainlyIrreducible(reduced)) return { unit, factors: [{ base: reduced, power: 1 }], by: 'kernel' };
  const names = symbolsOf(reduced);
  const symbols = names.map((_, i) => `v${i + 1}`);
  const images = new Map(symbols.map((symbol, i) => [symbol, generator(p.ring, names[i]!)]));
  const polynomial = textOf(reduced, new Map(names.map((name, i) => [name, symbols[i]!])));
  let unsplit: Factorisation | undefined;
  for (const proposer of proposers) {
    const reply = await proposer.propose(polynomial, symbols, timeLimitMs);
    const found = reply === undefined ? undefined : verified(reduced, reply, images);
    if (!found) continue;
    const result = { unit: multiply(unit, found.unit), factors: found.factors, by: proposer.name };
    if (found.factors.length > 1 || found.factors[0]!.power > 1) return result;
    unsplit ??= result;
  }
  return unsplit;
}

/**
 * Whether p = A x + B for some generator x with a single term A: since no generator divides p, A and B have no common
 * factor, and p has none. False says nothing.
 */
function isPlainlyIrreducible(p: Poly): boolean {
  const { high } = exponentRange(p.ring, p.keys);
  return p.ring.generators.some((g, i) => high[i] === 1 && coefficientOf(p, g.name, 1).size === 1);
}

/** Infix text with integer coefficients and renamed symbols; p has no denominators. */
function textOf(p: Poly, symbols: ReadonlyMap<string, string>): string {
  return termsOf(p)
    .map(({ coefficient, exponents }) => {
      const powers = exponents.map(([g, e]) => {
        const symbol = symbols.get(p.ring.generators[g]!.name)!;
        return e === 1 ? symbol : `${symbol}^${e}`;
      });
      return [`(${coefficient.num})`, ...powers].join('*');
    })
    .join('+');
}

/** What a reply says the factors of p are, when it multiplies to p; units are taken out of them and equal ones joined. */
function verified(p: Poly, reply: string, images: ReadonlyMap<string, Poly>): Omit<Factorisation, 'by'> | undefined {
  const { ring } = p;
  const maxExponent = Math.max(1, ...exponentRange(ring, p.keys).high);
  const factors: { base: Poly; power: number }[] = [];
  let unit = constant(ring, 1);
  let product = unit;
  try {
    for (const { base, power: n } of factorsOfReply(readReply(reply))) {
      const { unit: single, reduced } = splitUnit(valueOfReply(base, ring, images, maxExponent));
      if (Math.abs(n) > MAX_EXPONENT) return undefined;
      unit = multiply(unit, power(single, n));
      if (reduced.size === 1) continue;
      if (n < 1 || n > maxExponent) return undefined;
      product = multiply(product, power(reduced, n));
      const twin = factors.find((f) => equals(f.base, reduced));
      if (twin) twin.power += n;
      else factors.push({ base: reduced, power: n });
    }
    if (!equals(multiply(unit, product), p)) return undefined;
  } catch (error) {
    // Unreadable, or beyond what the ring can hold: no factors of p.
    if (error instanceof ReplyError || error instanceof RangeError) return undefined;
    throw error;
  }
  return { unit, factors: factors.sort((a, b) => compareSimplicity(a.base, b.base)) };
}
