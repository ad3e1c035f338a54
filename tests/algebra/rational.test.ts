import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addRational,
  divideRational,
  equalRational,
  gcd,
  isCanonicalRational,
  multiplyRational,
  negateRational,
  ONE,
  powerRational,
  printRational,
  type Rational,
  rational,
  signOfRational,
  squareRootOf,
  subtractRational,
  toNumber,
  ZERO,
} from '../../src/algebra/rational.js';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import { integers, quotients, tries } from './arbitrary.js';
import { toRational } from './textbook.js';

function expectValue(x: Rational, q: Q): void {
  expect(isCanonicalRational(x)).toBe(true);
  expect(`${x.num}/${x.den}`).toBe(`${q.n}/${q.d}`);
}

describe('rational', () => {
  it('does what schoolbook fractions do', () => {
    fc.assert(
      fc.property(quotients, quotients, fc.integer({ min: -4, max: 4 }), (p, q, n) => {
        const [x, y] = [toRational(p), toRational(q)];
        expectValue(addRational(x, y), E.add(p, q));
        expectValue(subtractRational(x, y), E.sub(p, q));
        expectValue(multiplyRational(x, y), E.mul(p, q));
        expectValue(negateRational(x), E.neg(p));
        expectValue(subtractRational(x, x), E.ZERO);
        if (!E.isZero(q)) expectValue(divideRational(x, y), E.div(p, q));
        if (!E.isZero(p) || n >= 0) expectValue(powerRational(x, n), E.pow(p, n));
        expect(equalRational(x, y)).toBe(E.same(p, q));
        expect(signOfRational(x)).toBe(p.n < 0n ? -1 : p.n > 0n ? 1 : 0);
        expect(printRational(x)).toBe(E.show(p));
      }),
      tries(300),
    );
  });

  it('reduces to lowest terms with a positive denominator', () => {
    fc.assert(
      fc.property(integers, integers, integers, (n, d, m) => {
        fc.pre(d !== 0n && m !== 0n);
        expectValue(rational(n * m, d * m), E.q(n, d));
      }),
      tries(300),
    );
    expectValue(rational(6, -4), E.q(-3, 2));
    expectValue(rational(0, -7), E.ZERO);
    expect(equalRational(ZERO, rational(0)) && equalRational(ONE, rational(5, 5))).toBe(true);
  });

  it('finds greatest common divisors by their definition', () => {
    fc.assert(
      fc.property(fc.integer({ min: -60, max: 60 }), fc.integer({ min: -60, max: 60 }), (a, b) => {
        let best = 0;
        for (let d = 1; d <= 60; d++) if (a % d === 0 && b % d === 0 && (a !== 0 || b !== 0)) best = d;
        expect(gcd(BigInt(a), BigInt(b))).toBe(BigInt(best));
      }),
      tries(),
    );
  });

  it('refuses division by zero and numbers that are not integers', () => {
    expect(() => rational(1, 0)).toThrow(RangeError);
    expect(() => divideRational(ONE, ZERO)).toThrow('division by zero');
    expect(() => powerRational(ZERO, -1)).toThrow('division by zero');
    expect(() => rational(0.5)).toThrow(RangeError);
    expect(() => rational(Number.NaN)).toThrow(RangeError);
    expectValue(powerRational(ZERO, 0), E.ONE);
  });

  it('tells a spoiled value', () => {
    expect(isCanonicalRational({ num: 2n, den: 4n })).toBe(false);
    expect(isCanonicalRational({ num: 1n, den: -2n })).toBe(false);
    expect(isCanonicalRational({ num: 1n, den: 0n })).toBe(false);
    expect(isCanonicalRational({ num: 0n, den: 3n })).toBe(false);
  });
});

/** A double as the fraction that it is. */
function exactly(x: number): Q {
  let denominator = 1n;
  let y = x;
  while (!Number.isInteger(y)) {
    y *= 2;
    denominator *= 2n;
  }
  return E.q(BigInt(y), denominator);
}

