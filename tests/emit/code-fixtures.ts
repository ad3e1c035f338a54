/** Theories and descriptions on which every language is tried. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { partialOfFraction } from '../../src/algebra/fraction.js';
import { add, constant, generator, monomial, multiply, type Poly, power } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import type { CodeFunction, CodeModule, VectorInput } from '../../src/emit/code-description.js';
import { codeModel } from '../../src/emit/code-model.js';
import { nameFault } from '../../src/notation/names.js';
import { deriveText } from './emitted-module.js';

const theory = (lines: string): string => `untwist: 1\nname: Harbour light\n${lines}`;

/** Couplings of all invariants at most quadratic in curvature and torsion, and of a constant. */
export const EIGHTEEN = theory(`constants: [c0, c1, a1, a2, a3, a4, a5, a6, o1, o2, o3, o4, b1, b2, b3, d1, d2, v0]
scales: { M: mass }
lagrangian: |
  1/2 c0 M^2 R + c1 M^2 \\epsilon^{abcd} R_{abcd}
  + a1 R^2 + a2 R_{ab} R^{ab} + a3 R_{ab} R^{ba} + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} + a6 R_{abcd} R^{cdab}
  + o1 R \\epsilon^{abcd} R_{abcd} + o2 \\epsilon^{abcd} R_{abef} R_{cd}{}^{ef}
  + o3 \\epsilon^{abcd} R_{efab} R^{ef}{}_{cd} + o4 \\epsilon^{abcd} R_{abef} R^{ef}{}_{cd}
  + M^2 ( b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a + d1 T_a A^a + d2 \\epsilon^{abcd} T_{eab} T^{e}{}_{cd} )
  + v0 M^4
matter: [ dust, radiation, { vacuum: Lambda }, { fluid: chi, w: "1/5" } ]
`);

export const THEORIES: Readonly<Record<string, string>> = {
  'eighteen couplings': EIGHTEEN,
  'no parameters': theory('lagrangian: "T_a T^a T_b A^b + R T_{abc} T^{abc}"\n'),
  'large numbers': theory(`constants: [g]
lagrangian: |
  123456789012345678901234567890 g R^2 + 98765432109876543210/12345678901234567891 T_a T^a T_b T^b
  + 1/3 R_{abcd} R^{abcd} + 22/7 R_{ab} T^{acd} T^{b}{}_{cd}
matter: [ { fluid: chi, w: "-1/2" } ]
`),
  'Bianchi I': theory(`constants: [b1, b2]
scales: { M: mass }
lagrangian: "1/2 M^2 R + b1 T_{abc} T^{abc} R + b2 T_a T^a"
matter: [ dust ]
geometry: bianchi-i
`),
  'total derivatives only': theory(
    'constants: [g]\nlagrangian: "g ( R^2 - 4 R_{ab} R^{ba} + R_{abcd} R^{cdab} )"\nimpose: [ "g^2 = 4" ]\n',
  ),
};

/** High degree: its functions are divided into parts in every language. */
export const QUARTIC = theory(`constants: [g1, g2, g3, g4, g5, g6]
lagrangian: |
  g1 R^3 + g2 R^2 R_{abcd} R^{abcd} + g3 R T_a T^a T_{bcd} T^{bcd} + g4 R_{abcd} T^{abe} T^{cd}{}_e R
  + g5 R_{ab} R^{ab} R_{cd} R^{cd} + g6 R^2 R_{ab} R^{ab}
`);

const WORDS_OF_LANGUAGES = [
  ...[
    'delete',
    'class',
    'arguments',
    'undefined',
    'NaN',
    'Infinity',
    'constructor',
    'toString',
    'Math',
    'yield',
    'await',
  ],
  ...[
    'eval',
    'static',
    'readonly',
    'globalThis',
    'prototype',
    'couplings',
    'jets',
    'lagrangian',
    'equations',
    'theory',
  ],
  ...[
    'aDot',
    'aInv',
    'aInvPow2',
    'a_dot',
    'a_inv',
    'a_inv_pow2',
    'sum1',
    'product1',
    'coupling1',
    'numerator',
    'part1',
  ],
  ...[
    'int',
    'double',
    'register',
    'restrict',
    'inline',
    'main',
    'printf',
    'NULL',
    'EOF',
    'NAN',
    'INFINITY',
    'I',
    'M_PI',
  ],
  ...[
    'HUGE_VAL',
    'linux',
    'unix',
    'errno',
    'stdin',
    'stdout',
    'isnan',
    'signbit',
    'BUFSIZ',
    'L_tmpnam',
    'assert',
    'j0',
  ],
  ...['y1', 'gamma', 'exp', 'template', 'nullptr', 'and', 'or', 'this', 'namespace', 'float', 'values', 'value', 'dp'],
  ...['end', 'do', 'if', 'real', 'integer', 'program', 'module', 'function', 'call', 'write', 'print', 'stop', 'kind'],
  ...['type', 'data', 'contains', 'result', 'pure', 'end_', 'couplings_t', 'size', 'trim', 'real64', 'parameters'],
  ...['def', 'lambda', 'None', 'True', 'pass', 'from', 'is', 'not', 'with', 'nonlocal', 'math', 'isinstance', 'exec'],
  ...['begin', 'baremodule', 'let', 'macro', 'mutable', 'struct', 'where', 'using', 'quote', 'in', 'isa', 'ans', 'pi'],
  ...['b1', 'B1', 'b1_', 'Sum1', 'SUM1', 'phi_dot', 'Phi', 'PHI', 'n', 'harbour_light', 'harbour_light_equations'],
  // Longer than Fortran allows, and the same up to there.
  `${'x'.repeat(63)}1`,
  `${'x'.repeat(63)}2`,
  `${'X'.repeat(63)}1`,
];

