import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import {
  collectScalars,
  comparePowers,
  isCanonicalScalar,
  multiplyScalarTerms,
  powerScalarTerm,
  powersKey,
} from '../../src/notation/scalar-term.js';
import type { ScalarTerm } from '../../src/notation/theory.js';

const powers = fc
  .uniqueArray(fc.tuple(fc.constantFrom('M', 'a1', 'b', 'c_1'), fc.integer({ min: -3, max: 3 })), {
    selector: ([n]) => n,
  })
  .map((list) => list.filter(([, n]) => n !== 0).sort(([x], [y]) => (x < y ? -1 : 1)));
const term: fc.Arbitrary<ScalarTerm> = fc.record({
  coefficient: fc
    .tuple(fc.integer({ min: -9, max: 9 }), fc.integer({ min: 1, max: 9 }))
    .map(([n, d]) => rational(n, d)),
  powers,
});

/** Value at M = 2, a1 = 3, b = 5, c_1 = 7, as a double: good enough to tell apart small terms. */
const VALUES: Readonly<Record<string, number>> = { M: 2, a1: 3, b: 5, c_1: 7 };
const value = ({ coefficient, powers: all }: ScalarTerm): number =>
  (Number(coefficient.num) / Number(coefficient.den)) * all.reduce((p, [name, n]) => p * VALUES[name]! ** n, 1);
const total = (sum: readonly ScalarTerm[]): number => sum.reduce((s, t) => s + value(t), 0);

const expectNear = (got: number, wanted: number, size = Math.abs(wanted)): void =>
  expect(Math.abs(got - wanted)).toBeLessThanOrEqual(1e-12 * size);

describe('scalar terms', () => {
  it('multiply and power as numbers do, and stay canonical', () => {
    fc.assert(
      fc.property(term, term, fc.integer({ min: 0, max: 3 }), (a, b, n) => {
        const product = multiplyScalarTerms(a, b);
        expectNear(value(product), value(a) * value(b));
        expectNear(value(powerScalarTerm(a, n)), value(a) ** n);
        if (product.coefficient.num !== 0n) expect(isCanonicalScalar([product])).toBe(true);
      }),
    );
  });

  it('collect to a canonical sum of the same value, in any order', () => {
    fc.assert(
      fc.property(fc.array(term, { maxLength: 8 }), (list) => {
        const sum = collectScalars(list);
        expect(isCanonicalScalar(sum)).toBe(true);
        expectNear(total(sum), total(list), Math.max(...list.map((t) => Math.abs(value(t))), 1));
        expect(collectScalars([...list].reverse())).toEqual(sum);
      }),
    );
  });

  it('compare by one total order', () => {
    fc.assert(
      fc.property(powers, powers, powers, (a, b, c) => {
        expect(Math.sign(comparePowers(a, b))).toBe(-Math.sign(comparePowers(b, a)) + 0);
        expect(comparePowers(a, b) === 0).toBe(powersKey(a) === powersKey(b));
        if (comparePowers(a, b) <= 0 && comparePowers(b, c) <= 0) expect(comparePowers(a, c)).toBeLessThanOrEqual(0);
      }),
    );
  });

  it('spoilt values are not canonical', () => {
    const one = rational(1);
    expect(isCanonicalScalar([{ coefficient: rational(0), powers: [] }])).toBe(false);
    expect(isCanonicalScalar([{ coefficient: { num: 2n, den: 4n }, powers: [] }])).toBe(false);
    expect(isCanonicalScalar([{ coefficient: one, powers: [['a', 0]] }])).toBe(false);
    expect(
      isCanonicalScalar([
        {
          coefficient: one,
          powers: [
            ['b', 1],
            ['a', 1],
          ],
        },
      ]),
    ).toBe(false);
    expect(
      isCanonicalScalar([
        { coefficient: one, powers: [] },
        { coefficient: one, powers: [] },
      ]),
    ).toBe(false);
  });
});
