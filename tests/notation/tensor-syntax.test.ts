import { describe, expect, it } from 'vitest';
import type { TensorFactor } from '../../src/notation/theory.js';
import { lagrangianErrors, terms } from './rendered.js';

/** Slots of a factor as `^a_b_c`. */
const slots = ({ head, slots: all }: TensorFactor): string =>
  head + all.map((s) => (s.up ? '^' : '_') + s.name).join('');
const first = (text: string): string => terms(text)[0]!.factors.map(slots).join(' ');

describe('indices', () => {
  it.each([
    ['T_{bc}{}^a T^{bc}{}_a', 'T_b_c^a T^b^c_a'],
    ['T^{a}{}_{bc} T_a{}^{bc}', 'T^a_b_c T_a^b^c'],
    ['T^a_{bc} T_a^{bc}', 'T^a_b_c T_a^b^c'],
    ['T^{a}{}_{b}{}_{c} T_{a}^{}{}^{b c}', 'T^a_b_c T_a^b^c'],
    ['T{^a}{_{bc}} T{_a}{^{bc}}', 'T^a_b_c T_a^b^c'],
    ['{T^a}_{bc} {T_a}^{bc}', 'T^a_b_c T_a^b^c'],
    ['T^{a}{}_{\\phantom{a}bc} T_a{}^{bc}', 'T^a_b_c T_a^b^c'],
    ['T_{bc}^{\\ \\ a} T^{bc}_{\\ \\ a}', 'T_b_c^a T^b^c_a'],
    ['R_{\\mu\\nu} R^{ \\mu \\nu }', 'R_\\mu_\\nu R^\\mu^\\nu'],
    ['R_{μν} R^{μν}', 'R_\\mu_\\nu R^\\mu^\\nu'],
    ['T_\\mu T^\\mu', 'T_\\mu T^\\mu'],
    ['R_{a\\mu} R^{a\\mu}', 'R_a_\\mu R^a^\\mu'],
    ['R_{AB} R^{AB}', 'R_A_B R^A^B'],
    ['T_ a T ^ a', 'T_a T^a'],
    ['\\epsilon^{abcd} R_{abcd}', 'epsilon^a^b^c^d R_a_b_c_d'],
    ['\\varepsilon_{abcd} R^{abcd}', 'epsilon_a_b_c_d R^a^b^c^d'],
    ['\\eta_{ab} R^{ab}', 'eta_a_b R^a^b'],
    ['\\delta^a_b R^b_a', 'delta^a_b R^b_a'],
    ['\\delta_b^a R^b{}_a', 'delta_b^a R^b_a'],
    ['T_a A^a', 'T_a A^a'],
    ['R^{ab}{}_{ab}', 'R^a^b_a_b'],
    ['R_{}', 'R'],
  ])('%s has the slots %s', (text, expected) => {
    expect(first(text)).toBe(expected);
  });

  it('a Greek head that is also a constant is a tensor only with indices', () => {
    const delta = [{ name: 'delta', role: 'constant' as const, dimension: 0, latex: 'd' }];
    const [constant, power, tensor] = terms('\\delta R + \\delta^2 R + \\delta^a_a R', delta);
    expect(constant!.scalar.powers).toEqual([['delta', 1]]);
    expect(power!.scalar.powers).toEqual([['delta', 2]]);
    expect(tensor!.factors[0]!.head).toBe('delta');
  });

  it('A_1 is a constant when declared, and a component otherwise', () => {
    const symbols = [{ name: 'A_1', role: 'constant' as const, dimension: 0, latex: 'A' }];
    expect(terms('A_1 R + A_{1} R', symbols)).toHaveLength(1);
    expect(lagrangianErrors('A_1 R')).toContain('L:1:3: error: an index is a number');
  });
});

