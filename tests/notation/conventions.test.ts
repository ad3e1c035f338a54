import { describe, expect, it } from 'vitest';
import {
  CHOICES,
  CONVENTION_KEYS,
  type Conventions,
  fromInternal,
  INTERNAL,
  internalWith,
  toInternal,
  translate,
} from '../../src/notation/conventions.js';
import { printLagrangian } from '../../src/notation/print.js';
import type { DeclaredTensor, LagrangianTerm } from '../../src/notation/theory.js';
import { CONSTANTS, randomProduct } from '../oracle/lagrangian.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { SYMBOLS, symbol, terms, theory, theoryFile } from './rendered.js';
import { asYaml, randomConventions, UserTensors } from './user-tensors.js';

const WITH_UNITS = [...SYMBOLS, symbol('kappa'), symbol('G'), symbol('pi')];
/** With it a product of an odd number of torsion tensors is a scalar. */
const SPIN: DeclaredTensor = { name: 'S', slots: 3, generators: [], latex: 'S', dimension: 3 };
const read = (text: string) => terms(text, WITH_UNITS, [SPIN]);
const print = (list: readonly LagrangianTerm[]): string => printLagrangian(list, { symbols: SYMBOLS });
const inside = (text: string, choice: Partial<Conventions>): string =>
  print(toInternal(read(text), { ...INTERNAL, ...choice }));

/** Products that no sign or index order leaves alone. */
const SAMPLES = [
  '1/2 M^2 c0 R + c1 R_{ab} R^{ab} + 3 R_{ab} R^{ba} + R_{abcd} R^{abcd} + R_{abcd} R^{acbd} - R_{abcd} R^{cdab}',
  'R_{abcd} T^{abe} T^{cd}{}_e + R_{ab} T^a A^b + R^a{}_b T_a T^b + M^3 T_a T^a - M T_{abc} R^{ab} T^c',
  'T_{abc} T^{abc} + T_{abc} T^{bac} + T_a A^a + \\epsilon^{abcd} R_{abcd} + \\epsilon_{abcd} T^{eab} T_e{}^{cd} R',
  'T^{(axial)}_{abc} T^{abc} + R^{(weyl)}_{abcd} T^{abe} T^{cd}{}_e + R^{(ricci)}{}^{ab}{}_{ac} R_b{}^c + M^{-1} \\eta_{ab} R^{ab} + S_{abc} T^{abc}',
];

describe.each(CONVENTION_KEYS.flatMap((key) => CHOICES[key].map((value) => ({ key, value }))))(
  '$key: $value',
  ({ key, value }) => {
    const conventions = { ...INTERNAL, [key]: value } as Conventions;
    const samples = SAMPLES.map(read);
    it('there and back', () => {
      for (const sample of samples) {
        const written = fromInternal(sample, conventions);
        expect(toInternal(written, conventions)).toEqual(sample);
        expect(fromInternal(toInternal(written, conventions), conventions)).toEqual(written);
      }
    });
    it('changes something, unless it is the internal choice', () => {
      const same = samples.every((sample) => print(fromInternal(sample, conventions)) === print(sample));
      expect(same).toBe(value === CHOICES[key][0]);
    });
  },
);

