import { describe, expect, it } from 'vitest';
import { eulerLagrange, timeDerivative } from '../../src/algebra/calculus.js';
import { equalFraction, fraction, timeDerivativeOfFraction } from '../../src/algebra/fraction.js';
import { add, generator, type Poly } from '../../src/algebra/poly.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import { vectorRoles } from '../../src/every-k.js';
import { loadGeometry } from '../../src/geometry/build.js';
import { backgroundOf } from '../../src/scalartensor/constraint-vector.js';
import { eulerLagrangeOfFraction, sameOnSubstitution } from '../../src/scalartensor/elimination-check.js';
import { isZeroFraction } from '../../src/scalartensor/vector-form.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { exampleRing, formOf } from './auxiliary-examples.js';

const jets = makeRing([...['N', 'a', 'q', 'r'].flatMap((name) => jetsOf(name, 5)), ...constantsOf(['k', 'm', 'f'])]);
const g = (name: string): Poly => generator(jets, name);
const FIRST = ['q', 'r', 'D(q,1)', 'D(r,1)', 'm'];

describe('eulerLagrangeOfFraction', () => {
  it('is that of polynomials where there is no denominator', () => {
    for (let run = 0; run < runs(15); run++) {
      const p = randomPoly(new Random(firstSeed(77_000) + run), jets, FIRST);
      expect(equalFraction(eulerLagrangeOfFraction(fraction(p), 'q'), fraction(eulerLagrange(p, 'q')))).toBe(true);
    }
  });

  it('vanishes on total derivatives, with denominators', () => {
    for (let run = 0; run < runs(15); run++) {
      const random = new Random(firstSeed(78_000) + run);
      const inner = fraction(randomPoly(random, jets, ['q', 'r', 'm']), [{ base: add(g('q'), g('m')), power: 1 }]);
      const total = timeDerivativeOfFraction(inner);
      for (const q of ['q', 'r']) expect(isZeroFraction(eulerLagrangeOfFraction(total, q))).toBe(true);
    }
  });
});

describe('sameOnSubstitution', () => {
  const background = backgroundOf(vectorRoles(loadGeometry('flrw', '-+++'))!, jets);
  const NAMES = { constants: ['m', 'f'], scalars: ['q', 'r'] };
  const form = (text: string) => formOf(text, NAMES, exampleRing(NAMES));

  it('accepts r = q with m r² − 2 m q r for −m q², and nothing else', () => {
    const values = new Map([['r', g('q')]]);
    const one = { ...form('2 m q r - m r^2 + f D(q,1)^2'), scalars: ['q', 'r'] };
    const plain = { ...form('m q^2 + f D(q,1)^2'), scalars: ['q'] };
    expect(sameOnSubstitution(one, plain, values, ['N', 'a'], background)).toBe(true);
    const other = { ...form('m q^2 + 2 f D(q,1)^2'), scalars: ['q'] };
    expect(sameOnSubstitution(one, other, values, ['N', 'a'], background)).toBe(false);
    const wrong = new Map([['r', timeDerivative(g('q'))]]);
    expect(sameOnSubstitution(one, plain, wrong, ['N', 'a'], background)).toBe(false);
  });
});
