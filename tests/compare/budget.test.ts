import { describe, expect, it } from 'vitest';
import { equals, multiply } from '../../src/algebra/poly.js';
import { ExponentLimitError } from '../../src/algebra/ring.js';
import { BoundError, Budget, boundIn } from '../../src/compare/budget.js';
import { poly, spaceOf } from './derivations.js';

const space = spaceOf();
const p = poly(space, [1, 'phi'], [2, 'psi'], [3, 'H']);

describe('the bound on an elimination', () => {
  it('multiplies exactly while there is room', () => {
    expect(equals(new Budget(100, 100).multiply(p, p), multiply(p, p))).toBe(true);
  });

  it('refuses more products of terms than it has, over all multiplications', () => {
    const budget = new Budget(17, 100);
    budget.multiply(p, p);
    expect(() => budget.multiply(p, p)).toThrow(BoundError);
    expect(() => new Budget(17, 100).spend(18)).toThrow('more than 17 products');
    expect(() => new Budget(17, 100).spend(17)).not.toThrow();
  });

  it('refuses a polynomial with too many terms', () => {
    expect(() => new Budget(100, 5).multiply(p, p)).toThrow('more than 5 terms');
    expect(() => new Budget(100, 6).multiply(p, p)).not.toThrow();
  });

  it('powers beyond those of the kernel are a bound too, other errors are none', () => {
    expect(boundIn(new ExponentLimitError())).toBeInstanceOf(BoundError);
    expect(boundIn(new BoundError('x'))!.message).toBe('x');
    expect(boundIn(new Error('x'))).toBeUndefined();
  });
});
