import { describe, expect, it } from 'vitest';
import { isCanonical } from '../../src/algebra/poly.js';
import { plainPassage } from '../../src/notation/passage.js';
import { parseTensorExpression } from '../../src/notation/tensor-expression.js';
import {
  combinationOf,
  kindsWith,
  lagrangianOf,
  namesIn,
  ringOfNames,
  scalarsOf,
  sumOf,
  tensorTerms,
} from '../../src/tensor/lagrangian-sum.js';
import { SymmetryError } from '../../src/tensor/symmetry.js';
import { RING, sum } from './rewriting.js';

const terms = (text: string) =>
  parseTensorExpression(plainPassage(text, 't'), { symbols: ['c1', 'c2', 'x'].map((name) => ({ name })) });

describe('terms and sums', () => {
  it('names occur once, in order', () => {
    expect(namesIn(terms('x c1 R + c2/x R^2'))).toEqual(['c1', 'x', 'c2']);
    expect(ringOfNames(['a', 'b', 'a']).generators.map((g) => g.name)).toEqual(['a', 'b']);
  });

  it('go there and back', () => {
    const text = '1/2 c1 R + c1/x^2 R - 3 x T_a T^a + c2';
    const there = sum(text);
    for (const t of there) expect(isCanonical(t.coefficient)).toBe(true);
    const back = lagrangianOf(there);
    expect(sumOf(RING, back, kindsWith([]))).toEqual(there);
    // One term for each monomial, powers sorted by name.
    expect(back).toHaveLength(4);
    expect(tensorTerms(RING, terms(text)).map((t) => t.factors.length)).toEqual([1, 1, 2, 0]);
  });

  it('coefficients become named monomials', () => {
    const [only] = sum('2/3 x c1^2/c2 R');
    expect(scalarsOf(only!.coefficient)).toEqual([
      {
        coefficient: { num: 2n, den: 3n },
        powers: [
          ['c1', 2],
          ['c2', -1],
          ['x', 1],
        ],
      },
    ]);
  });

  it('combinations have numbers in front', () => {
    expect(combinationOf(sum('2/3 R - T_a T^a')).map((t) => t.coefficient)).toEqual([
      { num: 2n, den: 3n },
      { num: -1n, den: 1n },
    ]);
    expect(() => combinationOf(sum('c1 R'))).toThrow(RangeError);
    expect(() => combinationOf(sum('R + c1 R'))).toThrow(RangeError);
  });

  it('declared tensors become kinds', () => {
    const declared = {
      name: 'S',
      slots: 2,
      generators: [{ places: [1, 0], sign: -1 as const }],
      latex: 'S',
      dimension: 0,
    };
    expect(kindsWith([declared]).get('S/2')!.group).toHaveLength(2);
    const zero = { ...declared, generators: [{ places: [0, 1], sign: -1 as const }] };
    expect(() => kindsWith([zero])).toThrow(SymmetryError);
  });
});