describe('errors of tensors', () => {
  it('wrong numbers of indices are reported together', () => {
    expect(lagrangianErrors('T_{ab} + R_a + R_{abc}\n+ T + A_{ab}')).toBe(
      [
        'L:1:1: error: T_{ab} has 2 indices, T has 1 or 3',
        '    T_{ab} + R_a + R_{abc}',
        '    ^^^^^^',
        'hint: T_{abc} is the torsion, T_a its trace',
        'L:1:10: error: R_a has 1 index, R has 0, 2 or 4',
        '    T_{ab} + R_a + R_{abc}',
        '             ^^^',
        'hint: R_{abcd} is the curvature, R_{ab} its trace, R the scalar',
        'L:1:16: error: R_{abc} has 3 indices, R has 0, 2 or 4',
        '    T_{ab} + R_a + R_{abc}',
        '                   ^^^^^^^',
        'hint: R_{abcd} is the curvature, R_{ab} its trace, R the scalar',
        'L:2:3: error: T has no indices here, T has 1 or 3',
        '    + T + A_{ab}',
        '      ^',
        'hint: T_{abc} is the torsion, T_a its trace',
        'L:2:7: error: A_{ab} has 2 indices, A has 1',
        '    + T + A_{ab}',
        '          ^^^^^^',
        'hint: A_a is the axial vector of the torsion',
      ].join('\n'),
    );
  });

  it('several letters without braces, with the spelling that was meant', () => {
    expect(lagrangianErrors('R_ab R^ab')).toBe(
      [
        'L:1:3: error: several indices need braces',
        '    R_ab R^ab',
        '      ^^',
        'hint: write R_{ab}, or leave a space: R_a b',
      ].join('\n'),
    );
    expect(lagrangianErrors('T^a_bc')).toContain('hint: write T^a_{bc}, or leave a space: T^a_b c');
    expect(lagrangianErrors('T_ab1')).toContain('an index is one letter');
  });

  it('powers of tensors with indices', () => {
    expect(lagrangianErrors('R_{ab}^2')).toBe(
      [
        'L:1:1: error: R_{ab} has free indices, so its power has no meaning',
        '    R_{ab}^2',
        '    ^^^^^^^^',
        'hint: powers stand on scalars: R^2, (T_a T^a)^2; a square is written out, R_{ab} R^{ab}',
      ].join('\n'),
    );
    expect(lagrangianErrors('R_{ab}^{2}')).toContain('L:1:1: error: R_{ab} has free indices');
    expect(lagrangianErrors('R_{ab}²')).toContain('L:1:1: error: R_{ab} has free indices');
    expect(lagrangianErrors('R^{2}_{ab}')).toContain('error: a power cannot stand between a tensor and its indices');
    expect(lagrangianErrors('(T_a)^2')).toContain('L:1:1: error: the base of this power has the free index a');
  });

  it.each([
    ['R_{a1}', 'L:1:5: error: an index is a number'],
    ['T_{0}', 'L:1:4: error: an index is a number'],
    ['T^0', 'L:1:3: error: an index of T is a number'],
    ['T_1', 'L:1:3: error: an index is a number'],
    ['R_{[ab]} R^{ab}', 'L:1:4: error: brackets around indices are not part of the notation'],
    ['R_{(ab)} R^{ab}', 'L:1:4: error: brackets around indices are not part of the notation'],
    ['T_{a,b}', 'L:1:5: error: a comma among indices'],
    ['R_{a+b}', 'L:1:5: error: + is not an index'],
    ['T_', 'L:1:2: error: _ lacks its index'],
    ['T_)', 'L:1:3: error: _ lacks its index'],
    ['\\delta_{ab} R^{ab}', 'L:1:1: error: \\delta has one index up and one down'],
    ['\\epsilon_{ab}', 'L:1:1: error: \\epsilon_{ab} has 2 indices, \\epsilon has 4'],
    ['\\eta', 'L:1:1: error: \\eta has no indices here, \\eta has 2'],
    ['{R^a}_{bc}', 'L:1:1: error: {R^a}_{bc} has 3 indices, R has 0, 2 or 4'],
    ['{T}^2', 'L:1:2: error: T has no indices here, T has 1 or 3'],
    ['{R^a}', 'L:1:2: error: R^a has 1 index, R has 0, 2 or 4'],
  ])('%s: %s', (text, line) => {
    expect(lagrangianErrors(text).split('\n')[0]).toBe(line);
    expect(lagrangianErrors(text).match(/error/g)).toHaveLength(1);
  });
});
