import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import { printLagrangian } from '../../src/notation/print.js';
import type { LagrangianTerm } from '../../src/notation/theory.js';
import { lagrangianErrors, SYMBOLS, terms } from './rendered.js';

const understood = (text: string): string => printLagrangian(terms(text), { symbols: SYMBOLS });
const coefficient = (text: string): LagrangianTerm['scalar']['coefficient'] => terms(text)[0]!.scalar.coefficient;

describe('precedence', () => {
  it.each([
    ['c0/2 R', '1/2 c0 R'],
    ['1/2 c0 M^2 R', '1/2 c0 M^2 R'],
    ['1/2c0 R', '1/2 c0 R'],
    ['c0/b1/x R', 'c0 b1^{-1} x^{-1} R'],
    ['c0 R/2 M^2 - R*3/4', '1/2 c0 M^2 R - 3/4 R'],
    ['R/(2 c0)', '1/2 c0^{-1} R'],
    ['R/2 c0', '1/2 c0 R'],
    ['+ -3 R', '-3 R'],
    ['2 * -3 R', '-6 R'],
    ['R / -2', '-1/2 R'],
    ['- - -R', '-R'],
    ['-c0^2 R', '-c0^2 R'],
    ['-(c0 - b1) R', '-c0 R + b1 R'],
    ['c0 - (b1 - x) + R', 'c0 - b1 + x + R'],
    ['2 c0 + 3 c0', '5 c0'],
    ['(2/3)^-2 R', '9/4 R'],
  ])('%s is understood as %s', (text, printed) => {
    expect(understood(text)).toBe(printed);
  });
});

describe('spelling', () => {
  it.each([
    ['\\frac{1}{2} R', '1/2 R'],
    ['\\tfrac12 R', '1/2 R'],
    ['\\dfrac1{3} R', '1/3 R'],
    ['\\frac{c0 + b1}{2 M^2} R', '1/2 c0 M^{-2} R + 1/2 b1 M^{-2} R'],
    ['\\frac{R_{ab}}{c0} R^{ab}', 'c0^{-1} R_{ab} R^{ab}'],
    ['\\left( c0 + b1 \\right) R', 'c0 R + b1 R'],
    ['\\bigl[ c0 \\{ b1 \\} \\bigr] R', 'c0 b1 R'],
    ['{c0} R', 'c0 R'],
    ['c0 \\cdot R \\times 2', '2 c0 R'],
    ['\\; c0 \\, R ~ \\!', 'c0 R'],
    ['c0\nR\n\t+\nx', 'c0 R + x'],
    ['R^2', 'R^2'],
    ['R^{2}', 'R^2'],
    ['R R R', 'R^3'],
    ['M^{-2} R', 'M^{-2} R'],
    ['M^-2 R', 'M^{-2} R'],
    ['M^{+2} R^{ 2 }', 'M^2 R^2'],
    ['M^(-2) R', 'M^{-2} R'],
    ['c_1 R + c_{1} R', '2 c_1 R'],
    ['\\alpha_1 R + \\alpha_{1} R + α_1 R', '3 alpha_1 R'],
    ['1/2 M² R', '1/2 M^2 R'],
    ['(T_a T^a)^2', 'T_a T^a T_b T^b'],
    ['c R_{ab} R^{ab} T_c T^c', 'c R_{ab} R^{ab} T_c T^c'],
  ])('%j is understood as %s', (text, printed) => {
    expect(understood(text)).toBe(printed);
  });

  it('keeps exact rationals of any size', () => {
    expect(coefficient(`${'9'.repeat(100)}/3 R`)).toEqual(rational(BigInt('9'.repeat(100)), 3n));
  });
});

