import { describe, expect, it } from 'vitest';
import { equals, multiply } from '../../src/algebra/poly.js';
import {
  addQuotients,
  divideQuotients,
  multiplyQuotients,
  negateQuotient,
  powerOfQuotient,
  type Quotient,
  quotientOf,
  rateOfQuotient,
} from '../../src/compare/quotient.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { poly, spaceOf } from './derivations.js';

const space = spaceOf();
const same = (a: Quotient, b: Quotient): boolean => equals(multiply(a.top, b.bottom), multiply(b.top, a.bottom));
const x = poly(space, [1, 'phi'], [2, 'H']);
const y = poly(space, [1, 'psi'], [-1, 'k']);

describe('quotients', () => {
  it('add, multiply and divide as fractions do', () => {
    for (let run = 0; run < runs(15); run++) {
      const random = new Random(firstSeed(9800) + run);
      const part = () => randomPoly(random, space.ring, ['phi', 'H', 'a', 'k'], { terms: 2, factors: 2 });
      const a: Quotient = { top: part(), bottom: x };
      const b: Quotient = { top: part(), bottom: y };
      const c: Quotient = { top: part(), bottom: x };
      expect(same(addQuotients(a, b), addQuotients(b, a))).toBe(true);
      expect(
        same(multiplyQuotients(addQuotients(a, b), c), addQuotients(multiplyQuotients(a, c), multiplyQuotients(b, c))),
      ).toBe(true);
      expect(same(addQuotients(a, negateQuotient(a)), quotientOf(poly(space)))).toBe(true);
      expect(same(multiplyQuotients(divideQuotients(a, quotientOf(y)), quotientOf(y)), a)).toBe(true);
      const product = rateOfQuotient(space, multiplyQuotients(a, b));
      const rule = addQuotients(
        multiplyQuotients(rateOfQuotient(space, a), b),
        multiplyQuotients(a, rateOfQuotient(space, b)),
      );
      expect(same(product, rule)).toBe(true);
    }
  });

  it('take integer powers of either sign, but nothing is divided by zero', () => {
    const a: Quotient = { top: x, bottom: y };
    expect(same(powerOfQuotient(a, -2), powerOfQuotient({ top: y, bottom: x }, 2))).toBe(true);
    expect(same(powerOfQuotient(a, 0), quotientOf(poly(space, [1])))).toBe(true);
    expect(() => powerOfQuotient(quotientOf(poly(space)), -1)).toThrow(RangeError);
    expect(() => divideQuotients(a, quotientOf(poly(space)))).toThrow(RangeError);
  });
});
