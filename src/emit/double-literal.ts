/** Exact rationals as numeric literals of a language whose numbers are IEEE 754 doubles. */
import type { Rational } from '../algebra/rational.js';

const SAFE = BigInt(Number.MAX_SAFE_INTEGER);
/** Bits kept before the last rounding: more than a double holds, so that one sticky bit decides ties. */
const GUARD = 66n;

/** The double nearest to a rational, ties to even; infinite or subnormal where doubles end. */
export function nearestDouble({ num, den }: Rational): number {
  if (num < 0n) return -nearestDouble({ num: -num, den });
  if (num <= SAFE && den <= SAFE) return Number(num) / Number(den);
  const shift = GUARD - BigInt(num.toString(2).length - den.toString(2).length);
  const top = shift > 0n ? num << shift : num;
  const bottom = shift < 0n ? den << -shift : den;
  const quotient = top / bottom;
  const sticky = quotient * bottom === top ? 0n : 1n;
  return scaleByPowerOfTwo((quotient << 1n) | sticky, -Number(shift) - 1);
}

/** n · 2^e with one rounding: bits that a subnormal result cannot hold are folded into the sticky bit first. */
function scaleByPowerOfTwo(n: bigint, e: number): number {
  const bits = n.toString(2).length;
  const lost = -1074 - e;
  if (bits + e > -1021 || lost <= 0) {
    const m = Number(n);
    // Two exact factors: 2^e alone may lie outside the doubles where the product does not.
    return m * 2 ** Math.ceil(e / 2) * 2 ** Math.floor(e / 2);
  }
  const cut = BigInt(lost);
  const kept = n >> cut;
  const rest = n - (kept << cut);
  const half = 1n << (cut - 1n);
  const up = rest > half || (rest === half && (kept & 1n) === 1n) ? 1n : 0n;
  return Number(kept + up) * 2 ** -1074;
}

/**
 * A rational that is not negative, as one literal, or as two integers whose quotient a language rounds once. Where
 * numerator or denominator exceed the exact doubles it is the nearest double in the shortest decimals that give it back,
 * with a point or an exponent so that no language takes it for an integer.
 */
export function doubleParts(value: Rational): readonly [string] | readonly [string, string] {
  const { num, den } = value;
  if (num > SAFE || den > SAFE) {
    const nearest = nearestDouble(value);
    // Beyond the doubles the literal itself overflows, as the number would.
    const text = Number.isFinite(nearest) ? `${nearest}` : '1e999';
    return [/[.e]/.test(text) ? text : `${text}.0`];
  }
  return den === 1n ? [`${num}`] : [`${num}`, `${den}`];
}
