import { describe, expect, it } from 'vitest';
import { equals } from '../../src/algebra/poly.js';
import { readClaim } from '../../src/compare/claim.js';
import { vocabularyOf } from '../../src/compare/vocabulary.js';
import { groupedText, productText, quotientText, ratioText } from '../../src/emit/grouped.js';
import { derivationOf } from '../compare/derivations.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';

const vocabulary = vocabularyOf(derivationOf({ lagrangian: 'b M^2 R + c R^2', constants: ['b', 'c'] }), []);
const { space } = vocabulary;
const p = (text: string) => readClaim(vocabulary, `${text} = 0`).poly;

describe('plain texts of polynomials', () => {
  it.each([
    ['0', '0'],
    ['(b + c) H^2 - 3 phi', '-3*phi + (b + c)*H^2'],
    ['(b - c)/a^2 + b', 'b + (b - c)/a^2'],
    ['b + c', 'b + c'],
    ['-H', '-H'],
    ['2 k/(3 a^2) psi', '2*k*psi/(3*a^2)'],
  ])('%s', (typed, expected) => {
    expect(groupedText(p(typed))).toBe(expected);
  });

  it('can be read again as a claim', () => {
    const names = ['a', 'phi', 'D(phi,1)', 'H', 'b', 'c', 'k'];
    for (let run = 0; run < runs(30); run++) {
      const random = new Random(firstSeed(10_100) + run);
      const value = randomPoly(random, space.ring, names);
      expect(equals(p(groupedText(value)), value), groupedText(value)).toBe(true);
    }
  });

  it('products and quotients keep their factors', () => {
    const factors = [
      { base: p('psi'), power: 2 },
      { base: p('phi - H'), power: 1 },
    ];
    expect(productText(factors)).toBe('psi^2*(phi - H)');
    expect(productText([])).toBe('1');
    expect(quotientText(p('H'), factors)).toBe('H/(psi^2*(phi - H))');
    expect(quotientText(p('H + b'), factors.slice(1))).toMatch(/^\((H \+ b|b \+ H)\)\/\(phi - H\)$/);
    expect(quotientText(p('H'), [])).toBe('H');
  });

  it('ratios of couplings', () => {
    expect(ratioText(p('2 b'), p('4 c'))).toBe('b/(2*c)');
    expect(ratioText(p('b'), p('b + c'))).toBe('(b)/(b + c)');
    expect(ratioText(p('b'), p('b'))).toBe('1');
  });
});
