/**
 * Exact rational numbers: a pair of BigInts in lowest terms with a positive denominator.
 * Invariant: `isCanonical(x)` for every value made here. Imports nothing.
 */

/** num/den in lowest terms, den > 0. */
export interface Rational {
  readonly num: bigint;
  readonly den: bigint;
}

/** Greatest common divisor of absolute values; gcd(0, 0) = 0. */
export function gcd(a: bigint, b: bigint): bigint {
  let x = a < 0n ? -a : a;
  let y = b < 0n ? -b : b;
  while (y !== 0n) [x, y] = [y, x % y];
  return x;
}

/**
 * The rational num/den.
 * @throws RangeError when den is 0.
 */
export function rational(num: bigint | number, den: bigint | number = 1n): Rational {
  const n = BigInt(num);
  const d = BigInt(den);
  if (d === 0n) throw new RangeError('division by zero');
  if (d === 1n) return { num: n, den: 1n };
  const g = gcd(n, d) * (d < 0n ? -1n : 1n);
  return { num: n / g, den: d / g };
}

export const ZERO: Rational = Object.freeze(rational(0));
export const ONE: Rational = Object.freeze(rational(1));

export const addRational = (a: Rational, b: Rational): Rational =>
  rational(a.num * b.den + b.num * a.den, a.den * b.den);
export const subtractRational = (a: Rational, b: Rational): Rational => addRational(a, negateRational(b));
export const multiplyRational = (a: Rational, b: Rational): Rational => rational(a.num * b.num, a.den * b.den);
/** @throws RangeError when b is 0. */
export const divideRational = (a: Rational, b: Rational): Rational => rational(a.num * b.den, a.den * b.num);
export const negateRational = (a: Rational): Rational => ({ num: -a.num, den: a.den });
export const equalRational = (a: Rational, b: Rational): boolean => a.num === b.num && a.den === b.den;
export const signOfRational = (a: Rational): -1 | 0 | 1 => (a.num > 0n ? 1 : a.num < 0n ? -1 : 0);

/**
 * a^n for an integer n.
 * @throws RangeError for 0 to a negative power.
 */
export function powerRational(a: Rational, n: number): Rational {
  if (n < 0) return powerRational(rational(a.den, a.num), -n);
  return { num: a.num ** BigInt(n), den: a.den ** BigInt(n) };
}

/** Integer part of the root of a natural number, by Newton's method from above. */
function integerRoot(n: bigint): bigint {
  if (n < 2n) return n;
  let x = 1n << BigInt((n.toString(2).length + 1) >> 1);
  for (;;) {
    const y = (x + n / x) >> 1n;
    if (y >= x) return x;
    x = y;
  }
}

/** The non-negative root when it is rational, else undefined. */
export function squareRootOf(a: Rational): Rational | undefined {
  if (a.num < 0n) return undefined;
  const num = integerRoot(a.num);
  const den = integerRoot(a.den);
  return num * num === a.num && den * den === a.den ? { num, den } : undefined;
}

/** Text `p` or `p/q`; what it prints is read back by the expression grammar of docs/formats.md. */
export const printRational = (a: Rational): string => (a.den === 1n ? `${a.num}` : `${a.num}/${a.den}`);

/** Bits of a positive integer. */
const bitsOf = (a: bigint): number => {
  const hex = a.toString(16);
  return 4 * hex.length - Math.clz32(Number.parseInt(hex[0]!, 16)) + 28;
};

/** Bits of a double's significand, and the exponent of its least positive value. */
const SIGNIFICAND = 53;
const SMALLEST = -1074;

/** The nearest double, ties to even; ±Infinity and 0 beyond the range of doubles. */
export function toNumber(a: Rational): number {
  const n = Number(a.num);
  const d = Number(a.den);
  if (Number.isSafeInteger(n) && Number.isSafeInteger(d)) return n / d;
  const size = a.num < 0n ? -a.num : a.num;
  // The quotient of size · 2^shift by den fills a significand exactly; near the smallest double it is shorter.
  let shift = SIGNIFICAND + bitsOf(a.den) - bitsOf(size);
  if (size << BigInt(Math.max(shift, 0)) >= (a.den << BigInt(SIGNIFICAND)) << BigInt(Math.max(-shift, 0))) shift--;
  shift = Math.min(shift, -SMALLEST);
  const top = size << BigInt(Math.max(shift, 0));
  const bottom = a.den << BigInt(Math.max(-shift, 0));
  const down = top / bottom;
  const twiceRest = 2n * (top % bottom);
  const up = twiceRest > bottom || (twiceRest === bottom && (down & 1n) === 1n);
  const magnitude = Number(up ? down + 1n : down) * 2 ** -shift;
  return a.num < 0n ? -magnitude : magnitude;
}

/** Whether the pair is in lowest terms with a positive denominator. */
export const isCanonicalRational = (a: Rational): boolean => a.den > 0n && gcd(a.num, a.den) === 1n;
