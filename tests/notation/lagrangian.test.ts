import { describe, expect, it } from 'vitest';
import { renderDiagnostic } from '../../src/notation/diagnostics.js';
import { dimensionOf, readLagrangian } from '../../src/notation/lagrangian.js';
import { plainPassage } from '../../src/notation/passage.js';
import { SYMBOLS, symbol, terms } from './rendered.js';

const warnings = (text: string, symbols = SYMBOLS): string =>
  readLagrangian(plainPassage(text, 'L'), symbols)
    .warnings.map((d) => renderDiagnostic(d))
    .join('\n');

describe('mass dimension', () => {
  it('of terms', () => {
    const of = (text: string): number => dimensionOf(terms(text)[0]!, new Map([['M', 1]]));
    expect(of('R')).toBe(2);
    expect(of('c0 M^-2 R_{ab} R^{ab} T_c A^c')).toBe(4);
    expect(of('\\epsilon^{abcd} \\eta_{ab} \\delta^e_e R_{cd}')).toBe(2);
  });

  it('is silent when all terms have 4', () => {
    expect(warnings('M^2 R + c0 R^2 + M^4 + M^2 T_a T^a')).toBe('');
    expect(warnings('g R', [symbol('g', 'constant', 2)])).toBe('');
  });

  it('warns once, at the first summand that is off', () => {
    expect(warnings('M^2 R\n+ c0 R\n+ M R')).toBe(
      [
        'L:2:3: warning: the term c0 R has mass dimension 2, a Lagrangian has 4',
        '    + c0 R',
        '      ^^^^',
        'hint: multiply by a scale such as M^2, or declare the dimension of its constant: { b1: mass^2 }',
      ].join('\n'),
    );
  });
});
