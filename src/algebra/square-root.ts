/**
 * Exact square roots of polynomials, as far as they exist: p = root² · radicand, where the radicand is as simple as the
 * method finds. Invariant: root² · radicand is p, multiplied out. Imports polynomials.
 */
import { splitUnit } from './division.js';
import {
  constant,
  equals,
  isZero,
  monomial,
  multiply,
  type Poly,
  power,
  scale,
  subtract,
  sum,
  termsOf,
} from './poly.js';
import { rational } from './rational.js';

export interface SquareRoot {
  readonly root: Poly;
  /** 1 for a perfect square; else a single term without square factors, times a sum that is no square. */
  readonly radicand: Poly;
}

/** Prime factors beyond this are left under the root. */
const MAX_TRIAL = 10_000n;

/** n = root² · rest, positive n; factors are tried up to MAX_TRIAL, then n itself is tested. */
function splitSquare(n: bigint): { readonly root: bigint; readonly rest: bigint } {
  let root = 1n;
  let rest = n;
  for (let d = 2n; d <= MAX_TRIAL && d * d <= rest; d++)
    while (rest % (d * d) === 0n) {
      rest /= d * d;
      root *= d;
    }
  const whole = integerRoot(rest);
  return whole * whole === rest ? { root: root * whole, rest: 1n } : { root, rest };
}

/** The largest integer whose square is at most n. */
function integerRoot(n: bigint): bigint {
  if (n < 2n) return n;
  let x = 1n << BigInt(Math.ceil(n.toString(2).length / 2));
  for (;;) {
    const next = (x + n / x) >> 1n;
    if (next >= x) return x;
    x = next;
  }
}

/** The root of one term, and what stays under it: exponents 0 or 1 and a squarefree integer with the sign. */
function ofTerm(p: Poly): SquareRoot {
  const [term] = termsOf(p);
  const { coefficient, exponents } = term!;
  const negative = coefficient.num < 0n;
  const size = negative ? -coefficient.num : coefficient.num;
  // √(n/d) = √(n d)/d.
  const { root, rest } = splitSquare(size * coefficient.den);
  const names = exponents.map(([g, e]) => [p.ring.generators[g]!.name, e] as const);
  return {
    root: monomial(
      p.ring,
      rational(root, coefficient.den),
      names.map(([name, e]) => [name, Math.floor(e / 2)]),
    ),
    radicand: monomial(
      p.ring,
      rational(negative ? -rest : rest),
      names.map(([name, e]) => [name, e - 2 * Math.floor(e / 2)]),
    ),
  };
}

/** p = root² · radicand. Zero has the root zero. */
export function squareRoot(p: Poly): SquareRoot {
  const { ring } = p;
  if (isZero(p)) return { root: p, radicand: constant(ring, 1) };
  if (p.size === 1) return ofTerm(p);
  const { unit, reduced } = splitUnit(p);
  const single = ofTerm(unit);
  const inner = perfectRoot(reduced);
  if (inner) return { root: multiply(single.root, inner), radicand: single.radicand };
  return { root: single.root, radicand: multiply(single.radicand, reduced) };
}

/** The root of a perfect square with a positive leading coefficient, term by term from the highest. */
function perfectRoot(p: Poly): Poly | undefined {
  const { ring } = p;
  const leading = leadingTerm(p);
  const first = ofTerm(leading);
  if (!isOne(first.radicand)) return undefined;
  const half = scale(power(first.root, -1), rational(1, 2));
  let root = first.root;
  let rest = subtract(p, leading);
  // A root with so many terms that their square is longer than p would need cancellations; it is not looked for.
  for (let steps = 0; !isZero(rest); steps++) {
    if (2 * steps + 1 > p.size) return undefined;
    const next = multiply(leadingTerm(rest), half);
    rest = subtract(rest, multiply(next, sum(ring, [root, root, next])));
    root = sum(ring, [root, next]);
  }
  return equals(multiply(root, root), p) ? root : undefined;
}

function leadingTerm(p: Poly): Poly {
  const [{ exponents, coefficient }] = termsOf(p) as [ReturnType<typeof termsOf>[number]];
  return monomial(
    p.ring,
    coefficient,
    exponents.map(([g, e]) => [p.ring.generators[g]!.name, e]),
  );
}

const isOne = (p: Poly): boolean => p.size === 1 && equals(p, constant(p.ring, 1));
