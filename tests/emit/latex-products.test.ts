import { describe, expect, it } from 'vitest';
import { fraction } from '../../src/algebra/fraction.js';
import { inFactors } from '../../src/algebra/known-factors.js';
import { generator, multiply, type Poly, power, scale, sum } from '../../src/algebra/poly.js';
import { viewerOf } from '../../src/emit/display.js';
import { inlineTex } from '../../src/emit/latex-math.js';
import { ProductWriter } from '../../src/emit/latex-products.js';
import { TEN, withFields } from './scalar-fields-theories.js';

const d = await withFields(TEN);
const g = (name: string): Poly => generator(d.ring, name);
const plus = (...names: readonly string[]): Poly => sum(d.ring, names.map(g));

describe('products in TeX', () => {
  it('are a number, symbols and brackets, quotients in one fraction', () => {
    const writer = new ProductWriter(viewerOf(d), [], [plus('a1', 'a2')]);
    const product = multiply(scale(multiply(g('b1'), power(plus('a1', 'a2'), 2)), -6), g('psi'));
    expect(inlineTex([writer.product(inFactors(product, [plus('a1', 'a2')]))])).toBe(
      '-6 b_{1} \\psi ( a_{1} + a_{2} )^{2}',
    );
    const quotient = fraction(scale(g('b1'), 3), [{ base: scale(plus('a1', 'a2'), 2), power: 1 }]);
    expect(inlineTex([writer.fraction(quotient)])).toBe('\\frac{3 b_{1}}{2 ( a_{1} + a_{2} )}');
    expect(inlineTex([writer.fraction(fraction(g('b1'), [{ base: plus('a1', 'a2'), power: 1 }]))])).toBe(
      '\\frac{b_{1}}{a_{1} + a_{2}}',
    );
  });

  it('use names that are given, with the number between them', () => {
    const value = scale(plus('a1', 'a2'), 3);
    const writer = new ProductWriter(viewerOf(d), [{ name: 'G_{4}', value }], []);
    const f = fraction(g('b1'), [{ base: plus('a1', 'a2'), power: 2 }]);
    expect(inlineTex([writer.fraction(f)])).toBe('\\frac{9 b_{1}}{G_{4}^{2}}');
    const omega = new ProductWriter(viewerOf(d), [{ name: '\\Omega', value, step: 2 }], []);
    expect(inlineTex([omega.fraction(f)])).toBe('\\frac{9 b_{1}}{\\Omega^{4}}');
  });

  it('give a name to a wide bracket once, and remember its value', () => {
    const writer = new ProductWriter(viewerOf(d), [], [], '\\mathcal{Q}');
    const wide = plus('a1', 'a2', 'a3', 'a4', 'a5', 'a6', 'b1', 'b2', 'b3', 'c0');
    expect(inlineTex([writer.product(inFactors(multiply(wide, g('M')), []))])).toBe('M \\mathcal{Q}_{1}');
    expect(inlineTex([writer.product(inFactors(wide, []))])).toBe('\\mathcal{Q}_{1}');
    expect(writer.definitions().map(([name, value]) => [name, value.size])).toEqual([['\\mathcal{Q}_{1}', 10]]);
  });
});
