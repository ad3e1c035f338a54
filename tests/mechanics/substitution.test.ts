import { describe, expect, it } from 'vitest';
import { timeDerivative } from '../../src/algebra/calculus.js';
import { substitute } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { add, constant, equals, generator, isCanonical, multiply, type Poly, power } from '../../src/algebra/poly.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import { reduceRoots, substituteFields } from '../../src/mechanics/substitution.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';

const ring = makeRing([...jetsOf('a', 4), ...jetsOf('phi', 4), ...constantsOf(['k', 's', 'r'])]);
const g = (name: string, e = 1): Poly => generator(ring, name, e);

describe('substituteFields', () => {
  it('puts a function in with its derivatives', () => {
    const rate = multiply(g('D(a,1)'), g('a', -1));
    const p = add(g('D(phi,1)'), multiply(g('phi'), rate));
    expect(infix(substituteFields(p, new Map([['phi', g('a', -1)]])))).toBe('0');
    expect(infix(substituteFields(g('D(phi,2)'), new Map([['phi', multiply(g('a'), g('a'))]])))).toBe(
      '2*a*D(a,2) + 2*D(a,1)^2',
    );
  });

  it('leaves what does not contain the field', () => {
    const p = g('D(a,1)');
    expect(substituteFields(p, new Map([['phi', g('a')]]))).toBe(p);
  });

  it('commutes with d/dt', () => {
    for (let run = 0; run < runs(20); run++) {
      const random = new Random(firstSeed(800) + run);
      const p = randomPoly(random, ring, ['a', 'phi', 'D(phi,1)', 'D(a,1)', 'k'], { exponents: [0, 2] });
      const value = randomPoly(random, ring, ['a', 'D(a,1)', 'k'], { terms: 2, exponents: [0, 2] });
      const put = (q: Poly): Poly => substituteFields(q, new Map([['phi', value]]));
      expect(equals(put(timeDerivative(p)), timeDerivative(put(p))), `seed ${random.seed}`).toBe(true);
    }
  });

  it('needs the jets that the derivatives ask for', () => {
    expect(() => substituteFields(g('D(phi,2)'), new Map([['phi', g('D(a,3)')]]))).toThrow(/no time derivative/);
  });
});

describe('reduceRoots', () => {
  const roots = [
    { name: 's', radicand: g('k') },
    { name: 'r', radicand: add(g('s'), constant(ring, 1)) },
  ];

  it('leaves the first power of a root at most', () => {
    expect(infix(reduceRoots(multiply(g('s', 5), g('a')), roots))).toBe('k^2*s*a');
    expect(infix(reduceRoots(g('s', -1), roots))).toBe('s/k');
    expect(infix(reduceRoots(g('s', 0), roots))).toBe('1');
  });

  it('takes the last root first, since its radicand may contain the others', () => {
    expect(infix(reduceRoots(g('r', 4), roots))).toBe('k + 2*s + 1');
  });

  it('has the value of what it was given, for random powers', () => {
    for (let run = 0; run < runs(20); run++) {
      const random = new Random(firstSeed(810) + run);
      const p = randomPoly(random, ring, ['s', 'a', 'k'], { exponents: [-3, 4] });
      const reduced = reduceRoots(p, roots.slice(0, 1));
      expect(isCanonical(reduced)).toBe(true);
      // With k put in as s² both are the same polynomial.
      const image = new Map([['k', power(g('s'), 2)]]);
      expect(infix(substitute(reduced, image)), `seed ${random.seed}`).toBe(infix(substitute(p, image)));
    }
  });

  it('refuses a negative power of a root of a sum', () => {
    expect(() => reduceRoots(g('r', -1), roots)).toThrow(RangeError);
  });
});
