import { describe, expect, it } from 'vitest';
import { equalFraction, type Fraction, fraction } from '../../src/algebra/fraction.js';
import { rational } from '../../src/algebra/rational.js';
import { type CanonicalField, canonicalField, namedBranches } from '../../src/scalartensor/canonical-fields.js';
import { jordanFrame } from '../../src/scalartensor/conformal.js';
import { candidatesOf, einsteinFrame } from '../../src/scalartensor/frames.js';
import { conformalScalar, type FormTexts, formOf, knowing, poly, roles } from './forms.js';

function einsteinField(
  form: ReturnType<typeof formOf>,
  scalar: string,
  ...assumed: readonly string[]
): CanonicalField | undefined {
  const outcome = einsteinFrame(form, roles, poly('M^2'), knowing(...assumed));
  if (!outcome.found) throw new Error(outcome.reason);
  return canonicalField(scalar, outcome.frame.functions.kinetic, candidatesOf(form), outcome.frame.knowledge, 4);
}
const jordanField = (texts: FormTexts, scalar: string, ...assumed: readonly string[]): CanonicalField | undefined => {
  const form = formOf(texts);
  return canonicalField(scalar, jordanFrame(form).kinetic, candidatesOf(form), knowing(...assumed), 4);
};
const same = (f: Fraction, text: string): void => expect(equalFraction(f, fraction(poly(text)))).toBe(true);

describe('a canonical field', () => {
  it('of a conformally coupled scalar is √6 M artanh or arcoth of ψ/(√6 M) (Ann. Phys. 82 (1974) 535, memory)', () => {
    const field = einsteinField(conformalScalar, 'psi')!;
    const [only, ...others] = field.cases;
    expect(others).toEqual([]);
    same(only!.unit!.value, '6 M^2');
    same(only!.scale.value, '6 M^2');
    expect(only!.kineticSign).toBe(1);
    expect(only!.branches.map((b) => [b.named, b.inverse, b.domain])).toEqual([
      ['artanh', 'tanh', 'x^2 < 1'],
      ['arcoth', 'coth', 'x^2 > 1'],
    ]);
  });

  it('comes in two cases when the sign of a coupling is open, in one when it is assumed', () => {
    const form = formOf({ g4: '1/2 M^2 + c psi^2', kinetic: ['0', '0', '-12 c'] });
    const open = einsteinField(form, 'psi')!;
    expect(open.cases.map((c) => [c.condition!.sign, c.kineticSign, c.branches[0]!.named])).toEqual([
      [-1, 1, 'artanh'],
      [1, -1, 'arctan'],
    ]);
    expect(einsteinField(form, 'psi', 'c > 0')!.cases.map((c) => c.branches[0]!.named)).toEqual(['arctan']);
    expect(einsteinField(form, 'psi', '0 > c')!.cases.map((c) => c.branches[0]!.named)).toEqual(['artanh']);
  });

  it('of a constant, a power and an inverse square', () => {
    const named = (k: string) => jordanField({ g4: 'M^2', kinetic: ['0', '0', k] }, 'psi')!.cases[0]!.branches[0]!;
    expect(named('4 c').named).toBe('linear');
    expect(named('c psi^2')).toMatchObject({ named: 'power', exponent: rational(2) });
    expect(named('c/psi^2')).toMatchObject({ named: 'log', inverse: 'exp' });
  });

  it('does not exist where the kinetic term mixes, depends on another field or vanishes', () => {
    expect(jordanField({ g4: 'M^2', kinetic: ['1', '1', '1'] }, 'psi')).toBeUndefined();
    expect(jordanField({ g4: 'M^2', kinetic: ['1', '0', 'phi^2'] }, 'psi')).toBeUndefined();
    expect(jordanField({ g4: 'M^2', kinetic: ['1', '0', '0'] }, 'psi')).toBeUndefined();
  });

  it('without a closed form keeps the relation and a series', () => {
    const field = jordanField({ g4: 'M^2', kinetic: ['0', '0', 'c + d psi^2 + e psi^3'] }, 'psi')!;
    expect(field.cases).toEqual([]);
    expect(field.series.slope).toHaveLength(5);
  });
});

describe('named functions', () => {
  it('are given for the integrands they belong to only', () => {
    const of = (c: number, exponent: number, power = 0) =>
      namedBranches({ power, factors: [{ coefficients: [rational(0), rational(c)], exponent }] }).map((b) => b.named);
    expect(of(1, -1)).toEqual(['arsinh']);
    expect(of(-1, -1)).toEqual(['arcsin', 'arcosh']);
    expect(of(-1, -2)).toEqual(['artanh', 'arcoth']);
    expect(of(1, -2)).toEqual(['arctan']);
    expect(of(1, 1)).toEqual([]);
    expect(of(2, -2)).toEqual([]);
    expect(of(1, -2, 2)).toEqual([]);
  });
});
