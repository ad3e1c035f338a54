import { describe, expect, it } from 'vitest';
import { lagrangianErrors, terms } from './rendered.js';

describe('unknown names', () => {
  it('suggests the nearest declared one, once for each name', () => {
    expect(lagrangianErrors('b4 R + b4 T_a T^a + b4')).toBe(
      ['L:1:1: error: unknown symbol b4', '    b4 R + b4 T_a T^a + b4', '    ^^', 'hint: did you mean b1?'].join('\n'),
    );
  });

  it('reports all of them, next to decimal points and wrong index counts', () => {
    const text = lagrangianErrors('q1 R + T_{ab}\n+ 0.5 zeta R');
    expect(text.split('\n').filter((l) => l.includes('error'))).toEqual([
      'L:2:3: error: 0.5 has a decimal point',
      'L:1:1: error: unknown symbol q1',
      'L:1:8: error: T_{ab} has 2 indices, T has 1 or 3',
      'L:2:7: error: unknown symbol zeta',
    ]);
  });

  it.each([
    ['c0M R', 'c0 M'],
    ['c0MR', 'c0 M R'],
    ['c0R^2', 'c0 R'],
    ['b1T_{abc}T^{abc}', 'b1 T_{abc}'],
    ['b1T^{abc}T_{abc}', 'b1 T'],
    ['c_1R', 'c_1 R'],
    ['C0 R', 'c0'],
  ])('%s: did you mean %s?', (text, meant) => {
    expect(lagrangianErrors(text)).toContain(`hint: did you mean ${meant}?`);
  });

  it.each([
    ['g_{ab} R^{ab}', 'g_{ab} is not a tensor of this notation', 'indices are frame indices: write \\eta_{ab}'],
    ['g^{ab} R_{ab}', 'g is not a tensor of this notation', 'indices are frame indices: write \\eta_{ab}'],
    ['K_{abc}', 'K_{abc} is not a tensor of this notation', 'the tensors are R, T, A, \\epsilon, \\eta and \\delta'],
    ['epsilon^{abcd} R_{abcd}', 'epsilon is not a tensor of this notation', 'write \\epsilon'],
    ['eta_{ab} R^{ab}', 'eta_{ab} is not a tensor of this notation', 'write \\eta'],
  ])('%s: %s', (text, message, hint) => {
    const shown = lagrangianErrors(text);
    expect(shown).toContain(`error: ${message}\n`);
    expect(shown).toContain(`hint: ${hint}`);
  });

  it.each([
    ['k R', 'k stands for the spatial curvature and cannot occur in a Lagrangian'],
    ['\\phi R', 'phi stands for a connection function and cannot occur in a Lagrangian'],
    ['rho_dust', 'rho_dust stands for an energy density and cannot occur in a Lagrangian'],
    ['H', 'H stands for the expansion rate and cannot occur in a Lagrangian'],
  ])('%s: %s', (text, message) => {
    expect(lagrangianErrors(text)).toContain(`error: ${message}\n`);
  });

  it('a name of every object is only known when declared', () => {
    expect(lagrangianErrors('constructor R')).toContain('unknown symbol constructor');
    expect(lagrangianErrors('toString R')).toContain('unknown symbol toString');
    const symbols = [{ name: 'constructor', role: 'constant' as const, dimension: 0, latex: 'c' }];
    expect(terms('constructor R', symbols)[0]!.scalar.powers).toEqual([['constructor', 1]]);
  });

  it('\\varepsilon is epsilon unless varepsilon is declared', () => {
    const named = (name: string) => [{ name, role: 'constant' as const, dimension: 0, latex: name }];
    expect(terms('\\varepsilon R', named('epsilon'))[0]!.scalar.powers).toEqual([['epsilon', 1]]);
    expect(terms('\\varepsilon R', named('varepsilon'))[0]!.scalar.powers).toEqual([['varepsilon', 1]]);
  });

  it('stops looking after enough unknown names', () => {
    const text = Array.from({ length: 100_000 }, (_, i) => `y${i}`).join(' ');
    expect(lagrangianErrors(text).match(/unknown symbol/g)!.length).toBeLessThan(30);
  });
});
