/**
 * Arithmetic modulo a prime below 2^26, so that products of residues are exact in doubles, and the way back to rationals.
 */
import { type Rational, rational } from './rational.js';

/** Primes below 2^26: three to compute with, the last to check with. */
export const PRIMES = [67_108_859, 67_108_837, 67_108_819, 67_108_777] as const;

export const multiplyMod = (a: number, b: number, p: number): number => (a * b) % p;

/** Inverse of a non-zero residue. @throws RangeError for 0. */
export function inverseMod(a: number, p: number): number {
  let [r0, r1] = [p, ((a % p) + p) % p];
  let [t0, t1] = [0, 1];
  if (r1 === 0) throw new RangeError('division by zero');
  while (r1 !== 0) {
    const q = Math.floor(r0 / r1);
    [r0, r1] = [r1, r0 - q * r1];
    [t0, t1] = [t1, t0 - q * t1];
  }
  return ((t0 % p) + p) % p;
}

/** Residue of a rational. @throws RangeError when p divides its denominator. */
export function residue(value: Rational, p: number): number {
  const big = BigInt(p);
  const num = Number(((value.num % big) + big) % big);
  return multiplyMod(num, inverseMod(Number(value.den % big), p), p);
}

/**
 * The rational n/d with |n|, d ≤ √(m/2) that has these residues, m being the product of the primes, or undefined when there
 * is none (the Chinese remainder theorem and the classical rational reconstruction by the extended Euclidean algorithm).
 */
export function reconstruct(residues: readonly number[], primes: readonly number[]): Rational | undefined {
  let [a, m] = [0n, 1n];
  residues.forEach((r, i) => {
    const p = primes[i]!;
    const lift = multiplyMod((((r - Number(a % BigInt(p))) % p) + p) % p, inverseMod(Number(m % BigInt(p)), p), p);
    a += m * BigInt(lift);
    m *= BigInt(p);
  });
  const bound = rootBelow(m / 2n);
  let [r0, r1] = [m, a];
  let [t0, t1] = [0n, 1n];
  while (r1 > bound) {
    const q = r0 / r1;
    [r0, r1] = [r1, r0 - q * r1];
    [t0, t1] = [t1, t0 - q * t1];
  }
  if (t1 === 0n || t1 > bound || -t1 > bound) return undefined;
  return rational(r1, t1);
}

/** ⌊√n⌋ by Newton's iteration. */
function rootBelow(n: bigint): bigint {
  let x = BigInt(Math.floor(Math.sqrt(Number(n)))) + 1n;
  for (;;) {
    const next = (x + n / x) / 2n;
    if (next >= x) return x;
    x = next;
  }
}

/**
 * Reduced row echelon form of a matrix of residues, in place.
 * @returns the pivot columns, leftmost first; row i has its leading 1 in column pivots[i].
 */
export function echelonMod(rows: Float64Array[], p: number): number[] {
  const columns = rows[0]?.length ?? 0;
  const pivots: number[] = [];
  for (let c = 0; c < columns && pivots.length < rows.length; c++) {
    const top = pivots.length;
    const found = rows.findIndex((r, i) => i >= top && r[c] !== 0);
    if (found < 0) continue;
    [rows[top], rows[found]] = [rows[found]!, rows[top]!];
    const pivot = rows[top]!;
    const inverse = inverseMod(pivot[c]!, p);
    for (let j = c; j < columns; j++) pivot[j] = multiplyMod(pivot[j]!, inverse, p);
    rows.forEach((row, i) => {
      const factor = row[c]!;
      if (i === top || factor === 0) return;
      for (let j = c; j < columns; j++) row[j] = (row[j]! + multiplyMod(p - factor, pivot[j]!, p)) % p;
    });
    pivots.push(c);
  }
  return pivots;
}
