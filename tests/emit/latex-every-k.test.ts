import { describe, expect, it } from 'vitest';
import { equationsTex, latexSections } from '../../src/emit/latex.js';
import { writerOf } from '../../src/emit/latex-display.js';
import { everyKSection, formSteps, reasonsFor, solutionLines } from '../../src/emit/latex-every-k.js';
import { proseTex } from '../../src/emit/latex-text.js';
import { reportHtml } from '../../src/emit/report.js';
import { ALL, einsteinCartan, quadratic, steep } from './every-k-fixtures.js';
import { typesetFaults } from './latex-constrained-faults.js';

const sectionOf = (d: typeof quadratic) => everyKSection(writerOf(d))!;
const passage = (d: typeof quadratic, id: string) => sectionOf(d).passages.find((p) => p.id === id);
const said = (d: typeof quadratic, id: string): string => {
  const p = passage(d, id)!;
  return [...p.text, ...p.remarks].map(proseTex).join(' ');
};

describe('everyKSection', () => {
  it('shows the Lagrangian in components with its constraint, and what the components are', () => {
    expect(passage(einsteinCartan, 'constraint-vector')!.displays[0]!.tex).toBe(
      '\\frac{\\mathcal{L}_{n}}{\\sqrt{-g}} = 3 M^{2} A_1 + 3 M^{2} A_4 + \\lambda (n_{\\mu} n^{\\mu} + 1)',
    );
    expect(passage(einsteinCartan, 'constraint-vector-components')!.displays[0]!.tex).toContain(
      'A_4 &= \\tfrac{1}{6} {{}^{3}\\!R} + \\phi^{2} - \\psi^{2}',
    );
  });

  it('says where the rules stop and why, with the terms', () => {
    expect(said(einsteinCartan, 'rules')).toContain('The rule spatial-curvature stops: curvature obstruction');
    expect(passage(einsteinCartan, 'rules')!.displays[0]!.tex).toBe('\\Delta = \\tfrac{1}{2} M^{2} {{}^{3}\\!R}');
    expect(said(steep, 'rules')).toContain('The rule expansion-for-curvature stops');
    expect(passage(steep, 'current-domain')).toBeUndefined();
  });

  it('solves for couplings, or says that none will do', () => {
    expect(said(einsteinCartan, 'every-k-conditions')).toContain('No choice of the couplings');
    expect(passage(quadratic, 'every-k-conditions')!.displays[0]!.tex).toContain('b_{3} &=');
    expect(passage(quadratic, 'screening-solved')!.displays[0]!.tex).toContain('c_{0} &= 0');
  });

  it('names branch, domain and zeros of the current', () => {
    expect(said(quadratic, 'current-domain')).toContain('where all components vanish: $\\phi = 0$ and $');
    expect(said(einsteinCartan, 'current-domain')).toContain('no common zero');
    expect(passage(einsteinCartan, 'current-domain')!.displays[0]!.tex).toBe('F = 2 M^{2} \\phi');
  });

  it('shows the connection integrated out and the metric form that is left', () => {
    expect(passage(einsteinCartan, 'integrated-form')!.displays[0]!.tex).toContain(
      '= \\tfrac{1}{2} M^{2} \\mathring{R}',
    );
    expect(solutionLines(einsteinCartan, einsteinCartan.everyK!.integrated!.branch.steps).flat()).toEqual([
      '\\phi = \\tfrac{1}{3} \\theta_{n}',
      '\\psi = 0',
    ]);
  });

  it('is a section of the documents and a step of the report, and fits the column', () => {
    expect(latexSections(quadratic).map((s) => s.id)).toContain('every-k');
    expect(equationsTex(quadratic)).toContain('\\label{eq:outer-mole:constraint-vector}');
    expect(reportHtml(quadratic, {})).toContain('<h2><span class="number">7</span>Every spatial curvature</h2>');
    for (const d of Object.values(ALL)) expect(typesetFaults(latexSections(d))).toEqual([]);
  }, 120_000);
});

describe('formSteps, reasonsFor', () => {
  it('list rules in order, and each reason once', () => {
    expect(proseTex(formSteps(einsteinCartan.everyK!.metric!))).toContain(
      'expansion-by-parts and unit-timelike-vector',
    );
    expect(reasonsFor(['gaussian-field', 'gaussian-field'])).toHaveLength(1);
    expect(proseTex(reasonsFor(['spatial-curvature'])[0]!)).toMatch(
      /^Rule spatial-curvature: \$.*\$, since .* \(derived here\)\.$/,
    );
  });
});
