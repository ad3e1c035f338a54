import { describe, expect, it } from 'vitest';
import { decideClaims } from '../../src/compare/decide.js';
import { derivationOf, EINSTEIN_CARTAN, TORSION_SCALAR, type Wanted } from './derivations.js';

const SCALAR_MODE: Wanted = {
  lagrangian: `a0/2 R + b/24 R^2 + a1/2 (${TORSION_SCALAR})`,
  constants: ['a0', 'a1', 'b'],
};
const where = ['R = 6 (A1 + A4)', 'mu = a0 + a1', 'Phi = 3 u', 'T = 3 p - rho'];

const repairs = (wanted: Wanted, claim: string, options = {}): string[] =>
  decideClaims(derivationOf(wanted), { claims: [claim], ...options }).claims[0]!.repairs.map(
    ({ kind, term, corrected }) => `${kind}: ${term} -> ${corrected}`,
  );

describe('repairs of a misprint', () => {
  it('a sign', () => {
    expect(repairs(EINSTEIN_CARTAN, '3 M^2 (H^2 - k/a^2) = rho')).toEqual(['sign: 3 M^2 k/a^2 -> -3 M^2 k/a^2']);
    expect(repairs(EINSTEIN_CARTAN, 'phi = -H')).toContain('sign: H -> -H');
  });

  it('a coefficient, of one term or of a whole summand', () => {
    expect(repairs(EINSTEIN_CARTAN, '2 M^2 (H^2 + k/a^2) = rho')).toEqual([
      'coefficient: 2 M^2 (H^2 + k/a^2) -> 3 M^2 (H^2 + k/a^2)',
      'coefficient: rho -> 2/3 rho',
    ]);
    const one = repairs(SCALAR_MODE, '\\dot H = (mu R + T)/(6 a1) - 3 H^2 - k/a^2', { where, branch: ['psi = 0'] });
    expect(one).toEqual(['coefficient: 3 H^2 -> 2 H^2']);
    const whole = repairs(SCALAR_MODE, '\\dot R = -1/3 (R + 6 mu/b) Phi', { where, branch: ['psi = 0'] });
    expect(whole).toContain('coefficient: 1/3 (R + 6 mu/b) Phi -> 2/3 (R + 6 mu/b) Phi');
  });

  it('a coupling in place of another', () => {
    const found = repairs(SCALAR_MODE, '\\dot H = (a0 R + T)/(6 a1) - 2 H^2 - k/a^2', { where, branch: ['psi = 0'] });
    expect(found.length).toBe(1);
    expect(found[0]).toMatch(/^coefficient: a0 R.* -> \(?.*a1/);
  });

  it('a term that should not be there', () => {
    expect(repairs(EINSTEIN_CARTAN, '3 M^2 (H^2 + k/a^2) + psi H + H^2 = rho')).toContain('absent: H^2 -> 0');
  });

  it('there is none for a missing term, and none that spoils another branch', () => {
    expect(repairs(EINSTEIN_CARTAN, '3 M^2 H^2 = rho')).toEqual([]);
    const tele: Wanted = { lagrangian: `-1/2 M^2 (${TORSION_SCALAR})`, constrain: ['R^a_{bcd}'] };
    expect(repairs(tele, 'psi^2 = -k/a^2')).toEqual([]);
  });
});
