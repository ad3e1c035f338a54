/**
 * Euler–Lagrange expressions of random reduced Lagrangians, computed a second time with a general-purpose library and
 * compared at exact rational points. Symbols are renamed to v0, v1, …, because the library gives many names a meaning;
 * numbers are exact integers. Fluids are symbols with a rule in the kernel and written-out powers of a in the library.
 */
import algebrite, { type AlgebriteExpression } from 'algebrite';
import { describe, expect, it } from 'vitest';
import { eulerLagrange } from '../../src/algebra/calculus.js';
import { evaluate } from '../../src/algebra/collect.js';
import { isCanonical, isZero, monomial, type Poly, sum, termsOf } from '../../src/algebra/poly.js';
import { type Rational, rational } from '../../src/algebra/rational.js';
import { constantsOf, jetName, jetsOf, makeRing } from '../../src/algebra/ring.js';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import { type Arithmetic, evaluate as read } from '../oracle/infix.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const FIELDS = ['N', 'a', 'phi', 'psi'] as const;
const FLUIDS = { rho_dust: -3, rho_radiation: -4 } as const;
const ring = makeRing([
  ...FIELDS.flatMap((q) => jetsOf(q, 4)),
  ...Object.entries(FLUIDS).map(([name, e]) => ({
    kind: 'source' as const,
    name,
    exponents: new Map([['a', rational(e)]]),
  })),
  ...constantsOf(['c', 'k', 'M']),
]);
const names = ring.generators.map((g) => g.name);
const alias = (name: string): string => `v${ring.position.get(name)!}`;

/** Up to six terms: Laurent in a and N, polynomial in the other jets, at most quadratic in the highest derivative. */
function randomLagrangian(random: Random, order: 1 | 2): Poly {
  const terms = Array.from({ length: 1 + random.below(6) }, () => {
    const powers: [string, number][] = [
      ['a', random.below(8) - 3],
      ['N', random.below(5) - 3],
    ];
    for (let i = random.below(4); i > 0; i--)
      powers.push([random.pick(['phi', 'psi', 'c', 'k', 'M']), 1 + random.below(2)]);
    for (let i = random.below(3); i > 0; i--) powers.push([jetName(random.pick(FIELDS), 1 + random.below(order)), 1]);
    if (random.chance(20)) powers.push([random.pick(Object.keys(FLUIDS)), 1]);
    const c = random.chance(10) ? E.q(2n ** 53n + 1n, 7n) : random.rational(true);
    return monomial(ring, rational(c.n, c.d), powers);
  });
  return sum(ring, terms);
}

/** The Lagrangian as text for the library; a fluid is its density at a = 1 times a power of a. */
function written(lagrangian: Poly): string {
  const terms = termsOf(lagrangian).map(({ coefficient, exponents }) =>
    [
      `(${coefficient.num}/${coefficient.den})`,
      ...exponents.flatMap(([g, e]) => {
        const name = names[g]!;
        const power = `${alias(name)}^(${e})`;
        return name in FLUIDS ? [power, `${alias('a')}^(${e * FLUIDS[name as keyof typeof FLUIDS]})`] : [power];
      }),
    ].join('*'),
  );
  return terms.length === 0 ? '0' : terms.join('+');
}

/** d/dt by the chain rule over the jets that the text contains. */
function rate(f: AlgebriteExpression): AlgebriteExpression {
  const symbols = new Set(f.toString().match(/v\d+/g));
  return FIELDS.flatMap((q) => [0, 1, 2, 3].map((n) => [alias(jetName(q, n)), alias(jetName(q, n + 1))] as const))
    .filter(([from]) => symbols.has(from))
    .map(([from, to]) => algebrite.multiply(algebrite.derivative(f, from), algebrite.eval(to)))
    .reduce((x, y) => algebrite.add(x, y), algebrite.eval('0'));
}

function variedByLibrary(text: string, field: string, order: number): string {
  const lagrangian = algebrite.eval(text);
  let total = algebrite.derivative(lagrangian, alias(field));
  for (let n = 1; n <= order; n++) {
    let moved = algebrite.derivative(lagrangian, alias(jetName(field, n)));
    for (let i = 0; i < n; i++) moved = algebrite.multiply('-1', rate(moved));
    total = algebrite.add(total, moved);
  }
  return total.toString();
}

/** Values of all symbols, and of their aliases: there a fluid's alias is its density at a = 1. */
function randomPoint(random: Random): { kernel: Map<string, Rational>; library: Map<string, Q> } {
  const library = new Map(names.map((name) => [alias(name), random.rational(true)]));
  const kernel = new Map(
    names.map((name) => {
      const e = FLUIDS[name as keyof typeof FLUIDS] ?? 0;
      const x = E.mul(library.get(alias(name))!, E.pow(library.get(alias('a'))!, e));
      return [name, rational(x.n, x.d)];
    }),
  );
  return { kernel, library };
}

function valueOfText(text: string, point: ReadonlyMap<string, Q>): Q {
  const arithmetic: Arithmetic<Q> = {
    integer: (n) => E.q(n),
    name: (name) => point.get(name)!,
    add: E.add,
    sub: E.sub,
    mul: E.mul,
    div: E.div,
    pow: E.pow,
  };
  return read(text, arithmetic);
}

function compare(seed: number, order: 1 | 2): number {
  const random = new Random(seed);
  const lagrangian = randomLagrangian(random, order);
  const text = written(lagrangian);
  let varied = 0;
  for (const field of FIELDS) {
    const ours = eulerLagrange(lagrangian, field);
    expect(isCanonical(ours)).toBe(true);
    if (!isZero(ours)) varied++;
    const theirs = variedByLibrary(text, field, order);
    for (let i = 0; i < 2; i++) {
      const { kernel, library } = randomPoint(random);
      const value = evaluate(ours, kernel);
      const circumstances = `seed ${seed}, ${field}, L = ${text}, theirs = ${theirs}`;
      expect(E.show(E.q(value.num, value.den)), circumstances).toBe(E.show(valueOfText(theirs, library)));
    }
  }
  return varied;
}

describe('Euler–Lagrange expressions agree with a general-purpose library', () => {
  it(
    'for Lagrangians of first order',
    () => {
      let varied = 0;
      for (let i = 0; i < runs(12); i++) varied += compare(firstSeed(1000) + i, 1);
      // Most Lagrangians depend on most fields; a comparison of zeros would show nothing.
      expect(varied).toBeGreaterThan(runs(12));
    },
    120_000 * runs(1),
  );

  it(
    'for Lagrangians of second order',
    () => {
      let varied = 0;
      for (let i = 0; i < runs(4); i++) varied += compare(firstSeed(2000) + i, 2);
      expect(varied).toBeGreaterThan(runs(4));
    },
    120_000 * runs(1),
  );
});
