/**
 * Exact division in a ring of Laurent polynomials, where every single term is a unit, and the normal form of a
 * polynomial up to units. Invariant: a quotient is returned only when quotient · divisor is the dividend.
 * Where a radical s occurs, its square is written as s² for the time of a division: then all generators are free.
 * Imports polynomials.
 */
import { involves, moveTo, substitute } from './collect.js';
import { primitive } from './linear.js';
import {
  constant,
  generator,
  isZero,
  leadingCoefficient,
  monomial,
  multiply,
  normalise,
  type Poly,
  power,
  scale,
  subtract,
  sum,
} from './poly.js';
import { divideRational, ONE, rational } from './rational.js';
import { exponentAt, exponentRange, makeRing, packMonomial, type Ring, unpackMonomial } from './ring.js';

/**
 * p = unit · reduced, where the unit is one term and the reduced part is the same for all multiples of p by units:
 * primitive, and no generator divides it or is in one of its denominators. The reduced part of zero is zero.
 * @throws ExponentLimitError when the exponents of a generator lie more than 511 apart.
 */
export function splitUnit(p: Poly): { unit: Poly; reduced: Poly } {
  const { ring } = p;
  if (isZero(p)) return { unit: constant(ring, 1), reduced: p };
  const lowest = Array.from(exponentRange(ring, p.keys).low);
  for (const [r, square] of ring.radicals) {
    let halves = Number.POSITIVE_INFINITY;
    for (let at = 0; at < p.keys.length; at += ring.words)
      halves = Math.min(halves, 2 * exponentAt(p.keys, at, square) + exponentAt(p.keys, at, r));
    lowest[r] = halves;
    lowest[square] = 0;
  }
  const shift = monomial(
    ring,
    ONE,
    lowest.map((e, g) => [ring.generators[g]!.name, e]),
  );
  const shifted = multiply(p, power(shift, -1));
  const reduced = primitive(shifted);
  const content = divideRational(leadingCoefficient(shifted), leadingCoefficient(reduced));
  return { unit: scale(shift, content), reduced };
}

/**
 * The quotient p/q when it is exact, else undefined.
 * @throws RangeError when q is zero; ExponentLimitError when the quotient exceeds ±511, also with k written as s².
 */
export function divideExactly(p: Poly, q: Poly): Poly | undefined {
  if (isZero(q)) throw new RangeError('division by zero');
  if (p.ring !== q.ring) throw new Error('polynomials of different rings');
  if (isZero(p)) return p;
  const { ring } = p;
  if (!ring.radicals.some(([r]) => [p, q].some((x) => involves(x, ring.generators[r]!.name)))) return divideFree(p, q);
  const free = freeRing(ring);
  const quotient = divideFree(unfold(p, free), unfold(q, free));
  return quotient && moveTo(quotient, ring);
}

/**
 * Division with remainder zero, highest terms first, all generators free. Extreme exponents of a product add up, so those
 * of the quotient are known beforehand: terms within that box are finitely many and each is tried once, which ends the
 * loop although leading terms of Laurent polynomials could be cancelled for ever.
 */
function divideFree(p: Poly, q: Poly): Poly | undefined {
  const { ring } = p;
  const of = exponentRange(ring, p.keys);
  const by = exponentRange(ring, q.keys);
  const low = Array.from(of.low, (e, g) => e - by.low[g]!);
  const high = Array.from(of.high, (e, g) => e - by.high[g]!);
  const leading = unpackMonomial(ring, q.keys, 0);
  const terms: Poly[] = [];
  let rest = p;
  while (!isZero(rest)) {
    const exponents = Array.from(unpackMonomial(ring, rest.keys, 0), (e, g) => e - leading[g]!);
    if (exponents.some((e, g) => e < low[g]! || e > high[g]!)) return undefined;
    const ratio = divideRational(leadingCoefficient(rest), leadingCoefficient(q));
    const reach = exponents.reduce((r, e) => Math.max(r, Math.abs(e)), 0);
    const term = normalise(ring, packMonomial(ring, exponents), [ratio.num], ratio.den, reach);
    terms.push(term);
    rest = subtract(rest, shiftBy(q, term, p.reach));
  }
  return sum(ring, terms);
}

/** q times one term whose product with q is known to stay within the reach. */
function shiftBy(q: Poly, term: Poly, reach: number): Poly {
  const { words } = q.ring;
  const keys = q.keys.map((k, i) => k + term.keys[i % words]!);
  const factor = rational(BigInt(term.numerators[0]!), term.denominator);
  return scale(normalise(q.ring, keys, q.numerators, q.denominator, reach), factor);
}

/** Rings in which the radicals of the given ones are constants without relation. */
const freeRings = new WeakMap<Ring, Ring>();

function freeRing(ring: Ring): Ring {
  const known = freeRings.get(ring);
  if (known) return known;
  const free = makeRing(ring.generators.map((g) => (g.kind === 'radical' ? { kind: 'constant', name: g.name } : g)));
  freeRings.set(ring, free);
  return free;
}

/** p in another ring with every k written as s², where s is the radical of k. */
function unfold(p: Poly, free: Ring): Poly {
  const squares = p.ring.radicals.map(([r, square]): [string, Poly] => [
    p.ring.generators[square]!.name,
    generator(free, p.ring.generators[r]!.name, 2),
  ]);
  return substitute(moveTo(p, free), new Map(squares));
}