describe('syntax errors', () => {
  it('unbalanced brackets of every kind', () => {
    expect(lagrangianErrors('R\n+ c0 (b1 + x')).toBe(
      ['L:2:6: error: ( is never closed', '    + c0 (b1 + x', '         ^', 'hint: add the closing )'].join('\n'),
    );
    expect(lagrangianErrors('c0 R)')).toBe(
      ['L:1:5: error: ) closes no bracket', '    c0 R)', '        ^', 'hint: remove it or add the opening one'].join(
        '\n',
      ),
    );
    expect(lagrangianErrors('[c0 R)')).toBe(
      ['L:1:6: error: ) does not match [', '    [c0 R)', '         ^', 'hint: expected ]'].join('\n'),
    );
    expect(lagrangianErrors('T_{ab')).toContain('L:1:3: error: { is never closed');
    expect(lagrangianErrors('c_{1')).toContain('L:1:3: error: { is never closed');
    expect(lagrangianErrors('\\frac{1}{2')).toContain('L:1:9: error: { is never closed');
    expect(lagrangianErrors('c0^{2')).toContain('L:1:4: error: { is never closed');
  });

  it.each([
    ['c0 +', 'L:1:4: error: the expression ends too early'],
    ['( )', 'L:1:3: error: unexpected )'],
    ['c0 * * R', 'L:1:6: error: unexpected *'],
    ['c0 ** 2', 'L:1:4: error: powers are not written **'],
    ['2 3 R', 'L:1:1: error: two numbers side by side: 2 3'],
    ['{c0 + b1} R', 'L:1:1: error: braces do not show in print and group nothing'],
    ['c0^2^3', 'L:1:5: error: two exponents on one factor'],
    ['c0^{1/2}', 'L:1:5: error: the exponent is not an integer'],
    ['c0^{2 3}', 'L:1:7: error: the exponent must be one integer'],
    ['c0^', 'L:1:1: error: c0^ lacks its exponent'],
    ['c0^x', 'L:1:4: error: c0 is a scalar and takes no index or symbolic exponent'],
    ['(c0)_a', 'L:1:1: error: (c0) cannot carry indices'],
    ['\\frac{1}', 'L:1:1: error: a fraction needs two braced parts'],
    ['\\sqrt{R}', 'L:1:1: error: \\sqrt has no meaning here'],
    ['\\cdotR', 'L:1:1: error: \\cdotR has no meaning here'],
    ['R = 0', 'L:1:3: error: an expression has no equals sign'],
    ['R, c0', 'L:1:2: error: unexpected ,'],
    ['_c0', 'L:1:1: error: unexpected _'],
    ['c0 R % half', 'L:1:6: error: unexpected character %'],
    ['R & c0', 'L:1:3: error: unexpected character &'],
    ['c0 R \\\\', 'L:1:6: error: unexpected line break \\\\'],
    ['a; process.exit()', 'L:1:2: error: unexpected character ;'],
  ])('%j: %s', (text, first) => {
    expect(lagrangianErrors(text).split('\n')[0]).toBe(first);
  });

  it('nesting ends at a stated limit', () => {
    const nested = (n: number): string => `${'('.repeat(n)}R${')'.repeat(n)}`;
    expect(understood(nested(60))).toBe('R');
    expect(lagrangianErrors(nested(61))).toContain('L:1:61: error: brackets are nested more than 60 deep');
    for (const opening of ['(', '[', '{', '\\{', '\\frac{', 'c0^(', '(-']) {
      expect(lagrangianErrors(opening.repeat(20_000))).toMatch(/error/);
    }
  });

  it('digits and exponents end at stated limits', () => {
    expect(understood(`${'1'.repeat(200)} R`)).toBe(`${'1'.repeat(200)} R`);
    expect(lagrangianErrors(`${'1'.repeat(201)} R`)).toContain('error: a number of 201 digits; the limit is 200');
    expect(understood('c0^64 R')).toBe('c0^64 R');
    expect(lagrangianErrors('c0^65 R')).toContain('L:1:4: error: the exponent is beyond the limit of 64');
    expect(lagrangianErrors(`c0^${'9'.repeat(1000)} R`)).toContain('error: the exponent is beyond the limit of 64');
  });

  it('long sums, products and runs of signs need no stack', () => {
    expect(understood(`${'- '.repeat(100_000)}R`)).toBe('R');
    expect(understood(Array.from({ length: 50_000 }, () => 'R').join('+'))).toBe('50000 R');
    expect(understood(`${'1*'.repeat(100_000)}R`)).toBe('R');
  });
});
