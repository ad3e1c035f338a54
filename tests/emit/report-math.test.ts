import { describe, expect, it } from 'vitest';
import { katexStyle, makeTypesetter } from '../../src/emit/report-math.js';

const faces = (style: string): string[] =>
  [...style.matchAll(/@font-face\{[^}]*font-family:(KaTeX_\w+);font-style:(\w+);font-weight:(\d+)/g)]
    .map(([, family, slant, weight]) => `${family} ${slant} ${weight}`)
    .sort();

describe('makeTypesetter', () => {
  it('lays out short formulas for the eye and for a reader aloud', () => {
    const { inline, display } = makeTypesetter();
    expect(inline('\\dot{\\phi}^{2}')).toMatch(/class="katex-mathml">.*class="katex-html"/);
    expect(display('x &= y')).toContain('source-only');
    expect(display('\\begin{split} x &= y \\end{split}')).toContain('katex-display');
    expect(inline('x')).not.toContain('<annotation');
  });

  it('makes MathML of long ones', () => {
    const long = Array.from({ length: 400 }, (_, i) => `a_{${i}} \\phi^{2}`).join(' + ');
    const markup = makeTypesetter().display(long);
    expect(markup).toContain('<math');
    expect(markup).not.toContain('katex-html');
  });

  it('stops laying out when the page would become heavy', () => {
    const { inline } = makeTypesetter();
    const formula = (n: number) => Array.from({ length: 60 }, (_, i) => `x_{${i + n}}`).join('+');
    const kinds = Array.from({ length: 120 }, (_, n) => inline(formula(n)).includes('katex-html'));
    expect(kinds[0]).toBe(true);
    expect(kinds.at(-1)).toBe(false);
    expect(kinds.lastIndexOf(true)).toBeLessThan(kinds.indexOf(false));
  });

  it('leaves displays out when there are far too many, but no formula in a line', () => {
    const { inline, display } = makeTypesetter();
    const formula = (n: number) => Array.from({ length: 180 }, (_, i) => `x_{${i}}^{${n}}`).join('+');
    const shown = Array.from({ length: 400 }, (_, n) => display(formula(n)).includes('<math'));
    expect(shown[0]).toBe(true);
    expect(shown.at(-1)).toBe(false);
    expect(display(formula(400))).toContain('the source is complete');
    expect(inline('x')).toContain('<math');
  });

  it('shows the source of what KaTeX does not know, as text', () => {
    expect(makeTypesetter().inline('\\unknown<b>')).toBe('<code class="source-only">\\unknown&lt;b&gt;</code>');
  });
});

describe('katexStyle', () => {
  it('embeds the faces that occur and refers to no file', () => {
    const { inline } = makeTypesetter();
    const plain = katexStyle(inline('x + 1'));
    expect(faces(plain)).toEqual(
      ['Main italic', 'Main normal', 'Math italic', 'Size1 normal'].map((f) => `KaTeX_${f} 400`),
    );
    expect(plain).not.toMatch(/url\((?!data:font\/woff2;base64,)/);
    const rich = faces(
      katexStyle(inline('\\mathcal{L} \\mathfrak{g} \\mathbb{R} \\mathsf{s} \\mathbf{v} \\Biggl( x \\Biggr)')),
    );
    for (const family of ['Caligraphic', 'Fraktur', 'AMS', 'SansSerif', 'Size4'])
      expect(
        rich.some((f) => f.startsWith(`KaTeX_${family} `)),
        family,
      ).toBe(true);
    expect(rich).toContain('KaTeX_Main normal 700');
    expect(rich.some((f) => f.startsWith('KaTeX_Typewriter'))).toBe(false);
  });

  it('knows the letters of MathML', () => {
    const style = katexStyle('<mi mathvariant="script">L</mi>');
    expect(faces(style)).toContain('KaTeX_Caligraphic normal 400');
    expect(style).toContain('math [mathvariant="script"]{font:normal 400 1em KaTeX_Caligraphic}');
  });
});
