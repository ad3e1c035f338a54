import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import { INTERNAL } from '../../src/notation/conventions.js';
import { renderDiagnostic } from '../../src/notation/diagnostics.js';
import { printLagrangian } from '../../src/notation/print.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { theory, theoryErrors, theoryFile } from './rendered.js';

const EXAMPLES = new URL('../../rules/examples/', import.meta.url);
const example = (name: string): string => readFileSync(new URL(name, EXAMPLES), 'utf8');

describe('examples', () => {
  it.each(readdirSync(EXAMPLES))('%s is read without warnings', (name) => {
    expect(readTheory(example(name), name).warnings.map((d) => renderDiagnostic(d))).toEqual([]);
  });

  it('Harbour light is understood as typed', () => {
    const read = readTheory(example('harbour-light.yaml'), 'harbour-light.yaml');
    expect(read).toMatchObject({ name: 'Harbour light', slug: 'harbour-light', signature: '-+++', geometry: 'flrw' });
    expect(printLagrangian(read.lagrangian, read)).toBe(
      '1/2 c0 M^2 R + a1 R^2 + a2 R_{ab} R^{ab} + a3 R_{ab} R^{ba} + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} ' +
        '+ a6 R_{abcd} R^{cdab} + b1 M^2 T_{abc} T^{abc} + b2 M^2 T_{abc} T^{bac} + b3 M^2 T_a T^a',
    );
    expect(read.relations.map(({ subject, text }) => [subject, text])).toEqual([
      ['a1', 'a1 = 0'],
      ['b1', 'b1 = -2 b3'],
    ]);
    expect(read.matter.map((m) => m.density)).toEqual(['rho_dust', 'rho_radiation', 'Lambda', 'rho_chi']);
    expect(read.symbols.map((s) => s.latex)).toContain('\\alpha_0');
  });
});

