import katex from 'katex';
import { describe, expect, it } from 'vitest';
import { evaluate } from '../../src/algebra/collect.js';
import { divideRational, printRational, type Rational } from '../../src/algebra/rational.js';
import { viewerOf } from '../../src/emit/display.js';
import { derivationTex, equationsTex, type LatexDisplay, latexSections, type Passage } from '../../src/emit/latex.js';
import { rateTex, symbolTex } from '../../src/emit/latex-math.js';
import { displayPoint } from './display-point.js';
import { GoldenFolder } from './golden.js';
import { FIXTURES, fixture } from './latex-fixtures.js';
import { CLASSES, faultsOf, logOf, WITHOUT_TEX } from './tex.js';
import { sidesOf, texValue } from './tex-value.js';

const passagesOf = (name: Parameters<typeof fixture>[0], variables?: string): Map<string, Passage> =>
  new Map(
    latexSections(fixture(name), variables ? { variables } : {}).flatMap((s) =>
      s.passages.map((p) => [p.id, p] as const),
    ),
  );

/** Value of the left and of the right side of an equation that may be spread over several displays. */
function sides(displays: readonly LatexDisplay[], symbols: Map<string, Rational>): [left: string, right: string] {
  const [first, ...parts] = displays.map((d) => sidesOf(d.copyTex));
  for (const { left, right } of parts) symbols.set(left, texValue(right, symbols));
  return [printRational(texValue(first!.left, symbols)), printRational(texValue(first!.right, symbols))];
}

const golden = new GoldenFolder('latex');

describe.each(FIXTURES)('LaTeX of %s', (name) => {
  const derivation = fixture(name);
  const keys = [undefined, ...derivation.geometry.variables.map((v) => v.key)];

  it.each(keys)('read back from the file, has the values of the derivation in the variables %s', (variables) => {
    const viewer = viewerOf(derivation, variables);
    const { ring, display } = displayPoint(derivation, viewer, 5);
    const passages = passagesOf(name, variables);
    const symbols = new Map(
      [...viewer.symbols.values()].map((s) => [symbolTex(s), display.get(s.generator)!] as const),
    );
    symbols.set('N', { num: 1n, den: 1n });
    const compare = (id: string, left: string, value: Rational): void => {
      const known = new Map(symbols).set(left, value);
      const [l, r] = sides(passages.get(id)!.displays, known);
      expect(r, id).toBe(l);
    };
    for (const [q, e] of derivation.equations) {
      const { latex } = derivation.geometry.fields.find((f) => f.name === q)!;
      compare(`equation-${q}`, `E_{${latex}}`, evaluate(e, ring));
    }
    compare('reduced-lagrangian', 'L', evaluate(derivation.lagrangian, ring));
    if (derivation.friedmann) {
      compare('rho-T', '\\rho_{T}', evaluate(derivation.friedmann.rhoT, ring));
      compare('p-T', 'p_{T}', evaluate(derivation.friedmann.pT, ring));
      const [shown] = passages.get('w-T')?.displays ?? [];
      const quotient = shown?.tex.split(' = ')[2];
      const [p, rho] = [evaluate(derivation.friedmann.pT, ring), evaluate(derivation.friedmann.rhoT, ring)];
      if (quotient !== undefined)
        expect(printRational(texValue(quotient, symbols))).toBe(printRational(divideRational(p, rho)));
    }
  });

  it('has displays that KaTeX accepts', () => {
    for (const variables of keys)
      for (const passage of passagesOf(name, variables).values())
        for (const { tex, copyTex } of passage.displays)
          for (const source of [tex, copyTex.replace(/\\label\{[^}]*\}/, '')]) {
            const options = { displayMode: true, throwOnError: true, strict: 'error', maxExpand: 1e6 } as const;
            expect(() => katex.renderToString(source, { ...options, output: 'mathml' }), source).not.toThrow();
          }
  });

  it('has formulas in its text that KaTeX accepts', () => {
    for (const { text, remarks } of passagesOf(name).values())
      for (const piece of [...text, ...remarks].flat())
        if (typeof piece !== 'string')
          expect(
            () => katex.renderToString(piece.math, { throwOnError: true, strict: 'error' }),
            piece.math,
          ).not.toThrow();
  });

  it('is ASCII with unique labels that carry the slug', () => {
    for (const tex of [derivationTex(derivation), equationsTex(derivation)]) {
      expect(/^[ -~\n]*$/.test(tex)).toBe(true);
      const labels = [...tex.matchAll(/\\label\{([^}]*)\}/g)].map((m) => m[1]!);
      expect(new Set(labels).size).toBe(labels.length);
      for (const label of labels)
        expect(label).toMatch(new RegExp(`^eq:${derivation.theory.slug}:[A-Za-z0-9-]+(:\\d+)?$`));
    }
  });

  it('says where the equivalence holds', () => {
    if (derivation.scalarTensor.form === 'none') return;
    expect(derivationTex(derivation).replace(/\s+/g, ' ')).toContain(
      'holds on the homogeneous and isotropic background',
    );
  });

  it.skipIf(WITHOUT_TEX).each(Object.entries(CLASSES))(
    'compiles in %s without an overfull line',
    (_, documentClass) => {
      const long = name === 'quartic' ? 'u,v' : undefined;
      const tex = derivationTex(derivation, long ? { variables: long } : {});
      expect(tex.match(/^\\documentclass.*$/gm)).toEqual(['\\documentclass{article}']);
      expect(faultsOf(logOf(tex.replace(/^\\documentclass.*$/m, documentClass)))).toEqual([]);
    },
    120_000,
  );

  it.skipIf(WITHOUT_TEX).each(Object.entries(CLASSES))(
    'has fragments that can be input into a manuscript of %s with three-digit numbers',
    (_, documentClass) => {
      const manuscript = [
        documentClass,
        '\\usepackage{amsmath}',
        '\\begin{document}',
        '\\setcounter{equation}{500}',
        'Text. \\input{equations}',
        '\\end{document}',
      ].join('\n');
      expect(faultsOf(logOf(manuscript, { 'equations.tex': equationsTex(derivation) }))).toEqual([]);
    },
    120_000,
  );
});

