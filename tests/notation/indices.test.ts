import { describe, expect, it } from 'vitest';
import { lagrangianErrors, terms } from './rendered.js';

describe("Einstein's rule", () => {
  it('an index of order three', () => {
    expect(lagrangianErrors('b1 R_{cb} T^c T^{cb}{}_a T^a')).toBe(
      [
        'L:1:18: error: index c appears three times',
        '    b1 R_{cb} T^c T^{cb}{}_a T^a',
        '                     ^',
        'hint: a contracted index occurs exactly twice; rename one pair',
      ].join('\n'),
    );
    expect(lagrangianErrors('T_a T^a T_a T^a')).toContain('index a appears four times');
  });

  it('a pair at one height', () => {
    expect(lagrangianErrors('R_{ab} R^a_b')).toBe(
      [
        'L:1:12: error: both indices b are down',
        '    R_{ab} R^a_b',
        '               ^',
        'hint: a contracted pair has one index up and one down: write ^b here',
      ].join('\n'),
    );
    expect(lagrangianErrors('T_{aab} T^b')).toContain('L:1:5: error: both indices a are down');
    expect(lagrangianErrors('\\epsilon^{aabc} T_{abc}')).toContain('error: index a appears three times');
  });

  it('free indices of the Lagrangian, one error for each term', () => {
    expect(lagrangianErrors('R + T_a + R_{ab} T^{bcd}')).toBe(
      [
        'L:1:7: error: index a is free: it occurs once in its term',
        '    R + T_a + R_{ab} T^{bcd}',
        '          ^',
        'hint: the Lagrangian is a scalar; contract a with one ^a',
        'L:1:14: error: indices a, c, d are free: each occurs once in its term',
        '    R + T_a + R_{ab} T^{bcd}',
        '                 ^',
        'hint: the Lagrangian is a scalar; contract a with one ^a',
      ].join('\n'),
    );
  });

  it('summands of a bracket that differ', () => {
    expect(lagrangianErrors('R^{ab} (R_{ab} + T_a A_c)')).toBe(
      [
        'L:1:18: error: the summands differ in their free indices: _a _c here, _a _b in the first',
        '    R^{ab} (R_{ab} + T_a A_c)',
        '                     ^^^^^^^',
        'hint: every summand must carry the same free indices at the same heights',
      ].join('\n'),
    );
    expect(lagrangianErrors('(1 + T_a) T^a')).toContain('_a here, none in the first');
    expect(lagrangianErrors('(T_a + A^a) T^a')).toContain('^a here, _a in the first');
  });

  it('does not report what only follows from another error', () => {
    expect(lagrangianErrors('(T_a T^a T_a + A_a) T^a').match(/error/g)).toHaveLength(1);
    expect(lagrangianErrors('T_{ab} A^a').match(/error/g)).toHaveLength(1);
  });

  it.each([
    '(R + b1 T_a T^a)(R + b2 A_a A^a)',
    'T_a T^a (T_a T^a)',
    'T_a (T^a R + A^a T_b T^b)',
    '(R_{ab} + R_{ba}) R^{ab}',
    '(T_a A^b)(T_b A^a)',
    '(c0 T_a + A_a)(T^a - A^a)',
    '\\frac{T_a}{c0} T^a',
    'R^a{}_a',
    '((T_a T^a)^2 + R^2)^2',
  ])('%s is in order', (text) => {
    for (const { factors } of terms(text)) {
      const heights = new Map<string, boolean[]>();
      for (const { slots } of factors) {
        for (const { name, up } of slots) heights.set(name, [...(heights.get(name) ?? []), up]);
      }
      for (const pair of heights.values()) expect([...pair].sort()).toEqual([false, true]);
    }
  });
});
