import { describe, expect, it } from 'vitest';
import { C_NAMING } from '../../src/emit/code-c.js';
import { inputsOf } from '../../src/emit/code-description.js';
import {
  commaLines,
  commentLines,
  couplingMembers,
  functionLines,
  headerLines,
  identifiersFor,
  inputMembers,
  moduleName,
  QUARTERS,
  standsFor,
} from '../../src/emit/code-language.js';
import { firstOrderModule, HOSTILE_TITLES, named } from './code-fixtures.js';

const m = firstOrderModule();

describe('texts of emitted code', () => {
  it('clean and break comments, and keep their indentation', () => {
    expect(commentLines(['    one two three', ''], 12)).toEqual(['    one two', '    three', '']);
    for (const title of HOSTILE_TITLES)
      for (const line of commentLines(headerLines(named(m, title)))) {
        expect(line).not.toMatch(/\*\/|\/\*|[\p{Cc}\p{Cf}\p{Zl}\p{Zp}]/u);
        expect(line.length).toBeLessThanOrEqual(110);
      }
  });

  it('list what a function returns', () => {
    const [rates, jacobian, constraint] = m.functions;
    expect(functionLines(rates!).slice(2)).toEqual([
      '    a: d a/dt',
      '    phi: d phi/dt',
      '    D(phi,1): d D(phi,1)/dt',
      '    psi: d psi/dt',
    ]);
    expect(functionLines(jacobian!).at(-1)).toBe('    columns: a, phi, D(phi,1), psi');
    expect(functionLines(constraint!)).toEqual(['Vanishes on solutions.']);
    expect(commaLines(['a', 'b', 'c'], 5)).toEqual(['a, b,', 'c']);
  });
});

describe('identifiers of emitted code', () => {
  it('are made of any text, once each', () => {
    expect([...identifiersFor(['phi,psi', 'phi psi', 'D(phi,1)', '3x', 'int', '_'], C_NAMING).values()]).toEqual([
      'phi_psi',
      'phi_psi_',
      'D_phi_1',
      'x3x',
      'int_',
      'x',
    ]);
    expect([...couplingMembers(m, C_NAMING)]).toEqual([
      ['g', 'g'],
      ['k', 'k'],
      ['end', 'end'],
    ]);
    expect(inputMembers(inputsOf(m)[0]!, C_NAMING).get('D(phi,1)')).toBe('D_phi_1');
    expect([standsFor('B1_', 'B1'), standsFor('B1', 'B1')]).toEqual(['; stands for B1', '']);
  });

  it('begin with a letter and are short where they stand in front of others', () => {
    expect(moduleName(m)).toBe('first_order');
    expect(moduleName({ ...m, slug: '3-form' })).toBe('x3_form');
    expect(moduleName({ ...m, slug: 'a'.repeat(29) + '-b'.repeat(9) })).toBe('a'.repeat(29));
  });
});

describe('the sample point', () => {
  it('has numbers that every language reads alike, none of them zero', () => {
    for (let i = 0; i < 30; i++)
      for (const text of [QUARTERS.coupling(i), QUARTERS.jet(i, i % 4)]) {
        expect(text).toMatch(/^\d\.\d\d$/);
        expect(Number(text)).toBeGreaterThan(0);
      }
  });
});
