import { describe, expect, it } from 'vitest';
import { moveTo, substitute, symbolsOf } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { equals, multiply, negate } from '../../src/algebra/poly.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { loadGeometry } from '../../src/geometry/build.js';
import {
  density,
  MAX_EXPANSION,
  MAX_REDUCED_TERMS,
  ReductionLimitError,
  symbolicValue,
} from '../../src/geometry/reduction.js';
import { Contraction } from '../oracle/contraction.js';
import * as E from '../oracle/exact.js';
import { fieldJets, frameOf, type GeometryName } from '../oracle/geometry.js';
import { atPoint } from '../oracle/infix.js';
import { firstSeed, Random, runs, showPoint } from '../oracle/random.js';
import { factorsOf } from '../oracle/reading.js';

const PRODUCTS = [
  'R',
  'R_{ab} R^{ba}',
  'R_{abcd} R^{acbd}',
  'T_{abc} T^{bac}',
  'T_a A^a',
  'A_a A^a T_b T^b',
  '\\epsilon^{abcd} R_{abef} R_{cd}{}^{ef}',
  'R_{abcd} T^{abe} T^{cd}{}_e',
  'R_{ab} T^a T^b',
  'R R_{ab} R^{ab}',
  '\\epsilon^{abcd} T_{abe} T_{cd}{}^e R',
];

const factors = factorsOf;
const flrw = loadGeometry('flrw', '-+++');

describe('density', () => {
  for (const geometry of ['flrw', 'bianchi-i'] as const satisfies readonly GeometryName[])
    for (const signature of ['-+++', '+---'] as const)
      it(`has the values of the second derivation on ${geometry}, ${signature}`, () => {
        for (let i = 0; i < runs(2); i++) {
          const seed = firstSeed(17 * i);
          const point = new Random(seed).point(geometry, [], 1);
          const algebra = { kSquared: point.k };
          const frame = frameOf(geometry, fieldJets(point, algebra, -1), algebra);
          const oracle = new Contraction(frame, signature);
          for (const text of PRODUCTS) {
            const expected = oracle.value(factors(text)).times(frame.volume).rationalAt(0);
            const found = atPoint(infix(density(loadGeometry(geometry, signature), factors(text))), point);
            expect(E.show(found), `seed ${seed}: ${text} at ${showPoint(point)}`).toBe(E.show(expected));
          }
        }
      });

  it('is the volume times the value in component symbols', () => {
    const images = new Map(flrw.components.map((c) => [c.name, c.value]));
    for (const text of PRODUCTS) {
      const value = substitute(symbolicValue(flrw, factors(text)), images, flrw.ring);
      expect(equals(density(flrw, factors(text)), multiply(flrw.volume, value)), text).toBe(true);
    }
  });

  it('of no tensors is the volume', () => {
    expect(equals(density(flrw, []), flrw.volume)).toBe(true);
  });

  it('is free of the root of k', () => {
    for (const text of PRODUCTS) expect(symbolsOf(density(flrw, factors(text)))).not.toContain('sqrt(k)');
  });

  it('changes sign with the signature exactly for an odd number of metrics', () => {
    const other = loadGeometry('flrw', '+---');
    const odd = ['R', 'T_{abc} T^{abc}', 'T_a T^a', '\\epsilon^{abcd} R_{abcd}', 'A_a A^a', 'R_{ab} R^{ab} R'];
    const even = ['R_{ab} R^{ab}', 'R_{ab} T^a T^b', 'R^a{}_{bcd} R_a{}^{bcd}', 'T_a T^a T_b T^b', 'R T_a T^a'];
    for (const text of odd)
      expect(infix(density(other, factors(text))), text).toBe(infix(negate(density(flrw, factors(text)))));
    for (const text of even)
      expect(infix(density(other, factors(text))), text).toBe(infix(density(flrw, factors(text))));
  });

  it('is computed once for a product and once for a ring', () => {
    const again = density(flrw, factors('R_{xy} R^{yx}'));
    expect(density(flrw, factors('R_{ab} R^{ba}'))).toBe(again);
    const larger = makeRing([...flrw.ring.generators.filter((g) => g.kind !== 'radical'), ...constantsOf(['c'])]);
    const moved = density(flrw, factors('R_{ab} R^{ba}'), larger);
    expect(moved.ring).toBe(larger);
    expect(equals(moved, moveTo(again, larger))).toBe(true);
    expect(density(flrw, factors('R_{ab} R^{ba}'), larger)).toBe(moved);
  });
});

describe('limits', () => {
  it('refuse a power of the curvature of ten fields, quickly', () => {
    const start = performance.now();
    const power = Array.from({ length: 12 }, () => factors('R')).flat();
    expect(() => density(loadGeometry('bianchi-i', '-+++'), power)).toThrow(ReductionLimitError);
    expect(() => density(loadGeometry('bianchi-i', '-+++'), power)).toThrow(`more than ${MAX_EXPANSION} terms`);
    expect(performance.now() - start).toBeLessThan(20_000);
  });

  it('let the same power pass where the symmetry keeps it short', () => {
    const power = Array.from({ length: 12 }, () => factors('R')).flat();
    expect(density(flrw, power).size).toBeLessThan(MAX_REDUCED_TERMS);
    // Products of n of the five terms of R: (n + 4)! / (n! 4!) of them.
    expect(density(flrw, power).size).toBe(1820);
  });
});
