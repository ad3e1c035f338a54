import { describe, expect, it } from 'vitest';
import { infix } from '../src/algebra/infix.js';
import { POSITIVE, signOf } from '../src/algebra/signs.js';
import { derive } from '../src/derive.js';
import { readTheory } from '../src/notation/read-theory.js';
import { errorText } from './notation/rendered.js';

const derived = (assume: readonly string[], set: readonly string[] = []) =>
  derive(
    readTheory(
      'untwist: 1\nname: Test\nconstants: [c, d]\nscales: { M: mass }\nlagrangian: c R^2 + d M^2 T_a T^a + M^2 R\n',
      'test.yaml',
      { assume, set },
    ),
  );

describe('assumptions of a theory', () => {
  it('become knowledge, with relations applied first', () => {
    const { knowledge } = derived(['c > 2 d'], ['c = 3 d']);
    expect(knowledge!.assumptions.map((a) => `${infix(a.value)} ${a.relation} 0`)).toEqual(['d > 0']);
    expect(signOf(knowledge!.assumptions[0]!.value, knowledge!).signs).toBe(POSITIVE);
    expect(derived([]).knowledge).toBeUndefined();
  });

  it('use conditions that could not be solved', () => {
    const { knowledge } = derived(['c > 0'], ['c d = 1']);
    expect(knowledge!.assumptions.map((a) => a.relation)).toEqual(['=', '>']);
  });

  it('are refused when they exclude each other or what is imposed', () => {
    expect(errorText(() => derived(['c > d', 'd > c']))).toMatch(/"d > c" contradicts "c > d"/);
    expect(errorText(() => derived(['c > 0'], ['c = -1']))).toContain('contradicts what is imposed');
    expect(errorText(() => derived(['0 > 1']))).toContain('contradicts arithmetic');
    expect(errorText(() => derived(['M < 0']))).toMatch(/"M < 0" contradicts "M > 0"/);
    expect(errorText(() => derived(['c d < 0', 'c > 0', 'd > 0']))).toContain('contradicts');
  });

  it('about k do not fix k', () => {
    expect(derived(['k >= 0']).knowledge!.assumptions).toHaveLength(1);
  });
});
