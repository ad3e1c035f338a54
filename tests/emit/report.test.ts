import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import type { Derivation } from '../../src/derivation.js';
import { latexSections } from '../../src/emit/latex.js';
import { reportHtml } from '../../src/emit/report.js';
import { reasonsOf } from '../../src/emit/report-reasons.js';
import { escapeHtml } from '../../src/emit/report-text.js';
import { deriveText } from './emitted-module.js';

const GENERAL = `untwist: 1
name: Harbour light
constants: [c0, a1, a2, a3, a4, a5, a6, b1, b2, b3, spare]
scales: { M: mass }
lagrangian: |
  1/2 c0 M^2 R + a1 R^2 + a2 R_{ab} R^{ab} + a3 R_{ab} R^{ba}
  + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} + a6 R_{abcd} R^{cdab}
  + M^2 ( b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a )
impose: [ "a1 = 0", "a2 a3 = 1" ]
matter: [ dust, radiation, { vacuum: Lambda }, { fluid: chi, w: "1/5" } ]
symbols: { c0: '\\alpha_0' }
`;
const general = deriveText(GENERAL);
const page = reportHtml(general);
const bianchi = deriveText(`untwist: 1
name: Outer mole
constants: [b1]
scales: { M: mass }
lagrangian: "1/2 M^2 R + b1 T_a T^a"
matter: [ dust ]
geometry: bianchi-i
`);
const cubic = deriveText('untwist: 1\nname: Slack tide\nconstants: [g]\nlagrangian: "g R^3 + g T_a A^a R"\n');

const named = (d: Derivation, name: string): Derivation => ({ ...d, theory: { ...d.theory, name } });
/** Fails with the match rather than with the whole page. */
const found = (html: string, pattern: RegExp): string | undefined => pattern.exec(html)?.[0];
const count = (text: string, part: string | RegExp): number => text.split(part).length - 1;

