import { describe, expect, it } from 'vitest';
import { eulerLagrange, orderIn, timeDerivative } from '../../src/algebra/calculus.js';
import { infix } from '../../src/algebra/infix.js';
import {
  add,
  equals,
  generator,
  isZero,
  monomial,
  multiply,
  negate,
  type Poly,
  product,
  subtract,
  zero,
} from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { jetName } from '../../src/algebra/ring.js';
import { dropTotalDerivatives } from '../../src/mechanics/total-derivatives.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import {
  anyLagrangian,
  FIELDS,
  invariantLagrangian,
  LAPSE,
  nonZeroFunction,
  randomFunction,
  rate,
  ring,
} from './reduced-lagrangian.js';

const drop = (lagrangian: Poly, fields: readonly string[] = FIELDS) => dropTotalDerivatives(lagrangian, fields, LAPSE);

/** Runs a statement on random numbers; the seed is printed when it fails. */
function always(statement: (random: Random) => void): void {
  for (let i = 0; i < runs(30); i++) {
    const seed = firstSeed(19 * i);
    try {
      statement(new Random(seed));
    } catch (error) {
      throw new Error(`seed ${seed}: ${(error as Error).message}`, { cause: error });
    }
  }
}

const same = (found: Poly, expected: Poly): void => {
  expect(infix(subtract(found, expected))).toBe('0');
};

describe('dropTotalDerivatives', () => {
  it('states what it dropped', () => {
    always((random) => {
      const lagrangian = random.chance(50) ? anyLagrangian(random) : invariantLagrangian(random);
      const { reduced, primitive } = drop(lagrangian);
      same(add(reduced, timeDerivative(primitive)), lagrangian);
    });
  });

  it('gives Lagrangians that differ by a total derivative the same representative', () => {
    always((random) => {
      const lagrangian = anyLagrangian(random);
      const boundary = timeDerivative(randomFunction(random));
      same(drop(add(lagrangian, boundary)).reduced, drop(lagrangian).reduced);
    });
  });

  it('leaves nothing of a total derivative', () => {
    always((random) => {
      expect(infix(drop(timeDerivative(nonZeroFunction(random))).reduced)).toBe('0');
    });
  });

  it('does nothing to a representative', () => {
    always((random) => {
      const { reduced } = drop(anyLagrangian(random));
      const again = drop(reduced);
      same(again.reduced, reduced);
      expect(isZero(again.primitive)).toBe(true);
    });
  });

  it('goes term by term', () => {
    always((random) => {
      const [p, q] = [anyLagrangian(random), anyLagrangian(random)];
      same(drop(add(p, q)).reduced, add(drop(p).reduced, drop(q).reduced));
    });
  });

  it('changes no equation, the lapse included', () => {
    always((random) => {
      const lagrangian = anyLagrangian(random);
      const { reduced } = drop(lagrangian);
      for (const q of [LAPSE, ...FIELDS]) same(eulerLagrange(reduced, q), eulerLagrange(lagrangian, q));
    });
  });

  it('removes second derivatives that a boundary term removes', () => {
    always((random) => {
      // d/dt of a function of fields and of one velocity, with lapse.
      const q = random.pick(FIELDS);
      const f = multiply(nonZeroFunction(random), rate(q));
      const lagrangian = add(timeDerivative(f), anyLagrangian(random));
      const { reduced } = drop(lagrangian);
      for (const field of FIELDS) expect(orderIn(reduced, field)).toBeLessThan(2);
    });
  });

  it('finds the representative of curvature: N a³ G(φ) R at k = 0 has −6 G H² − 6 Ġ H', () => {
    const n = generator(ring, LAPSE);
    const a = generator(ring, 'a');
    const g = nonZeroFunction(new Random(firstSeed(1)), ['phi', 'psi', 'c']);
    const hubble = multiply(rate('a'), generator(ring, 'a', -1));
    const perTime = (p: Poly): Poly => multiply(timeDerivative(p), generator(ring, LAPSE, -1));
    const six = monomial(ring, rational(6), []);
    const cubed = product(ring, [n, a, a, a]);
    const two = monomial(ring, rational(2), []);
    const curvature = multiply(six, add(perTime(hubble), product(ring, [two, hubble, hubble])));
    const expected = negate(product(ring, [six, cubed, hubble, add(multiply(g, hubble), perTime(g))]));
    same(drop(product(ring, [cubed, g, curvature])).reduced, drop(expected).reduced);
  });

  it('lets the velocities of earlier fields go first', () => {
    const lagrangian = monomial(ring, rational(3), [
      ['a', 2],
      [jetName('a', 1), 1],
      ['phi', 1],
    ]);
    expect(infix(drop(lagrangian).reduced)).toBe('-a^3*D(phi,1)');
    expect(infix(drop(lagrangian, ['phi', 'psi', 'a']).reduced)).toBe('3*a^2*phi*D(a,1)');
  });

  it('keeps what is no total derivative: a velocity times the lapse, a power of a velocity', () => {
    const [withLapse, squared] = [
      monomial(ring, rational(1), [
        [LAPSE, 1],
        [jetName('a', 1), 1],
      ]),
      monomial(ring, rational(1), [
        [jetName('a', 1), 2],
        ['a', 1],
      ]),
    ] as [Poly, Poly];
    for (const p of [withLapse, squared]) expect(equals(drop(p).reduced, p)).toBe(true);
  });

  it('keeps a logarithm, which the ring does not have', () => {
    const logarithm = monomial(ring, rational(5), [
      [jetName('phi', 1), 1],
      ['phi', -1],
    ]);
    const { reduced, primitive } = drop(logarithm);
    expect(equals(reduced, logarithm)).toBe(true);
    expect(equals(primitive, zero(ring))).toBe(true);
    expect(isZero(eulerLagrange(logarithm, 'phi'))).toBe(true);
  });
});
