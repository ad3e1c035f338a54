import { describe, expect, it } from 'vitest';
import { derive } from '../../src/derive.js';
import { summary } from '../../src/emit/summary.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { theoryText, type Wanted } from '../oracle/pipeline.js';

const text = (wanted: Wanted, extra = ''): string =>
  summary(derive(readTheory(theoryText(wanted) + extra, 'lee.yaml')), { variables: '', color: false });
const block = (whole: string, title: string): string[] => {
  const lines = whole.split('\n');
  const from = lines.indexOf(title);
  return lines.slice(from + 1, lines.indexOf('', from + 1)).map((l) => l.trim().normalize('NFC'));
};
const TELEPARALLEL = '-1/2 M^2 (1/4 T_{abc} T^{abc} + 1/2 T_{abc} T^{bac} - T_a T^a)';

describe('summary of constrained theories', () => {
  const whole = text({ lagrangian: TELEPARALLEL, constrain: ['R^a_{bcd}'] }, 'assume: ["k >= 0"]\n');

  it('lists constraints with their multipliers', () => {
    expect(block(whole, 'Constraints by multipliers')).toEqual([
      'R^a_{bcd} = 0: 4 of 36 components of its multiplier are left by the symmetry',
      'λ_1: 0 = φ² − ψ² + k/a²',
      'λ_2: 0 = φ ψ',
      'λ_3: 0 = φ̇ + H φ',
      'λ_4: 0 = ψ̇ + H ψ',
    ]);
  });

  it('lists branches, and those that are ruled out', () => {
    expect(block(whole, 'Branches of the constraints')).toEqual([
      'phi = 0, psi = sqrt(k)/a (k > 0); either sign of a root',
      'L = −3 M² a³ H² + 3 M² k a',
      'E_N/a³ = 3 M² H² + 3 M² k/a²',
      'E_a/a² = 6 M² Ḣ + 9 M² H² + 3 M² k/a²',
      'not fixed by the equations: λ_3, λ_4',
      'phi = psi = 0 (k = 0)',
      'L = −3 M² a³ H²',
      'E_N/a³ = 3 M² H²',
      'E_a/a² = 6 M² Ḣ + 9 M² H²',
      'not fixed by the equations: λ_1, λ_2',
      'ruled out by k >= 0: psi = 0, phi = sqrt(-k)/a (k < 0)',
    ]);
  });

  it('says when there is no solution', () => {
    const none = text({ lagrangian: 'M^2 R', constrain: ['A_a A^a - 1'] });
    expect(block(none, 'Branches of the constraints')).toEqual(['the constraints have no solution']);
  });

  it('shows what spin does', () => {
    const spin = text({
      lagrangian: '1/2 M^2 R + M^2/4/gamma \\epsilon^{abcd} R_{abcd}',
      constants: ['q', 'gamma'],
      matter: ['{ spin: sigma, axial: q }'],
    });
    expect(block(spin, 'Matter with spin')).toEqual([
      'volume times what it adds to L: q σ ψ',
      'φ = [ (γ² + 1) H − q γ σ/(6 M² a³) ] / (γ² + 1)',
      'ψ = [ q γ² σ/(6 M² a³) ] / (γ² + 1)',
      'effective density [ −q² γ² σ²/(12 M² a⁶) ] / (γ² + 1)',
      'effective pressure [ −q² γ² σ²/(12 M² a⁶) ] / (γ² + 1)',
    ]);
    const average = text({ lagrangian: '1/2 M^2 R', matter: ['{ spin: s, average: weyssenhoff }'] });
    expect(block(average, 'Matter with spin')).toEqual(['averaged spins s, p = ρ = −s²/(4 M² a⁶)']);
  });
});
