import { describe, expect, it } from 'vitest';
import { partial } from '../../src/algebra/calculus.js';
import { substitute } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { generator, isZero, multiply, type Poly, power, scale, subtract } from '../../src/algebra/poly.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { linearised, withPowers } from '../../src/scalartensor/linearise.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';

const ring = makeRing(constantsOf(['x', 'y', 'u', 'v', 'c', 'd']));
const g = (name: string): Poly => generator(ring, name);
const PAIRS = [
  ['x', 'u'],
  ['y', 'v'],
] as const;

describe('linearised', () => {
  it('replaces c X² by c (2 χ X − χ²), with the second derivative 2c', () => {
    const made = linearised(multiply(g('c'), power(g('x'), 2)), [['x', 'u']])!;
    expect([infix(made.value), infix(made.hessian[0]![0]!)]).toEqual(['2*x*u*c - u^2*c', '2*c']);
  });

  it('has nothing to do where everything is linear', () => {
    expect(linearised(multiply(g('c'), g('x')), PAIRS)).toBeUndefined();
  });

  it('is linear in X, has the value of the original at χ = X, and its own equation holds there and only there', () => {
    for (let run = 0; run < runs(40); run++) {
      const random = new Random(firstSeed(73_000) + run);
      const p = randomPoly(random, ring, ['x', 'y', 'c', 'd'], { terms: 5, exponents: [0, 3] });
      const made = linearised(p, PAIRS);
      if (!made) continue;
      for (const a of ['x', 'y'])
        for (const b of ['x', 'y']) expect(isZero(partial(partial(made.value, a), b))).toBe(true);
      const back = new Map(PAIRS.map(([x, chi]) => [chi, g(x)]));
      expect(infix(substitute(made.value, back))).toBe(infix(p));
      // ∂L/∂χ_i = Σ_j h_ij (X_j − χ_j).
      PAIRS.forEach(([, chi], i) => {
        const equation = PAIRS.reduce(
          (rest, [x, own], j) => subtract(rest, multiply(made.hessian[i]![j]!, subtract(g(x), g(own)))),
          partial(made.value, chi),
        );
        expect(isZero(equation)).toBe(true);
      });
    }
  });
});

describe('withPowers', () => {
  it('adds powers of one generator', () => {
    expect(infix(withPowers(g('y'), 'x', [g('c'), scale(g('d'), 2)]))).toBe('2*x*d + y + c');
  });
});
