/**
 * Rational numbers of the second derivation: reduced BigInt pairs with a positive denominator.
 * Shares nothing with src/, so that an error there cannot hide here.
 */
export interface Q {
  readonly n: bigint;
  readonly d: bigint;
}

function gcd(a: bigint, b: bigint): bigint {
  let x = a < 0n ? -a : a;
  let y = b < 0n ? -b : b;
  while (y !== 0n) [x, y] = [y, x % y];
  return x;
}

/** p/q in lowest terms. Throws a RangeError when q = 0. */
export function q(p: bigint | number, r: bigint | number = 1n): Q {
  let n = BigInt(p);
  let d = BigInt(r);
  if (d === 0n) throw new RangeError('zero denominator');
  if (d === 1n) return { n, d };
  if (d < 0n) [n, d] = [-n, -d];
  const g = gcd(n, d);
  return g === 1n ? { n, d } : { n: n / g, d: d / g };
}

export const ZERO: Q = q(0);
export const ONE: Q = q(1);

export function add(x: Q, y: Q): Q {
  if (x.n === 0n) return y;
  if (y.n === 0n) return x;
  return x.d === y.d ? q(x.n + y.n, x.d) : q(x.n * y.d + y.n * x.d, x.d * y.d);
}

export function neg(x: Q): Q {
  return { n: -x.n, d: x.d };
}

export function sub(x: Q, y: Q): Q {
  return add(x, neg(y));
}

export function mul(x: Q, y: Q): Q {
  return x.n === 0n || y.n === 0n ? ZERO : q(x.n * y.n, x.d * y.d);
}

/** x/y. Throws a RangeError when y = 0. */
export function div(x: Q, y: Q): Q {
  return q(x.n * y.d, x.d * y.n);
}

/** xⁿ for integer n. */
export function pow(x: Q, n: number): Q {
  const base = n < 0 ? div(ONE, x) : x;
  return { n: base.n ** BigInt(Math.abs(n)), d: base.d ** BigInt(Math.abs(n)) };
}

export function same(x: Q, y: Q): boolean {
  return x.n === y.n && x.d === y.d;
}

export function isZero(x: Q): boolean {
  return x.n === 0n;
}

export function sum(...terms: readonly Q[]): Q {
  return terms.reduce(add, ZERO);
}

export function product(...factors: readonly Q[]): Q {
  return factors.reduce(mul, ONE);
}

/** `p/q`, or `p` for an integer: what failure messages show. */
export function show(x: Q): string {
  return x.d === 1n ? `${x.n}` : `${x.n}/${x.d}`;
}