const distance = (x: Q, y: Q): Q => {
  const d = E.sub(x, y);
  return d.n < 0n ? E.neg(d) : d;
};
const atMost = (x: Q, y: Q): boolean => x.n * y.d <= y.n * x.d;
const bits = new DataView(new ArrayBuffer(8));
/** The neighbour of a positive double, one bit up or down. */
function neighbour(x: number, step: 1n | -1n): number {
  bits.setFloat64(0, x);
  bits.setBigInt64(0, bits.getBigInt64(0) + step);
  return bits.getFloat64(0);
}

describe('toNumber', () => {
  it('gives back every double', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (x) => {
        const q = exactly(x);
        expect(toNumber(rational(q.n, q.d)) === x).toBe(true);
      }),
      tries(300),
    );
    expect(toNumber(rational(1n, 2n ** 1074n))).toBe(Number.MIN_VALUE);
    expect(toNumber(rational((2n ** 53n - 1n) * 2n ** 971n))).toBe(Number.MAX_VALUE);
  });

  it('is as near as a double can be', () => {
    const sizes = fc.oneof(integers, fc.bigInt({ min: -(2n ** 1200n), max: 2n ** 1200n }));
    fc.assert(
      fc.property(sizes, sizes, (n, d) => {
        fc.pre(n !== 0n && d !== 0n);
        const q = E.q(n, d);
        const x = toNumber(rational(n, d));
        const size = q.n < 0n ? E.neg(q) : q;
        const found = Math.abs(x);
        if (found === 0 || found === Number.POSITIVE_INFINITY) return;
        expect(Math.sign(x)).toBe(q.n < 0n ? -1 : 1);
        for (const step of [1n, -1n] as const) {
          const other = neighbour(found, step);
          if (other === Number.POSITIVE_INFINITY) continue;
          expect(atMost(distance(size, exactly(found)), distance(size, exactly(other)))).toBe(true);
        }
      }),
      tries(300),
    );
  });

  it('handles numerator and denominator beyond the range of doubles', () => {
    const big = 10n ** 400n;
    expect(toNumber(rational(3n * big + 1n, 2n * big + 1n))).toBe(1.5);
    expect(toNumber(rational(-(3n * big + 1n), 2n * big + 1n))).toBe(-1.5);
    expect(toNumber(rational(2n ** 2000n + 1n, 2n ** 1000n))).toBe(2 ** 1000);
    expect(toNumber(rational(2n ** 1000n, 2n ** 2000n + 1n))).toBe(2 ** -1000);
    expect(toNumber(rational(1n, big))).toBe(0);
    expect(toNumber(rational(big))).toBe(Number.POSITIVE_INFINITY);
    expect(toNumber(rational(-big))).toBe(Number.NEGATIVE_INFINITY);
  });

  it('rounds ties to even, once, near the smallest double and at the largest', () => {
    expect(toNumber(rational(2n ** 53n + 1n))).toBe(2 ** 53);
    expect(toNumber(rational(2n ** 53n + 3n))).toBe(2 ** 53 + 4);
    expect(toNumber(rational(2n ** 60n + 2n ** 7n, 2n ** 60n))).toBe(1);
    expect(toNumber(rational(2n ** 160n + 2n ** 107n + 1n, 2n ** 160n))).toBe(1 + 2 ** -52);
    expect(toNumber(rational(1n, 2n ** 1075n))).toBe(0);
    expect(toNumber(rational(3n, 2n ** 1075n))).toBe(2 * Number.MIN_VALUE);
    expect(toNumber(rational(2n ** 1024n - 2n ** 970n))).toBe(Number.POSITIVE_INFINITY);
    expect(toNumber(rational(2n ** 1024n - 2n ** 970n - 1n))).toBe(Number.MAX_VALUE);
  });
});

describe('rational roots', () => {
  it('are found exactly when there are some', () => {
    fc.assert(
      fc.property(quotients, (q) => {
        const x = toRational(q);
        const root = squareRootOf(multiplyRational(x, x))!;
        expect(root.num >= 0n).toBe(true);
        expect(multiplyRational(root, root)).toEqual(multiplyRational(x, x));
      }),
    );
    for (const [num, den] of [
      [2n, 1n],
      [1n, 3n],
      [-4n, 1n],
      [10n ** 40n + 1n, 1n],
    ] as const)
      expect(squareRootOf(rational(num, den))).toBeUndefined();
  });
});
