import { describe, expect, it } from 'vitest';
import { evaluate } from '../../src/algebra/collect.js';
import {
  equalFraction,
  type Fraction,
  fraction,
  isCanonicalFraction,
  partialOfFraction,
} from '../../src/algebra/fraction.js';
import { isZero } from '../../src/algebra/poly.js';
import {
  addRational,
  divideRational,
  multiplyRational,
  powerRational,
  type Rational,
  rational,
} from '../../src/algebra/rational.js';
import {
  determinant,
  type FrameFunctions,
  inverse,
  jordanFrame,
  kineticMatrix,
  logarithmicSlope,
  scaledFraction,
  transformed,
} from '../../src/scalartensor/conformal.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoint } from '../random-poly.js';
import { formOf, poly, ring } from './forms.js';

const form = formOf({
  g4: 'c phi^2 + d psi^2 + M^2',
  kinetic: ['e', 'm phi psi', 'd'],
  current: ['M^2 + c psi^2', 'c phi psi'],
  potential: 'c phi^4 + e M^2 psi^2',
});

const numberAt = (f: Fraction, at: ReadonlyMap<string, Rational>): Rational =>
  f.denominator.reduce(
    (x, { base, power }) => divideRational(x, powerRational(evaluate(base, at), power)),
    evaluate(f.numerator, at),
  );

const all = (f: FrameFunctions): Fraction[] => [
  f.coupling,
  ...f.kinetic.values(),
  ...f.current.values(),
  f.root,
  f.potential,
];

describe('a conformal map', () => {
  it('gives canonical fractions and leaves the kinetic matrix as the field-space metric of arXiv:1003.1159 (memory)', () => {
    const omega2 = scaledFraction(fraction(form.g4), 2);
    const einstein = transformed(jordanFrame(form), omega2);
    expect(all(einstein).every(isCanonicalFraction)).toBe(true);
    expect(equalFraction(einstein.coupling, fraction(poly('1/2')))).toBe(true);
    for (let run = 0; run < runs(4); run++) {
      const at = randomPoint(new Random(firstSeed(9300) + run), ring);
      const f = evaluate(form.g4, at);
      const slope = { phi: evaluate(poly('2 c phi'), at), psi: evaluate(poly('2 d psi'), at) };
      const k = (key: string): Rational => evaluate(form.kinetic.get(key)!, at);
      // G̃_IJ = (1/2f) (G_IJ + (3/f) f_I f_J) in units M = 1; one entry for an unordered pair is twice the matrix element.
      for (const [key, factor] of [
        ['phi,phi', 1],
        ['phi,psi', 2],
        ['psi,psi', 1],
      ] as const) {
        const [a, b] = key.split(',') as ['phi' | 'psi', 'phi' | 'psi'];
        const square = multiplyRational(rational(3 * factor), divideRational(multiplyRational(slope[a], slope[b]), f));
        const wanted = divideRational(addRational(k(key), square), multiplyRational(rational(2), f));
        expect(numberAt(einstein.kinetic.get(key)!, at)).toEqual(wanted);
      }
      const four = multiplyRational(rational(4), multiplyRational(f, f));
      expect(numberAt(einstein.potential, at)).toEqual(divideRational(evaluate(form.potential, at), four));
    }
  });

  it('is undone by the inverse map, for any conformal factor', () => {
    for (const text of ['c phi^2 + d psi^2 + M^2', '1 + phi^2/M^2', 'phi^2', 'M^4 + c phi psi', '4']) {
      const omega2 = fraction(poly(text));
      const there = transformed(jordanFrame(form), omega2);
      const back = transformed(there, inverse(omega2));
      const start = all(jordanFrame(form));
      expect(
        all(back).every((f, i) => equalFraction(f, start[i]!)),
        text,
      ).toBe(true);
    }
  });

  it('of two steps is the map of the product', () => {
    const [one, two] = ['1 + phi^2/M^2', 'M^2 + psi^2'].map((t) => fraction(poly(t))) as [Fraction, Fraction];
    const steps = all(transformed(transformed(jordanFrame(form), one), two));
    const product = all(transformed(jordanFrame(form), fraction(poly('(1 + phi^2/M^2) (M^2 + psi^2)'))));
    expect(steps.every((f, i) => equalFraction(f, product[i]!))).toBe(true);
  });

  it('refuses a factor that is zero', () => {
    expect(() => transformed(jordanFrame(form), fraction(poly('0')))).toThrow(RangeError);
  });
});

describe('small parts', () => {
  it('differentiate fractions and logarithms', () => {
    const f = fraction(poly('phi'), [{ base: poly('phi^2 + c'), power: 2 }]);
    expect(
      equalFraction(
        partialOfFraction(f, 'phi'),
        fraction(poly('c - 3 phi^2'), [{ base: poly('phi^2 + c'), power: 3 }]),
      ),
    ).toBe(true);
    expect(isZero(partialOfFraction(f, 'psi').numerator)).toBe(true);
    expect(equalFraction(logarithmicSlope(fraction(poly('phi^4')), 'phi'), fraction(poly('2/phi')))).toBe(true);
  });

  it('take determinants, one entry per pair halved', () => {
    const matrix = kineticMatrix(jordanFrame(form).kinetic, ['phi', 'psi']);
    expect(equalFraction(determinant(matrix, ring), fraction(poly('d e - 1/4 m^2 phi^2 psi^2')))).toBe(true);
    expect(equalFraction(determinant([], ring), fraction(poly('1')))).toBe(true);
  });
});
