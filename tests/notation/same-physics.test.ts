// One theory written by hand in two conventions gives the same equations. The general quadratic theory with parity-odd terms and a
// cubic one stand for all; the second column is what an author with that convention would print.
import { describe, expect, it } from 'vitest';
import { derive } from '../../src/derive.js';
import { derivationObject } from '../../src/emit/json.js';
import { theory, theoryFile } from './rendered.js';

const HEADER = ['constants: [c0, a2, a3, a4, b1, b3, d1, d2, e1]', 'scales: { M: mass }'];
const LAGRANGIAN =
  '1/2 c0 M^2 R + a2 R_{ab} R^{ab} + a3 R_{ab} T^a T^b + a4 R_{abcd} R^{acbd} + M^2 b1 T_{abc} T^{bac} + M^2 b3 T_a T^a ' +
  '+ d1 \\epsilon^{abcd} R_{abef} R_{cd}{}^{ef} + M^2 d2 T_a A^a + e1 R_{abcd} T^{abe} T^{cd}{}_e + d1 \\epsilon^{abcd} T_a R_{bcde} T^e';

/** Equations of every field, and the Friedmann form, of a theory file with these lines. */
function equations(conventions: string, lagrangian: string, geometry: string): unknown {
  const { symbols } = theory(theoryFile(...HEADER, `lagrangian: '${LAGRANGIAN}'`));
  const text = theoryFile(
    `conventions: ${conventions}`,
    ...HEADER,
    `lagrangian: '${lagrangian}'`,
    `geometry: ${geometry}`,
  );
  const read = theory(text);
  expect(read.symbols.map((s) => s.name).sort()).toEqual(symbols.map((s) => s.name).sort());
  const json = derivationObject(derive(read)) as Record<string, unknown>;
  return { equations: json.equations, friedmann: json.friedmann };
}

/** The Lagrangian with some of its terms replaced; each must be there. */
function written(...changes: readonly (readonly [from: string, to: string])[]): string {
  let text = LAGRANGIAN;
  for (const [from, to] of changes) {
    expect(text, from).toContain(from);
    text = text.replaceAll(from, to);
  }
  return text;
}

const PAIRS: readonly (readonly [conventions: string, lagrangian: string])[] = [
  // A product changes sign when half the difference of its natural lower and upper indices is odd: (7 − 3)/2 of R T T is even.
  ['{ signature: "+---" }', written(['1/2 c0', '-1/2 c0'], ['b1', '(-b1)'], ['b3', '(-b3)'], ['d2', '(-d2)'])],
  [
    '{ torsion: half }',
    written(
      ['R_{ab} T^a T^b', '4 R_{ab} T^a T^b'],
      ['b1', '4 b1'],
      ['b3', '4 b3'],
      ['d2', '4 d2'],
      ['e1', '4 e1'],
      ['T_a R_{bcde} T^e', '4 T_a R_{bcde} T^e'],
    ),
  ],
  ['{ torsion-sign: -1 }', LAGRANGIAN],
  [
    '{ torsion-index: last }',
    written(['T_{abc} T^{bac}', 'T_{bca} T^{acb}'], ['T^{abe} T^{cd}{}_e', 'T^{bea} T^d{}_e{}^c']),
  ],
  ['{ torsion-trace: "T^b_{ba}" }', written(['d2', '(-d2)'])],
  [
    '{ curvature-sign: -1 }',
    written(
      ['1/2 c0', '-1/2 c0'],
      ['a3 R_{ab}', 'a3 (-1) R_{ab}'],
      ['e1', '(-e1)'],
      ['\\epsilon^{abcd} T_a', '(-1) \\epsilon^{abcd} T_a'],
    ),
  ],
  [
    '{ curvature-indices: form-first }',
    written(
      ['R_{abcd} R^{acbd}', 'R_{cdab} R^{bdac}'],
      ['R_{abef} R_{cd}{}^{ef}', 'R_{efab} R^{ef}{}_{cd}'],
      ['R_{abcd} T', 'R_{cdab} T'],
      ['R_{bcde} T^e', 'R_{debc} T^e'],
    ),
  ],
  ['{ ricci: "R^c_{abc}" }', written(['1/2 c0', '-1/2 c0'], ['a3 R_{ab}', 'a3 (-1) R_{ab}'])],
  ['{ ricci: "R^c_{bca}" }', LAGRANGIAN],
  [
    '{ epsilon: -1 }',
    written(
      ['d1 \\epsilon^{abcd} R_{abef}', '(-d1) \\epsilon^{abcd} R_{abef}'],
      ['d2', '(-d2)'],
      ['d1 \\epsilon^{abcd} T_a', '(-d1) \\epsilon^{abcd} T_a'],
    ),
  ],
  ['{ action: -1 }', `-(${LAGRANGIAN})`],
  ['{ units: kappa }', written(['M^2', 'kappa^{-1}'])],
  ['{ units: 8piG }', written(['M^2', '\\frac{1}{8\\pi G}'])],
  [
    'mostly-minus-kappa',
    written(
      ['1/2 c0 M^2', '-\\frac{c0}{2\\kappa}'],
      ['M^2', '\\kappa^{-1}'],
      ['b1', '(-b1)'],
      ['b3', '(-b3)'],
      ['d2', '(-d2)'],
    ),
  ],
];

describe.each(['flrw', 'bianchi-i'])('on %s', (geometry) => {
  const expected = equations('{}', LAGRANGIAN, geometry);
  it.each(PAIRS)('%s: %s', (conventions, lagrangian) => {
    expect(equations(conventions, lagrangian, geometry)).toEqual(expected);
  });
  it('and the comparison can fail', () => {
    expect(equations('{ torsion: half }', LAGRANGIAN, geometry)).not.toEqual(expected);
    expect(equations('{ curvature-sign: -1 }', LAGRANGIAN, geometry)).not.toEqual(expected);
    expect(equations('{ epsilon: -1 }', LAGRANGIAN, geometry)).not.toEqual(expected);
  });
});
