import { describe, expect, it } from 'vitest';
import { writerOf } from '../../src/emit/latex-display.js';
import { equationsSection, friedmannSection, reductionSection } from '../../src/emit/latex-results.js';
import { proseTex } from '../../src/emit/latex-text.js';
import { fixture } from './latex-fixtures.js';

const ids = (section: ReturnType<typeof reductionSection>): string[] => section.passages.map((p) => p.id);

describe('results', () => {
  it('have one passage for each field', () => {
    expect(ids(equationsSection(writerOf(fixture('anisotropic'))))).toEqual([
      'euler-lagrange',
      ...['N', 'a_x', 'a_y', 'a_z', 'phi_x', 'phi_y', 'phi_z', 'psi_x', 'psi_y', 'psi_z'].map((q) => `equation-${q}`),
    ]);
  });

  it('say what total derivative was dropped', () => {
    const section = reductionSection(writerOf(fixture('einstein-cartan')));
    expect(ids(section)).toEqual(['reduced-lagrangian', 'reduced-gravity', 'total-derivative']);
    expect(section.passages[2]!.displays[0]!.tex).toBe('\\frac{F}{a^{3}} = M^{2} \\phi');
  });

  it('have a Friedmann form on an isotropic geometry only', () => {
    expect(friedmannSection(writerOf(fixture('anisotropic')))).toBeUndefined();
    const section = friedmannSection(writerOf(fixture('einstein-cartan')))!;
    expect(ids(section)).toEqual(['friedmann', 'rho-T', 'p-T', 'w-T']);
    expect(section.passages[1]!.displays[0]!.tex).toBe(
      '\\rho_{T} = 3 M^{2} H^{2} - 3 M^{2} \\phi^{2} + 3 M^{2} \\psi^{2}',
    );
  });

  it('leave a long equation of state as a quotient', () => {
    const section = friedmannSection(writerOf(fixture('quartic')))!;
    expect(section.passages.at(-1)!.displays.map((d) => d.tex)).toEqual(['w_{T} = \\frac{p_{T}}{\\rho_{T}}']);
  });

  it('say in which variables they are written', () => {
    const text = (variables?: string): string =>
      equationsSection(writerOf(fixture('conformal'), variables ? { variables } : {}))
        .passages.flatMap((p) => [...p.text, ...p.remarks].map(proseTex))
        .join(' ');
    expect(text('u,v')).toContain('only the variables in them are others');
    expect(text()).not.toContain('only the variables in them are others');
  });
});
