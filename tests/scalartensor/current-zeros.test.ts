import { describe, expect, it } from 'vitest';
import { fraction } from '../../src/algebra/fraction.js';
import { infix } from '../../src/algebra/infix.js';
import { type Poly, zero } from '../../src/algebra/poly.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { plainPassage } from '../../src/notation/passage.js';
import { parseScalar } from '../../src/notation/scalar.js';
import { polyOfScalar } from '../../src/notation/scalar-poly.js';
import { currentResult, scalarsOf } from '../../src/scalartensor/current-zeros.js';

const names = ['phi', 'psi', 'W', 'tau', 'm'];
const ring = makeRing(constantsOf(names));
const poly = (text: string): Poly =>
  polyOfScalar(ring, parseScalar(plainPassage(text, 'x'), { isSymbol: (n) => names.includes(n) }));

const of = (phi: string, psi: string) =>
  currentResult(
    new Map([
      ['phi', fraction(poly(phi))],
      ['psi', fraction(poly(psi))],
    ]),
  );
const surfaces = (phi: string, psi: string) =>
  of(phi, psi)?.zeros.map(({ vanishing, conditions }) => [...vanishing, ...conditions.map(infix)].join(', '));

describe('currentResult', () => {
  it('has nothing to say about a current that vanishes', () => {
    expect(of('0*m', '0*m')).toBeUndefined();
    expect(currentResult(new Map([['phi', fraction(zero(ring))]]))).toBeUndefined();
  });

  it('of the quadratic class: φ = 0 and a circle of ψ; ψ = 0 only when a coupling vanishes, which is not general', () => {
    expect(surfaces('tau - W psi^2', 'W phi psi')).toEqual(['phi, psi^2*W - tau']);
  });

  it('finds a factor of all components, alone and with what they share', () => {
    expect(surfaces('phi psi', 'phi^2')).toEqual(['phi']);
    expect(surfaces('phi^2 + psi', 'm phi^2 + m psi')).toEqual(['phi^2 + psi']);
    expect(surfaces('phi', 'psi')).toEqual(['phi, psi']);
  });

  it('has none for a constant component, and drops components that vanish', () => {
    expect(surfaces('m', 'psi')).toEqual([]);
    expect(surfaces('psi', '0*m')).toEqual(['psi']);
  });

  it('counts no zero of a denominator', () => {
    expect(surfaces('phi/psi', 'psi')).toEqual([]);
  });

  it('knows a gradient, with the scalar whose gradient it is', () => {
    expect(infix(of('2 m phi psi', 'm phi^2 + tau')!.potential!.numerator)).toBe('phi^2*psi*m + psi*tau');
    expect(of('tau - W psi^2', 'W phi psi')!.potential).toBeUndefined();
    expect(of('1/phi', 'm')!.potential).toBeUndefined();
  });

  it('names the scalars that a surface involves', () => {
    const [zeroSet] = of('tau - W psi^2', 'W phi psi')!.zeros;
    expect(scalarsOf(zeroSet!, ['phi', 'psi'])).toEqual(['phi', 'psi']);
  });
});
