import { describe, expect, it } from 'vitest';
import { INTERNAL } from '../../src/notation/conventions.js';
import { lagrangianIn } from '../../src/notation/output-conventions.js';
import { latexLagrangian, printLagrangian } from '../../src/notation/print.js';
import { presetConventions } from '../../src/notation/read-conventions.js';
import { errorText, theory, theoryFile } from './rendered.js';

const KAPPA = presetConventions('mostly-minus-kappa')!;

describe('lagrangianIn', () => {
  it('writes a theory in other conventions', () => {
    const typed = theory(theoryFile('scales: { M: mass }', 'lagrangian: 1/2 M^2 R + M^2 T_a T^a + R_{ab} R^{ab}'));
    const { terms, symbols } = lagrangianIn(typed, KAPPA);
    expect(printLagrangian(terms)).toBe('-1/2 kappa^{-1} R - kappa^{-1} T_a T^a + R_{ab} R^{ab}');
    expect(latexLagrangian(terms, symbols)).toContain('\\frac{1}{2 \\kappa} R');
    expect(printLagrangian(lagrangianIn(typed, INTERNAL).terms)).toBe(printLagrangian(typed.lagrangian));
  });

  it('gives back what was typed in the conventions of the file, with its names', () => {
    const text = '-1/2 kappa^{-1} R + 3 T_{bc}{}^a T^{bc}{}_a';
    const typed = theory(
      theoryFile(
        'conventions: { preset: half-torsion-last, signature: "+---", units: kappa }',
        `lagrangian: '${text}'`,
        "symbols: { kappa: '\\kappa_4' }",
      ),
    );
    expect(printLagrangian(typed.lagrangian)).toBe('-1/2 M^2 R + 3/4 T^a{}_{bc} T_a{}^{bc}');
    const { terms, symbols } = lagrangianIn(typed, typed.conventions);
    expect(printLagrangian(terms)).toBe(text);
    expect(latexLagrangian(terms, symbols)).toContain('\\kappa_4');
  });

  it('is a theory file again', () => {
    const typed = theory(theoryFile('scales: { M: mass }', 'lagrangian: 1/2 M^2 R + R_{ab} T^a A^b'));
    const { terms } = lagrangianIn(typed, KAPPA);
    const again = theory(theoryFile('conventions: mostly-minus-kappa', `lagrangian: ${printLagrangian(terms)}`));
    expect(lagrangianIn(again, INTERNAL).terms).toEqual(typed.lagrangian);
  });

  it('refuses a unit whose name is taken', () => {
    const typed = theory(theoryFile('constants: [kappa]', 'lagrangian: kappa R^2'));
    expect(errorText(() => lagrangianIn(typed, KAPPA))).toContain(
      'error: kappa is a constant of this theory and cannot be a unit of the output',
    );
    expect(lagrangianIn(typed, INTERNAL).terms).toEqual(typed.lagrangian);
  });

  it('π of the own units is no stranger', () => {
    const typed = theory(theoryFile('conventions: mostly-plus-8piG', 'lagrangian: R/G'));
    expect(printLagrangian(lagrangianIn(typed, typed.conventions).terms)).toBe('G^{-1} R');
  });
});
