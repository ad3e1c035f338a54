import { describe, expect, it } from 'vitest';
import { eulerLagrange } from '../../src/algebra/calculus.js';
import { involves, substitute, symbolsOf } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { dependsOn } from '../../src/algebra/linear.js';
import { add, constant, generator, multiply, type Poly, product, scale, sum } from '../../src/algebra/poly.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import { couplingCombinations, screeningConditions } from '../../src/mechanics/couplings.js';
import { dropTotalDerivatives } from '../../src/mechanics/total-derivatives.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly, toRational } from '../random-poly.js';

const COUPLINGS = ['c1', 'c2', 'c3'];
const ring = makeRing([
  ...['N', 'a', 'phi'].flatMap((name) => jetsOf(name, 3)),
  { kind: 'source', name: 'rho', exponents: new Map() },
  ...constantsOf(['k', ...COUPLINGS, 'M', 'mu']),
]);
const g = (name: string, e = 1): Poly => generator(ring, name, e);
const combinations = (p: Poly): string[] => couplingCombinations(p, ['k'], ['M', 'mu']).map(infix);

describe('couplingCombinations', () => {
  it('are the coefficients of the monomials in fields and k, each once, simplest first', () => {
    const p = sum(ring, [
      product(ring, [add(g('c1'), scale(g('c2'), 2)), g('a', 3), g('N')]),
      product(ring, [scale(add(g('c1'), scale(g('c2'), 2)), -5), g('a'), g('phi', 2)]),
      product(ring, [g('c3'), g('k'), g('a')]),
    ]);
    expect(combinations(p)).toEqual(['c3', 'c1 + 2*c2']);
  });

  it('leave out what is a linear combination of simpler ones', () => {
    const p = sum(ring, [
      multiply(g('c1'), g('a')),
      multiply(g('c2'), g('a', 2)),
      multiply(add(g('c1'), scale(g('c2'), 7)), g('a', 3)),
    ]);
    expect(combinations(p)).toEqual(['c1', 'c2']);
  });

  it('divide a common scale out, and only a common one', () => {
    const p = sum(ring, [
      product(ring, [g('c1'), g('M', 2), g('a')]),
      product(ring, [add(product(ring, [g('c2'), g('M', 2)]), product(ring, [g('c3'), g('mu', 2)])), g('a', 2)]),
      product(ring, [add(g('c2'), multiply(g('c3'), g('mu', -2))), g('a', 3)]),
    ]);
    expect(combinations(p)).toEqual(['c1', 'c2*mu^2 + c3', 'c2*M^2 + c3*mu^2']);
  });

  it('treat densities as part of the monomial', () => {
    expect(combinations(multiply(g('rho'), g('N')))).toEqual(['1']);
  });

  it('of zero are none', () => {
    expect(combinations(scale(g('a'), 0))).toEqual([]);
  });

  it('span the same as the coefficients themselves', () => {
    for (let i = 0; i < runs(20); i++) {
      const seed = firstSeed(41 * i);
      const random = new Random(seed);
      const monomials = [g('a'), g('a', 2), g('phi'), g('k'), multiply(g('k'), g('phi')), g('N', -1)];
      const coefficients = monomials.map(() =>
        randomPoly(random, ring, COUPLINGS, { terms: 3, exponents: [1, 1], factors: 1 }),
      );
      const found = couplingCombinations(
        sum(
          ring,
          monomials.map((m, n) => multiply(m, coefficients[n]!)),
        ),
        ['k'],
        [],
      );
      for (const c of coefficients) expect(dependsOn(c, found), `seed ${seed}`).toBe(true);
      for (const [n, c] of found.entries()) {
        expect(dependsOn(c, coefficients), `seed ${seed}`).toBe(true);
        expect(
          dependsOn(
            c,
            found.filter((_, m) => m !== n),
          ),
          `seed ${seed}`,
        ).toBe(false);
      }
    }
  });
});

describe('screeningConditions', () => {
  it('vanish exactly where no equation contains k', () => {
    for (let i = 0; i < runs(30); i++) {
      const seed = firstSeed(43 * i);
      const random = new Random(seed);
      const names = ['a', 'phi', 'D(a,1)', 'D(phi,1)'];
      const general = sum(
        ring,
        COUPLINGS.map((c) =>
          product(ring, [
            g(c),
            // A lapse in every term: a number without any field would change no equation.
            g('N', random.pick([1, 1, -1])),
            g('k', random.pick([0, 1, 1, 2])),
            randomPoly(random, ring, names),
          ]),
        ),
      );
      const { reduced } = dropTotalDerivatives(general, ['a', 'phi'], 'N');
      const conditions = screeningConditions(reduced, 'k', ['k'], []);
      // Numbers for the couplings, often zero, so that the conditions hold now and then.
      const values = new Map(
        COUPLINGS.map((c) => [c, constant(ring, random.chance(50) ? 0 : toRational(random.rational()))]),
      );
      const holds = conditions.every((c) => substitute(c, values).size === 0);
      const equations = ['N', 'a', 'phi'].map((q) => eulerLagrange(substitute(general, values), q));
      expect(
        equations.some((e) => involves(e, 'k')),
        `seed ${seed}: ${infix(general)}`,
      ).toBe(!holds);
    }
  });

  it('are none when k occurs in a total derivative only', () => {
    const p = product(ring, [g('k'), g('c1'), add(multiply(g('a'), g('D(phi,1)')), multiply(g('phi'), g('D(a,1)')))]);
    const { reduced } = dropTotalDerivatives(p, ['a', 'phi'], 'N');
    expect(screeningConditions(reduced, 'k', ['k'], [])).toEqual([]);
  });

  it('look at every power of k', () => {
    const p = sum(ring, [product(ring, [g('k', 2), g('c1'), g('N')]), product(ring, [g('k'), g('c2'), g('a')])]);
    expect(screeningConditions(p, 'k', ['k'], []).map(infix)).toEqual(['c1', 'c2']);
  });

  it('contain a number when no coupling can remove k', () => {
    const [condition] = screeningConditions(product(ring, [g('k'), g('M', 2), g('a')]), 'k', ['k'], ['M']);
    expect(symbolsOf(condition!)).toEqual([]);
  });
});
