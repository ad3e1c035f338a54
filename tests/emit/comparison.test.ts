import { describe, expect, it } from 'vitest';
import { compareTheories } from '../../src/compare/theories.js';
import { areSame, comparisonObject, comparisonText } from '../../src/emit/comparison.js';
import { derivationOf, EINSTEIN_CARTAN, TORSION_SCALAR, type Wanted } from '../compare/derivations.js';

function compared(first: Wanted, second: Wanted, redefine: readonly string[] = []) {
  const a = derivationOf({ ...first, name: 'Outer pier' });
  const b = derivationOf({ ...second, name: 'Inner pier' });
  const c = compareTheories(a, b, { redefine });
  return { text: comparisonText(a, b, c, false), object: comparisonObject(a, b, c), same: areSame(c) };
}

const TELEPARALLEL: Wanted = { lagrangian: `-1/2 M^2 (${TORSION_SCALAR})`, constrain: ['R^a_{bcd}'] };

describe('texts about two theories', () => {
  it('identical', () => {
    const { text, same } = compared(EINSTEIN_CARTAN, EINSTEIN_CARTAN);
    expect(text).toBe('1  Outer pier\n2  Inner pier  on the geometry flrw\n\nthe same reduced Lagrangian\n');
    expect(same).toBe(true);
  });

  it('a total derivative is printed', () => {
    const { text } = compared(EINSTEIN_CARTAN, EINSTEIN_CARTAN, ['phi = 2 H - phi']);
    expect(text).toContain('1  Outer pier  with phi = 2 H - phi');
    expect(text).toContain('L1 − L2 = d/dt of -6*M^2*a^3*phi + 6*M^2*a^2*D(a,1)/N');
  });

  it('scalings', () => {
    const constants = ['c'];
    expect(compared(EINSTEIN_CARTAN, { lagrangian: 'c M^2 R', constants }).text).toContain(
      'theory 2 is theory 1 with (2*c) M^2 for M^2',
    );
    const vacuum = { matter: [] };
    const both = compared({ ...EINSTEIN_CARTAN, ...vacuum }, { lagrangian: 'c M^2 R', constants, ...vacuum });
    expect(both.text).toContain('theory 2 is theory 1 multiplied by 2*c');
    expect(both.object.scaling).toEqual({ factor: '2*c', massSquared: '1' });
  });

  it('what was eliminated, and that the connections differ', () => {
    const { text, object } = compared(TELEPARALLEL, EINSTEIN_CARTAN);
    expect(text).toContain('the same equations of the metric and its matter, with different connections');
    expect(text).toContain('eliminated from theory 2: phi, psi');
    expect(object).toMatchObject({ relation: 'metric', same: true, anyMatter: true });
  });

  it('the first difference with both coefficients', () => {
    const { text, object, same } = compared(TELEPARALLEL, { lagrangian: 'M^2 R' });
    expect(same).toBe(false);
    expect(text).toContain(
      'first difference, in the relation for rho: the coefficient of H^2\n    1: -3*M^2\n    2: -6*M^2\n',
    );
    expect(object.difference).toEqual({ equation: 'rho', monomial: 'H^2', first: '-3*M^2', second: '-6*M^2' });
    expect(object.missing).toMatchObject({ theory: 1, equation: 'rho' });
  });

  it('what is undecided', () => {
    const { text, object } = compared(EINSTEIN_CARTAN, EINSTEIN_CARTAN, ['a = 2 a']);
    expect(text).toContain('undecided\n  solutions are compared for the scale factor as it is');
    expect(object).toMatchObject({ relation: 'undecided', same: false });
  });
});
