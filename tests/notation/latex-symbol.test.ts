import katex from 'katex';
import { describe, expect, it } from 'vitest';
import { renderDiagnostic } from '../../src/notation/diagnostics.js';
import { latexFault, latexName, latexPower } from '../../src/notation/latex-symbol.js';
import { plainPassage } from '../../src/notation/passage.js';
import { GREEK } from '../../src/notation/tokens.js';

const fault = (text: string): string => {
  const d = latexFault(plainPassage(text, 'L'));
  return d === undefined ? '' : renderDiagnostic(d);
};
const typesets = (latex: string): void => {
  expect(() => katex.renderToString(latex, { throwOnError: true, strict: 'error' })).not.toThrow();
};

describe('latexName', () => {
  it.each([
    ['c0', 'c_{0}'],
    ['c', 'c'],
    ['M', 'M'],
    ['alpha_1', '\\alpha_{1}'],
    ['alpha1', '\\alpha_{1}'],
    ['Lambda', '\\Lambda'],
    ['rho_dust', '\\rho_{\\mathrm{dust}}'],
    ['rho_chi', '\\rho_{\\chi}'],
    ['rho_x', '\\rho_{x}'],
    ['mass', '\\mathrm{mass}'],
    ['c12', 'c_{12}'],
    ['c0_max', 'c_{0,\\mathrm{max}}'],
    ['c_1_2', 'c_{1,2}'],
    ['a__b', 'a_{b}'],
    ['c_', 'c'],
    ['b1c', '\\mathrm{b1c}'],
    ['Alpha', '\\mathrm{Alpha}'],
    ['omicron', '\\mathrm{omicron}'],
    ['constructor', '\\mathrm{constructor}'],
  ])('%s → %s', (name, latex) => {
    expect(latexName(name)).toBe(latex);
    typesets(latex);
    expect(fault(latex)).toBe('');
  });

  it('every Greek name typesets', () => {
    for (const name of GREEK) typesets(latexName(name));
  });
});

describe('latexFault', () => {
  it.each([
    '\\alpha_0',
    "c'",
    "c_{1}''",
    '\\mathcal{M}_{\\mathrm{Pl}}^{2}',
    '\\hat{\\mathsf c}_a',
    '\\bar{x}\\hat{c}',
    'x^\\ast_{\\mathrm{eff}}',
    '{c_1}_2',
    'c_{a,b}',
    '\\widetilde{M}^{\\prime}',
    '\\hbar',
    '\\mathrm M',
    '\\hat 1',
  ])('%s may be used', (latex) => {
    expect(fault(latex)).toBe('');
    typesets(latex);
    typesets(latexPower(latex, 2));
  });

  it('shows the place of what is refused', () => {
    expect(fault('c_{\\def\\x}')).toBe(
      [
        'L:1:4: error: \\def is not allowed in a LaTeX name',
        '    c_{\\def\\x}',
        '       ^^^^',
        'hint: allowed are Greek letters and \\mathrm, \\mathcal, \\mathsf, \\mathbf, \\hat, \\tilde, \\bar and their like',
      ].join('\n'),
    );
  });

  it.each([
    ['}c{', '} closes no brace'],
    ['{c', '{ is never closed'],
    ['c_1_2', 'a second subscript'],
    ['c^1^2', 'a second superscript'],
    ["c'^2", 'a second superscript'],
    ['c_', '_ lacks its argument'],
    ['c_}', 'is not allowed'],
    ['$x$', '"$" is not allowed'],
    ['c%', '"%" is not allowed'],
    ['a & b', '"&" is not allowed'],
    ['<b>', '"<" is not allowed'],
    ['c\\\\', 'is not allowed'],
    ['c\\', 'is not allowed'],
    ['\\input{x}', '\\input is not allowed'],
    ['\\href{x}{y}', '\\href is not allowed'],
    ['\\mathrm', '\\mathrm needs an argument in braces'],
    ['\\hat_', '\\hat needs an argument in braces'],
    ['c_\\hat{x}', '\\hat as a script needs braces around it'],
    ['\\boldsymbol{c}', '\\boldsymbol is not allowed'],
    ['\\omicron', '\\omicron is not allowed'],
    ['cé', 'is not allowed'],
    ['c#1', '"#" is not allowed'],
    ['', 'the LaTeX name has no letter'],
    ['{}', 'the LaTeX name has no letter'],
    ['x'.repeat(101), 'more than 100 characters'],
    ['{{{{{{{{{x}}}}}}}}}', 'nested more than 8 deep'],
  ])('%j: %s', (latex, message) => {
    expect(fault(latex)).toContain(message);
  });
});

describe('latexPower', () => {
  it('puts brackets where TeX would see two superscripts', () => {
    expect(latexPower('M', 1)).toBe('M');
    expect(latexPower('M', -2)).toBe('M^{-2}');
    expect(latexPower("c'", 2)).toBe("(c')^{2}");
    expect(latexPower('c^{*}', 2)).toBe('(c^{*})^{2}');
  });
});
