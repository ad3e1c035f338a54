import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import {
  add,
  constant,
  equals,
  generator,
  isCanonical,
  isZero,
  multiply,
  type Poly,
  scale,
} from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { squareRoot } from '../../src/algebra/square-root.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';

const NAMES = ['x', 'y', 'k'];
const ring = makeRing(constantsOf(NAMES));
const x = generator(ring, 'x');
const y = generator(ring, 'y');
const k = generator(ring, 'k');
const shown = (p: Poly): [string, string] => {
  const { root, radicand } = squareRoot(p);
  expect(equals(multiply(multiply(root, root), radicand), p)).toBe(true);
  return [infix(root), infix(radicand)];
};

describe('squareRoot', () => {
  it('of single terms leaves what is no square under the root', () => {
    expect(shown(constant(ring, rational(9, 4)))).toEqual(['3/2', '1']);
    expect(shown(scale(multiply(k, generator(ring, 'x', -2)), 12))).toEqual(['2/x', '3*k']);
    expect(shown(scale(generator(ring, 'x', -3), -1))).toEqual(['1/x^2', '-x']);
    expect(shown(scale(k, rational(1, 2)))).toEqual(['1/2', '2*k']);
    expect(shown(constant(ring, 0))).toEqual(['0', '1']);
  });

  it('of perfect squares of sums is exact', () => {
    expect(shown(multiply(add(x, y), add(x, y)))).toEqual(['x + y', '1']);
    const p = add(add(x, scale(y, 2)), generator(ring, 'k', -1));
    expect(shown(multiply(p, p))[1]).toBe('1');
  });

  it('of other sums is left to the radicand, square factors of the content apart', () => {
    expect(shown(scale(add(multiply(x, x), y), 4))).toEqual(['2', 'x^2 + y']);
    expect(shown(add(multiply(x, x), multiply(y, y)))[0]).toBe('1');
  });

  it('of random squares times random single terms: root² · radicand is the polynomial, and the sum is found', () => {
    for (let run = 0; run < runs(60); run++) {
      const seed = firstSeed(760) + run;
      const random = new Random(seed);
      const p = randomPoly(random, ring, NAMES, { terms: 4, exponents: [-1, 2] });
      if (isZero(p)) continue;
      const square = multiply(p, p);
      const { root, radicand } = squareRoot(square);
      expect(infix(radicand), `seed ${seed}`).toBe('1');
      expect(isCanonical(root)).toBe(true);
      expect(equals(multiply(root, root), square)).toBe(true);
      const odd = squareRoot(multiply(square, scale(k, 3)));
      expect(infix(odd.radicand), `seed ${seed}`).toBe('3*k');
    }
  });

  it('takes large squares that trial division does not find', () => {
    const p = 1_000_003n;
    expect(shown(constant(ring, rational(p * p)))).toEqual([`${p}`, '1']);
  });
});
