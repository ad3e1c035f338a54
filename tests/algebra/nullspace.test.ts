import { describe, expect, it } from 'vitest';
import { nullspace, type SparseRow } from '../../src/algebra/nullspace.js';
import {
  addRational,
  isCanonicalRational,
  multiplyRational,
  type Rational,
  rational,
  ZERO,
} from '../../src/algebra/rational.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const row = (entries: Record<number, number | Rational>): SparseRow =>
  new Map(Object.entries(entries).map(([i, v]) => [Number(i), typeof v === 'number' ? rational(v) : v]));

const applied = (r: SparseRow, x: SparseRow): Rational =>
  [...r].reduce((total, [i, c]) => addRational(total, multiplyRational(c, x.get(i) ?? ZERO)), ZERO);

describe('nullspace', () => {
  it('without equations is everything', () => {
    expect(nullspace(3, []).map((v) => [...v.keys()])).toEqual([[0], [1], [2]]);
  });

  it('keeps low unknowns free', () => {
    expect(nullspace(3, [row({ 0: 1, 2: rational(1, 2) })])).toEqual([row({ 0: 1, 2: -2 }), row({ 1: 1 })]);
  });

  it('is empty when every unknown is bound', () => {
    expect(nullspace(2, [row({ 0: 1, 1: 1 }), row({ 0: 1, 1: -1 })])).toEqual([]);
  });

  it('ignores rows that follow from others, and empty ones', () => {
    expect(nullspace(3, [row({ 0: 2, 1: 4 }), row({}), row({ 0: 1, 1: 2 }), row({ 0: -3, 1: -6 })])).toHaveLength(2);
  });

  it('solves random systems of known rank', () => {
    for (let run = 0; run < runs(40); run++) {
      const seed = firstSeed(700) + run;
      const random = new Random(seed);
      const count = 3 + random.below(8);
      const rank = random.below(count);
      // Each row has its own last unknown in a triangular pattern, so the rank is known; then they are mixed.
      const triangular = Array.from({ length: rank }, (_, r) =>
        row(
          Object.fromEntries([
            ...Array.from({ length: count - rank + r }, (_, i) => [i, random.below(7) - 3] as const).filter(
              ([, v]) => v,
            ),
            [count - rank + r, 1 + random.below(3)],
          ]),
        ),
      );
      const mixed = triangular.map((first, r) => {
        const sum = new Map(first);
        for (const other of triangular.slice(r + 1)) {
          const by = rational(random.below(5) - 2, 1 + random.below(3));
          for (const [i, v] of other) {
            const total = addRational(sum.get(i) ?? ZERO, multiplyRational(by, v));
            if (total.num === 0n) sum.delete(i);
            else sum.set(i, total);
          }
        }
        return sum;
      });
      const basis = nullspace(count, mixed);
      expect(basis.length, `seed ${seed}`).toBe(count - rank);
      for (const v of basis) {
        for (const value of v.values()) expect(isCanonicalRational(value) && value.num !== 0n).toBe(true);
        for (const r of triangular) expect(applied(r, v).num, `seed ${seed}`).toBe(0n);
      }
    }
  });
});
