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

/** Text `p` or `p/q`; what it prints is read back by the expression grammar of docs/formats.md. */
export const printRational = (a: Rational): string => (a.den === 1n ? `${a.num}` : `${a.num}/${a.den}`);

/** Nearest double. Exact to one rounding also when numerator or denominator exceed the range of doubles. */
export function toNumber(a: Rational): number {
  const n = Number(a.num);
  const d = Number(a.den);
  if (Number.isFinite(n) && Number.isFinite(d)) return n / d;
  const shift = BigInt(Math.max(0, a.num.toString(2).length, a.den.toString(2).length) - 1000);
  return Number(a.num >> shift) / Number(a.den >> shift);
}

/** Whether the pair is in lowest terms with a positive denominator. */
export const isCanonicalRational = (a: Rational): boolean => a.den > 0n && gcd(a.num, a.den) === 1n;
