import { describe, expect, it } from 'vitest';
import { writerOf } from '../../src/emit/latex-display.js';
import { proseTex } from '../../src/emit/latex-text.js';
import { geometrySection, theorySection } from '../../src/emit/latex-theory.js';
import { fixture } from './latex-fixtures.js';

const shown = (section: ReturnType<typeof theorySection>, id: string): string => {
  const passage = section.passages.find((p) => p.id === id)!;
  return [...passage.text.map(proseTex), ...passage.displays.map((d) => d.tex), ...passage.remarks.map(proseTex)].join(
    '\n',
  );
};

describe('the theory', () => {
  const section = theorySection(writerOf(fixture('with-relations')));

  it('is the Lagrangian as typed, then with the relations', () => {
    expect(shown(section, 'lagrangian')).toContain('\\tfrac{1}{2} \\alpha_0 M^{2} R + a_{1} R^{2}');
    expect(shown(section, 'lagrangian-imposed')).not.toContain('a_{1}');
    expect(shown(section, 'lagrangian-imposed')).toContain('2 b_{3} M^{2} T_{abc} T^{abc}');
  });

  it('lists what was eliminated and what stays a condition', () => {
    expect(shown(section, 'relations')).toMatch(/a_\{1\} &= 0[\s\S]*b_\{1\} &= -2 b_\{3\}/);
    expect(shown(section, 'conditions')).toContain('= 0');
  });

  it('lists the matter with its equation of state', () => {
    const matter = shown(section, 'matter');
    expect(matter).toContain('chi ($w = 1/5$, density $\\rho_{\\chi}$)');
    expect(matter).toContain('dust ($w = 0$, density $\\rho_{\\mathrm{dust}}$ at unit scale factor)');
    expect(matter).toContain(
      '\\tfrac{1}{3} \\frac{\\rho_{\\mathrm{radiation}}}{a^{4}} - \\Lambda + \\tfrac{1}{5} \\rho_{\\chi}',
    );
  });

  it('says what abbreviations stand for', () => {
    const long = theorySection(writerOf(fixture('awkward')));
    expect(shown(long, 'lagrangian').replaceAll('\\allowbreak{}', '')).toContain(
      '$\\mathsf{s}_{1}$ for supercalifragilisticexpialidociousconstantnumberone',
    );
  });
});

describe('the geometry', () => {
  it('gives the values of the invariants in components', () => {
    const section = geometrySection(writerOf(fixture('ten-couplings')));
    const invariants = shown(section, 'invariants');
    for (const row of [
      'R &= 6 (A_1 + A_4)',
      'R_{abcd} R^{abcd} &= 12 (A_1^{2} - A_2^{2} - A_3^{2} + A_4^{2})',
      'T_{abc} T^{abc} &= -6 (u^{2} - 4 v^{2})',
      'T_a T^a &= -9 u^{2}',
    ])
      expect(invariants).toContain(row);
    expect(shown(section, 'components')).toContain('A_4 &= \\phi^{2} - \\psi^{2} + \\frac{k}{a^{2}}');
    expect(shown(section, 'fields')).toContain('$H = \\dot{a}/a$');
  });

  it('gives names to products that are too wide for a left side', () => {
    const invariants = shown(geometrySection(writerOf(fixture('awkward'))), 'invariants');
    expect(invariants).toMatch(/\\mathcal\{I\}_\{\d\}|T_\{abc\} T\^\{bcd\}/);
  });

  it('says what other variables are', () => {
    const section = geometrySection(writerOf(fixture('ten-couplings'), { variables: 'h,f' }));
    expect(shown(section, 'variables')).toContain('\\phi &= \\frac{h}{a}');
    expect(shown(section, 'components')).toContain('A_1 &= \\frac{\\dot{h}}{a}');
    const own = shown(geometrySection(writerOf(fixture('ten-couplings'), { variables: 'u,v' })), 'components');
    expect(own).not.toMatch(/u &= u/);
  });
});
