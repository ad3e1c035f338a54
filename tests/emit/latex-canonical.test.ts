import { describe, expect, it } from 'vitest';
import { latexSections } from '../../src/emit/latex.js';
import { DECOUPLED, TEN, withFields } from './scalar-fields-theories.js';

async function displays(text: string, id: string): Promise<ReadonlyMap<string, string>> {
  const section = latexSections(await withFields(text)).find((s) => s.id === id)!;
  return new Map(section.passages.map((p) => [p.id, p.displays.map((d) => d.tex).join('\n')]));
}

describe('the section on canonical fields', () => {
  it('writes field, inverse and domain of each case', async () => {
    const of = await displays(DECOUPLED, 'canonical');
    expect(of.get('canonical-1-case-1')).toContain('s^{2} &= 6 M^{2}');
    expect(of.get('canonical-1-case-1')).toContain('\\psi = \\lambda \\tanh \\frac{z}{s} \\quad (x^{2} < 1)');
    expect(of.get('canonical-1-case-1')).toContain('\\psi = \\lambda \\coth \\frac{z}{s} \\quad (x^{2} > 1)');
    expect(of.get('canonical-1-case-2')).toContain('\\psi = \\lambda \\tan \\frac{z}{s}');
    expect(of.get('canonical-1-case-1-tanh')).toContain('\\Omega^{2} = 3 b_{3} \\cosh^{-2} \\frac{z}{s}');
    expect(of.get('canonical-1-case-1-coth')).toContain('\\Omega^{2} = -3 b_{3} \\sinh^{-2} \\frac{z}{s}');
    expect(of.get('canonical-1-current')).toContain('\\phi &= \\zeta | g |^{1/2}');
  });

  it('gives a linear field in the frame of the form, and says when nothing decouples', async () => {
    expect((await displays(DECOUPLED, 'canonical')).get('canonical-2-case-1')).toContain('z &= s \\psi');
    const ten = latexSections(await withFields(TEN)).find((s) => s.id === 'canonical')!;
    expect(JSON.stringify(ten.passages.map((p) => p.text))).toContain('frame of the form itself');
    expect(latexSections(await withFields(TEN)).some((s) => s.id === 'frames')).toBe(true);
  });
});