describe('each choice alone', () => {
  it.each<[Partial<Conventions>, string, string]>([
    [
      { signature: '+---' },
      'R + R_{ab} R^{ab} + T_a T^a + T_{abc} T^{abc}',
      '-R + R_{ab} R^{ab} - T_a T^a - T_{abc} T^{abc}',
    ],
    [
      { signature: '+---' },
      '\\epsilon^{abcd} R_{abcd} + A_a A^a + T_a A^a',
      '-\\epsilon^{abcd} R_{abcd} - A_a A^a - T_a A^a',
    ],
    [
      { signature: '+---' },
      'R_{abcd} R^{abcd} + R T_a T^a + \\eta^{ab} R_{ab}',
      'R_{abcd} R^{abcd} + R T_a T^a - \\eta^{ab} R_{ab}',
    ],
    [
      { torsion: 'half' },
      'T_{abc} T^{abc} + T_a T^a + A_a T^a + R',
      '1/4 T_{abc} T^{abc} + 1/4 T_a T^a + 1/4 A_a T^a + R',
    ],
    [{ 'torsion-sign': '-1' }, 'T_a T^a + S_{abc} T^{abc}', 'T_a T^a - S_{abc} T^{abc}'],
    [{ 'torsion-index': 'last' }, 'T_{bc}{}^a T^{bc}{}_a + T_{abc} T^{acb}', 'T^a{}_{bc} T_a{}^{bc} + T_{cab} T^{bac}'],
    [{ 'torsion-index': 'last' }, 'T_a A^a', 'T_a A^a'],
    [{ 'torsion-trace': 'T^b_{ba}' }, 'T_a A^a + T_a T^a', '-T_a A^a + T_a T^a'],
    [{ 'curvature-sign': '-1' }, 'R + R^2 + R_{abcd} R^{ab} R^{cd}', '-R + R^2 - R_{abcd} R^{ab} R^{cd}'],
    [
      { 'curvature-indices': 'form-first' },
      'R_{cd}{}^a{}_b R^{cd}{}_a{}^b + R_{ab} R^{ab}',
      'R^a{}_{bcd} R_a{}^{bcd} + R_{ab} R^{ab}',
    ],
    [
      { ricci: 'R^c_{abc}' },
      'R + R_{ab} R^{ab} + R_{abcd} R^{acbd} + R_{ab} T^a T^b',
      '-R + R_{ab} R^{ab} + R_{abcd} R^{acbd} - R_{ab} T^a T^b',
    ],
    [{ ricci: 'R^c_{bca}' }, 'R + R_{ab} T^{abc} T_c', 'R + R_{ba} T^{abc} T_c'],
    [{ ricci: 'R^c_{bac}' }, 'R + R_{ab} T^{abc} T_c', '-R - R_{ba} T^{abc} T_c'],
    [
      { epsilon: '-1' },
      '\\epsilon^{abcd} R_{abcd} + T_a A^a + A_a A^a',
      '-\\epsilon^{abcd} R_{abcd} - T_a A^a + A_a A^a',
    ],
    [{ action: '-1' }, '1/2 M^2 R - T_a T^a + 3', '-1/2 M^2 R + T_a T^a - 3'],
    [{ units: 'kappa' }, '\\frac{1}{2\\kappa} R + kappa R^2 T_a T^a + M R', '1/2 M^2 R + M^{-2} R^2 T_a T^a + M R'],
    [{ units: '8piG' }, '\\frac{1}{16 \\pi G} R + \\pi R^2', '1/2 M^2 R + pi R^2'],
    [{ units: '8piG' }, 'G^2 R', '1/64 M^{-4} pi^{-2} R'],
  ])('%j: %s', (choice, typed, understood) => {
    expect(inside(typed, choice)).toBe(understood);
  });

  it('parts follow their tensor', () => {
    expect(inside('T^{(axial)}_{bc}{}^a T^{bc}{}_a', { 'torsion-index': 'last', torsion: 'half' })).toBe(
      '1/4 T^{(axial)}{}^a{}_{bc} T_a{}^{bc}',
    );
    expect(inside('R^{(weyl)}_{abcd} T^{abe} T^{cd}{}_e', { 'curvature-sign': '-1' })).toBe(
      '-R^{(weyl)}_{abcd} T^{abe} T^{cd}{}_e',
    );
  });

  it('like terms meet', () => {
    expect(inside('\\frac{R}{2 kappa} + 1/2 M^2 R', { units: 'kappa' })).toBe('M^2 R');
  });

  it('odd powers of M keep one M', () => {
    const out = (text: string, units: Conventions['units']) => print(fromInternal(read(text), { ...INTERNAL, units }));
    expect(out('M^3 R + M^{-1} R + M^{-3} R + M R', 'kappa')).toBe('M kappa^{-1} R + M^{-1} R + M^{-1} kappa R + M R');
    expect(out('1/2 M^2 R', '8piG')).toBe('1/16 G^{-1} pi^{-1} R');
  });
});

describe('any combination of choices', () => {
  it('gives the value that the definitions give, component by component', () => {
    for (let run = 0, done = 0; done < runs(60); run++) {
      const seed = firstSeed(31_000) + run;
      const random = new Random(seed);
      const factors = randomProduct(random, { degree: [1, 3], epsilon: 30, metric: 20, constants: CONSTANTS });
      if (factors === undefined || factors.length === 0 || factors.flatMap((f) => f.slots).length > 12) continue;
      const conventions = randomConventions(random);
      const user = new UserTensors(seed, conventions);
      // A product that vanishes would agree with anything.
      if (user.value(factors) === 0) continue;
      done++;
      const text = printLagrangian([{ scalar: read('1')[0]!.scalar, factors }]);
      const file = theoryFile(`conventions: ${asYaml(conventions)}`, `lagrangian: '${text}'`);
      const { lagrangian, signature } = theory(file);
      const typed = user.value(factors) * (conventions.action === '-1' ? -1 : 1);
      const message = `seed ${seed}\n${file}\nunderstood ${printLagrangian(lagrangian)}`;
      const inSignature = new UserTensors(seed, internalWith(signature));
      expect(inSignature.lagrangian(lagrangian), message).toBeCloseTo(typed, 6);
      const internal = translate(lagrangian, internalWith(signature), INTERNAL);
      expect(new UserTensors(seed, INTERNAL).lagrangian(internal), message).toBeCloseTo(typed, 6);
    }
  });
});
