import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { boxProduct, FEW_TERMS, mergedProduct, type TermList } from '../../src/algebra/products.js';
import { constantsOf, makeRing, packMonomial, type Ring } from '../../src/algebra/ring.js';
import { runs } from '../oracle/random.js';

const RINGS = [makeRing(constantsOf(['x', 'y'])), makeRing(constantsOf(['x', 'y', 'z', 'p', 'q', 'r', 's']))];

/** Distinct monomials with small integer coefficients, descending as the program keeps them. */
const listIn = (ring: Ring, exponents: number, size: { minLength: number; maxLength: number }) =>
  fc
    .uniqueArray(
      fc.array(fc.integer({ min: -exponents, max: exponents }), {
        minLength: ring.generators.length,
        maxLength: ring.generators.length,
      }),
      { ...size, selector: String },
    )
    .chain((monomials) =>
      fc.tuple(
        fc.constant(monomials.sort((a, b) => compare(b, a))),
        fc.array(
          fc.integer({ min: -5, max: 5 }).filter((c) => c !== 0),
          {
            minLength: monomials.length,
            maxLength: monomials.length,
          },
        ),
      ),
    );

type List = [number[][], number[]];

function compare(a: readonly number[], b: readonly number[]): number {
  const at = a.findIndex((e, i) => e !== b[i]);
  return at < 0 ? 0 : a[at]! - b[at]!;
}

const packed = (ring: Ring, [monomials, coefficients]: List): TermList => ({
  keys: Float64Array.from(monomials.flatMap((e) => [...packMonomial(ring, e)])),
  coefficients: Float64Array.from(coefficients),
});

/** The product collected in a map, as packed lists are. */
function schoolbook(ring: Ring, [ma, ca]: List, [mb, cb]: List): TermList {
  const found = new Map<string, number>();
  ma.forEach((a, i) => {
    mb.forEach((b, j) => {
      const key = a.map((e, g) => e + b[g]!).join();
      found.set(key, (found.get(key) ?? 0) + ca[i]! * cb[j]!);
    });
  });
  const rows = [...found]
    .filter(([, c]) => c !== 0)
    .map(([key, c]): [number[], number] => [key.split(',').map(Number), c])
    .sort(([a], [b]) => compare(b, a));
  return packed(ring, [rows.map(([m]) => m), rows.map(([, c]) => c)]);
}

describe('products of packed lists', () => {
  it('by merging agree with a map', () => {
    for (const ring of RINGS) {
      const list = listIn(ring, 2, { minLength: 1, maxLength: 30 });
      const few = listIn(ring, 2, { minLength: 1, maxLength: FEW_TERMS });
      fc.assert(
        fc.property(list, few, (a, b) => {
          expect(mergedProduct(ring.words, packed(ring, a), packed(ring, b))).toEqual(schoolbook(ring, a, b));
        }),
        { numRuns: runs(150) },
      );
    }
  });

  it('over a box agree with a map', () => {
    const ring = RINGS[0]!;
    const list = listIn(ring, 6, { minLength: 80, maxLength: 110 });
    let boxes = 0;
    fc.assert(
      fc.property(list, list, (a, b) => {
        const product = boxProduct(ring, packed(ring, a), packed(ring, b));
        if (product) boxes++;
        expect(product).toEqual(schoolbook(ring, a, b));
      }),
      { numRuns: runs(20) },
    );
    expect(boxes).toBeGreaterThan(0);
  });

  it('leave a sparse or short product to the table', () => {
    const ring = RINGS[1]!;
    const short: List = [[[1, 0, 0, 0, 0, 0, 0]], [1]];
    expect(boxProduct(ring, packed(ring, short), packed(ring, short))).toBeUndefined();
    const wide = Array.from({ length: 100 }, (_, i) => [
      100 - i,
      i,
      (7 * i) % 90,
      (11 * i) % 80,
      i % 70,
      i % 60,
      i % 50,
    ]);
    const sparse: List = [wide, wide.map(() => 1)];
    expect(boxProduct(ring, packed(ring, sparse), packed(ring, sparse))).toBeUndefined();
  });

  it('drop terms that cancel', () => {
    const ring = RINGS[0]!;
    const plus: List = [
      [
        [1, 0],
        [0, 1],
      ],
      [1, 1],
    ];
    const minus: List = [plus[0], [1, -1]];
    expect(mergedProduct(ring.words, packed(ring, plus), packed(ring, minus)).coefficients).toEqual(
      Float64Array.of(1, -1),
    );
  });
});
