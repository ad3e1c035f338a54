import { describe, expect, it } from 'vitest';
import { printLagrangian } from '../../src/notation/print.js';
import { isCanonicalScalar } from '../../src/notation/scalar-term.js';
import { lagrangianErrors, SYMBOLS, terms } from './rendered.js';

const understood = (text: string): string => printLagrangian(terms(text), { symbols: SYMBOLS });

describe('expand', () => {
  it.each([
    ['(R + c0)^3', 'R^3 + 3 c0 R^2 + 3 c0^2 R + c0^3'],
    ['(R + c0)(R - c0)', 'R^2 - c0^2'],
    ['(R + b1 T_a T^a)^2', 'R^2 + 2 b1 R T_a T^a + b1^2 T_a T^a T_b T^b'],
    ['(R + b1 T_a T^a)(R + b2 A_a A^a)', 'R^2 + b2 R A_a A^a + b1 T_a T^a R + b1 b2 T_a T^a A_b A^b'],
    ['T_a T^a (T_a T^a)', 'T_a T^a T_b T^b'],
    ['(c0 + b1) T_a (T^a + A^a)', 'c0 T_a T^a + c0 T_a A^a + b1 T_a T^a + b1 T_a A^a'],
    ['(c0 b1)^-2 (R + x)^0 R', 'c0^{-2} b1^{-2} R'],
    ['R/(c0 + c0)', '1/2 c0^{-1} R'],
    ['R/(c0^2/M)', 'c0^{-2} M R'],
    ['R + 0 x + R - 2 c0 + 2 c0', '2 R'],
    ['R_{ab} R^{ab} + R^{ab} R_{ab}', '2 R_{ab} R^{ab}'],
    ['R_{ab} R^{ab} - R_{cd} R^{cd}', 'R_{ab} R^{ab} - R_{cd} R^{cd}'],
    ['c0/c0 R', 'R'],
  ])('%s is understood as %s', (text, printed) => {
    expect(understood(text)).toBe(printed);
    for (const { scalar } of terms(text)) expect(isCanonicalScalar([scalar])).toBe(true);
  });

  it('refuses divisors that are no monomials, at their place', () => {
    expect(lagrangianErrors('R/(c0 + b1)')).toBe(
      [
        'L:1:3: error: division by (c0 + b1), which is a sum',
        '    R/(c0 + b1)',
        '      ^^^^^^^^^',
        'hint: a divisor is a number or a product of constants; name the quotient',
      ].join('\n'),
    );
    expect(lagrangianErrors('c0/R')).toContain('L:1:4: error: division by R, which contains a tensor');
    expect(lagrangianErrors('T_a T^a/T_b')).toContain('error: division by T_b, which contains a tensor');
    expect(lagrangianErrors('R/0')).toContain('L:1:3: error: division by 0, which is zero');
    expect(lagrangianErrors('R/(c0 - c0)')).toContain('error: division by (c0 - c0), which is zero');
    expect(lagrangianErrors('0^-1 R')).toContain('error: 0 is zero and has no negative power');
    expect(lagrangianErrors('R^-1')).toContain('error: R is no monomial in constants');
    expect(lagrangianErrors('(c0 + b1)^{-1} R')).toContain('error: (c0 + b1) is no monomial in constants');
  });

  it('every limit is an error that names it', () => {
    expect(understood('R^12')).toBe('R^12');
    expect(lagrangianErrors('R^13')).toContain('error: a product of 13 tensors; the limit is 12');
    expect(lagrangianErrors('(R + 1)^64')).toContain('error: a product of 13 tensors; the limit is 12');
    expect(lagrangianErrors('c0^64 c0 R')).toContain('error: the exponent 65 of c0 is beyond the limit of 64');
    expect(lagrangianErrors('(c0^64)^64 R')).toContain('error: the exponent 4096 of c0 is beyond the limit of 64');
    expect(lagrangianErrors('(((9^60)^60)^60) R')).toContain('error: a number of more than 200 digits arises here');
    expect(lagrangianErrors(`${`${'9'.repeat(150)} `.replace(' ', '*').repeat(2)}R`)).toContain('more than 200 digits');
    expect(lagrangianErrors('(c0+c1+b1+b2+b3+c+x)^20 R')).toContain(
      'error: more than 20000 terms when the brackets are multiplied out',
    );
  });

  it('an empty or vanishing Lagrangian is refused', () => {
    expect(lagrangianErrors('  \n ')).toContain('error: the Lagrangian is empty');
    expect(lagrangianErrors('R - R')).toContain('error: the Lagrangian is zero');
    expect(lagrangianErrors('0')).toContain('error: the Lagrangian is zero');
  });
});
