/**
 * The task that is timed, written once over the operations of a library: the Euler–Lagrange expressions of the general
 * reduced Lagrangian of homogeneous, isotropic torsion cosmology, fully expanded. With H = ȧ/(aN),
 *
 *     A1 = φ̇/N + Hφ,  A2 = 2φψ,  A3 = ψ̇/N + Hψ,  A4 = k/a² + φ² − ψ²,  u = H − φ,  v = ψ,
 *     L = a³N [ 6 c0 (A1 + A4) + P (A1² + A4²) + S (A2² + A3²) + W A2 A3 + tu u² + tv v² + c1 (A2 + A3)
 *               + o1 A1 A3 + o2 A2 A4 + o3 A1 A2 + o4 A3 A4 + tuv u v ],
 *     E_q = ∂L/∂q − d/dt ∂L/∂q̇   for q = N, a, φ, ψ.
 *
 * The clock runs from the symbols to the four expressions as sums of distinct Laurent monomials; printing is outside.
 */
import type { Q } from '../oracle/exact.js';

/** The four expressions in the order N, a, φ, ψ have this many terms. */
export const TERM_COUNTS = [28, 54, 31, 31] as const;
export const FIELDS = ['N', 'a', 'phi', 'psi'] as const;
export type Field = (typeof FIELDS)[number];
export const CONSTANTS = ['k', 'c0', 'P', 'S', 'W', 'tu', 'tv', 'c1', 'o1', 'o2', 'o3', 'o4', 'tuv'] as const;
/** Highest derivative of each field in the result. */
export const ORDERS: Readonly<Record<Field, number>> = { N: 1, a: 2, phi: 2, psi: 2 };

export interface Operations<X> {
  /** A constant, or the n-th time derivative of a field. */
  symbol(name: string, derivative?: number): X;
  integer(n: number): X;
  add(...terms: readonly X[]): X;
  subtract(a: X, b: X): X;
  multiply(...factors: readonly X[]): X;
  /** x^n, also for negative n when x is a symbol. */
  power(x: X, n: number): X;
}

export function reducedLagrangian<X>({ symbol, integer, add, subtract, multiply, power }: Operations<X>): X {
  const [N, a, phi, psi] = FIELDS.map((q) => symbol(q)) as [X, X, X, X];
  const [k, c0, P, S, W, tu, tv, c1, o1, o2, o3, o4, tuv] = CONSTANTS.map((name) => symbol(name)) as X[] & {
    length: 13;
  };
  const perN = power(N, -1);
  const H = multiply(symbol('a', 1), power(a, -1), perN);
  const A1 = add(multiply(symbol('phi', 1), perN), multiply(H, phi));
  const A2 = multiply(integer(2), phi, psi);
  const A3 = add(multiply(symbol('psi', 1), perN), multiply(H, psi));
  const A4 = add(multiply(k!, power(a, -2)), subtract(power(phi, 2), power(psi, 2)));
  const u = subtract(H, phi);
  const density = add(
    multiply(integer(6), c0!, add(A1, A4)),
    multiply(P!, add(power(A1, 2), power(A4, 2))),
    multiply(S!, add(power(A2, 2), power(A3, 2))),
    multiply(W!, A2, A3),
    multiply(tu!, power(u, 2)),
    multiply(tv!, power(psi, 2)),
    multiply(c1!, add(A2, A3)),
    multiply(o1!, A1, A3),
    multiply(o2!, A2, A4),
    multiply(o3!, A1, A2),
    multiply(o4!, A3, A4),
    multiply(tuv!, u, psi),
  );
  return multiply(power(a, 3), N, density);
}

/** A library that does the task. */
export interface Subject {
  readonly name: string;
  readonly version: string;
  /** Anything that must be undone between runs; not timed. */
  reset(): void;
  /** The timed part. The result is opaque. */
  run(): readonly unknown[];
  /** Number of terms of each expression of a result. */
  termCounts(result: readonly unknown[]): number[];
  /** Exact values of the expressions of a result at a point given by `name` or `D(name,n)`. */
  values(result: readonly unknown[], point: ReadonlyMap<string, Q>): Q[];
}
