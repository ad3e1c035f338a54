/**
 * Euler–Lagrange expressions and Friedmann form of random theories against variation by dual numbers over power series, at
 * random exact points.
 */
import { describe, expect, it } from 'vitest';
import type { LagrangianTerm } from '../oracle/contraction.js';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import type { GeometryName, Point } from '../oracle/geometry.js';
import { atPoint } from '../oracle/infix.js';
import { CONSTANTS, randomTerm, write } from '../oracle/lagrangian.js';
import { circumstances, derived, equationsAt, shown } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { torsionTheory } from '../oracle/variation.js';
import { NAMED, randomTheory, SYMBOLS } from './wanted.js';

const CASES: readonly (readonly [geometry: GeometryName, degree: readonly [number, number], count: number])[] = [
  ['flrw', [1, 2], 20],
  ['flrw', [1, 4], 20],
  ['bianchi-i', [1, 3], 14],
  ['flrw', [6, 6], 4],
];

describe('Euler–Lagrange expressions of a random theory with matter', () => {
  CASES.forEach(([geometry, degree, count], row) => {
    it(
      `degree ${degree.join(' to ')} on ${geometry}`,
      () => {
        for (let run = 0; run < runs(count); run++) {
          const seed = firstSeed(10_000 * (row + 6)) + run;
          const random = new Random(seed);
          const liberty = geometry === 'flrw' ? 'squares' : 'brackets';
          const { wanted, oracle } = randomTheory(random, { geometry, degree, terms: 4, matter: 30, liberty });
          const json = derived(wanted);
          expect(json.checks.every((c) => c.holds)).toBe(true);
          const point = random.point(geometry, SYMBOLS);
          const expected = torsionTheory(oracle, point);
          const about = circumstances(seed, wanted, point);
          expect(E.show(atPoint(json.lagrangian, point)), about).toBe(E.show(expected.lagrangian));
          expect(shown(equationsAt(json, point)), about).toEqual(shown(expected.equations));
        }
      },
      runs(60_000),
    );
  });
});

/** How many metrics the contraction contains, mod 2: whether it changes its sign with the signature. */
function flips({ factors }: LagrangianTerm): boolean {
  const natural: Readonly<Record<string, readonly boolean[]>> = {
    R4: [true, false, false, false],
    R2: [false, false],
    R0: [],
    T3: [true, false, false],
    T1: [false],
    A1: [true],
    epsilon4: [false, false, false, false],
    eta2: [false, false],
    delta2: [true, false],
  };
  let metrics = 0;
  for (const { head, slots } of factors) {
    const heights = natural[`${head}${slots.length}`]!;
    metrics += slots.filter((slot, i) => slot.up !== heights[i]).length;
    // R = η^ab R_ab; A^a = ε^abcd T_bcd lowers one index of T^b_cd and raises four of ε; η is itself.
    if (['R0', 'A1', 'eta2'].includes(`${head}${slots.length}`)) metrics++;
  }
  return metrics % 2 === 1;
}

describe('signature', () => {
  it(
    'a theory written in (+−−−), its odd coefficients flipped, has the same equations',
    () => {
      for (let run = 0; run < runs(16); run++) {
        const seed = firstSeed(150_000) + run;
        const random = new Random(seed);
        const geometry = random.pick(['flrw', 'flrw', 'bianchi-i'] as const);
        const wishes = {
          degree: [1, geometry === 'flrw' ? 4 : 2] as const,
          epsilon: 35,
          metric: 20,
          constants: CONSTANTS,
        };
        const terms = Array.from({ length: 1 + random.below(4) }, () => randomTerm(random, wishes));
        const texts = [terms, terms.map((t) => (flips(t) ? { ...t, coefficient: E.neg(t.coefficient) } : t))].map(
          (lagrangian) => write(random, lagrangian, 'none').text,
        );
        const [east, west] = (['-+++', '+---'] as const).map((signature, i) =>
          derived({ ...NAMED, lagrangian: texts[i]!, signature, geometry }),
        );
        expect(west!.equations, `seed ${seed}\n${texts.join('\n\n')}`).toEqual(east!.equations);
        expect(west!.lagrangian).toBe(east!.lagrangian);
        expect(west!.scalarTensor).toEqual(east!.scalarTensor);
      }
    },
    runs(60_000),
  );
});

describe('Friedmann form of a random theory', () => {
  it(
    '3M²(H² + k/a²) = ρ + ρ_T and −M²(2Ḣ + 3H² + k/a²) = p + p_T say the same as E_N = 0 and E_a = 0',
    () => {
      for (let run = 0; run < runs(16); run++) {
        const seed = firstSeed(200_000) + run;
        const random = new Random(seed);
        const { wanted, oracle } = randomTheory(random, { geometry: 'flrw', degree: [1, 3], terms: 4, matter: 0 });
        const json = derived(wanted);
        const drawn = random.point('flrw', SYMBOLS);
        const point: Point = { ...drawn, fields: { ...drawn.fields, N: [E.ONE, E.ZERO, E.ZERO] } };
        const { equations } = torsionTheory(oracle, point);
        const [a, velocity, acceleration] = point.fields.a as [Q, Q, Q];
        const H2 = E.pow(E.div(velocity, a), 2);
        const kOverA2 = E.div(point.k, E.pow(a, 2));
        const M2 = E.pow(point.constants.M!, 2);
        // The density and the pressure that would solve E_N − a³ρ = 0 and E_a + 3a²p = 0.
        const rho = E.div(equations.N!, E.pow(a, 3));
        const p = E.div(E.neg(equations.a!), E.mul(E.q(3), E.pow(a, 2)));
        const rhoT = E.sub(E.product(E.q(3), M2, E.add(H2, kOverA2)), rho);
        // 2Ḣ + 3H² = 2ä/a + H²
        const bending = E.sum(E.mul(E.q(2), E.div(acceleration, a)), H2, kOverA2);
        const pT = E.sub(E.neg(E.mul(M2, bending)), p);
        const about = circumstances(seed, wanted, point);
        expect(E.show(atPoint(json.friedmann.rho_T, point)), about).toBe(E.show(rhoT));
        expect(E.show(atPoint(json.friedmann.p_T, point)), about).toBe(E.show(pT));
      }
    },
    runs(60_000),
  );
});
