import { describe, expect, it } from 'vitest';
import { plainPassage } from '../../src/notation/passage.js';
import { printLagrangian } from '../../src/notation/print.js';
import {
  freeSlots,
  parseTensorExpression,
  readTensorEquation,
  type TensorExpressionOptions,
} from '../../src/notation/tensor-expression.js';
import { errorText, symbol } from './rendered.js';

const PATTERN: TensorExpressionOptions = { patterns: true, allowFree: true };
const parse = (text: string, options: TensorExpressionOptions = PATTERN) =>
  parseTensorExpression(plainPassage(text, 'E'), options);
const errors = (text: string, options?: TensorExpressionOptions) => errorText(() => parse(text, options));
const slots = (text: string) =>
  parse(text).map((t) =>
    t.factors.map((f) => f.head + f.slots.map((s) => (s.up ? '^' : '_') + s.name).join('')).join(' '),
  );

describe('patterns', () => {
  it.each([
    ['R_{?a?b}', 'R_?a_?b'],
    ['R_{?a ?b}', 'R_?a_?b'],
    ['R_{?ab}', 'R_?a_b'],
    ['T_?a', 'T_?a'],
    ['T^{?\\mu}{}_{?b c}', 'T^?\\mu_?b_c'],
    ['T^?\\mu', 'T^?\\mu'],
    ['R_{?a?c?b}{}^{?c}', 'R_?a_?c_?b^?c'],
  ])('%s has the slots %s', (text, expected) => {
    expect(slots(text)).toEqual([expected]);
  });

  it('a variable and an index of the same letter are different', () => {
    expect(freeSlots(parse('R_{?a}{}^a')[0]!)).toEqual([
      { name: '?a', up: false },
      { name: 'a', up: true },
    ]);
  });

  it('a bound variable that is renamed stays a variable', () => {
    expect(slots('(T_{?a} T^{?a})(A_{?a} A^{?a})')).toEqual(['T_?a T^?a A_?b A^?b']);
    expect(slots('(T_{?a} T^{?a})(A_a A^a)')).toEqual(['T_?a T^?a A_a A^a']);
  });

  it('are printed as they are read', () => {
    const text = '\\epsilon_{?a?b c\\mu} T^{?\\alpha c\\mu}';
    const read = parse(text);
    expect(parse(printLagrangian(read))).toEqual(read);
    expect(parse(printLagrangian(read, { unicode: true }))).toEqual(read);
    expect(printLagrangian(read, { unicode: true })).toBe('ε_{?a?bcμ} T^{?αcμ}');
  });

  it('are refused where they are not asked for', () => {
    expect(errors('T_{?a} T^{?a}', {})).toContain('E:1:4: error: unexpected character ?');
    expect(errors('R_{?}')).toContain('error: } is not an index');
    expect(errors('T_?{ab}')).toContain('error: _ lacks its index');
    expect(errors('?x R')).toContain('error: unexpected ?');
  });
});

describe('free indices', () => {
  it('are allowed when they agree', () => {
    expect(parse('R_{ab} - R_{ba} + 2 T_a T_b - 1/2 \\eta_{ab} R')).toHaveLength(4);
    expect(errors('R_{ab} + T_a')).toBe(
      [
        'E:1:10: error: the summands differ in their free indices: _a here, _a _b in the first',
        '    R_{ab} + T_a',
        '             ^^^',
        'hint: every summand must carry the same free indices at the same heights',
      ].join('\n'),
    );
    expect(errors('T_a + T^a')).toContain('^a here, _a in the first');
    expect(errors('T_a T_a')).toContain('both indices a are down');
  });

  it('are refused otherwise', () => {
    expect(errors('R_{ab}', {})).toContain('indices a, b are free');
  });
});

describe('expressions', () => {
  it('know the given symbols and tensors only', () => {
    const tensors = [{ name: 'S', slots: 2, generators: [], latex: 'S', dimension: 0 }];
    expect(parse('c S_{ab}', { ...PATTERN, symbols: [symbol('c')], tensors })).toHaveLength(1);
    expect(errors('c S_{ab}')).toContain('unknown symbol c');
  });
  it('may be zero', () => {
    expect(parse('R_{ab} - R_{ab}')).toEqual([]);
    expect(parse('0')).toEqual([]);
  });
});

describe('equations', () => {
  const equation = (text: string) => readTensorEquation(plainPassage(text, 'E'), PATTERN);
  it('have two sides', () => {
    const { left, right } = equation('R_{?a?b}{}^{?b}{}_{?c} = -R_{?a?c}');
    expect(printLagrangian(left.terms)).toBe('R_{?a?b}{}^{?b}{}_{?c}');
    expect(printLagrangian(right.terms)).toBe('-R_{?a?c}');
  });
  it('report the faults of both', () => {
    const shown = errorText(() => equation('T_a T_a = T_b T_b'));
    expect(shown.match(/error:/g)).toHaveLength(2);
  });
});
