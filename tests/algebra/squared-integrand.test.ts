import { describe, expect, it } from 'vitest';
import { equalFraction, fraction } from '../../src/algebra/fraction.js';
import { infix } from '../../src/algebra/infix.js';
import { rational } from '../../src/algebra/rational.js';
import {
  factorPoly,
  integrandKey,
  radicandOf,
  type SquaredIntegrand,
  squareAsFraction,
} from '../../src/algebra/squared-integrand.js';
import { poly, ring } from '../scalartensor/forms.js';

const square: SquaredIntegrand = {
  power: 3,
  factors: [
    { coefficients: [rational(0), rational(-1)], exponent: -2 },
    { coefficients: [rational(1, 2)], exponent: 1 },
  ],
};

describe('the square of an integrand', () => {
  it('is a rational function', () => {
    const wanted = fraction(poly('c^3 (1 + 1/2 c)'), [{ base: poly('1 - c^2'), power: 2 }]);
    expect(equalFraction(squareAsFraction(square, ring, 'c'), wanted)).toBe(true);
    expect(infix(factorPoly(ring, 'c', [rational(0), rational(2)]))).toBe('2*c^2 + 1');
  });

  it('has the product of its odd powers under the root', () => {
    expect(infix(radicandOf(square, ring, 'c'))).toBe('c^2/2 + c');
    expect(infix(radicandOf({ power: 2, factors: [] }, ring, 'c'))).toBe('1');
  });

  it('has a key that tells integrands apart', () => {
    expect(integrandKey(square)).not.toBe(integrandKey({ ...square, power: 2 }));
    expect(integrandKey(square)).toBe(integrandKey({ ...square }));
  });
});
