import { describe, expect, it } from 'vitest';
import { viewerOf } from '../../src/emit/display.js';
import { inlineTex, sumTex } from '../../src/emit/latex-math.js';
import { extentOf, widthOf } from '../../src/emit/latex-width.js';
import { FIXTURES, fixture } from './latex-fixtures.js';
import { logOf, WITHOUT_TEX } from './tex.js';

const GREEK =
  'alpha beta gamma delta epsilon varepsilon zeta eta theta vartheta iota kappa lambda mu nu xi pi varpi rho varrho sigma varsigma tau upsilon phi varphi chi psi omega Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi Omega'.split(
    ' ',
  );
const SIGNS = 'prime ell hbar star ast dagger parallel perp pm partial mu'.split(' ');
const ACCENTS =
  'hat tilde bar dot ddot dddot vec check breve acute grave overline underline widehat widetilde mathring'.split(' ');
const FACES = 'mathrm mathcal mathsf mathbf mathit mathtt boldsymbol'.split(' ');

const letters = [...'abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ0123456789'];
const samples = (): string[] => [
  ...[...GREEK, ...SIGNS].flatMap((m) => [`\\${m}`, `x_{\\${m}}`, `\\${m}^{12}`, `x_{y_{\\${m}}}`]),
  ...letters.flatMap((c) => [c, `x_{${c}}`, `x^{${c}}`, `x_{y_{${c}}}`, `${c}^{2}`]),
  ...FACES.flatMap((f) =>
    letters.flatMap((c) => (f === 'mathcal' && !/[A-Z]/.test(c) ? [] : [`\\${f}{${c}}`, `x_{\\${f}{${c}}}`])),
  ),
  ...ACCENTS.flatMap((m) => [`\\${m}{x}`, `\\${m}{A}^{2}`, `\\${m}{\\phi}_{1}`]),
  "c'",
  "(c')^{2}",
  '\\bigl( a + b \\bigr) \\phi',
  '\\Bigl( \\frac{a}{b} \\Bigr)',
  '\\frac{\\mathcal{L}_{\\mathrm{ST}}}{\\sqrt{-g}} = G_{4} \\mathring{R} + \\sqrt{| J_{\\mu} J^{\\mu} |} - V',
  '\\tfrac{1}{2} R^{a}{}_{bcd} \\, e^{c} \\wedge e^{d}, \\quad \\epsilon_{0123} = +1',
  '\\frac{\\frac{1}{2} a}{b^{2}} \\times 3',
  'E_{N}^{[12]} + \\phi^{(4)} + \\text{ab c}',
  ...FIXTURES.flatMap((name) => {
    const d = fixture(name);
    const viewer = viewerOf(d);
    return [...d.equations.values()].flatMap((e) =>
      sumTex(viewer.sum(e))
        .slice(0, 25)
        .map((t) => inlineTex([t])),
    );
  }),
];

describe('estimated extents', () => {
  it.skipIf(WITHOUT_TEX)(
    'are never less than what TeX sets, and rarely much more',
    () => {
      const list = samples();
      const body = list.map(
        (tex) => `\\setbox0\\hbox{$\\displaystyle ${tex}$}\\typeout{@@\\the\\wd0,\\the\\ht0,\\the\\dp0}`,
      );
      const log = logOf(
        [
          '\\documentclass{article}',
          '\\usepackage{amsmath}',
          '\\begin{document}',
          ...body,
          'x',
          '\\end{document}',
        ].join('\n'),
      );
      const real = [...log.matchAll(/@@([\d.]+)pt,([-\d.]+)pt,([-\d.]+)pt/g)].map((m) => m.slice(1).map(Number));
      expect(real.length).toBe(list.length);
      const short: string[] = [];
      let estimated = 0;
      let set = 0;
      list.forEach((tex, i) => {
        const { width, height, depth } = extentOf(tex);
        const [w, h, d] = real[i]!;
        if (width < w!) short.push(`${tex}: width ${width} < ${w}`);
        if (height < h! - 1.5 || depth < d! - 2) short.push(`${tex}: ${height}, ${depth} < ${h}, ${d}`);
        if (tex.length > 30) {
          estimated += width;
          set += w!;
        }
      });
      expect(short).toEqual([]);
      expect(estimated / set).toBeLessThan(1.1);
    },
    60_000,
  );

  it('add up', () => {
    expect(widthOf('')).toBe(0);
    expect(widthOf('a_{1} + 2 a_{2}')).toBeCloseTo(widthOf('a_{1}') + widthOf('+') + widthOf('2 a_{2}'), 6);
    expect(widthOf('a & b \\\\')).toBeCloseTo(widthOf('a b'), 6);
  });
});
