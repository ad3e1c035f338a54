/**
 * Views of a polynomial: as a polynomial in some generators with polynomial coefficients in the others; its values;
 * its image under substitution or in another ring.
 */

import { select } from './calculus.js';
import { add, constant, generator, monomial, multiply, normalise, type Poly, power, sum, termsOf } from './poly.js';
import { addRational, multiplyRational, powerRational, type Rational, ZERO } from './rational.js';
import { exponentAt, type Ring, weightOf, wordOf } from './ring.js';

/** One monomial in the chosen generators and what multiplies it. */
export interface Collected {
  /** Exponents by generator position, only of the chosen generators, non-zero only. */
  readonly monomial: readonly (readonly [generator: number, exponent: number])[];
  /** Polynomial in the remaining generators. */
  readonly coefficient: Poly;
}

/** Groups the terms of p by their monomial in the chosen generators, in canonical order of first appearance. */
export function collect(p: Poly, chosen: (generator: number) => boolean): Collected[] {
  const { ring } = p;
  const groups = new Map<string, { monomial: [number, number][]; rows: number[] }>();
  const positions = ring.generators.map((_, i) => i).filter(chosen);
  for (let i = 0; i < p.size; i++) {
    const found: [number, number][] = [];
    for (const g of positions) {
      const e = exponentAt(p.keys, i * ring.words, g);
      if (e !== 0) found.push([g, e]);
    }
    const key = found.join(';');
    const group = groups.get(key);
    if (group) group.rows.push(i);
    else groups.set(key, { monomial: found, rows: [i] });
  }
  return [...groups.values()].map(({ monomial: powers, rows }) => {
    const part = select(p, rows);
    const keys = part.keys.slice();
    for (const [g, e] of powers)
      for (let i = 0; i < part.size; i++) keys[i * ring.words + wordOf(g)]! -= e * weightOf(g);
    // Dividing all terms by one monomial keeps their order.
    return { monomial: powers, coefficient: normalise(ring, keys, part.numerators, part.denominator, p.reach) };
  });
}

/** The monomial of a `Collected` as a polynomial with coefficient 1. */
export const monomialOf = (ring: Ring, powers: Collected['monomial']): Poly =>
  powers.reduce((p, [g, e]) => multiply(p, generator(ring, ring.generators[g]!.name, e)), constant(ring, 1));

/** Whether a generator occurs in p. */
export function involves(p: Poly, name: string): boolean {
  const g = p.ring.position.get(name);
  if (g === undefined) return false;
  for (let i = 0; i < p.size; i++) if (exponentAt(p.keys, i * p.ring.words, g) !== 0) return true;
  return false;
}

/** Names of the generators that occur in p, in the order of the ring. */
export function symbolsOf(p: Poly): string[] {
  return p.ring.generators.map((g) => g.name).filter((name) => involves(p, name));
}

/**
 * p with generators replaced by polynomials of a target ring; the others keep their name there.
 * Constant in the number of terms of p times the size of the powers needed.
 * @throws RangeError when a negative power of zero or of a sum would be needed; Error for a name unknown in the target.
 */
export function substitute(p: Poly, images: ReadonlyMap<string, Poly>, target: Ring = p.ring): Poly {
  const replaced = p.ring.generators.map((g) => images.get(g.name));
  const powers = new Map<string, Poly>();
  const powerOf = (g: number, e: number): Poly => {
    const key = `${g}^${e}`;
    let value = powers.get(key);
    if (!value) {
      value = power(replaced[g]!, e);
      powers.set(key, value);
    }
    return value;
  };
  const groups = collect(p, (g) => replaced[g] !== undefined);
  return sum(
    target,
    groups.map(({ monomial: powersOf, coefficient }) =>
      powersOf.reduce((acc, [g, e]) => multiply(acc, powerOf(g, e)), moveTo(coefficient, target)),
    ),
  );
}

/** The same polynomial in another ring, generators matched by name. @throws Error when a name is missing there. */
export function moveTo(p: Poly, target: Ring): Poly {
  if (p.ring === target) return p;
  return sum(
    target,
    termsOf(p).map(({ coefficient, exponents }) =>
      monomial(
        target,
        coefficient,
        exponents.map(([g, e]) => [p.ring.generators[g]!.name, e] as const),
      ),
    ),
  );
}

/**
 * Exact value at a point given by generator name.
 * @throws Error when a value is missing; RangeError for a negative power of zero.
 */
export function evaluate(p: Poly, point: ReadonlyMap<string, Rational>): Rational {
  let total = ZERO;
  for (const { coefficient, exponents } of termsOf(p)) {
    let value = coefficient;
    for (const [g, e] of exponents) {
      const name = p.ring.generators[g]!.name;
      const x = point.get(name);
      if (x === undefined) throw new Error(`no value for ${name}`);
      value = multiplyRational(value, powerRational(x, e));
    }
    total = addRational(total, value);
  }
  return total;
}

/** Coefficient polynomial of one power of one generator. */
export function coefficientOf(p: Poly, name: string, exponent: number): Poly {
  const g = p.ring.position.get(name);
  const rows: number[] = [];
  for (let i = 0; i < p.size; i++)
    if ((g === undefined ? 0 : exponentAt(p.keys, i * p.ring.words, g)) === exponent) rows.push(i);
  const part = select(p, rows);
  return g === undefined || exponent === 0 ? part : multiply(part, generator(p.ring, name, -exponent));
}

/** Sum over all terms of p of f(term): a linear map given on monomials. */
export function mapTerms(p: Poly, target: Ring, f: (term: Poly) => Poly): Poly {
  let total = constant(target, 0);
  for (let i = 0; i < p.size; i++) total = add(total, f(select(p, [i])));
  return total;
}
