import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { solveLinear } from '../../src/algebra/linear-system.js';
import {
  constant,
  equals,
  generator,
  isCanonical,
  multiply,
  type Poly,
  product,
  subtract,
  sum,
  zero,
} from '../../src/algebra/poly.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';

const NAMES = ['x', 'y', 'z'];
const ring = makeRing(constantsOf(NAMES));
const [x, y] = NAMES.map((name) => generator(ring, name)) as [Poly, Poly];
const one = constant(ring, 1);

/** By expansion along the first row. */
function determinant(m: readonly (readonly Poly[])[]): Poly {
  if (m.length === 0) return one;
  return sum(
    ring,
    m[0]!.map((entry, j) => {
      const minor = determinant(m.slice(1).map((row) => row.filter((_, i) => i !== j)));
      return j % 2 === 0 ? multiply(entry, minor) : subtract(zero(ring), multiply(entry, minor));
    }),
  );
}

describe('solveLinear', () => {
  it('solves by Cramer’s rule without dividing', () => {
    const solution = solveLinear(
      [
        [x, one],
        [one, y],
      ],
      [one, zero(ring)],
    )!;
    expect(infix(solution.determinant)).toBe('x*y - 1');
    expect(solution.numerators.map((p) => infix(p))).toEqual(['y', '-1']);
  });

  it('exchanges rows where a pivot vanishes, and keeps the sign', () => {
    const solution = solveLinear(
      [
        [zero(ring), x],
        [y, one],
      ],
      [x, one],
    )!;
    expect(infix(solution.determinant)).toBe('-x*y');
    expect(solution.numerators.map((p) => infix(p))).toEqual(['0', '-x*y']);
  });

  it('has no answer for a singular matrix', () => {
    expect(
      solveLinear(
        [
          [x, y],
          [multiply(x, x), multiply(x, y)],
        ],
        [one, one],
      ),
    ).toBeUndefined();
    expect(solveLinear([[zero(ring)]], [zero(ring)])).toBeUndefined();
  });

  it('agrees with the expansion of determinants on random systems', () => {
    for (let run = 0; run < runs(20); run++) {
      const seed = firstSeed(780) + run;
      const random = new Random(seed);
      const n = 1 + random.below(4);
      const entry = (): Poly => randomPoly(random, ring, NAMES, { terms: 2, factors: 2, exponents: [-1, 1] });
      const matrix = Array.from({ length: n }, () => Array.from({ length: n }, entry));
      const right = Array.from({ length: n }, entry);
      const solution = solveLinear(matrix, right);
      const det = determinant(matrix);
      if (!solution) {
        expect(infix(det), `seed ${seed}`).toBe('0');
        continue;
      }
      expect(equals(solution.determinant, det), `seed ${seed}`).toBe(true);
      solution.numerators.forEach((numerator, j) => {
        expect(isCanonical(numerator)).toBe(true);
        const swapped = matrix.map((row, i) => row.map((e, c) => (c === j ? right[i]! : e)));
        expect(equals(numerator, determinant(swapped)), `seed ${seed}`).toBe(true);
        expect(equals(product(ring, [numerator, one]), numerator)).toBe(true);
      });
    }
  });
});
