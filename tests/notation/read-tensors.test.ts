import katex from 'katex';
import { describe, expect, it } from 'vitest';
import { latexLagrangian, printLagrangian } from '../../src/notation/print.js';
import { refuseDeclaredTensors } from '../../src/notation/read-tensors.js';
import { errorText, terms, theory, theoryErrors, theoryFile } from './rendered.js';

const withTensors = (tensors: string, lagrangian = 'R', ...more: string[]): string =>
  theoryFile(`tensors: ${tensors}`, `lagrangian: '${lagrangian}'`, ...more);
const declared = (tensors: string) => theory(withTensors(tensors)).tensors.map(({ origin: _, ...tensor }) => tensor);

describe('tensors', () => {
  it('are read with their symmetry', () => {
    expect(declared('{ S: { indices: 3, symmetry: ["S_{abc} = -S_{acb}"], latex: s, dimension: mass } }')).toEqual([
      { name: 'S', slots: 3, generators: [{ places: [0, 2, 1], sign: -1 }], latex: 's', dimension: 1 },
    ]);
    expect(declared('{ Sigma: { indices: 2 } }')).toEqual([
      { name: 'Sigma', slots: 2, generators: [], latex: '\\Sigma', dimension: 0 },
    ]);
  });

  it.each([
    ['S_{abcd} = S_{cdab}', [2, 3, 0, 1], 1],
    ['S_{abcd} = -S_{bacd}', [1, 0, 2, 3], -1],
    ['-S_{abcd} = S_{bacd}', [1, 0, 2, 3], -1],
    ['-S_{abcd} = -S_{bacd}', [1, 0, 2, 3], 1],
    // A cycle is not its own inverse, so left and right cannot be mixed up.
    ['S_{abcd} = S_{bcda}', [1, 2, 3, 0], 1],
    ['S_{xyzw} = S_{wxyz}', [3, 0, 1, 2], 1],
    ['S^a{}_b{}^c{}_d = S^c{}_b{}^a{}_d', [2, 1, 0, 3], 1],
  ])('%s moves the slots as %j with the sign %d', (symmetry, places, sign) => {
    expect(declared(`{ S: { indices: 4, symmetry: '${symmetry}' } }`)[0]!.generators).toEqual([{ places, sign }]);
  });

  it('the identity is no generator', () => {
    expect(declared("{ S: { indices: 2, symmetry: 'S_{ab} = S_{ab}' } }")[0]!.generators).toEqual([]);
  });

  it.each([
    ['S_{ab} = -S_{ab}', 'this symmetry makes S vanish'],
    ['S_{ab} = 0', 'one side is zero'],
    ['S_{ab} + S_{ba} = 0', 'one side is a sum'],
    ['S_{ab} = 2 S_{ba}', 'the coefficient is not 1 or −1'],
    ['S_{ab} = S_{bc}', 'the two sides carry different indices'],
    ['S_{ab} = S_b{}^a', 'an index changes its height'],
    ['S_a{}^a = S_a{}^a', 'two indices are contracted'],
    ['S_{ab} = R_{ab}', 'each side is S alone with indices'],
    ['S_{ab} = R S_{ab}', 'each side is S alone with indices'],
    ['S_{ab}', 'a relation needs an equals sign'],
    ['S_{abc} = S_{acb}', 'S_{abc} has 3 indices, S has 2'],
    ['S_{ab} = x S_{ba}', 'unknown symbol x'],
  ])('the symmetry %s is refused: %s', (symmetry, message) => {
    const shown = theoryErrors(withTensors(`{ S: { indices: 2, symmetry: '${symmetry}' } }`, 'R'));
    expect(shown).toContain(`error: ${message}\n`);
    expect(shown).toMatch(/^test.yaml:3:\d+: error/);
    expect(shown).toContain('hint: ');
  });

  it('symmetries that only together leave nothing', () => {
    const both = '["S_{abc} = S_{bac}", "S_{abc} = -S_{acb}"]';
    const shown = theoryErrors(withTensors(`{ S: { indices: 3, symmetry: ${both} } }`, 'R'));
    expect(shown).toContain('test.yaml:3:61: error: this symmetry together with those before it makes S vanish');
    expect(shown.match(/error:/g)).toHaveLength(1);
  });

  it.each([
    ['{ T: { indices: 3 } }', 'the name T is reserved for the torsion'],
    ['{ eta: { indices: 2 } }', 'the tensor eta exists already'],
    ['{ S_1: { indices: 2 } }', 'S_1 is not the name of a tensor, whose indices begin at the first underscore'],
    ['{ "1S": { indices: 2 } }', '"1S" is not a name'],
    ['{ c0: { indices: 2 } }', 'c0 is declared twice'],
    ['{ q: { indices: 2 } }', 'q_eff reads as the tensor q with indices'],
    ['{ S: { indices: 0 } }', '"0" is not a number of indices'],
    ['{ S: { indices: 7 } }', '"7" is not a number of indices'],
    ['{ S: { indices: two } }', '"two" is not a number of indices'],
    ['{ S: { symmetry: "S_{ab} = S_{ba}" } }', 'the tensor S lacks the key indices'],
    ['{ S: { indices: 2, trace: 0 } }', 'the tensor S has no key trace'],
    ["{ S: { indices: 2, latex: '\\input' } }", '\\input is not allowed in a LaTeX name'],
    ['{ S: { indices: 2, dimension: kg } }', '"kg" is not a dimension'],
    ['[S]', 'tensors must be a mapping but is a list'],
  ])('%s: %s', (tensors, message) => {
    const shown = theoryErrors(withTensors(tensors, 'c0 q_eff q_1 R', 'constants: [c0, q_eff, q_1]'));
    expect(shown).toContain(`error: ${message}\n`);
    expect(shown.match(/error:/g)).toHaveLength(1);
  });

  it('occur in a Lagrangian like any other tensor', () => {
    const read = theory(
      withTensors(
        '{ S: { indices: 3, latex: "S_1" }, Sigma: { indices: 2 }, S2: { indices: 1, dimension: mass^2 } }',
        'S_{abc} T^{abc} + \\Sigma_{ab} Sigma^{ba} + S2_a S2^a + Σ_a^a',
      ),
    );
    const again = (text: string) => terms(text, read.symbols, read.tensors);
    expect(read.lagrangian.map((t) => t.factors.map((f) => f.head).join(' '))).toEqual([
      'S T',
      'Sigma Sigma',
      'S2 S2',
      'Sigma',
    ]);
    expect(again(printLagrangian(read.lagrangian))).toEqual(read.lagrangian);
    expect(again(printLagrangian(read.lagrangian, { unicode: true }))).toEqual(read.lagrangian);
    expect(printLagrangian(read.lagrangian, { unicode: true })).toBe(
      'S_{abc} T^{abc} + Σ_{ab} Σ^{ba} + S2_a S2^a + Σ_a{}^a',
    );
    const latex = latexLagrangian(read.lagrangian, read.symbols, read.tensors);
    expect(latex).toBe('{S_1}_{abc} T^{abc} + \\Sigma_{ab} \\Sigma^{ba} + {S_{2}}_a {S_{2}}^a + \\Sigma_a{}^a');
    katex.renderToString(latex, { throwOnError: true, strict: 'error' });
  });

  it('count with their dimension, and warn when they are idle', () => {
    const warnings = (lagrangian: string) =>
      theory(withTensors('{ S: { indices: 1, dimension: mass^2 } }', lagrangian)).warnings.map((w) => w.message);
    expect(warnings('S_a S^a')).toEqual([]);
    expect(warnings('S_a T^a')).toEqual(['the term S_a T^a has mass dimension 3, a Lagrangian has 4']);
    expect(warnings('R^2')).toEqual(['the tensor S is declared but not used']);
  });

  it('unknown ones are reported with those that exist', () => {
    const tensors = '{ S: { indices: 2 } }';
    expect(theoryErrors(withTensors(tensors, 'S_a S^a'))).toContain(
      "error: S_a has 1 index, S has 2\n    lagrangian: 'S_a S^a'\n                 ^^^\nhint: it is declared with 2 under tensors",
    );
    expect(theoryErrors(withTensors(tensors, 'S R'))).toContain('error: S has no indices here, S has 2');
    expect(theoryErrors(withTensors(tensors, 'S_{ab}^2'))).toContain('so its power has no meaning');
    expect(theoryErrors(withTensors(tensors, 'Q_{ab} R^{ab}'))).toContain('; declared are S; others are declared');
    // The use of a tensor whose declaration is broken is no second error.
    expect(theoryErrors(withTensors('{ S: { indices: 9 } }', 'S_{ab} S^{ab}')).match(/error:/g)).toHaveLength(1);
  });

  it('are refused where components are needed, at their declaration', () => {
    const tensors = '{ S: { indices: 1 }, Q: { indices: 1 } }';
    expect(() => refuseDeclaredTensors(theory(withTensors(tensors)))).not.toThrow();
    expect(errorText(() => refuseDeclaredTensors(theory(withTensors(tensors, 'R + Q_a Q^a'))))).toBe(
      [
        'test.yaml:3:31: error: no geometry gives components to the declared tensor Q',
        '    tensors: { S: { indices: 1 }, Q: { indices: 1 } }',
        '                                  ^',
        'hint: declared tensors can be simplified but not reduced: leave it out of the Lagrangian',
      ].join('\n'),
    );
  });
});
