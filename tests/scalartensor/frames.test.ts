import { describe, expect, it } from 'vitest';
import { equalFraction, fraction } from '../../src/algebra/fraction.js';
import { infix } from '../../src/algebra/infix.js';
import { NEGATIVE, POSITIVE } from '../../src/algebra/signs.js';
import {
  type ConformalFrame,
  candidatesOf,
  chosenFrame,
  coefficientsIn,
  einsteinFrame,
  type FrameOutcome,
} from '../../src/scalartensor/frames.js';
import { conformalScalar, formOf, knowing, poly, roles } from './forms.js';

const found = (outcome: FrameOutcome): ConformalFrame => {
  if (!outcome.found) throw new Error(outcome.reason);
  return outcome.frame;
};
const einstein = (texts: Parameters<typeof formOf>[0], ...assumed: readonly string[]): ConformalFrame =>
  found(einsteinFrame(formOf(texts), roles, poly('M^2'), knowing(...assumed)));

describe('the Einstein frame', () => {
  it('of a minimal scalar is the form itself', () => {
    const frame = einstein({ g4: '1/2 M^2', kinetic: ['1', '0', '1'] });
    expect(equalFraction(frame.omega2, fraction(poly('1')))).toBe(true);
    expect(frame.signature.verdict).toBe('positive');
    expect(frame.domain.signs).toBe(POSITIVE);
    expect(equalFraction(frame.functions.kinetic.get('phi,phi')!, fraction(poly('1')))).toBe(true);
  });

  it('of a conformally coupled scalar has the kinetic term 1/(1 − ψ²/6M²)² (Ann. Phys. 82 (1974) 535, memory)', () => {
    const frame = found(einsteinFrame(conformalScalar, roles, poly('M^2'), knowing()));
    const bracket = poly('1 - psi^2/(6 M^2)');
    expect(
      equalFraction(frame.functions.kinetic.get('psi,psi')!, fraction(poly('1'), [{ base: bracket, power: 2 }])),
    ).toBe(true);
    expect(frame.signature.verdict).toBe('degenerate');
  });

  it('does not exist without a curvature scalar, and says why', () => {
    expect(einsteinFrame(formOf({ g4: '0' }), roles, poly('M^2'), knowing())).toEqual({
      found: false,
      reason: expect.stringContaining('G4 vanishes'),
    });
  });

  it('has the other sign where G4 is known to be negative', () => {
    const frame = einstein({ g4: '-M^2 - c psi^2', kinetic: ['0', '0', '1'] }, 'c >= 0');
    expect(frame.side).toBe(-1);
    expect(equalFraction(frame.functions.coupling, fraction(poly('-1/2 M^2')))).toBe(true);
  });

  it('decides its signature by assumptions, or leaves the two signs', () => {
    const texts = { g4: 'M^2', kinetic: ['c', '0', 'd'] } as const;
    expect(einstein(texts, 'c > 0', 'd > 0').signature).toMatchObject({
      verdict: 'positive',
      used: ['c > 0', 'd > 0'],
    });
    expect(einstein(texts, '0 > c', '0 > d').signature.verdict).toBe('negative');
    expect(einstein(texts, 'c > 0', '0 > d').signature.verdict).toBe('indefinite');
    const { signature } = einstein(texts);
    expect(signature.verdict).toBe('undecided');
    const factors = signature.determinant.sign.open.factors.map((f) => infix(f.base));
    expect(factors).toEqual(['c', 'd']);
  });

  it('counts mixing: the determinant, not the diagonal, decides', () => {
    const frame = einstein({ g4: 'M^2', kinetic: ['1', '4', '1'] });
    expect(frame.signature.verdict).toBe('indefinite');
    expect(frame.signature.determinant.sign.signs).toBe(NEGATIVE);
  });
});

describe('a frame of the user', () => {
  it('keeps F = G4/Ω²', () => {
    const frame = found(chosenFrame(conformalScalar, roles, poly('1 + psi^2/M^2'), knowing()));
    const wanted = fraction(poly('1/2 M^2 - 1/12 psi^2'), [{ base: poly('1 + psi^2/M^2'), power: 1 }]);
    expect(equalFraction(frame.functions.coupling, wanted)).toBe(true);
    expect(frame.domain.signs).toBe(POSITIVE);
  });

  it('is refused when Ω² is nowhere positive', () => {
    expect(chosenFrame(conformalScalar, roles, poly('-psi^2'), knowing()).found).toBe(false);
  });
});

describe('likely divisors', () => {
  it('are the coefficients of the functions of a form', () => {
    expect(coefficientsIn([poly('c psi^2 + d psi^2 + M^2')]).map(infix)).toEqual(['c + d', 'M^2']);
    expect(candidatesOf(conformalScalar).map(infix)).toContain('c');
  });
});
