import { describe, expect, it } from 'vitest';
import { basisNames, bundledBasis, readBasis } from '../../src/tensor/basis-file.js';
import { bundledTexts } from '../../src/tensor/rule-library.js';
import { errorText } from '../notation/rendered.js';

const file = (...couplings: string[]): string =>
  [
    'untwist-basis: 1',
    'title: own',
    'why: test',
    'source: none',
    'couplings:',
    ...couplings.map((c) => `  ${c}`),
    '',
  ].join('\n');
const errors = (...couplings: string[]): string => errorText(() => readBasis(file(...couplings), 'own.yaml'));

describe('the bundled bases', () => {
  it.each(bundledTexts('bases').map(({ file, text }) => [file, text] as const))(
    '%s: independent, complete',
    (path, text) => {
      const basis = readBasis(text, path);
      // 1 + 1 linear, 6 + 4 of curvature, 3 + 2 of torsion: arXiv:1105.3504 (memory).
      expect(basis.entries).toHaveLength(17);
      expect(new Set(basis.entries.map((e) => e.coupling)).size).toBe(17);
      expect(basis.source).toMatch(/\d{4}/);
      for (const { sum } of basis.entries)
        expect(sum.every((t) => t.factors.every((f) => f.part === undefined))).toBe(true);
    },
  );

  it('are found by name', () => {
    expect(basisNames()).toEqual(['monomials', 'irreducible', 'yang-mills']);
    expect(bundledBasis('irreducible').name).toBe('irreducible');
    expect(errorText(() => bundledBasis('irreducibel'))).toMatch(
      /no coupling basis irreducibel[\s\S]*did you mean irreducible\?/,
    );
  });
});

describe('readBasis', () => {
  it('reads couplings with LaTeX', () => {
    const text = `${file('g1: R', 'g2: T_a T^a')}symbols: { g1: '\\gamma_1' }\n`;
    const { name, entries } = readBasis(text, 'some/where/own.yaml');
    expect(name).toBe('own');
    expect(entries.map((e) => [e.coupling, e.latex, e.sum.length])).toEqual([
      ['g1', '\\gamma_1', 1],
      ['g2', 'g_{2}', 1],
    ]);
  });

  it.each([
    [
      'an invariant that depends on earlier ones',
      ['g1: R_{abcd} R^{abcd}', 'g2: R_{abcd} R^{badc}'],
      /own\.yaml:7:7: error: the invariant of g2 is a combination of earlier ones[\s\S]*g1/,
    ],
    [
      'dependence through four dimensions',
      [
        'g1: \\epsilon^{abcd} T_a T_{bcd}',
        'g2: \\epsilon^{abcd} T_{eab} T^e{}_{cd}',
        'g3: \\epsilon^{abcd} T_{abe} T_{cd}{}^e',
      ],
      /the invariant of g3 is a combination/,
    ],
    ['an invariant that vanishes', ['g1: R_{abcd} T^a T^b T^c T^d'], /the invariant of g1 vanishes/],
    ['free indices', ['g1: R_{ab}'], /own\.yaml:6:10: error: indices a, b are free/],
    ['symbols in an invariant', ['g1: x R'], /unknown symbol x/],
    ['a bad name', ['R: R'], /the name R is reserved/],
    ['no text', ['g1: [R]'], /g1 must be a text/],
  ] as const)('refuses %s', (_, couplings, message) => {
    expect(errors(...couplings)).toMatch(message);
  });

  it('refuses unknown keys, missing keys and another version', () => {
    const text = errorText(() => readBasis('untwist-basis: 2\ntitle: x\ncouplings: {}\nfoo: 1\n', 'own.yaml'));
    for (const message of [/has no key foo/, /lacks the key why/, /lacks the key source/, /not a version/])
      expect(text).toMatch(message);
  });
});
