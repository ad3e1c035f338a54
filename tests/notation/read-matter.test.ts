import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import { theory, theoryErrors, theoryFile } from './rendered.js';

const withMatter = (matter: string, ...more: string[]): string =>
  theoryFile(...more, 'lagrangian: R^2', `matter: ${matter}`);

describe('readMatter', () => {
  it('reads the four kinds', () => {
    const text = withMatter(
      '[dust, radiation, { vacuum: Lambda }, { fluid: chi, w: "1/5" }, { fluid: y, w: -1/3 }, { fluid: s, w: 1 }]',
    );
    expect(theory(text).matter).toEqual([
      { kind: 'dust', name: 'dust', density: 'rho_dust', latex: '\\rho_{\\mathrm{dust}}', w: rational(0) },
      {
        kind: 'radiation',
        name: 'radiation',
        density: 'rho_radiation',
        latex: '\\rho_{\\mathrm{radiation}}',
        w: rational(1, 3),
      },
      { kind: 'vacuum', name: 'Lambda', density: 'Lambda', latex: '\\Lambda', w: rational(-1) },
      { kind: 'fluid', name: 'chi', density: 'rho_chi', latex: '\\rho_{\\chi}', w: rational(1, 5) },
      { kind: 'fluid', name: 'y', density: 'rho_y', latex: '\\rho_{y}', w: rational(-1, 3) },
      { kind: 'fluid', name: 's', density: 'rho_s', latex: '\\rho_{s}', w: rational(1) },
    ]);
  });

  it('a vacuum density that is declared stays what it is', () => {
    const { symbols } = theory(withMatter('[{ vacuum: V }]', 'constants: [{ V: mass^4 }]'));
    expect(symbols).toEqual([{ name: 'V', role: 'constant', dimension: 4, latex: 'V' }]);
  });

  it('a density has the name that the user gives it', () => {
    const symbols = "symbols: { rho_dust: '\\rho_m', V: 'U' }";
    const read = theory(withMatter('[dust, radiation, { vacuum: V }]', 'constants: [{ V: mass^4 }]', symbols));
    expect(read.matter.map((m) => m.latex)).toEqual(['\\rho_m', '\\rho_{\\mathrm{radiation}}', 'U']);
    expect(theoryErrors(withMatter('[dust]', 'symbols: { rho_dusk: q }'))).toContain('did you mean rho_dust?');
    const alike = theory(withMatter('[dust, radiation]', "symbols: { rho_dust: r, rho_radiation: 'r' }"));
    expect(alike.warnings.map((w) => w.message)).toEqual(['rho_dust and rho_radiation are both printed as r']);
  });

  it('shows unknown matter with a suggestion', () => {
    expect(theoryErrors(withMatter('[dusk, { vacum: X }, ghosts]'))).toBe(
      [
        'test.yaml:4:10: error: unknown matter dusk',
        '    matter: [dusk, { vacum: X }, ghosts]',
        '             ^^^^',
        'hint: did you mean dust?',
        'test.yaml:4:18: error: unknown matter vacum',
        '    matter: [dusk, { vacum: X }, ghosts]',
        '                     ^^^^^',
        'hint: did you mean vacuum?',
        'test.yaml:4:30: error: unknown matter ghosts',
        '    matter: [dusk, { vacum: X }, ghosts]',
        '                                 ^^^^^^',
        'hint: matter is dust, radiation, { vacuum: X }, { fluid: name, w: "1/5" } or { spin: sigma, axial: q }',
      ].join('\n'),
    );
  });

  it.each([
    ['dust', 'matter must be a list but is a text'],
    ['[dust, dust]', 'the matter component dust occurs twice'],
    ['[dust, { fluid: dust, w: 0 }]', 'the matter component dust occurs twice'],
    ['[{ vacuum: X }, { vacuum: X }]', 'the matter component X occurs twice'],
    ['[vacuum]', 'vacuum needs a name'],
    ['[fluid]', 'fluid needs a name'],
    ['[{ vacuum: k }]', 'the name k is reserved for the spatial curvature'],
    ['[{ vacuum: "" }]', 'the vacuum density must be a text but is empty'],
    ['[{ vacuum: X, w: -1 }]', 'a vacuum component has no key w'],
    ['[{ fluid: chi }]', 'a fluid component lacks the key w'],
    ['[{ fluid: a b, w: 1 }]', '"a b" is not a name'],
    ['[{ fluid: chi, w: 0.2 }]', 'w = 0.2 has a decimal point'],
    ['[{ fluid: chi, w: 1/0 }]', 'w = 1/0 divides by zero'],
    ['[{ fluid: chi, w: x }]', 'w = x is not a rational number'],
    ['[{ fluid: chi, w: 1/-3 }]', 'w = 1/-3 is not a rational number'],
    [`[{ fluid: chi, w: ${'1'.repeat(300)} }]`, 'w has more than 200 digits'],
    ['[{}]', 'unknown matter {}'],
    ['[[dust]]', 'a matter component must be a text but is a list'],
  ])('%s: %s', (matter, message) => {
    const text = theoryErrors(withMatter(matter));
    expect(text).toContain(`error: ${message}\n`);
    expect(text.match(/error:/g)).toHaveLength(1);
  });
});
