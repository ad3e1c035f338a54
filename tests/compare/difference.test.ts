import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import type { Poly } from '../../src/algebra/poly.js';
import { firstDifference } from '../../src/compare/difference.js';
import { one, poly, spaceOf } from './derivations.js';

const space = spaceOf({ lagrangian: 'c M^2 R', constants: ['c'] });
const shown = (a: Record<string, Poly>, b: Record<string, Poly>, volume = one(space)) => {
  const d = firstDifference(space, new Map(Object.entries(a)), new Map(Object.entries(b)), volume);
  return d && [d.equation, ...[d.monomial, d.first, d.second].map(infix)];
};

describe('the first difference', () => {
  const p = poly(space, [3, 'c', ['H', 2]], [1, 'phi'], [1, 'k', 'H']);

  it('is a monomial in the fields with its couplings on both sides', () => {
    expect(shown({ N: p }, { N: p })).toBeUndefined();
    expect(shown({ N: p }, { N: poly(space, [3, 'c', ['H', 2]], [1, 'phi'], [-1, 'k', 'H']) })).toEqual([
      'N',
      'H',
      'k',
      '-k',
    ]);
    expect(shown({ N: p, a: p }, { N: p, a: poly(space, [3, 'c', ['H', 2]], [1, 'phi']) })).toEqual([
      'a',
      'H',
      'k',
      '0',
    ]);
  });

  it('is the simplest one, per volume', () => {
    const a = poly(space, [1, ['H', 4]], [2, 'H', 'a']);
    const b = poly(space, [2, ['H', 4]], [2, 'H', 'a'], [5, 'a']);
    expect(shown({ N: a }, { N: b }, poly(space, [1, 'a']))).toEqual(['N', '1', '0', '5']);
  });

  it('takes a missing equation for zero', () => {
    expect(shown({}, { x: poly(space, [2, 'H']) })).toEqual(['x', 'H', '0', '2']);
  });
});
