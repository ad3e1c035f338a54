import { describe, expect, it } from 'vitest';
import { viewerOf } from '../../src/emit/display.js';
import { componentTable } from '../../src/emit/display-symbols.js';
import { fixture } from './latex-fixtures.js';

describe('symbols of a display', () => {
  const { symbols } = viewerOf(fixture('ten-couplings'));
  const role = (name: string) => symbols.get(name)?.role;

  it('know their part', () => {
    expect(['c0', 'M', 'k', 'a', 'rate of a', 'phi', 'D(phi,2)', 'Lambda', 'rho_dust', 'rho_chi'].map(role)).toEqual([
      'constant',
      'scale',
      'parameter',
      'length',
      'rate',
      'field',
      'field',
      'density',
      'density',
      'density',
    ]);
    expect(symbols.has('N')).toBe(false);
  });

  it('have the LaTeX of the user, of the geometry, or of their name', () => {
    const latex = (name: string) => symbols.get(name)?.latex;
    expect(latex('c0')).toBe('\\alpha_0');
    expect(latex('phi')).toBe('\\phi');
    expect(latex('rho_dust')).toBe('\\rho_{\\mathrm{dust}}');
    expect(latex('rate of a')).toBe('H');
    expect(symbols.get('D(rate of a,1)')?.order).toBe(1);
  });

  it('include the Planck mass of a theory that does not declare it', () => {
    expect(viewerOf(fixture('conformal')).symbols.get('M')).toMatchObject({ role: 'scale', latex: 'M' });
  });

  it('abbreviate names that no line could hold', () => {
    const long = [...viewerOf(fixture('awkward')).symbols.values()].filter((s) => s.isAbbreviated);
    expect(long.map((s) => s.name)).toEqual([
      'supercalifragilisticexpialidociousconstantnumberone',
      'manyparts_abc_def_ghi_jkl_mno_pqr_stu',
      'rho_quintessencelikefluidwithalongname',
    ]);
    expect(new Set(long.map((s) => s.latex)).size).toBe(3);
  });

  it('of components are those of the geometry', () => {
    const d = fixture('anisotropic');
    const table = componentTable(d);
    expect(table.size).toBe(d.geometry.components.length);
    for (const s of table.values()) expect(s.role).toBe('component');
  });
});
