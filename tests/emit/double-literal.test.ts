import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import { doubleParts, nearestDouble } from '../../src/emit/double-literal.js';

/** |x − p/q| as an exact fraction over a common denominator, x a finite double. */
function distance(x: number, p: bigint, q: bigint): bigint {
  // 2^1074 x is an integer for every double.
  let scaled = x;
  let shift = 1074n;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    shift -= 1n;
  }
  const d = (BigInt(scaled) << shift) * q - (p << 1074n);
  return d < 0n ? -d : d;
}

/** The doubles next to x. */
function neighbours(x: number): [number, number] {
  const view = new DataView(new ArrayBuffer(8));
  view.setFloat64(0, x);
  const bits = view.getBigInt64(0);
  const at = (b: bigint) => {
    view.setBigInt64(0, b);
    return view.getFloat64(0);
  };
  return [at(bits - 1n), at(bits + 1n)];
}

const large = fc.bigInt({ min: 1n, max: 10n ** 60n });

describe('nearestDouble', () => {
  it('has no double nearer than its result', () => {
    fc.assert(
      fc.property(large, large, fc.integer({ min: -280, max: 280 }), (p, q, e) => {
        const num = e > 0 ? p * 10n ** BigInt(e) : p;
        const den = e < 0 ? q * 10n ** BigInt(-e) : q;
        const x = nearestDouble(rational(num, den));
        if (!Number.isFinite(x)) return num / den > 10n ** 308n;
        const d = distance(x, num, den);
        return x === 0 ? num * 2n ** 1075n <= den : neighbours(x).every((y) => distance(y, num, den) >= d);
      }),
      { numRuns: 300 },
    );
  });

  it('agrees with the reading of decimal numbers, ties and subnormals included', () => {
    for (const text of [
      '9007199254740993',
      '9007199254740995',
      '36028797018963970',
      '123456789012345678901234567890',
    ]) {
      expect(nearestDouble(rational(BigInt(text)))).toBe(Number(text));
      expect(nearestDouble(rational(-BigInt(text)))).toBe(-Number(text));
    }
    for (const e of [300, 308, 310, 316, 320, 323, 324, 330]) {
      const text = `12345678901234567e-${e}`;
      expect(nearestDouble(rational(12345678901234567n, 10n ** BigInt(e)))).toBe(Number(text));
    }
    expect(nearestDouble(rational(10n ** 400n))).toBe(Number.POSITIVE_INFINITY);
    expect(nearestDouble(rational(10n ** 400n, 10n ** 400n + 1n))).toBe(1);
    expect(nearestDouble(rational(3n * 10n ** 320n, 7n * 10n ** 319n))).toBe(30 / 7);
  });
});

describe('doubleParts', () => {
  const read = ([top, bottom]: readonly string[]): number => Number(top) / Number(bottom ?? '1');

  it('writes small numbers as they are', () => {
    expect(doubleParts(rational(3))).toEqual(['3']);
    expect(doubleParts(rational(22, 7))).toEqual(['22', '7']);
  });

  it('reads back as the nearest double, and never as an integer of another type', () => {
    fc.assert(
      fc.property(large, large, (p, q) => {
        const value = rational(p, q);
        const parts = doubleParts(value);
        const exact = parts.every((t) => /^\d+$/.test(t) && BigInt(t) <= BigInt(Number.MAX_SAFE_INTEGER));
        return (
          read(parts) === nearestDouble(value) &&
          (exact || (parts.length === 1 && /^\d[\d.]*(e[+-]?\d+)?$/.test(parts[0]) && /[.e]/.test(parts[0])))
        );
      }),
    );
  });

  it('overflows where doubles do', () => {
    expect(read(doubleParts(rational(10n ** 400n)))).toBe(Number.POSITIVE_INFINITY);
    expect(read(doubleParts(rational(1n, 10n ** 400n)))).toBe(0);
  });
});