export const HOSTILE_NAMES = [...new Set(WORDS_OF_LANGUAGES)].filter((name) => nameFault(name) === undefined);

const INVARIANTS = ['R^2', 'T_a T^a', 'R', 'T_a A^a'];
export const HOSTILE_THEORY = theory(
  [
    `constants: [${HOSTILE_NAMES.join(', ')}]`,
    'lagrangian: |',
    ...HOSTILE_NAMES.map((c, i) => `  + ${i + 1} ${c}^${(i % 3) + 1} ${INVARIANTS[i % 4]}`),
    'matter: [ dust, { fluid: delete, w: "1/7" }, { fluid: Delete, w: "1/3" }, { vacuum: while } ]',
    '',
  ].join('\n'),
);

/** Names that no file may give a theory, or that end whatever a language puts them into. */
export const HOSTILE_TITLES = [
  '*/ int hacked(void) { return 1; } /*',
  '""" + __import__("os").getcwd() + """ $(error("hacked")) $hacked #{x} =# #=',
  '\' // char(7) // \' & ! " \\ \\n \\" ??/ ??) %s %n',
  '</script> `$` @ts-nocheck //# sourceMappingURL=x # coding: latin-1',
  'rtl \u202e override \u2028 line \u0085 next \ud83c\udf0a wave \\',
  '\\',
];

export const named = (m: CodeModule, name: string): CodeModule => ({ ...m, theory: name });

export const modelOf = (text: string, jacobian = true): CodeModule => codeModel(deriveText(text), { jacobian });

export const example = (name: string): string =>
  readFileSync(join(import.meta.dirname, `../../rules/examples/${name}.yaml`), 'utf8');

/** A first-order system as the description has it: a state, rates that are fractions, their Jacobian, a root. */
export function firstOrderModule(): CodeModule {
  const ring = makeRing([
    ...['a', 'phi', 'psi'].flatMap((q) => jetsOf(q, 1)),
    ...constantsOf(['g', 'k', 'end']),
    { kind: 'radical', name: 'kappa', square: 'k' },
  ]);
  const v = (name: string, exponent = 1): Poly => generator(ring, name, exponent);
  const bottom = add(multiply(v('g'), v('phi', 2)), constant(ring, 3));
  const other = add(v('D(phi,1)'), multiply(v('k'), v('psi')));
  const input: VectorInput = {
    kind: 'vector',
    name: 'state',
    about: 'State of the system.',
    entries: ['a', 'phi', 'D(phi,1)', 'psi'].map((symbol) => ({ symbol, meaning: `value of ${symbol}`, dimension: 1 })),
  };
  const rates = [
    { numerator: multiply(v('a'), v('phi')), denominator: [] },
    { numerator: v('D(phi,1)'), denominator: [] },
    {
      numerator: add(power(other, 2), monomial(ring, rational(-5, 7), [['end', 2]])),
      denominator: [
        { base: bottom, power: 2 },
        { base: other, power: 1 },
      ],
    },
    { numerator: multiply(v('kappa'), v('psi', -2)), denominator: [{ base: bottom, power: 1 }] },
  ];
  const symbols = input.entries.map((e) => e.symbol);
  const functions: CodeFunction[] = [
    {
      name: 'rates',
      doc: ['Time derivatives of the state.'],
      input,
      result: { kind: 'vector', about: 'In the order of the state.' },
      outputs: rates.map((r, i) => ({ key: symbols[i]!, meaning: `d ${symbols[i]}/dt`, ...r })),
    },
    {
      name: 'ratesJacobian',
      doc: ['Partial derivatives of the rates.'],
      input,
      result: { kind: 'matrix', about: 'Rows: rates. Columns: state.', rows: symbols, columns: symbols },
      outputs: rates.flatMap((r, i) =>
        symbols.map((s) => ({ key: `${symbols[i]},${s}`, meaning: 'an entry', ...partialOfFraction(r, s) })),
      ),
    },
    {
      name: 'energyConstraint',
      doc: ['Vanishes on solutions.'],
      input,
      result: { kind: 'number' },
      outputs: [{ key: 'value', meaning: 'residual', numerator: add(multiply(v('kappa'), v('k')), v('psi', 3)) }],
    },
  ];
  const parameter = (name: string) => ({ name, meaning: 'constant', dimension: 0, isSource: false });
  return {
    slug: 'first-order',
    theory: 'First order',
    geometry: { id: 'flrw', title: 'homogeneous and isotropic' },
    conditions: [],
    variables: ['a', 'phi', 'psi'],
    parameters: ['g', 'k', 'end'].map(parameter),
    couplings: new Set(['g']),
    functions,
  };
}
