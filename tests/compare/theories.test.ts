import { describe, expect, it } from 'vitest';
import { timeDerivative } from '../../src/algebra/calculus.js';
import { moveTo } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { equals, subtract } from '../../src/algebra/poly.js';
import { type Comparison, compareTheories } from '../../src/compare/theories.js';
import { derivationOf, EINSTEIN_CARTAN, TORSION_SCALAR, type Wanted } from './derivations.js';

const compare = (a: Wanted, b: Wanted, redefine: readonly string[] = []): Comparison =>
  compareTheories(derivationOf(a), derivationOf(b), { redefine });
const one = (lagrangian: string, ...constants: string[]): Wanted => ({ lagrangian, constants });

describe('the same theory written otherwise', () => {
  it.each([
    [EINSTEIN_CARTAN, { lagrangian: '-1/2 M^2 R', signature: '+---' }],
    [one('c R_{ab} R^{ab}', 'c'), one('c R_{ab} R^{ba}', 'c')],
    [one('c A_a A^a', 'c'), one('-2 c (T_{abc} T^{abc} - 2 T_{abc} T^{bac})', 'c')],
    [one('c \\epsilon^{abcd} T_{eab} T^e_{cd}', 'c'), one('4/3 c T_a A^a', 'c')],
  ])('identical: %o', (a, b) => {
    expect(compare(a, b).relation).toBe('identical');
  });

  it('up to a total derivative, which is stated', () => {
    const [a, b] = [EINSTEIN_CARTAN, one('1/2 M^2 R + c (R^2 - 4 R_{ab} R^{ba} + R_{abcd} R^{cdab})', 'c')].map(
      derivationOf,
    );
    const found = compareTheories(a!, b!);
    expect(found.relation).toBe('boundary');
    const primitive = found.primitive!;
    const rest = subtract(moveTo(a!.lagrangian, primitive.ring), moveTo(b!.lagrangian, primitive.ring));
    expect(equals(timeDerivative(primitive), rest)).toBe(true);
    expect(
      compare(one('1/2 M^2 R', 'c'), one('1/2 M^2 R + c \\epsilon^{abcd} R_{efab} R^{ef}_{cd}', 'c')).relation,
    ).toBe('boundary');
  });

  it('up to M² and an overall factor', () => {
    const ratio = (c: Comparison) =>
      c.scaling &&
      [c.scaling.factor.top, c.scaling.factor.bottom, c.scaling.massSquared.top, c.scaling.massSquared.bottom].map(
        infix,
      );
    expect(ratio(compare(EINSTEIN_CARTAN, { lagrangian: 'M^2 R' }))).toEqual(['1', '1', '2', '1']);
    expect(ratio(compare(EINSTEIN_CARTAN, one('c M^2 R', 'c')))).toEqual(['1', '1', '2*c', '1']);
    const vacuum = { matter: [] };
    expect(ratio(compare({ ...EINSTEIN_CARTAN, ...vacuum }, { ...one('c M^2 R', 'c'), ...vacuum }))?.slice(2)).toEqual([
      '1',
      '1',
    ]);
    expect(compare(EINSTEIN_CARTAN, one('c M^2 R + M^2 T_a A^a', 'c')).relation).not.toBe('scaled');
  });

  it('after a redefinition', () => {
    const odd = (sign: string): Wanted => one(`1/2 M^2 R ${sign} c T_a A^a`, 'c');
    expect(compare(odd('+'), odd('-'), ['psi = -psi']).relation).toBe('identical');
    expect(compare(odd('+'), odd('-'), ['c = -c']).relation).toBe('identical');
    expect(compare(one('b R^2', 'b'), one('c R^2', 'c'), ['b = c']).relation).toBe('identical');
    // The other root of the torsion: φ → 2H − φ leaves φ² − 2Hφ as it is.
    expect(compare(EINSTEIN_CARTAN, EINSTEIN_CARTAN, ['phi = 2 H - phi']).relation).toBe('boundary');
    expect(compare(EINSTEIN_CARTAN, EINSTEIN_CARTAN, ['phi = phi + psi']).relation).toBe('equivalent');
    expect(compare(EINSTEIN_CARTAN, EINSTEIN_CARTAN, ['phi = phi + H']).relation).toBe('metric');
  });
});

describe('the same solutions', () => {
  it('Holst term, torsion mass: φ = H and ψ = 0 all the same', () => {
    expect(compare(EINSTEIN_CARTAN, one('1/2 M^2 R + 1/4 c M^2 \\epsilon^{abcd} R_{abcd}', 'c')).relation).toBe(
      'equivalent',
    );
    expect(compare(EINSTEIN_CARTAN, one('1/2 M^2 R + c M^2 T_a T^a', 'c')).relation).toBe('equivalent');
  });

  it('teleparallel gravity and general relativity differ in the connection only', () => {
    const tele: Wanted = { lagrangian: `-1/2 M^2 (${TORSION_SCALAR})`, constrain: ['R^a_{bcd}'] };
    const found = compare(tele, EINSTEIN_CARTAN);
    expect(found.relation).toBe('metric');
    expect(found.unshared[0].length).toBeGreaterThan(0);
    expect(found.solutions).toMatchObject({ result: 'same', anyMatter: true });
  });
});

describe('different theories', () => {
  it('another mass, seen through multipliers', () => {
    const tele: Wanted = { lagrangian: `-1/2 M^2 (${TORSION_SCALAR})`, constrain: ['R^a_{bcd}'] };
    const found = compare(tele, { lagrangian: '1/3 M^2 R' });
    expect(found.relation).toBe('different');
    expect(
      found.difference && [
        found.difference.equation,
        ...[found.difference.monomial, found.difference.first, found.difference.second].map(infix),
      ],
    ).toEqual(['rho', 'H^2', '-3*M^2', '-2*M^2']);
  });

  it('other matter', () => {
    const found = compare(EINSTEIN_CARTAN, { ...EINSTEIN_CARTAN, matter: ['dust', 'radiation'] });
    expect(found.relation).toBe('different');
    expect(found.solutions?.result).toBe('different');
  });

  it('a redefined scale factor is compared as a Lagrangian only', () => {
    const found = compare(EINSTEIN_CARTAN, EINSTEIN_CARTAN, ['a = 2 a']);
    expect(found).toMatchObject({ relation: 'undecided', reason: expect.stringContaining('scale factor') });
  });
});
