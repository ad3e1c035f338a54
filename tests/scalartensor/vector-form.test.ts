import { describe, expect, it } from 'vitest';
import { timeDerivative } from '../../src/algebra/calculus.js';
import {
  equalFraction,
  type Fraction,
  fraction,
  isCanonicalFraction,
  multiplyFraction,
  partialOfFraction,
  timeDerivativeOfFraction,
} from '../../src/algebra/fraction.js';
import { add, constant, generator, isZero, multiply, type Poly, power, scale } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import { vectorRoles } from '../../src/every-k.js';
import { loadGeometry } from '../../src/geometry/build.js';
import { backgroundOf } from '../../src/scalartensor/constraint-vector.js';
import {
  alongNormal,
  asFraction,
  asPoly,
  EXPANSION,
  insert,
  integralOver,
  isZeroFraction,
  occurs,
  onBackground,
  powerFraction,
  rateAlong,
  SPATIAL_CURVATURE,
  scaleFraction,
  subtractFraction,
  sumOfTerms,
  termsIn,
  vectorRing,
} from '../../src/scalartensor/vector-form.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';

const SCALARS = ['phi', 'psi'];
const ring = vectorRing(SCALARS, ['c', 'd']);
const g = (name: string): Poly => generator(ring, name);
const jets = makeRing([...['N', 'a', ...SCALARS].flatMap((q) => jetsOf(q, 4)), ...constantsOf(['k', 'c', 'd'])]);
const background = backgroundOf(vectorRoles(loadGeometry('flrw', '-+++'))!, jets);

/** A function of the scalars and ³R, sometimes with a denominator. */
function randomFunction(random: Random): Fraction {
  const names = [...SCALARS, SPATIAL_CURVATURE, 'c'];
  const top = randomPoly(random, ring, names);
  const bottom = add(randomPoly(random, ring, ['psi', 'd']), constant(ring, 7));
  return random.chance(40) && !isZero(bottom) ? fraction(top, [{ base: bottom, power: 1 }]) : fraction(top);
}

const always = (statement: (random: Random, seed: string) => void): void => {
  for (let i = 0; i < runs(20); i++) statement(new Random(firstSeed(74_000) + i), `seed ${firstSeed(74_000) + i}`);
};

describe('alongNormal', () => {
  it('is the derivative by proper time on the background, ³R included', () => {
    always((random, seed) => {
      const f = randomFunction(random);
      const unit = { ...background, volume: constant(jets, 1) };
      const value = onBackground({ value: f, scalars: SCALARS }, unit);
      const rate = multiplyFraction(timeDerivativeOfFraction(value), asFraction(generator(jets, 'N', -1)));
      const along = onBackground({ value: alongNormal(f, SCALARS), scalars: SCALARS }, unit);
      expect(equalFraction(rate, along), seed).toBe(true);
    });
  });
});

describe('onBackground', () => {
  it('multiplies with the volume: θ is d(a³)/dt over a³N', () => {
    const value = onBackground({ value: fraction(g(EXPANSION)), scalars: SCALARS }, background);
    expect(isZeroFraction(subtractFraction(value, asFraction(timeDerivative(generator(jets, 'a', 3)))))).toBe(true);
  });

  it('puts the branch J_A n·∂A for the root of a current', () => {
    const current = new Map([
      ['phi', fraction(g('psi'))],
      ['psi', fraction(g('c'))],
    ]);
    const root = onBackground({ value: fraction(g('root(J)')), scalars: SCALARS, current }, background);
    const written = add(multiply(g('psi'), g(rateAlong('phi'))), multiply(g('c'), g(rateAlong('psi'))));
    expect(equalFraction(root, onBackground({ value: fraction(written), scalars: SCALARS }, background))).toBe(true);
  });
});

describe('termsIn', () => {
  it('takes apart what sumOfTerms puts together, and refuses denominators with the generators', () => {
    always((random, seed) => {
      const names = [...SCALARS, EXPANSION];
      const f = fraction(randomPoly(random, ring, [...names, 'c']), [{ base: add(g('d'), g('c')), power: 1 }]);
      expect(equalFraction(sumOfTerms(ring, termsIn(f, names)!), f), seed).toBe(true);
    });
    expect(termsIn(fraction(g('c'), [{ base: add(g('phi'), g('c')), power: 1 }]), ['phi'])).toBeUndefined();
  });
});

describe('insert', () => {
  it('replaces generators in numerator and denominator, negative powers too', () => {
    const x = fraction(g('c'), [{ base: add(g('d'), g('c')), power: 1 }]);
    const f = fraction(power(g('phi'), -2), [{ base: add(g('phi'), g('d')), power: 1 }]);
    const image = insert(f, new Map([['phi', x]]));
    expect(isCanonicalFraction(image)).toBe(true);
    const product = multiplyFraction(image, multiplyFraction(powerFraction(x, 2), fraction(g('d'))));
    const sum = multiplyFraction(image, powerFraction(x, 3));
    expect(equalFraction(subtractFraction(fraction(constant(ring, 1)), product), sum)).toBe(true);
    expect(occurs(image, 'phi')).toBe(false);
  });
});

describe('integralOver', () => {
  it('is undone by differentiating, and refuses logarithms and denominators', () => {
    always((random, seed) => {
      const f = fraction(randomPoly(random, ring, [...SCALARS, 'c']), [{ base: add(g('psi'), g('d')), power: 1 }]);
      expect(equalFraction(partialOfFraction(integralOver(f, 'phi')!, 'phi'), f), seed).toBe(true);
    });
    expect(integralOver(fraction(power(g('phi'), -1)), 'phi')).toBeUndefined();
    expect(integralOver(fraction(g('c'), [{ base: add(g('phi'), g('d')), power: 1 }]), 'phi')).toBeUndefined();
  });
});

describe('asPoly', () => {
  it('knows what has no denominator', () => {
    expect(asPoly(scaleFraction(fraction(g('c')), rational(1, 2)))).toEqual(scale(g('c'), rational(1, 2)));
    expect(asPoly(fraction(g('c'), [{ base: add(g('phi'), g('d')), power: 1 }]))).toBeUndefined();
  });
});
