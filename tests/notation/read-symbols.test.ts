import { describe, expect, it } from 'vitest';
import { renderDiagnostic } from '../../src/notation/diagnostics.js';
import { theory, theoryErrors, theoryFile } from './rendered.js';

const R4 = 'lagrangian: R^2';

describe('constants and scales', () => {
  it('are listed in the order of declaration, with role, dimension and LaTeX', () => {
    const text = theoryFile(
      'constants: [c0, { g: mass^2, l: mass^-1 }, constructor]',
      'scales: { M: mass, mu: "mass^{2}" }',
      'matter: [{ vacuum: Lambda }]',
      `symbols: { c0: '\\alpha_0', Lambda: "\\\\Lambda'" }`,
      'lagrangian: c0 g l M mu constructor R',
    );
    expect(theory(text).symbols).toEqual([
      { name: 'c0', role: 'constant', dimension: 0, latex: '\\alpha_0' },
      { name: 'g', role: 'constant', dimension: 2, latex: 'g' },
      { name: 'l', role: 'constant', dimension: -1, latex: 'l' },
      { name: 'constructor', role: 'constant', dimension: 0, latex: '\\mathrm{constructor}' },
      { name: 'M', role: 'scale', dimension: 1, latex: 'M' },
      { name: 'mu', role: 'scale', dimension: 2, latex: '\\mu' },
      { name: 'Lambda', role: 'vacuum', dimension: 4, latex: "\\Lambda'" },
    ]);
  });

  it('every fault of the declarations is shown, and nothing that follows from it', () => {
    expect(
      theoryErrors(
        theoryFile('constants:', '  - b1', '  - b1', '  - k', '  - c d', '  - { q: length }', 'lagrangian: c R'),
      ),
    ).toBe(
      [
        'test.yaml:5:5: error: b1 is declared twice',
        '      - b1',
        '        ^^',
        'hint: it is a constant already; keep one of them',
        'test.yaml:6:5: error: the name k is reserved for the spatial curvature',
        '      - k',
        '        ^',
        'hint: choose another, such as k1',
        'test.yaml:7:5: error: "c d" is not a name',
        '      - c d',
        '        ^^^',
        'hint: a name is a letter followed by letters, digits and underscores, such as b1 or alpha_1',
        'test.yaml:8:10: error: "length" is not a dimension',
        '      - { q: length }',
        '             ^^^^^^',
        'hint: a dimension is mass, mass^2, mass^-1, … or 1',
      ].join('\n'),
    );
  });

  it.each([
    ['scales: { M: mass, M1: kg }', '"kg" is not a dimension'],
    ['scales: [M]', 'scales must be a mapping but is a list'],
    ['constants: c0', 'constants must be a list but is a text'],
    ['constants: [[c0]]', 'a constant must be a text but is a list'],
    ['constants: [M]\nscales: { M: mass }', 'M is declared twice'],
    ['constants: [__proto__]', '"__proto__" is not a name'],
    [`constants: [${Array.from({ length: 402 }, (_, i) => `c${i}`)}]`, 'more than 400 constants, scales and tensors'],
    ['symbols: { zz: q }', 'symbols renames zz, which is not declared'],
    ["constants: [c0]\nsymbols: { c0: '\\def' }", '\\def is not allowed in a LaTeX name'],
    ['constants: [c0]\nsymbols: { c0: [x] }', 'the LaTeX of c0 must be a text but is a list'],
  ])('%s: %s', (lines, message) => {
    const text = theoryErrors(theoryFile(lines, R4));
    expect(text).toContain(`error: ${message}\n`);
    expect(text.match(/error:/g)).toHaveLength(1);
  });

  it('a LaTeX name is placed inside its quotes', () => {
    expect(theoryErrors(theoryFile('constants: [c0]', "symbols: { c0: 'a_1_2' }", R4))).toContain(
      ['test.yaml:4:20: error: a second subscript', "    symbols: { c0: 'a_1_2' }", '                       ^'].join(
        '\n',
      ),
    );
  });
});

describe('warnings', () => {
  const warnings = (text: string): string =>
    theory(text)
      .warnings.map((d) => renderDiagnostic(d))
      .join('\n');

  it('unused constants and scales, but not M', () => {
    expect(warnings(theoryFile('constants: [c0, x]', 'scales: { M: mass, mu: mass }', 'impose: [ "x = 1" ]', R4))).toBe(
      [
        'test.yaml:3:13: warning: the constant c0 is declared but not used',
        '    constants: [c0, x]',
        '                ^^',
        'hint: remove it, or use it',
        'test.yaml:4:20: warning: the scale mu is declared but not used',
        '    scales: { M: mass, mu: mass }',
        '                       ^^',
        'hint: remove it, or use it',
      ].join('\n'),
    );
  });

  it('two symbols that would be printed alike', () => {
    expect(warnings(theoryFile('constants: [c1, c_1]', 'lagrangian: c1 c_1 R^2'))).toContain(
      'test.yaml:3:17: warning: c1 and c_1 are both printed as c_{1}',
    );
  });
});
