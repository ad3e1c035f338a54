import { describe, expect, it } from 'vitest';
import { evaluate } from '../../src/algebra/collect.js';
import type { Fraction } from '../../src/algebra/fraction.js';
import { toNumber } from '../../src/algebra/rational.js';
import type { Derivation, SpinElimination } from '../../src/derivation.js';
import { typescriptModule } from '../../src/emit/code.js';
import { JAVASCRIPT, TYPESCRIPT, tupleType } from '../../src/emit/code-typescript.js';
import { firstOrderModule, modelOf } from './code-fixtures.js';
import {
  complaints,
  deriveText,
  integers,
  load,
  outputsOf,
  relativeError,
  samplePoint,
  worstError,
} from './emitted-module.js';

const theory = (lines: string): string => `untwist: 1\nname: Harbour light\n${lines}`;

const THEORIES: Readonly<Record<string, string>> = {
  'general quadratic': theory(`constants: [c0, a1, a2, a3, a4, a5, a6, b1, b2, b3]
scales: { M: mass }
lagrangian: |
  1/2 c0 M^2 R + a1 R^2 + a2 R_{ab} R^{ab} + a3 R_{ab} R^{ba}
  + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} + a6 R_{abcd} R^{cdab}
  + M^2 ( b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a )
matter: [ dust, radiation, { vacuum: Lambda }, { fluid: chi, w: "1/5" } ]
`),
  'odd parity and fractions': theory(`constants: [q, gamma, p]
scales: { M: mass }
lagrangian: |
  M^2/(4 gamma) \\epsilon^{abcd} R_{abcd} + \\frac{22}{7} p \\epsilon^{abcd} T_{eab} T^{e}{}_{cd} + M^2/3 R
  - 5/9 q R^2
`),
  'cubic torsion, no parameters': theory(`lagrangian: "T_a T^a T_b A^b + R T_{abc} T^{abc}"
`),
  'degree four with large numbers': theory(`constants: [g]
lagrangian: |
  123456789012345678901234567890 g R^2 + 98765432109876543210/12345678901234567891 T_a T^a T_b T^b
  + R_{abcd} R^{abcd} R + R_{ab} T^{acd} T^{b}{}_{cd}
matter: [ { fluid: chi, w: "-1/2" } ]
`),
  'Bianchi I': theory(`constants: [b1, b2]
scales: { M: mass }
lagrangian: "1/2 M^2 R + b1 T_{abc} T^{abc} R + b2 T_a T^a"
matter: [ dust ]
geometry: bianchi-i
`),
  'flat, conditions left': theory(`constants: [a1, a2, b1]
scales: { M: mass }
lagrangian: "a1 R^2 + a2 R_{ab} R^{ab} + b1 M^2 T_a T^a"
impose: [ "a1 a2 = 3" ]
`),
  'constraints by multipliers': theory(`scales: { M: mass }
lagrangian: "-1/2 M^2 (1/4 T_{abc} T^{abc} + 1/2 T_{abc} T^{bac} - T_a T^a)"
constrain: [ "R^a_{bcd}" ]
matter: [ dust ]
`),
  'matter with spin': theory(`constants: [q, gamma]
scales: { M: mass }
lagrangian: |
  1/2 M^2 R + M^2/4/gamma \\epsilon^{abcd} R_{abcd}
tensors: { S: { indices: 1, dimension: mass^3 } }
matter: [ dust, { spin: sigma, axial: q }, { spin: S, coupling: "S_a T^a" } ]
`),
  nothing: theory(`constants: [g]
lagrangian: "g R_{ab} T^{abc} A_c - g R_{ab} T^{abc} A_c + g ( R^2 - 4 R_{ab} R^{ba} + R_{abcd} R^{cdab} )"
`),
};

/** Words of the language, names of its library, and the names that the emitter itself uses. */
const HOSTILE = [
  ...['delete', 'class', 'arguments', 'undefined', 'NaN', 'Infinity', 'constructor', 'toString', 'valueOf', 'Math'],
  ...['let', 'yield', 'await', 'eval', 'static', 'number', 'readonly', 'new', 'get', 'of', 'globalThis', 'prototype'],
  ...['couplings', 'jets', '_jets'.slice(1), 'lagrangian', 'equations', 'Couplings', 'sum1', 'product1', 'coupling1'],
  ...['aDot', 'aInv', 'aInvPow2', 'phiPow2', 'NInv', 'delete_', 'hasOwnProperty', 'length', 'then', 'theory', 'wT'],
].filter((name, i, all) => all.indexOf(name) === i);

const HOSTILE_THEORY = theory(
  [
    `constants: [${HOSTILE.join(', ')}]`,
    'lagrangian: |',
    ...HOSTILE.map((c, i) => `  + ${i + 1} ${c}^${(i % 3) + 1} ${['R^2', 'T_a T^a', 'R', 'T_a A^a'][i % 4]}`),
    'matter: [ dust, { fluid: delete, w: "1/7" }, { fluid: class, w: "1/3" } ]',
    '',
  ].join('\n'),
);

