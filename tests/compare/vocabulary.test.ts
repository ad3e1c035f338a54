import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { equals, generator, multiply } from '../../src/algebra/poly.js';
import { vocabularyOf } from '../../src/compare/vocabulary.js';
import { derive } from '../../src/derive.js';
import { InputError } from '../../src/notation/diagnostics.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { derivationOf, poly, theoryText } from './derivations.js';

const d = derivationOf({ lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] });

function faults(where: readonly string[]): string[] {
  try {
    vocabularyOf(d, where);
  } catch (error) {
    if (error instanceof InputError) return error.diagnostics.map((x) => `${x.code}: ${x.message}`);
    throw error;
  }
  return [];
}

describe('what the names of a claim mean', () => {
  it('fields, rates, couplings, densities, totals, components', () => {
    const { meanings, space } = vocabularyOf(d, []);
    for (const name of ['phi', 'psi', 'a', 'H', 'c', 'M', 'k', 'rho_dust', 'Lambda', 'rho', 'p', 'rho_T', 'p_T'])
      expect(meanings.has(name), name).toBe(true);
    expect(infix(meanings.get('N')!.top)).toBe('1');
    expect(infix(meanings.get('u')!.top)).toBe('-phi + H');
    expect(infix(meanings.get('A1')!.top)).toBe('D(phi,1) + phi*H');
    expect(equals(meanings.get('rho')!.top, generator(space.ring, 'rho'))).toBe(true);
  });

  it('κ and G stand for M where the theory says so', () => {
    const kappa = theoryText({ lagrangian: '1/(2 kappa) R' }).replace(/scales:.*\n/, 'conventions: { units: kappa }\n');
    const value = vocabularyOf(derive(readTheory(kappa, 'x.yaml')), []).meanings.get('kappa')!;
    expect(infix(value.top)).toBe('1/M^2');
  });

  it('relations that were imposed', () => {
    const imposed = derive(
      readTheory(`${theoryText({ lagrangian: 'b M^2 R', constants: ['b'] })}impose: ["b = 1/2"]\n`, 'x'),
    );
    expect(infix(vocabularyOf(imposed, []).meanings.get('b')!.top)).toBe('1/2');
  });
});

describe('definitions', () => {
  it('may use earlier ones, derivatives and quotients', () => {
    const { space, meanings } = vocabularyOf(d, ['x = phi/(H + phi)', 'y = 2 D(x,1)']);
    const x = meanings.get('y')!;
    const base = poly(space, [1, 'H'], [1, 'phi']);
    // (φ/(H + φ))' = (φ̇H − φḢ)/(H + φ)².
    const expected = poly(space, [2, 'D(phi,1)', 'H'], [-2, 'phi', 'D(H,1)']);
    expect(infix(multiply(x.top, multiply(base, base)))).toBe(infix(multiply(expected, x.bottom)));
  });

  it('that cannot be solved introduce a function with an equation', () => {
    const { defining, space, meanings } = vocabularyOf(d, ['X^2 = H^2 + k/a^2', 'y = X H']);
    expect(defining.map((e) => [e.text, infix(e.poly)])).toEqual([['X^2 = H^2 + k/a^2', 'X^2 - H^2 - k/a^2']]);
    expect(space.ring.position.has('D(X,2)')).toBe(true);
    expect(infix(meanings.get('y')!.top)).toBe('X*H');
  });

  it.each([
    [['H = 2'], 'definition: the definition introduces no new symbol'],
    [['x = y'], 'definition: the definition has 2 unknown symbols: x, y'],
    [['x = H', 'x = 2 H'], 'definition: the definition introduces no new symbol'],
    [['x = 1/(phi - phi)'], 'division-by-zero: division by zero'],
    [['x = D(phi,9)'], 'exponent-limit: a time derivative beyond the order 8'],
    [['x = (H + phi + psi + a + k + M + c)^30'], 'terms-limit: the power is too large to be multiplied out'],
    [['x 3'], 'missing-equals: a relation needs an equals sign'],
  ])('%s is refused', (where, message) => {
    expect(faults(where)).toEqual([message]);
  });
});