describe('golden files', () => {
  it.each(['with-relations', 'einstein-cartan', 'conformal', 'anisotropic'] as const)('derivation of %s', (name) => {
    golden.expect(`${name}.tex`, derivationTex(fixture(name)));
  });

  it.each([
    ['ten-couplings', undefined],
    ['ten-couplings', 'u,v'],
    ['ten-couplings', 'h,f'],
    ['awkward', undefined],
  ] as const)('equations of %s in the variables %s', (name, variables) => {
    const suffix = variables === undefined ? '' : `-${variables.replace(',', '')}`;
    golden.expect(`${name}${suffix}-equations.tex`, equationsTex(fixture(name), variables ? { variables } : {}));
  });

  it('have no orphans', () => {
    expect(golden.orphans()).toEqual([]);
  });
});

describe('the document', () => {
  it('does not contain commands of a theory name', () => {
    const tex = derivationTex(fixture('awkward'));
    expect(tex).not.toContain('\\input{');
    expect(tex).toContain('\\textbackslash{}input\\{x\\}');
  });

  it('writes the equations of Einstein-Cartan theory as a textbook does', () => {
    const passages = passagesOf('einstein-cartan');
    const shown = (id: string): string =>
      passages
        .get(id)!
        .displays.map((d) => d.tex)
        .join('\n');
    expect(shown('equation-N')).toBe(
      '\\begin{split}\n  \\frac{E_{N}}{a^{3}} &= 3 M^{2} \\phi^{2} - 3 M^{2} \\psi^{2} + 3 M^{2} \\frac{k}{a^{2}} \\\\\n  &\\quad {}- \\frac{\\rho_{\\mathrm{dust}}}{a^{3}} = 0\n\\end{split}',
    );
    expect(shown('equation-phi')).toBe('\\frac{E_{\\phi}}{a^{3}} = -6 M^{2} H + 6 M^{2} \\phi = 0');
    expect(shown('friedmann')).toContain('3 M^{2} \\Bigl( H^{2} + \\frac{k}{a^{2}} \\Bigr) &= \\rho + \\rho_{T}');
    expect(shown('friedmann')).toContain(rateTex('H'));
    expect(shown('w-T')).toBe(
      'w_{T} = \\frac{p_{T}}{\\rho_{T}} = \\frac{-2 \\dot{H} - 3 H^{2} + 2 \\dot{\\phi} + 3 \\phi^{2} - 3 \\psi^{2}}{3 (H^{2} - \\phi^{2} + \\psi^{2})}',
    );
    const screening = passages.get('screening')!;
    expect(screening.displays).toEqual([]);
    expect(JSON.stringify(screening.text)).toContain('does not drop out');
  });

  it('refuses variables that the geometry lacks', () => {
    expect(() => derivationTex(fixture('anisotropic'), { variables: 'u,v' })).toThrow(RangeError);
  });
});
