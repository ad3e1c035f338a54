/**
 * Views of a polynomial: some of its terms; as a polynomial in some generators with polynomial coefficients in the
 * others; its values; its image under substitution or in another ring. Values out are canonical. Imports polynomials.
 */

import { constant, equals, fromTable, generator, multiply, normalise, type Poly, power, sum, termsOf } from './poly.js';
import { addRational, equalRational, multiplyRational, powerRational, type Rational, ZERO } from './rational.js';
import { exponentAt, type Ring, unpackMonomial, weightOf, wordOf } from './ring.js';
import { TermTable } from './terms.js';

/** The terms at the given rows (ascending), as a polynomial. */
export function select(p: Poly, rows: readonly number[]): Poly {
  if (rows.length === p.size) return p;
  const { words } = p.ring;
  const keys = new Float64Array(rows.length * words);
  for (let i = 0, t = 0; i < rows.length; i++)
    for (let w = 0, from = rows[i]! * words; w < words; w++) keys[t++] = p.keys[from + w]!;
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

/** One monomial in the chosen generators and what multiplies it. */
export interface Collected {
  /** Exponents by generator position, only of the chosen generators, non-zero only. */
  readonly monomial: readonly (readonly [generator: number, exponent: number])[];
  /** Polynomial in the remaining generators. */
  readonly coefficient: Poly;
}

/** Groups the terms of p by their monomial in the chosen generators, in canonical order of first appearance. */
export function collect(p: Poly, chosen: (generator: number) => boolean): Collected[] {
  return groupsOf(p, chosen).map(({ monomial, rows }) => ({ monomial, coefficient: coefficientIn(p, monomial, rows) }));
}

interface Group {
  readonly monomial: [number, number][];
  readonly rows: number[];
}

/** Rows with the same exponents of the chosen generators, in order of first appearance. */
function groupsOf(p: Poly, chosen: (generator: number) => boolean): Group[] {
  const { ring } = p;
  const groups = new Map<string | number, Group>();
  const positions = ring.generators.map((_, i) => i).filter(chosen);
  for (let i = 0; i < p.size; i++) {
    const found: [number, number][] = [];
    for (const g of positions) {
      const e = exponentAt(p.keys, i * ring.words, g);
      if (e !== 0) found.push([g, e]);
    }
    // Most terms have one chosen generator or none, for which a number is a cheaper key than a text.
    const [first] = found;
    const key = first === undefined ? -1 : found.length === 1 ? first[0] * 1024 + first[1] + 512 : found.join(';');
    const group = groups.get(key);
    if (group) group.rows.push(i);
    else groups.set(key, { monomial: found, rows: [i] });
  }
  return [...groups.values()];
}

/** The terms at the given rows divided by a monomial, which keeps their order. */
function coefficientIn(p: Poly, monomial: Collected['monomial'], rows: readonly number[]): Poly {
  const part = select(p, rows);
  if (monomial.length === 0) return part;
  const { words } = p.ring;
  const keys = part.keys.slice();
  for (const [g, e] of monomial)
    for (let at = wordOf(g), by = e * weightOf(g); at < keys.length; at += words) keys[at]! -= by;
  return normalise(p.ring, keys, part.numerators, part.denominator, p.reach);
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
 * p with generators replaced by polynomials of a target ring; the others keep their name there. Nothing else follows:
 * neither the jets of a replaced field nor the sources that depend on it.
 * @throws RangeError when a negative power of zero or of a sum would be needed; Error for a name unknown in the target,
 * and when p involves a radical whose image squared is not the image of its square; ExponentLimitError beyond ±511.
 */
export function substitute(p: Poly, images: ReadonlyMap<string, Poly>, target: Ring = p.ring): Poly {
  const replaced = p.ring.generators.map((g) => images.get(g.name));
  for (const [r, square] of p.ring.radicals) {
    if (!replaced[r] && !replaced[square]) continue;
    const [radical, value] = [r, square].map((g) => replaced[g] ?? generator(target, p.ring.generators[g]!.name));
    if (involves(p, p.ring.generators[r]!.name) && !equals(multiply(radical!, radical!), value!))
      throw new Error(`the image of ${p.ring.generators[r]!.name} is no root of the image of its square`);
  }
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
  const vanishes = ([g, e]: readonly [number, number]): boolean => e > 0 && replaced[g]!.size === 0;
  const groups = groupsOf(p, (g) => replaced[g] !== undefined).filter(({ monomial }) => !monomial.some(vanishes));
  return sum(
    target,
    groups.map(({ monomial, rows }) =>
      monomial.reduce((acc, [g, e]) => multiply(acc, powerOf(g, e)), moveTo(coefficientIn(p, monomial, rows), target)),
    ),
  );
}

/** The same polynomial in another ring, generators matched by name. @throws Error when a name is missing there. */
export function moveTo(p: Poly, target: Ring): Poly {
  const { ring, keys, numerators, size } = p;
  if (ring === target) return p;
  const there = ring.generators.map((g) => target.position.get(g.name) ?? -1);
  const table = new TermTable(target.words, size, !(numerators instanceof Float64Array));
  for (let i = 0; i < size; i++) {
    table.key.fill(0);
    unpackMonomial(ring, keys, i * ring.words).forEach((e, g) => {
      if (e === 0) return;
      if (there[g]! < 0) throw new Error(`no generator ${ring.generators[g]!.name} in the ring`);
      table.key[wordOf(there[g]!)]! += e * weightOf(there[g]!);
    });
    // Monomials stay distinct, so that nothing is added up here.
    const s = table.slot();
    if (table.bigs) table.bigs[s] = numerators[i] as bigint;
    else table.numbers[s] = numerators[i] as number;
  }
  return fromTable(target, table, p.denominator, p.reach);
}

/**
 * Exact value at a point given by generator name.
 * @throws Error when a value is missing, or when p involves a radical and the point does not have its square's root
 * there; RangeError for a negative power of zero.
 */
export function evaluate(p: Poly, point: ReadonlyMap<string, Rational>): Rational {
  for (const [r, square] of p.ring.radicals) {
    const name = p.ring.generators[r]!.name;
    const root = point.get(name);
    const value = point.get(p.ring.generators[square]!.name);
    if (root && value && !equalRational(multiplyRational(root, root), value) && involves(p, name))
      throw new Error(`the value of ${name} is no root of the value of its square`);
  }
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

/** Coefficient polynomial of one power of one generator; a name that is not in the ring occurs to the power 0 only. */
export function coefficientOf(p: Poly, name: string, exponent: number): Poly {
  const g = p.ring.position.get(name);
  const rows: number[] = [];
  for (let i = 0; i < p.size; i++)
    if ((g === undefined ? 0 : exponentAt(p.keys, i * p.ring.words, g)) === exponent) rows.push(i);
  const part = select(p, rows);
  return g === undefined || exponent === 0 ? part : multiply(part, generator(p.ring, name, -exponent));
}
