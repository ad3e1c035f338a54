import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import { type Expression, filled, layout, type Notation, print } from '../../src/emit/code-expression.js';

const PLAIN: Notation = {
  literal: (digits) => digits,
  element: (list, index) => `${list}[${index}]`,
  root: (argument) => `root(${argument})`,
};
const name = (text: string): Expression => ({ kind: 'name', text });
const number = (num: number, den = 1): Expression => ({ kind: 'number', value: rational(num, den) });
const product = (...factors: Expression[]): Expression => ({ kind: 'product', factors });
const quotient = (top: Expression, bottom: Expression): Expression => ({ kind: 'quotient', top, bottom });
const sum = (...terms: (Expression | readonly ['-', Expression])[]): Expression => ({
  kind: 'sum',
  terms: terms.map((t) => ('kind' in t ? { negative: false, value: t } : { negative: true, value: t[1] })),
});
const [a, b, c] = ['a', 'b', 'c'].map(name) as [Expression, Expression, Expression];

describe('print', () => {
  it('puts brackets where the table of precedence demands them and nowhere else', () => {
    const cases: [Expression, string][] = [
      [sum(a, ['-', b], ['-', c]), 'a - b - c'],
      [sum(['-', a], b), '-a + b'],
      [sum(['-', product(a, b)]), '-a * b'],
      [product(sum(a, b), c), '(a + b) * c'],
      [quotient(a, product(b, c)), 'a / (b * c)'],
      [quotient(product(a, b), c), 'a * b / c'],
      [quotient(sum(a, b), sum(b, c)), '(a + b) / (b + c)'],
      [quotient(quotient(a, b), c), 'a / b / c'],
      [quotient(a, quotient(b, c)), 'a / (b / c)'],
      [product(number(1, 3), a), '(1 / 3) * a'],
      [sum(['-', number(7, 3)]), '-(7 / 3)'],
      [sum(a, ['-', number(7, 3)]), 'a - 7 / 3'],
      [sum(number(7, 3)), '7 / 3'],
      [sum(['-', quotient(a, b)]), '-(a / b)'],
      [sum(), '0'],
      [product({ kind: 'element', of: 'p', index: 2 }, { kind: 'root', of: sum(a, b) }), 'p[2] * root(a + b)'],
      [product(sum(['-', a]), b), '(-a) * b'],
    ];
    for (const [e, text] of cases) expect(print(e, PLAIN)).toBe(text);
  });
});

describe('layout', () => {
  const long = sum(product(a, b), ['-', product(number(2), c)], a);

  it('keeps what fits on one line, else gives each term its own, ending in an operator', () => {
    expect(layout(long, PLAIN, 40)).toEqual(['a * b - 2 * c + a']);
    expect(layout(long, PLAIN, 10)).toEqual(['a * b -', '2 * c +', 'a']);
  });

  it('breaks a term at its products when it must', () => {
    const wide = sum(product(name('x'.repeat(20)), name('y'.repeat(20))), a);
    expect(layout(wide, PLAIN, 10, 30)).toEqual([`${'x'.repeat(20)} *`, `${'y'.repeat(20)} +`, 'a']);
    expect(layout(product(name('x'.repeat(20)), a), PLAIN, 10, 10)).toEqual([`${'x'.repeat(20)} *`, 'a']);
    expect(layout(name('x'.repeat(20)), PLAIN, 10, 10)).toEqual(['x'.repeat(20)]);
  });
});

describe('filled', () => {
  it('puts as many words on a line as fit', () => {
    expect(filled(['aa', 'bb', 'cc', 'dddddddd'], 5)).toEqual(['aa bb', 'cc', 'dddddddd']);
    expect(filled([], 5)).toEqual([]);
  });
});
