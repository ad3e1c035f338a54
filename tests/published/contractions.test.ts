/**
 * Torsion, curvature and their scalar contractions on the isotropic, homogeneous geometry.
 * Source of the component form: Phys. Lett. A 75 (1979) 27 (memory); values of the contractions: computed.
 */
import { describe, expect, it } from 'vitest';
import { Contraction } from '../oracle/contraction.js';
import * as E from '../oracle/exact.js';
import { fieldJets, frameOf, levi, type Point, RANGE } from '../oracle/geometry.js';
import { atPoint } from '../oracle/infix.js';
import type { Algebra, Jet } from '../oracle/jet.js';
import { derived } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { factorsOf } from '../oracle/reading.js';

/** u, v, A1 … A4 as jets, from their closed forms. */
function invariants(point: Point, algebra: Algebra): Record<'u' | 'v' | 'A1' | 'A2' | 'A3' | 'A4' | 'k', Jet> {
  const { N, a, phi, psi } = fieldJets(point, algebra, 1) as Record<string, Jet>;
  const hubble = a!.rate().over(a!.times(N!));
  const k = a!.over(a!).scaled(point.k);
  return {
    k,
    u: hubble.minus(phi!),
    v: psi!,
    A1: phi!.rate().over(N!).plus(hubble.times(phi!)),
    A2: phi!.times(psi!).scaled(E.q(2)),
    A3: psi!.rate().over(N!).plus(hubble.times(psi!)),
    A4: k.over(a!.times(a!)).plus(phi!.power(2)).minus(psi!.power(2)),
  };
}

type Value = (i: ReturnType<typeof invariants>) => Jet;
const times = (n: number, x: Jet): Jet => x.scaled(E.q(n));

/** Contraction, its value, and the parity of the number of metrics in it: its sign flips under (+−−−) when odd. */
const TABLE: readonly (readonly [text: string, value: Value, odd: boolean])[] = [
  ['R', (i) => times(6, i.A1.plus(i.A4)), true],
  ['R_{ab} R^{ab}', ricci, false],
  ['R_{ab} R^{ba}', ricci, false],
  [
    'R_{abcd} R^{abcd}',
    (i) => times(12, i.A1.power(2).minus(i.A2.power(2)).minus(i.A3.power(2)).plus(i.A4.power(2))),
    false,
  ],
  [
    'R_{abcd} R^{cdab}',
    (i) =>
      times(
        12,
        i.A1.power(2)
          .minus(times(2, i.A2.times(i.A3)))
          .plus(i.A4.power(2)),
      ),
    false,
  ],
  ['R_{abcd} R^{acbd}', (i) => times(6, i.A1.power(2).plus(i.A4.power(2)).plus(i.A2.plus(i.A3).power(2))), false],
  ['T_{abc} T^{abc}', (i) => times(-6, i.u.power(2)).plus(times(24, i.v.power(2))), true],
  ['T_{abc} T^{bac}', (i) => times(-3, i.u.power(2)).minus(times(24, i.v.power(2))), true],
  ['T_a T^a', (i) => times(-9, i.u.power(2)), true],
  ['A_a A^a', (i) => times(-144, i.v.power(2)), true],
  ['T_a A^a', (i) => times(-36, i.u.times(i.v)), true],
  ['\\epsilon^{abcd} R_{abcd}', (i) => times(12, i.A2.plus(i.A3)), true],
  ['\\epsilon^{abcd} R_{abef} R_{cd}{}^{ef}', (i) => times(48, i.A1.times(i.A3).plus(i.A2.times(i.A4))), false],
  ['\\epsilon^{abcd} R_{efab} R^{ef}{}_{cd}', (i) => times(48, i.A1.times(i.A2).plus(i.A3.times(i.A4))), false],
  ['\\epsilon^{abcd} T_{eab} T^e{}_{cd}', (i) => times(-48, i.u.times(i.v)), true],
];

function ricci(i: ReturnType<typeof invariants>): Jet {
  return times(12, i.A1.power(2).plus(i.A1.times(i.A4)).plus(i.A4.power(2)));
}

function setUp(seed: number): { point: Point; algebra: Algebra; frame: ReturnType<typeof frameOf> } {
  const point = new Random(seed).point('flrw', []);
  const algebra: Algebra = { kSquared: point.k };
  return { point, algebra, frame: frameOf('flrw', fieldJets(point, algebra, 1), algebra) };
}

