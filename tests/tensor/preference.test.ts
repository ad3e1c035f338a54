import { describe, expect, it } from 'vitest';
import { factorsKey } from '../../src/tensor/expression.js';
import { inPreferredOrder } from '../../src/tensor/preference.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { sum } from './rewriting.js';

const products = [
  'R_{abcd} R^{cdab}',
  'R^2',
  'T_a T^a',
  'T_{abc} T^{abc}',
  '\\epsilon^{abcd} R_{ab} R_{cd}',
  'R T_a T^a',
  'R^3',
  'R_{abcd} R^{abcd} R',
].map((text) => sum(text)[0]!.factors);

describe('the order of products', () => {
  it('puts the monomial basis first, in its order, then short texts', () => {
    expect(inPreferredOrder(products).map(factorsKey)).toEqual(
      [1, 0, 3, 2, 4, 6, 5, 7].map((i) => factorsKey(products[i]!)),
    );
  });

  it('does not depend on the order given', () => {
    for (let run = 0; run < runs(20); run++) {
      const shuffled = new Random(firstSeed(85_000) + run).shuffled(products);
      expect(inPreferredOrder(shuffled)).toEqual(inPreferredOrder(products));
    }
  });

  it('may put some last', () => {
    const last = factorsKey(products[1]!);
    expect(factorsKey(inPreferredOrder(products, new Set([last])).at(-1)!)).toBe(last);
  });
});