describe('readTheory', () => {
  it('fills in what is optional', () => {
    expect(theory(theoryFile('lagrangian: R_{ab} R^{ab}'))).toEqual({
      name: 'Test',
      slug: 'test',
      conventions: INTERNAL,
      signature: '-+++',
      symbols: [],
      unitSymbols: [],
      tensors: [],
      lagrangian: [
        {
          scalar: { coefficient: rational(1), powers: [] },
          factors: [
            {
              head: 'R',
              slots: [
                { name: 'a', up: false },
                { name: 'b', up: false },
              ],
            },
            {
              head: 'R',
              slots: [
                { name: 'a', up: true },
                { name: 'b', up: true },
              ],
            },
          ],
        },
      ],
      relations: [],
      matter: [],
      geometry: 'flrw',
      warnings: [],
    });
  });

  it.each([
    ['"-+++"', '-+++'],
    ['-+++', '-+++'],
    ['+---', '+---'],
    ['"+−−−"', '+---'],
    ['"(-, +, +, +)"', '-+++'],
  ])('signature %s', (typed, signature) => {
    expect(theory(theoryFile(`conventions: { signature: ${typed} }`, 'lagrangian: R^2')).signature).toBe(signature);
  });

  it('takes relations from the file and then from --set', () => {
    const text = theoryFile(
      'constants: [b1, b3]',
      'lagrangian: b1 b3 R^2',
      'matter: [dust, { vacuum: L }]',
      'impose: b1 = 2 b3',
    );
    const { relations } = theory(text, ['k=0', 'rho_dust = L', 'b3 = \\frac{1}{2}']);
    expect(relations.map((r) => [r.subject, r.text, r.origin.file])).toEqual([
      ['b1', 'b1 = 2 b3', 'test.yaml'],
      ['k', 'k=0', '--set'],
      ['rho_dust', 'rho_dust = L', '--set'],
      ['b3', 'b3 = \\frac{1}{2}', '--set'],
    ]);
    const [first] = relations;
    expect(first!.origin.source.slice(first!.origin.start, first!.origin.end)).toBe('b1 = 2 b3');
  });

  it('places errors of the Lagrangian in the file, in every scalar style', () => {
    const firstLine = (...lines: string[]): string => theoryErrors(theoryFile(...lines)).split('\n')[0]!;
    expect(firstLine('lagrangian: |', '    R^2', '    + q1 R')).toBe('test.yaml:5:7: error: unknown symbol q1');
    expect(firstLine('lagrangian: >-', '  R^2', '', '  + q1 R')).toBe('test.yaml:6:5: error: unknown symbol q1');
    expect(firstLine('lagrangian: R^2', '  + q1 R')).toBe('test.yaml:4:5: error: unknown symbol q1');
    expect(firstLine("lagrangian: 'R^2 + q1 R'")).toBe('test.yaml:3:20: error: unknown symbol q1');
    expect(firstLine('lagrangian: "\\\\epsilon^{abcd} R_{abcd} + q1 R"')).toBe(
      'test.yaml:3:42: error: unknown symbol q1',
    );
    expect(firstLine('impose: [ "q1 = 0" ]', 'lagrangian: R^2')).toBe('test.yaml:3:12: error: unknown symbol q1');
  });

  it('reports independent faults of the whole file together, in order', () => {
    const text = theoryFile(
      'conventions: { signature: "++++" }',
      'constants: [b1]',
      'lagrangian: |',
      '  b1 T_{ab} + 0.5 R^2',
      'impose: [ "b1 == 0", "b1 = q" ]',
      'geometry: ../etc/passwd',
    );
    const shown = theoryErrors(text, ['b9=0']).split('\n');
    expect(shown.filter((line) => line.includes('error:'))).toEqual([
      'test.yaml:3:27: error: "++++" is not a signature',
      'test.yaml:6:6: error: T_{ab} has 2 indices, T has 1 or 3',
      'test.yaml:6:15: error: 0.5 has a decimal point',
      'test.yaml:7:15: error: a relation has one equals sign, not ==',
      'test.yaml:7:28: error: unknown symbol q',
      'test.yaml:8:11: error: "../etc/passwd" is not the name of a geometry',
      '--set:1:1: error: unknown symbol b9',
    ]);
  });

  it('a misspelt key hides neither itself nor produces a crowd of unknown symbols', () => {
    expect(theoryErrors(theoryFile('constant: [b1, b2]', 'lagrangian: b1 R^2 + b2 R^2'))).toBe(
      [
        'test.yaml:3:1: error: a theory file has no key constant',
        '    constant: [b1, b2]',
        '    ^^^^^^^^',
        'hint: did you mean constants?',
      ].join('\n'),
    );
  });

  it.each([
    ['untwist: 2\nname: X\nlagrangian: R^2', 'f:1:10: error: untwist: 2 is not a version of the file format'],
    ['name: X\nlagrangian: R^2', 'f:1:1: error: a theory file lacks the key untwist'],
    ['untwist: 1\nlagrangian: R^2', 'f:1:1: error: a theory file lacks the key name'],
    ['untwist: 1\nname: X', 'f:1:1: error: a theory file lacks the key lagrangian'],
    ['untwist: 1\nname: X\nlagrangian:', 'f:3:12: error: the Lagrangian is empty'],
    ['untwist: 1\nname: X\nlagrangian: |\n\n', 'f:3:13: error: the Lagrangian is empty'],
    ['untwist: 1\nname: X\nlagrangian: [R]', 'f:3:13: error: lagrangian must be a text but is a list'],
    ['untwist: 1\nname:\nlagrangian: R^2', 'f:2:6: error: name must be a text but is empty'],
    ['untwist: 1\nname: "a\\u0007b"\nlagrangian: R^2', 'f:2:7: error: the name contains a control character'],
    [`untwist: 1\nname: ${'x'.repeat(201)}\nlagrangian: R^2`, 'f:2:7: error: the name has more than 200 characters'],
    ['untwist: 1\nname: X\nlagrangian: R^2\n__proto__: 1', 'f:4:1: error: a theory file has no key __proto__'],
    ['untwist: 1\nname: X\nlagrangian: R^2\nconventions: { sign: 1 }', 'f:4:16: error: conventions has no key sign'],
    [
      'untwist: 1\nname: X\nlagrangian: R^2\nimpose: [H = 1]',
      'f:4:10: error: H stands for the expansion rate; a relation is between constants',
    ],
    [
      'untwist: 1\nname: X\nlagrangian: R^2\nimpose: [rho_dust = 1]',
      'f:4:10: error: rho_dust is not the density of a matter component of this theory',
    ],
    ['untwist: 1\nname: X\nlagrangian: R^2\nimpose: [[k]]', 'f:4:10: error: a relation must be a text but is a list'],
    ['- untwist', 'f:1:1: error: a theory file must be a mapping but is a list'],
    ['hello', 'f:1:1: error: a theory file must be a mapping but is a text'],
  ])('%j: %s', (text, line) => {
    const shown = (() => {
      try {
        readTheory(text, 'f');
        return '';
      } catch (error) {
        return (error as { diagnostics: readonly Parameters<typeof renderDiagnostic>[0][] }).diagnostics
          .map((d) => renderDiagnostic(d))
          .join('\n');
      }
    })();
    expect(shown.split('\n')[0]).toBe(line);
    expect(shown.match(/error:/g)).toHaveLength(1);
  });

  it('shows a stated number of errors and counts the rest', () => {
    const text = theoryErrors(
      theoryFile(`constants: [${Array.from({ length: 50 }, () => 'k').join(', ')}]`, 'lagrangian: R^2'),
    );
    expect(text.match(/error:/g)).toHaveLength(21);
    expect(text.split('\n').at(-1)).toBe('test.yaml: error: 79 more errors are not shown');
  });

  it('reads files with carriage returns and a byte-order mark', () => {
    const text = `\ufeff${theoryFile('lagrangian: |', '  R^2', '  + R_{ab} R^{ab}')}`.replace(/\n/g, '\r\n');
    expect(theory(text).lagrangian).toHaveLength(2);
  });
});
