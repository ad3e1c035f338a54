import { describe, expect, it } from 'vitest';
import { nonNegativeSolution } from '../../src/algebra/feasibility.js';
import { addRational, multiplyRational, type Rational, rational, ZERO } from '../../src/algebra/rational.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

type Column = readonly (readonly [number, Rational])[];

const times = (columns: readonly Column[], x: readonly Rational[], rows: number): Rational[] => {
  const out: Rational[] = new Array<Rational>(rows).fill(ZERO);
  columns.forEach((column, j) => {
    for (const [i, value] of column) out[i] = addRational(out[i]!, multiplyRational(value, x[j]!));
  });
  return out;
};

const column = (...values: readonly number[]): Column => values.map((v, i) => [i, rational(v)] as const);

describe('non-negative solutions', () => {
  it('are found when there are some', () => {
    const columns = [column(1, 1), column(-1, 2), column(0, 1)];
    const right = [rational(1), rational(7)];
    const x = nonNegativeSolution(columns, right);
    expect(Array.isArray(x)).toBe(true);
    expect(times(columns, x as Rational[], 2)).toEqual(right);
  });

  it('are denied when the sign cannot be reached', () => {
    expect(nonNegativeSolution([column(1, 1), column(2, 3)], [rational(-1), rational(1)])).toBeUndefined();
    expect(nonNegativeSolution([], [rational(1)])).toBeUndefined();
    expect(nonNegativeSolution([column(0)], [rational(0)])).toEqual([ZERO]);
  });

  it('solve every system that was made from one, and a denial has a separating functional (Farkas)', () => {
    let denied = 0;
    for (let run = 0; run < runs(60); run++) {
      const random = new Random(firstSeed(9100) + run);
      const rows = 1 + random.below(4);
      const columns = Array.from({ length: 1 + random.below(5) }, () =>
        column(...Array.from({ length: rows }, () => random.below(7) - 3)),
      );
      const made = columns.map(() => rational(random.below(4)));
      const right = times(columns, made, rows);
      const x = nonNegativeSolution(columns, right);
      expect(Array.isArray(x), `seed ${firstSeed(9100) + run}`).toBe(true);
      expect((x as Rational[]).every((v) => v.num >= 0n)).toBe(true);
      expect(times(columns, x as Rational[], rows)).toEqual(right);
      const other = right.map(() => rational(random.below(9) - 4));
      const y = nonNegativeSolution(columns, other);
      if (y === undefined) {
        denied++;
        // A denial is checked on a grid of small solutions.
        for (let n = 0; n < 4 ** columns.length; n++) {
          const guess = columns.map((_, j) => rational(Math.floor(n / 4 ** j) % 4));
          expect(times(columns, guess, rows)).not.toEqual(other);
        }
      } else if (y !== 'unknown') expect(times(columns, y, rows)).toEqual(other);
    }
    expect(denied).toBeGreaterThan(0);
  });
});
