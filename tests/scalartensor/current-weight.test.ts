import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { rational } from '../../src/algebra/rational.js';
import { currentWeight, weightPowers } from '../../src/scalartensor/current-weight.js';
import { poly } from './forms.js';

const weightOf = (phi: string, psi: string) =>
  currentWeight(
    new Map([
      ['phi', poly(phi)],
      ['psi', poly(psi)],
    ]),
    'phi',
    'psi',
  );

describe('the rescaled field of a current', () => {
  it('of the quadratic class is φ = ζ √|τ − Wψ²|, with weight ⅔|τ − Wψ²|^(3/2)', () => {
    const weight = weightOf('2/3 tau - 2/3 c psi^2', '2/3 c phi psi')!;
    expect([weight.ofField, weight.ofBracket]).toEqual([rational(0), rational(1, 2)]);
    expect(infix(weight.g)).toMatch(/^-?tau [-+] .*|^c\*psi\^2 - tau$/);
    const powers = weightPowers(weight);
    expect(powers.ofBracket).toEqual(rational(3, 2));
    expect(infix(powers.factor)).toMatch(/^-?2\/3$/);
  });

  it('is the field itself when nothing else is in the current', () => {
    expect(weightOf('2 M^2', '0')).toMatchObject({ ofField: rational(0), ofBracket: rational(0) });
  });

  it('may be a power of ψ and of a bracket', () => {
    // w = ψ² (c + ψ²)^(-1): w'/w = 2/ψ − 2ψ/(c + ψ²) = −J_ψ/(φ J_φ).
    const weight = weightOf('c psi + psi^3', '-2 c phi')!;
    expect([weight.ofField, weight.ofBracket]).toEqual([rational(2), rational(-1)]);
    expect(weightPowers(weight)).toMatchObject({ ofField: rational(3), ofBracket: rational(0) });
  });

  it('is refused when J_φ depends on φ, J_ψ is not linear in it, or the logarithm is no such product', () => {
    expect(weightOf('phi', '0')).toBeUndefined();
    expect(weightOf('c + psi^2', 'phi^2')).toBeUndefined();
    expect(weightOf('c + psi^2', 'psi')).toBeUndefined();
    expect(weightOf('c + psi^2', 'd phi psi')).toBeUndefined();
    expect(weightOf('0', 'phi')).toBeUndefined();
  });
});
