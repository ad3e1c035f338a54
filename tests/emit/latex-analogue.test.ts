import { describe, expect, it } from 'vitest';
import type { Section } from '../../src/emit/latex.js';
import { analogueSection, checksSection, couplingsSection } from '../../src/emit/latex-analogue.js';
import { writerOf } from '../../src/emit/latex-display.js';
import { proseTex } from '../../src/emit/latex-text.js';
import { fixture } from './latex-fixtures.js';

const all = (section: Section): string =>
  section.passages
    .flatMap((p) => [...p.text.map(proseTex), ...p.displays.map((d) => d.tex), ...p.remarks.map(proseTex)])
    .join('\n');

describe('the metric analogue', () => {
  it('has the action, its functions, its domain and what it misses', () => {
    const section = analogueSection(writerOf(fixture('conformal')));
    expect(section.passages.map((p) => p.id)).toEqual([
      'scalar-tensor',
      'scalar-tensor-terms',
      'G4',
      'kinetic',
      'current',
      'potential',
      'validity',
      'curvature-obstruction',
    ]);
    const text = all(section);
    expect(text).toContain('G_{4} = -2 a_{4} \\phi^{2}');
    expect(text).toContain('K_{\\phi \\phi} &= 24 a_{4}');
    expect(text).toContain('J_{\\phi} &= 16 a_{4} \\psi^{2}');
    expect(text).toContain('The form holds at $k = 0$');
    expect(text).toContain('say nothing about the particle spectrum of the torsion theory');
    expect(text).toContain('\\Delta = 36 a_{4} \\frac{k}{a^{2}} \\phi^{2}');
  });

  it('keeps the scalars in their own variables', () => {
    const plain = all(analogueSection(writerOf(fixture('ten-couplings'))));
    expect(all(analogueSection(writerOf(fixture('ten-couplings'), { variables: 'u,v' })))).toBe(plain);
  });

  it('leaves out of the action what vanishes', () => {
    const [action] = analogueSection(writerOf(fixture('einstein-cartan'))).passages;
    expect(action!.displays[0]!.tex).toBe(
      '\\frac{\\mathcal{L}_{\\mathrm{ST}}}{\\sqrt{-g}} = \\sqrt{| J_{\\mu} J^{\\mu} |} - V + \\mathcal{L}_{\\mathrm{m}}',
    );
  });

  it('gives the reason and the terms when there is none', () => {
    const quartic = analogueSection(writerOf(fixture('quartic')));
    expect(all(quartic)).toContain('There is no bi-scalar form: ');
    expect(quartic.passages[0]!.displays.length).toBeGreaterThan(0);
    expect(analogueSection(writerOf(fixture('anisotropic'))).passages[0]!.displays).toEqual([]);
  });
});

describe('couplings', () => {
  it('are listed in the combinations that the background sees', () => {
    const section = couplingsSection(writerOf(fixture('ten-couplings')));
    expect(section.passages.map((p) => p.id)).toEqual(['combinations', 'screening']);
    const [first, second] = section.passages;
    const rows = first!.displays.map((d) => d.tex).join('\n');
    expect(rows.match(/\\mathcal\{C\}_/g)).toHaveLength(fixture('ten-couplings').combinations.length);
    expect(second!.displays[0]!.tex).toContain('6 a_{1} + 2 a_{2} + 2 a_{3} + 2 a_{4} + a_{5} + 2 a_{6} = 0');
  });

  it('cannot screen a curvature that no coupling multiplies', () => {
    const text = all(couplingsSection(writerOf(fixture('einstein-cartan'))));
    expect(text).toContain('does not drop out of the equations');
    expect(text).not.toContain('1 = 0');
  });
});

it('every check is in the list', () => {
  const d = fixture('conformal');
  const [passage] = checksSection(writerOf(d)).passages;
  expect(passage!.text).toHaveLength(d.checks.length + 1);
  expect(passage!.text.map(proseTex)[1]).toMatch(/^dd = 0/);
});
