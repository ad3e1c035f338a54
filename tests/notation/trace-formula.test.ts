import { describe, expect, it } from 'vitest';
import { INTERNAL } from '../../src/notation/conventions.js';
import { plainPassage } from '../../src/notation/passage.js';
import { ricciOf, torsionTraceOf } from '../../src/notation/trace-formula.js';

const passage = (text: string) => plainPassage(text, 'F');

describe('ricciOf', () => {
  // R_abcd is antisymmetric in ab and in cd, so each trace can be written in several ways.
  it.each([
    ['R^c_{acb}', 'R^c_{acb}'],
    ['R_{acb}{}^c', 'R^c_{acb}'],
    ['R_a{}^c{}_{bc}', 'R^c_{acb}'],
    ['R_{ca}{}^c{}_b', 'R^c_{acb}'],
    ['R_a{}^c{}_{cb}', 'R^c_{abc}'],
    ['R^c{}_{bca}', 'R^c_{bca}'],
    ['-R^c{}_{bca}', 'R^c_{bac}'],
    ['R_{\\beta\\gamma\\alpha}{}^\\gamma', 'R^c_{bca}'],
  ])('%s is %s', (formula, value) => {
    expect(ricciOf(passage(formula), INTERNAL)).toBe(value);
  });

  it('follows the order of the indices', () => {
    const formFirst = { ...INTERNAL, 'curvature-indices': 'form-first' } as const;
    expect(ricciOf(passage('R_{cb}{}^c{}_a'), formFirst)).toBe('R^c_{acb}');
    expect(ricciOf(passage('R_{acb}{}^c'), formFirst)).toBe('R^c_{bca}');
  });

  it.each(['R^c_{cab}', 'R_{ab}{}^c{}_c', 'R', 'T^c_{ac}', 'R^c_{acb} R', '0', 'R_{abcd}', 'R^{cd}{}_{cd}'])(
    '%s is none',
    (formula) => {
      expect(ricciOf(passage(formula), INTERNAL)).toBeUndefined();
    },
  );
});

describe('torsionTraceOf', () => {
  it.each([
    ['T^b_{ab}', 'T^b_{ab}'],
    ['T^b_{ba}', 'T^b_{ba}'],
    ['-T^b_{ba}', 'T^b_{ab}'],
    ['T_{\\lambda\\mu}{}^\\lambda', 'T^b_{ab}'],
    ['T_{ab}{}^b', undefined],
    ['T_a', undefined],
  ])('%s is %s', (formula, value) => {
    expect(torsionTraceOf(passage(formula), INTERNAL)).toBe(value);
  });
  it('follows the position of the torsion index', () => {
    const last = { ...INTERNAL, 'torsion-index': 'last' } as const;
    expect(torsionTraceOf(passage('T_{ab}{}^b'), last)).toBe('T^b_{ab}');
    expect(torsionTraceOf(passage('T_{ba}{}^b'), last)).toBe('T^b_{ba}');
    expect(torsionTraceOf(passage('T^b{}_{ba}'), last)).toBeUndefined();
  });
});