/** The same derivation of a theory with another name, also one that no file may contain. */
const named = (d: Derivation, name: string): Derivation => ({ ...d, theory: { ...d.theory, name } });

const HOSTILE_NAMES = [
  '*/ export const hacked = true; /*',
  '</script><script>alert(1)</script> `$` "quoted" \'single\' \\',
  '@ts-nocheck @license // @ts-ignore //# sourceMappingURL=x',
  'rtl \u202e override \u2028 line \u0085 next',
];

describe('emitted module', { timeout: 60_000 }, () => {
  for (const [name, text] of Object.entries(THEORIES))
    it(`agrees with the exact expressions: ${name}`, async () => {
      const { error, at } = await worstError(deriveText(text), 12, 20260730);
      expect(error, at).toBeLessThan(1e-12);
    });

  it('gives p_T/rho_T as wT', async () => {
    const d = deriveText(THEORIES['general quadratic']!);
    const module = await load(typescriptModule(d));
    const random = integers(5);
    const { rhoT, pT } = d.friedmann!;
    for (let i = 0; i < 12; i++) {
      const { exact, couplings, jets } = samplePoint(d, random);
      const ratio = toNumber(evaluate(pT, exact)) / toNumber(evaluate(rhoT, exact));
      expect(module.wT(couplings, jets)).toBeCloseTo(ratio, 6);
    }
  });

  it('exports what the derivation has and nothing else', async () => {
    const texts = ['geometry', 'parameters', 'sources', 'theory', 'variables'];
    const always = [...texts, 'densities', 'equations', 'lagrangian', 'pressures'];
    const covariant = ['current', 'curvatureObstruction', 'g4', 'kinetic', 'potential'];
    const general = await load(typescriptModule(deriveText(THEORIES['general quadratic']!)));
    expect(Object.keys(general).sort()).toEqual([...always, ...covariant, 'expansionRate', 'rhoT', 'pT', 'wT'].sort());
    expect(general.theory).toBe('Harbour light');
    expect(general.variables).toEqual(['N', 'a', 'phi', 'psi']);
    expect(general.sources).toEqual(['rho_chi']);
    expect([...general.parameters].sort()).toEqual(
      'c0 a1 a2 a3 a4 a5 a6 b1 b2 b3 M Lambda k rho_dust rho_radiation rho_chi'.split(' ').sort(),
    );
    const bianchi = await load(typescriptModule(deriveText(THEORIES['Bianchi I']!)));
    expect(Object.keys(bianchi).sort()).toEqual([...always, 'expansionRates'].sort());
  });

  it('documents every key with its dimension', () => {
    const text = typescriptModule(deriveText(THEORIES['general quadratic']!));
    for (const block of ['Couplings', 'Jets', 'Equations', 'Kinetic', 'Current']) {
      const body = new RegExp(`export interface ${block} \\{\\n([^}]*)\\n\\}`).exec(text)?.[1]?.split('\n') ?? [];
      expect(body.length).toBeGreaterThan(1);
      body.forEach((line, i) => {
        if (line.includes('readonly')) expect(body[i - 1]).toMatch(/^ {2}\/\*\* .*(dimension|zero).* \*\/$/);
      });
    }
    expect(text).toContain('/** spatial curvature; mass dimension 2 */');
    expect(text).toContain('/** ∂L/∂phi − d/dt ∂L/∂(dphi/dt); mass dimension 3 */');
    expect(text).not.toMatch(/\bimport\b|Math\.pow|\*\*[^/\n]*[a-z] \*\*/);
  });

  it('is the same text every time', () => {
    const text = THEORIES['general quadratic']!;
    expect(typescriptModule(deriveText(text))).toBe(typescriptModule(deriveText(text)));
  });

  it('keeps names that are words of the language as keys', async () => {
    const d = deriveText(HOSTILE_THEORY);
    const { error, at } = await worstError(d, 5, 11);
    expect(error, at).toBeLessThan(1e-12);
    const module = await load(typescriptModule(d));
    expect(module.parameters).toEqual(expect.arrayContaining([...HOSTILE, 'rho_delete', 'rho_class']));
  });

  it('does not run or hide text that is the name of the theory', async () => {
    const plain = deriveText(theory('lagrangian: R\n'));
    for (const name of HOSTILE_NAMES) {
      const text = typescriptModule(named(plain, name));
      const module = await load(text);
      expect(module.theory).toBe(name);
      expect(module.hacked).toBeUndefined();
      // biome-ignore lint/suspicious/noControlCharactersInRegex: none of them may be in a source file
      expect(text).not.toMatch(/[\u0000-\u0008\u000b-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069\u2028\u2029]/);
    }
  });

  it('compiles under the strictest flags', async () => {
    const files = Object.entries(THEORIES).map(([, text], i) => [`m${i}.mts`, typescriptModule(deriveText(text))]);
    const words = deriveText(HOSTILE_THEORY);
    const hostile = HOSTILE_NAMES.map((name, i) => [`h${i}.mts`, typescriptModule(named(words, name))]);
    const user = `import { equations, g4, type Couplings, type Jets } from './m0.mjs';
declare const couplings: Couplings;
const jets: Jets = { N: [1, 0], a: [1, 2, 3, 4], phi: [1, 2, 3], psi: [1, 2, 3] };
export const values: number = equations(couplings, jets).phi + g4(couplings, jets);
// @ts-expect-error a jet that is too short
export const short: Jets = { N: [1, 0], a: [1, 2], phi: [1, 2, 3], psi: [1, 2, 3] };
`;
    expect(await complaints(Object.fromEntries([...files, ...hostile, ['user.mts', user]]))).toBe('');
  });

  it('cuts functions of thousands of terms into parts', async () => {
    const even = ['R', 'T_a T^a', 'T_{abc} T^{abc}', 'R_{abcd} R^{abcd}', 'T_a A^a'];
    // The second factor gets its own dummies: a, b, c, d become e, f, g, h.
    const renamed = (y: string) =>
      y.replace(/(?<=[{_^])[a-d]+/g, (w) => w.replace(/./g, (c) => String.fromCharCode(c.charCodeAt(0) + 4)));
    const products = even.flatMap((x, i) => even.slice(i).map((y) => `R ${x} ${renamed(y)}`));
    const constants = products.map((_, i) => `g${i}`);
    const lines = products.map((p, i) => `  + ${constants[i]} ${p}\n`).join('');
    const d = deriveText(theory(`constants: [${constants}]\nlagrangian: |\n${lines}`));
    const text = typescriptModule(d);
    expect(text).toContain('function equationsPart2(');
    const module = await load(text);
    const sample = samplePoint(d, integers(3));
    for (const [name, computed, p] of outputsOf(d, module, sample))
      expect(relativeError(computed, p, sample.exact), name).toBeLessThan(1e-12);
    expect(await complaints({ 'large.mts': text })).toBe('');
  });

  it('computes a theory of nothing but total derivatives as zero', async () => {
    const d = deriveText(THEORIES.nothing!);
    const module = await load(typescriptModule(d));
    const { couplings, jets } = samplePoint(d, integers(1));
    expect(module.lagrangian(couplings, jets)).not.toBe(0);
    expect(module.equations(couplings, jets)).toEqual({ N: 0, a: 0, phi: 0, psi: 0 });
  });
});

describe('what spin adds', () => {
  it('is the value of the exact fractions', async () => {
    const d = deriveText(THEORIES['matter with spin']!);
    const module = await load(typescriptModule(d));
    const elimination = d.spin!.elimination as SpinElimination;
    const random = integers(11);
    for (let run = 0; run < 5; run++) {
      const sample = samplePoint(d, random);
      const value = ({ numerator, denominator }: Fraction): number =>
        denominator.reduce(
          (x, f) => x / toNumber(evaluate(f.base, sample.exact)) ** f.power,
          toNumber(evaluate(numerator, sample.exact)),
        );
      const close = (computed: number, f: Fraction): void => {
        expect(Math.abs(computed - value(f))).toBeLessThan(1e-9 * (1 + Math.abs(value(f))));
      };
      close(module.rhoSpin(sample.couplings, sample.jets), elimination.rho);
      close(module.pSpin(sample.couplings, sample.jets), elimination.p!);
      const connection = module.connection(sample.couplings, sample.jets);
      for (const [q, f] of elimination.solution) close(connection[q], f);
    }
  });

  it('compiles with its Jacobian and its example under the strictest flags, and with a state', async () => {
    const files = [modelOf(THEORIES['general quadratic']!), firstOrderModule()].flatMap((m, i) => [
      [`model${i}.mts`, TYPESCRIPT.write(m)],
      [`example${i}.mts`, TYPESCRIPT.example(m, `model${i}.mts`)],
    ]);
    expect(await complaints(Object.fromEntries(files))).toBe('');
  });

  it('is the same without types in JavaScript', () => {
    const m = modelOf(THEORIES['general quadratic']!);
    const [typed, plain] = [TYPESCRIPT.write(m), JAVASCRIPT.write(m)];
    const body = (text: string) => /^export function rhoT.*\n([\s\S]*?)^}/m.exec(text)![1];
    expect(body(plain)).toBe(body(typed));
    expect(plain).not.toMatch(/: number|as const|interface /);
    expect(plain).toContain('k: spatial curvature; mass dimension 2');
  });
});

describe('tupleType', () => {
  it('labels the entries and leaves the end open', () => {
    expect(tupleType(0)).toBe('readonly [value: number, ...higher: number[]]');
    expect(tupleType(4)).toContain('third: number, order4: number, ...higher');
  });
});
