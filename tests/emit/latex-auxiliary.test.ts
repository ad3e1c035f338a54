import { describe, expect, it } from 'vitest';
import { auxiliarySection } from '../../src/emit/latex-auxiliary.js';
import { writerOf } from '../../src/emit/latex-display.js';
import { proseTex } from '../../src/emit/latex-text.js';
import { branched, components, cubic, einsteinCartan, squared } from './every-k-fixtures.js';

const passages = (d: typeof squared) => auxiliarySection(writerOf(d))!.passages;
const tex = (d: typeof squared, id: string): string =>
  passages(d)
    .find((p) => p.id === id)!
    .displays.map((x) => x.tex)
    .join('\n');
const said = (d: typeof squared, id: string): string => {
  const p = passages(d).find((x) => x.id === id)!;
  return [...p.text, ...p.remarks].map(proseTex).join(' ');
};

describe('auxiliarySection', () => {
  it('is absent unless it was asked for', () => {
    expect(auxiliarySection(writerOf(einsteinCartan))).toBeUndefined();
  });

  it('says what the new field stands for, what must not vanish, and what comes out', () => {
    expect(tex(squared, 'auxiliary-fields')).toContain('\\chi = {{}^{3}\\!R} + 6 {(\\partial_{n} \\phi)}');
    expect(tex(squared, 'auxiliary-losses')).toContain('\\ell_{1}');
    expect(tex(squared, 'auxiliary-result')).toContain('G_{4} = \\tfrac{1}{2} M^{2} + 2 c \\chi');
    expect(tex(squared, 'auxiliary-result')).toContain('K_{\\chi \\chi}');
    expect(said(squared, 'auxiliary-result')).toContain('It holds for every curvature. Its equations were compared');
  });

  it('numbers branches, and gives the equation of a root', () => {
    expect(passages(branched).map((p) => p.id)).toContain('auxiliary-solutions-2');
    expect(tex(branched, 'auxiliary-solutions-2')).toContain('r^{2}');
    expect(said(branched, 'auxiliary-solutions-2')).toContain('verified by substitution');
  });

  it('gives the closed formula of a cubic, and why another field stays', () => {
    expect(tex(cubic, 'auxiliary-solutions')).toContain('\\sqrt[3]{');
    expect(said(cubic, 'auxiliary-solutions')).toContain('stays, since no rule integrates it out');
  });

  it('says at which rule the way to a metric form ends', () => {
    expect(said(components, 'auxiliary-result')).toContain('The rule expansion-for-curvature stops');
    expect(tex(components, 'auxiliary-fields')).toContain('\\chi_{1}');
  });
});
