import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compareSimplicity, dependsOn, echelon, independent, primitive } from '../../src/algebra/linear.js';
import {
  add,
  constant,
  equals,
  generator,
  isCanonical,
  isZero,
  type Poly,
  scale,
  subtract,
  termsOf,
  zero,
} from '../../src/algebra/poly.js';
import { gcd, rational } from '../../src/algebra/rational.js';
import * as E from '../oracle/exact.js';
import { inRing, nonZeroQuotients, quotients, RINGS, sums, tries } from './arbitrary.js';
import { fromKernel, number, plus, type Slow, times, toKernel } from './textbook.js';

/** Rank of a list of vectors, by elimination on a dense matrix. */
function rank(list: readonly Slow[]): number {
  const columns = [...new Set(list.flatMap((p) => [...p.keys()]))];
  const rows = list.map((p) => columns.map((key) => p.get(key) ?? E.ZERO));
  let done = 0;
  for (let c = 0; c < columns.length && done < rows.length; c++) {
    const pivot = rows.findIndex((row, i) => i >= done && !E.isZero(row[c]!));
    if (pivot < 0) continue;
    [rows[done], rows[pivot]] = [rows[pivot]!, rows[done]!];
    const top = rows[done]!;
    for (let i = done + 1; i < rows.length; i++) {
      const ratio = E.div(rows[i]![c]!, top[c]!);
      rows[i] = rows[i]!.map((x, j) => E.sub(x, E.mul(ratio, top[j]!)));
    }
    done++;
  }
  return done;
}

const RING = RINGS[2]!;
const few = sums(['x', 'r'], { terms: 4, low: 0, high: 1, factors: 2 });
/** Lists in which linear relations, zeros and repetitions are common. */
const lists = fc
  .tuple(
    fc.array(few, { minLength: 1, maxLength: 4 }),
    fc.array(fc.tuple(fc.nat(), fc.nat(), quotients), { maxLength: 3 }),
  )
  .chain(([list, mixtures]) => {
    const all = [...list];
    for (const [i, j, c] of mixtures) all.push(plus(all[i % all.length]!, times(number(c), all[j % all.length]!)));
    return fc.shuffledSubarray(all, { minLength: 1 });
  });
const kernel = (list: readonly Slow[]): Poly[] => list.map((p) => toKernel(RING, p));

describe('linear algebra over the rationals', () => {
  it('keeps the vectors that raise the rank', () => {
    fc.assert(
      fc.property(lists, (list) => {
        const polys = kernel(list);
        const want = polys.filter((_, i) => rank(list.slice(0, i + 1)) > rank(list.slice(0, i)));
        expect(independent(polys)).toEqual(want);
      }),
      tries(200),
    );
  });

  it('tells whether a vector depends on others', () => {
    fc.assert(
      fc.property(lists, few, (list, p) => {
        const others = kernel(list);
        expect(dependsOn(toKernel(RING, p), others)).toBe(rank([...list, p]) === rank(list));
        // The very same value among the others.
        expect(others.every((q) => dependsOn(q, others))).toBe(true);
      }),
      tries(200),
    );
    expect(dependsOn(zero(RING), [])).toBe(true);
    expect(dependsOn(constant(RING, 1), [])).toBe(false);
  });

  it('has one echelon basis for each span', () => {
    fc.assert(
      fc.property(
        lists.chain((list) =>
          fc.tuple(fc.constant(list), fc.shuffledSubarray(list, { minLength: list.length }), nonZeroQuotients),
        ),
        ([list, shuffled, c]) => {
          const basis = echelon(kernel(list));
          expect(basis.every(isCanonical)).toBe(true);
          expect(basis.length).toBe(rank(list));
          expect(rank([...list, ...basis.map(fromKernel)])).toBe(basis.length);
          const other = echelon(kernel([...shuffled.map((p) => times(number(c), p)), plus(...list)]));
          expect(other.length).toBe(basis.length);
          basis.forEach((b, i) => {
            expect(equals(b, other[i]!)).toBe(true);
            expect(equals(primitive(b), b)).toBe(true);
            const leading = JSON.stringify(termsOf(b)[0]!.exponents);
            const holders = basis.filter((p) => termsOf(p).some((t) => JSON.stringify(t.exponents) === leading));
            expect(holders.length).toBe(1);
          });
        },
      ),
      tries(200),
    );
  });
});

describe('the primitive multiple', () => {
  it('has coprime integer coefficients, the first positive', () => {
    fc.assert(
      fc.property(
        inRing((names) => sums(names)),
        nonZeroQuotients,
        ({ ring, x: p }, c) => {
          const q = primitive(toKernel(ring, p));
          expect(isCanonical(q)).toBe(true);
          expect(equals(primitive(toKernel(ring, times(number(c), p))), q)).toBe(true);
          if (isZero(q)) return;
          const coefficients = termsOf(q).map((t) => t.coefficient);
          expect(coefficients.every((x) => x.den === 1n)).toBe(true);
          expect(coefficients.reduce((g, x) => gcd(g, x.num), 0n)).toBe(1n);
          expect(coefficients[0]!.num > 0n).toBe(true);
          expect(rank([p, fromKernel(q)])).toBe(1);
        },
      ),
      tries(200),
    );
  });
});

describe('the order by simplicity', () => {
  const one = sums(['x', 'y', 'r'], {
    terms: 3,
    low: -1,
    high: 2,
    coefficients: fc.constantFrom(E.q(1), E.q(-1), E.q(2), E.q(1, 2), E.q(2n ** 60n)),
  });
  it('is total', () => {
    fc.assert(
      fc.property(one, one, one, (p, q, r) => {
        const [a, b, c] = kernel([p, q, r]) as [Poly, Poly, Poly];
        expect(Math.sign(compareSimplicity(a, b)) + Math.sign(compareSimplicity(b, a))).toBe(0);
        expect(compareSimplicity(a, b) === 0).toBe(equals(a, b));
        const [x, y, z] = [a, b, c].sort(compareSimplicity) as [Poly, Poly, Poly];
        expect(compareSimplicity(x, y) <= 0 && compareSimplicity(y, z) <= 0 && compareSimplicity(x, z) <= 0).toBe(true);
      }),
      tries(300),
    );
  });

  it('puts fewer terms first, then fewer factors, and tells signs apart', () => {
    const [x, y] = [generator(RING, 'x'), generator(RING, 'y')];
    const list = [subtract(x, y), add(x, y), add(x, scale(y, rational(1, 2))), y, constant(RING, 3), x];
    const sorted = [...list].sort(compareSimplicity);
    expect(sorted.slice(0, 3).map((p) => p.size)).toEqual([1, 1, 1]);
    expect(equals(sorted[0]!, constant(RING, 3))).toBe(true);
    for (let i = 0; i < 6; i++) {
      const rotated = [...list.slice(i), ...list.slice(0, i)].sort(compareSimplicity);
      expect(rotated.every((p, j) => equals(p, sorted[j]!))).toBe(true);
    }
  });
});