describe('isotropic, homogeneous torsion and curvature — Phys. Lett. A 75 (1979) 27 (memory)', () => {
  for (let run = 0; run < runs(3); run++) {
    const seed = firstSeed(41) + run;
    const { point, algebra, frame } = setUp(seed);
    const i = invariants(point, algebra);
    const nil = i.u.minus(i.u);
    const delta = (a: number, b: number): number => (a === b ? 1 : 0);
    /** Coefficient of e^0∧e^l: X_c δ for (0, l); antisymmetrised here. */
    const pair = (c: number, d: number, x: (l: number) => Jet): Jet =>
      c === 0 && d > 0 ? x(d) : d === 0 && c > 0 ? x(c).negated() : nil;

    it(`T^i = u e^0∧e^i + v ε_ijk e^j∧e^k and T^0 = 0, seed ${seed}`, () => {
      for (const a of RANGE)
        for (const b of RANGE)
          for (const c of RANGE) {
            let expected = pair(b, c, (l) => times(delta(a, l), i.u));
            if (a > 0 && b > 0 && c > 0) expected = expected.plus(times(2 * levi(a, b, c), i.v));
            expect(frame.torsion[a]![b]![c]!.equals(expected), `T^${a}_${b}${c}`).toBe(true);
          }
    });

    it(`R^i_0 and R^i_j in A1 … A4, the rest by antisymmetry, seed ${seed}`, () => {
      const boost = (a: number, c: number, d: number): Jet => {
        const electric = pair(c, d, (l) => times(delta(a, l), i.A1));
        return c > 0 && d > 0 ? electric.plus(times(levi(a, c, d), i.A2)) : electric;
      };
      for (const a of RANGE)
        for (const b of RANGE)
          for (const c of RANGE)
            for (const d of RANGE) {
              let expected = nil;
              if (a > 0 && b === 0) expected = boost(a, c, d);
              // R_ab = −R_ba with η_00 = −1 makes R^0_i equal to R^i_0.
              else if (a === 0 && b > 0) expected = boost(b, c, d);
              else if (a > 0 && b > 0) {
                expected = times(delta(a, c) * delta(b, d) - delta(a, d) * delta(b, c), i.A4);
                expected = expected.plus(pair(c, d, (l) => times(-levi(a, b, l), i.A3)));
              }
              expect(frame.curvature[a]![b]![c]![d]!.equals(expected), `R^${a}_${b}${c}${d}`).toBe(true);
            }
    });
  }
});

describe('scalar contractions on that geometry (computed)', () => {
  for (const [text, value, odd] of TABLE)
    it(`${text}: direct enumeration, both signatures`, () => {
      for (let run = 0; run < runs(2); run++) {
        const seed = firstSeed(57) + run;
        const { point, algebra, frame } = setUp(seed);
        const expected = value(invariants(point, algebra));
        const factors = factorsOf(text);
        const east = new Contraction(frame, '-+++');
        const west = new Contraction(frame, '+---');
        expect(east.value(factors).equals(expected), `seed ${seed}`).toBe(true);
        expect(west.value(factors).equals(odd ? expected.negated() : expected), `seed ${seed}`).toBe(true);
      }
    });

  for (const [text, value, odd] of TABLE)
    for (const signature of ['-+++', '+---'] as const)
      it(`${text}: through the program, ${signature}`, () => {
        const json = derived({ lagrangian: `7/3 c1 ${text}`, constants: ['c1'], signature });
        for (let run = 0; run < runs(2); run++) {
          const point = new Random(firstSeed(64) + run).point('flrw', ['M', 'c1']);
          const front = E.mul(E.q(odd && signature === '+---' ? -7 : 7, 3), point.constants.c1!);
          const volume = E.mul(E.pow(point.fields.a![0]!, 3), point.fields.N![0]!);
          const expected = value(invariants(point, { kSquared: point.k })).rationalAt(0);
          expect(E.show(atPoint(json.lagrangian, point))).toBe(E.show(E.product(front, volume, expected)));
        }
      });

  it('the pruned enumeration agrees with all 4ⁿ assignments', () => {
    const { frame } = setUp(firstSeed(71));
    const east = new Contraction(frame, '-+++');
    for (const text of [
      'R_{abcd} R^{acbd}',
      'T_{abc} T^{ab}{}_d T^{cd}{}_e T^e',
      '\\epsilon^{abcd} T_{eab} T^e{}_{cd}',
      'R_{abcd} T^{abe} T^{cd}{}_e',
      'R^a{}_b \\delta^b_a',
      '\\eta_{ab} A^a T^b',
    ]) {
      const factors = factorsOf(text);
      expect(east.value(factors).equals(east.dense(factors)), text).toBe(true);
    }
  });
});
