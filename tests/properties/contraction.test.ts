/**
 * The reduced Lagrangian of random theories against naive enumeration over all indices, at random exact points.
 */
import { describe, expect, it } from 'vitest';
import { Contraction } from '../oracle/contraction.js';
import * as E from '../oracle/exact.js';
import { fieldJets, frameOf, type GeometryName } from '../oracle/geometry.js';
import { atPoint } from '../oracle/infix.js';
import { CONSTANTS, randomProduct } from '../oracle/lagrangian.js';
import { circumstances, derived } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { torsionTheory } from '../oracle/variation.js';
import { randomTheory, SYMBOLS } from './wanted.js';

const CASES: readonly (readonly [
  geometry: GeometryName,
  degree: readonly [number, number],
  terms: number,
  count: number,
])[] = [
  ['flrw', [1, 4], 4, 30],
  ['bianchi-i', [1, 3], 3, 14],
  ['flrw', [6, 6], 4, 6],
  ['bianchi-i', [6, 6], 1, 1],
];

describe('value of a random Lagrangian', () => {
  CASES.forEach(([geometry, degree, terms, count], row) => {
    it(
      `degree ${degree.join(' to ')} on ${geometry}`,
      () => {
        for (let run = 0; run < runs(count); run++) {
          const seed = firstSeed(10_000 * (row + 1)) + run;
          const random = new Random(seed);
          // The square of three curvatures on Bianchi I is a hundred megabytes of text.
          const liberty = geometry === 'flrw' ? 'squares' : 'brackets';
          const { wanted, oracle } = randomTheory(random, { geometry, degree, terms, matter: 0, liberty });
          const json = derived(wanted);
          const point = random.point(geometry, SYMBOLS);
          const expected = torsionTheory(oracle, point).lagrangian;
          expect(E.show(atPoint(json.lagrangian, point)), circumstances(seed, wanted, point)).toBe(E.show(expected));
        }
      },
      runs(60_000),
    );
  });
});

describe('the naive enumeration itself', () => {
  it('skips only what vanishes: it equals the sum over all 4ⁿ assignments', () => {
    const point = new Random(firstSeed(3)).point('bianchi-i', []);
    const algebra = { kSquared: point.k };
    const frame = frameOf('bianchi-i', fieldJets(point, algebra, -1), algebra);
    let compared = 0;
    for (let run = 0; compared < runs(12); run++) {
      const random = new Random(firstSeed(7000) + run);
      const factors = randomProduct(random, { degree: [1, 3], epsilon: 30, metric: 20, constants: CONSTANTS });
      if (factors === undefined || factors.flatMap((f) => f.slots).length > 12) continue;
      const contraction = new Contraction(frame, random.pick(['-+++', '+---'] as const));
      expect(contraction.value(factors).equals(contraction.dense(factors)), `run ${run}`).toBe(true);
      compared++;
    }
  });
});
