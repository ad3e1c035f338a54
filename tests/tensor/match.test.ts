import { describe, expect, it } from 'vitest';
import { kindTable } from '../../src/tensor/kinds.js';
import { matches } from '../../src/tensor/match.js';
import { rules, sum } from './rewriting.js';

const KINDS = kindTable();
/** All matches of a pattern in one product: `sign taken ?a=b …`. */
function found(pattern: string, product: string): string[] {
  const variables = [...new Set(pattern.match(/\?[a-z]/g) ?? [])];
  // A right side with the same variables, whatever it means.
  const left = rules([pattern, variables.length === 0 ? '0' : pattern])[0]!.left;
  return [...matches(left, sum(product)[0]!.factors, KINDS)].map(({ sign, taken, bound }) => {
    const names = [...bound].sort(([a], [b]) => (a < b ? -1 : 1)).map(([v, s]) => `${v}=${s.up ? '^' : '_'}${s.name}`);
    return [sign > 0 ? '+' : '-', taken.join(), ...names].join(' ');
  });
}

describe('matching', () => {
  it('binds variables to indices with their heights, in every arrangement of the slots', () => {
    expect(found('T_{?a?b?c}', 'T^x{}_{yz}')).toEqual(['+ 0 ?a=^x ?b=_y ?c=_z', '- 0 ?a=^x ?b=_z ?c=_y']);
    expect(found('R_{?a?b}', 'R_{xy}')).toEqual(['+ 0 ?a=_x ?b=_y']);
  });

  it('lets dummies of the pattern stand for one contracted pair only', () => {
    expect(found('R_{ab} R^{ab}', 'R_{xy} R^{xy}')).toEqual(['+ 0,1', '+ 1,0']);
    expect(found('R_{ab} R^{ab}', 'R_{xy} R^{yx}')).toEqual([]);
    expect(found('R_{ab} R^{ba}', 'R_{xy} R^{yx}')).toEqual(['+ 0,1', '+ 1,0']);
    expect(found('R_{ab} R^{ab}', 'R_{xy} R^x{}_z')).toEqual([]);
  });

  it('lets two variables meet in one contracted pair', () => {
    expect(found('R_{?a?b} R_{?c?d}', 'R_{xy} R^{xy}')).toEqual([
      '+ 0,1 ?a=_a ?b=_b ?c=^a ?d=^b',
      '+ 1,0 ?a=^a ?b=^b ?c=_a ?d=_b',
    ]);
  });

  it('carries the sign of the arrangement', () => {
    const signs = found('\\epsilon^{abcd} R_{abcd}', '\\epsilon^{pqrs} R_{pqrs}').map((t) => t[0]);
    expect(signs.length).toBe(4);
    expect(new Set(signs)).toEqual(new Set(['+']));
    expect(found('\\epsilon_{?a?b?c?d}', '\\epsilon_{wxyz}')).toHaveLength(24);
  });

  it('finds a sub-product, tells parts from the whole and numbers of indices apart', () => {
    expect(found('T_a T^a', 'R R_{ab} R^{ab} T_c T^c')).toHaveLength(2);
    expect(found('T_{?a?b?c}', 'T^{(axial)}_{xyz}')).toEqual([]);
    expect(found('T^{(axial)}_{?a?b?c}', 'T_{xyz}')).toEqual([]);
    expect(found('T^{(axial)}_{?a?b?c}', 'T^{(axial)}_{xyz}')).toHaveLength(6);
    expect(found('R', 'R_{ab} R^{ab}')).toEqual([]);
    expect(found('R R', 'R^3')).toHaveLength(6);
  });

  it('ignores heights of contracted pairs', () => {
    expect(found('T^a{}_{bc} T_a{}^{bc}', 'T_{xyz} T^{xyz}').length).toBeGreaterThan(0);
  });
});
