import { describe, expect, it } from 'vitest';
import type { Derivation } from '../../src/derivation.js';
import { derive } from '../../src/derive.js';
import { derivationTex, equationsTex, latexSections } from '../../src/emit/latex.js';
import { branchViewer, constraintsSection, spinSection } from '../../src/emit/latex-constrained.js';
import { writerOf } from '../../src/emit/latex-display.js';
import { sumTex } from '../../src/emit/latex-math.js';
import { proseTex } from '../../src/emit/latex-text.js';
import { reportHtml } from '../../src/emit/report.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { theoryText, type Wanted } from '../oracle/pipeline.js';
import { typesetFaults } from './latex-constrained-faults.js';

const of = (wanted: Wanted): Derivation => derive(readTheory(theoryText(wanted), 'lee.yaml'));
const TELEPARALLEL = '-1/2 M^2 (1/4 T_{abc} T^{abc} + 1/2 T_{abc} T^{bac} - T_a T^a)';
const constrained = of({ lagrangian: TELEPARALLEL, constrain: ['R^a_{bcd}'], matter: ['dust'] });
const spinning = of({
  lagrangian: '1/2 M^2 R + M^2/4/gamma \\epsilon^{abcd} R_{abcd}',
  constants: ['q', 'gamma'],
  matter: ['dust', '{ spin: sigma, axial: q }'],
});
const averaged = of({ lagrangian: '1/2 M^2 R', matter: ['{ spin: s, average: weyssenhoff }'] });

describe('constraintsSection', () => {
  const section = constraintsSection(writerOf(constrained))!;
  const passage = (id: string) => section.passages.find((p) => p.id === id)!;
  const prose = (id: string): string => [...passage(id).text, ...passage(id).remarks].map(proseTex).join(' ');

  it('counts components and shows the constraints', () => {
    expect(prose('multipliers-1')).toContain(
      'Of the 36 independent components of its multiplier the symmetry leaves 4',
    );
    expect(passage('constraint-1').displays[0]!.tex).toBe('R^a{}_{bcd} = 0');
    expect(passage('multipliers-1').displays[0]!.tex).toContain('C_{4} &= \\dot{\\psi} + H \\psi');
  });

  it('shows solutions with roots, and the sign of k that they need', () => {
    expect(passage('branch-1').displays[0]!.tex).toContain('\\psi &= \\sqrt{k} \\frac{1}{a}');
    expect(prose('branch-1')).toContain('This needs $k > 0$. Either sign of a root will do.');
    expect(prose('branch-3')).toContain('$k < 0$');
    expect(passage('branch-3').displays[0]!.tex).toContain('\\sqrt{-k}');
    expect(prose('branch-1-equations')).toContain('do not fix $\\lambda_{3}$ and $\\lambda_{4}$');
  });

  it('is absent without constraints', () => {
    expect(constraintsSection(writerOf(spinning))).toBeUndefined();
    expect(spinSection(writerOf(constrained))).toBeUndefined();
  });
});

describe('branchViewer', () => {
  it('shows expressions of the ring of a branch', () => {
    const branch = constrained.constrained!.branches[0]!;
    const viewer = branchViewer(constrained, branch);
    const tex = sumTex(viewer.sum(branch.solution.get('psi')!, { divide: false }));
    expect(tex[0]!.head.join(' ')).toBe('\\sqrt{k} \\frac{1}{a}');
  });
});

describe('spinSection', () => {
  it('shows the interaction, the solution and the density over its denominator', () => {
    const section = spinSection(writerOf(spinning))!;
    const tex = section.passages.flatMap((p) => p.displays.map((d) => d.tex)).join('\n');
    expect(tex).toContain('q \\sigma \\psi');
    expect(tex).toContain('\\bigl( \\gamma^{2} + 1 \\bigr) \\rho_{\\mathrm{s}} =');
  });

  it('shows averages, also among matter', () => {
    const section = spinSection(writerOf(averaged))!;
    expect(section.passages.map((p) => p.id)).toEqual(['spin-average']);
    expect(derivationTex(averaged)).toContain('randomly oriented spins');
  });
});

describe('files', () => {
  it('contain the sections, typeset without fault, in any variables', () => {
    for (const d of [constrained, spinning, averaged]) {
      for (const variables of [undefined, 'u,v']) {
        const options = variables === undefined ? {} : { variables };
        expect(typesetFaults(latexSections(d, options))).toEqual([]);
      }
      expect(reportHtml(d)).toContain('</html>');
    }
    expect(equationsTex(constrained)).toContain('eq:outer-mole:branch-1-lagrangian');
    expect(equationsTex(spinning)).toContain('eq:outer-mole:spin-density');
  });
});