describe('reportHtml', () => {
  it('is one file without a reference to another', () => {
    for (const html of [page, reportHtml(bianchi)]) {
      expect(html.startsWith('<!doctype html>')).toBe(true);
      expect(
        found(html, /<(link|img|iframe|object|embed|base|form)\b|@import|\ssrc=|url\((?!data:font\/woff2)/),
      ).toBeUndefined();
      for (const [, target] of html.matchAll(/href="([^"]*)"/g)) expect(target).toMatch(/^#step-/);
      expect(found(html, /(?<! xmlns=")https?:.{0,40}/)).toBeUndefined();
    }
  });

  it('allows its own script and nothing else', () => {
    const scripts = [...page.matchAll(/<script>([\s\S]*?)<\/script>/g)];
    expect(scripts.length).toBe(1);
    const hash = createHash('sha256').update(scripts[0]![1]!).digest('base64');
    const policy = /http-equiv="Content-Security-Policy" content="([^"]*)"/.exec(page)?.[1];
    expect(policy?.split('; ')).toEqual([
      "default-src 'none'",
      "style-src 'unsafe-inline'",
      'font-src data:',
      'img-src data:',
      `script-src 'sha256-${hash}'`,
      "base-uri 'none'",
      "form-action 'none'",
    ]);
    expect(found(page, /\son[a-z]+="/)).toBeUndefined();
  });

  it('shows every display with its source, and KaTeX knows all of them', () => {
    for (const d of [general, bianchi, cubic]) {
      const html = reportHtml(d);
      expect(found(html, /class="source-only"|katex-error/)).toBeUndefined();
      for (const { tex, copyTex, label } of latexSections(d).flatMap((s) => s.passages.flatMap((p) => p.displays))) {
        expect(tex).not.toBe('');
        expect(html).toContain(`id="${label}"`);
        expect(html).toContain(`\n${escapeHtml(copyTex)}</pre>`);
      }
      const buttons = [...html.matchAll(/data-copies="([^"]*)"/g)].map(([, id]) => id);
      expect(buttons.length).toBeGreaterThan(5);
      for (const id of buttons) expect(html).toContain(`<pre id="${id}">`);
    }
  });

  it('gives every step its number, reasons and place in the contents', () => {
    latexSections(general).forEach(({ id, title }, i) => {
      expect(page).toContain(`<a href="#step-${id}">${escapeHtml(title)}</a>`);
      expect(page).toContain(`<h2><span class="number">${i + 1}</span>${escapeHtml(title)}</h2>`);
      expect(reasonsOf(id, general).allowed.length, id).toBeGreaterThan(0);
    });
    expect(count(page, 'Why this is allowed')).toBe(latexSections(general).length);
  });

  it('uses an id once', () => {
    for (const d of [general, bianchi, cubic]) {
      const ids = [...reportHtml(d).matchAll(/\sid="([^"]*)"/g)].map(([, id]) => id);
      expect(new Set(ids).size).toBe(ids.length);
    }
  });

  it('lists invariants, symbols, warnings, conditions and every check with its outcome', () => {
    const rows = (head: string) => new RegExp(`<th>${head}</th>[\\s\\S]*?</table>`).exec(page)?.[0] ?? '';
    expect(count(rows('Product of tensors'), '<tr>')).toBe(general.invariants.length);
    expect(count(rows('Symbol'), '<tr>')).toBe(general.theory.symbols.length);
    expect(rows('Symbol')).toContain('constant, eliminated');
    expect(count(page, '✓ holds')).toBe(general.checks.length);
    expect(page).toContain('<dd>all');
    expect(general.theory.warnings.length).toBeGreaterThan(0);
    for (const { message } of general.theory.warnings) expect(page).toContain(escapeHtml(message));
    expect(page).toContain('eq:harbour-light:conditions');
    expect(page).toContain('eq:harbour-light:noether');
    const failing = { ...general, checks: [{ name: 'a check', holds: false, detail: 'by intent' }] };
    expect(reportHtml(failing)).toContain('✗ fails');
    expect(reportHtml(failing)).toContain('1 of 1 fail');
  });

  it('says how far the metric analogue goes', () => {
    const text = page.replace(/<[^>]*>/g, ' ').replace(/\s+/g, ' ');
    expect(text).toMatch(/on the homogeneous and isotropic background/);
    expect(text).toMatch(/particle spectrum of the torsion theory/);
    expect(page).toContain('two scalars, for k = 0');
    expect(reportHtml(bianchi)).toContain('none in this class');
  });

  it('prints the equations in other variables, and refuses unknown ones', () => {
    const other = reportHtml(general, { variables: 'u,v' });
    expect(other).toContain('eq:harbour-light:variables');
    expect(other).not.toBe(page);
    expect(reportHtml(general, { variables: '' })).toBe(page);
    expect(() => reportHtml(general, { variables: 'x,y' })).toThrow(RangeError);
  });

  it('is the same text every time and of moderate size', () => {
    expect(reportHtml(deriveText(GENERAL))).toBe(page);
    expect(page.length).toBeLessThan(2_500_000);
    expect(page.length).toBeGreaterThan(100_000);
  });

  it('treats the text of a user as text', () => {
    const name = '</title></script><script>alert(1)</script><b onclick="x()">&amp; " \' \u202e<!-- ';
    const html = reportHtml(named(cubic, name));
    expect(count(html, /<script/)).toBe(1);
    expect(html).not.toContain('<b onclick');
    expect(html).not.toContain('\u202e');
    expect(html).not.toContain('<!--');
    expect(html).toContain(
      '&lt;/title&gt;&lt;/script&gt;&lt;script&gt;alert(1)&lt;/script&gt;&lt;b onclick=&quot;x()&quot;&gt;',
    );
    const warned: Derivation = {
      ...cubic,
      theory: {
        ...cubic.theory,
        warnings: [{ code: 'x', severity: 'warning', message: '<i>odd</i>', hint: '<script>1</script>' }],
      },
    };
    expect(reportHtml(warned)).toContain('&lt;i&gt;odd&lt;/i&gt; (&lt;script&gt;1&lt;/script&gt;)');
    const symbols = cubic.theory.symbols.map((s) => ({ ...s, latex: '\\href{javascript:alert(1)}{g}<b>' }));
    const linked = reportHtml({ ...cubic, theory: { ...cubic.theory, symbols } });
    expect(found(linked, /href="javascript|<b>/)).toBeUndefined();
  });
});
