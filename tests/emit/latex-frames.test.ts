import katex from 'katex';
import { describe, expect, it } from 'vitest';
import { derivationTex, equationsTex, latexSections } from '../../src/emit/latex.js';
import { BARE, DECOUPLED, TEN, withFields } from './scalar-fields-theories.js';
import { CLASSES, faultsOf, logOf, WITHOUT_TEX } from './tex.js';

const IDS = ['scalars', 'frames', 'canonical'];

describe('sections on frames and scalars', () => {
  it('are there when asked for, and every display is accepted by KaTeX', async () => {
    for (const [text, omega2] of [
      [DECOUPLED, '1 + psi^2/M^2'],
      [TEN, undefined],
      [BARE, undefined],
    ] as const) {
      const d = await withFields(text, omega2);
      const sections = latexSections(d).filter((s) => IDS.includes(s.id));
      expect(sections.map((s) => s.id)).toEqual(IDS);
      for (const { displays } of sections.flatMap((s) => s.passages))
        for (const { tex } of displays)
          expect(
            () => katex.renderToString(tex, { displayMode: true, throwOnError: true, maxExpand: 1e6 }),
            tex,
          ).not.toThrow();
    }
  });

  it('have labels of their own, also in the file for manuscripts', async () => {
    const d = await withFields(DECOUPLED, '1 + psi^2/M^2');
    const tex = derivationTex(d);
    const labels = [...tex.matchAll(/\\label\{([^}]*)\}/g)].map((m) => m[1]!);
    expect(new Set(labels).size).toBe(labels.length);
    expect(equationsTex(d)).toContain('\\label{eq:decoupled:einstein-frame}');
    expect(equationsTex(d)).toContain('\\label{eq:decoupled:canonical-1}');
  });

  it('say that signs are no statement about the spectrum, and why there is no frame', async () => {
    expect(derivationTex(await withFields(DECOUPLED))).toContain('nothing about the particle spectrum');
    expect(derivationTex(await withFields(BARE))).toContain('There is no Einstein frame');
  });

  it.skipIf(WITHOUT_TEX).each(Object.entries(CLASSES))(
    'compile in %s without an overfull line',
    async (_, documentClass) => {
      for (const [text, omega2] of [
        [DECOUPLED, '1 + psi^2/M^2'],
        [TEN, '1 + phi^2/M^2'],
        [BARE, undefined],
      ] as const) {
        const tex = derivationTex(await withFields(text, omega2));
        expect(faultsOf(logOf(tex.replace(/^\\documentclass.*$/m, documentClass)))).toEqual([]);
      }
    },
    180_000,
  );
});
