import { describe, expect, it } from 'vitest';
import {
  commentText,
  enumerated,
  escapeText,
  math,
  prose,
  proseTex,
  withFormulas,
  withNames,
} from '../../src/emit/latex-text.js';

describe('plain text in LaTeX', () => {
  it.each([
    ['100% of {R} & #1 $x$ a_b', '100\\% of \\{R\\} \\& \\#1 \\$x\\$ a\\_b'],
    ['\\input{x}^2 ~', '\\textbackslash{}input\\{x\\}\\textasciicircum{}2 \\textasciitilde{}'],
    ['élan façade Ångström Ünï Erdős', '\\\'{e}lan fa\\c{c}ade \\r{A}ngstr\\"{o}m \\"{U}n\\"{\\i} Erd\\H{o}s'],
    ['ß Ł ø – — “x”', "\\ss{} \\L{} \\o{} -- --- ``x''"],
    ['αρΩ m² ≠ ½', '$\\alpha$$\\rho$$\\Omega$ m$^{2}$ $\\neq$ $\\tfrac{1}{2}$'],
    ['中 😀', '[U+4E2D] [U+1F600]'],
    ['two\nlines\u0007\u200b', 'two lines'],
  ])('%s', (text, expected) => {
    expect(escapeText(text)).toBe(expected);
  });

  it('is ASCII and has no command but those of the tables', () => {
    let everything = '';
    for (let code = 1; code < 0x2600; code++) everything += `${String.fromCodePoint(code)} `;
    const tex = escapeText(everything);
    expect(/^[ -~]*$/.test(tex)).toBe(true);
    expect(tex).not.toMatch(/\\(?:input|write|def|csname|catcode)/);
  });

  it('may be broken inside long words', () => {
    expect(escapeText('x'.repeat(40)).split('\\allowbreak{}').length).toBe(4);
    expect(escapeText('reparametrisation:')).toBe('reparametrisation:');
  });
});

describe('prose', () => {
  it('mixes text and formulas', () => {
    const p = prose`The scalars ${enumerated([math('\\phi'), math('\\psi'), 'x_1'])} are ${'50%'} of it.`;
    expect(proseTex(p)).toBe('The scalars $\\phi$, $\\psi$ and x\\_1 are 50\\% of it.');
  });

  it('finds the symbols in its own statements', () => {
    expect(proseTex(withFormulas('dρ_T/dt and E_N at k = 0, not kind'))).toBe(
      'd$\\rho_{T}$/dt and $E_{N}$ at $k$ = 0, not kind',
    );
    expect(proseTex(withNames('the rate phi, not philosophy', new Map([['phi', '\\phi']])))).toBe(
      'the rate $\\phi$, not philosophy',
    );
  });
});

it('a comment is ASCII on one line', () => {
  expect(commentText('Café\n% \\x 中')).toBe('Cafe % \\x');
});
