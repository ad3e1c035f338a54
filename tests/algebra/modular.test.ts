import { describe, expect, it } from 'vitest';
import { echelonMod, inverseMod, multiplyMod, PRIMES, reconstruct, residue } from '../../src/algebra/modular.js';
import { equalRational, rational } from '../../src/algebra/rational.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const P = PRIMES[0];
const isPrime = (n: number): boolean => {
  for (let d = 2; d * d <= n; d++) if (n % d === 0) return false;
  return n > 1;
};

describe('primes', () => {
  it('are different primes below 2^26', () => {
    expect(PRIMES.every((p) => p < 2 ** 26 && isPrime(p))).toBe(true);
    expect(new Set(PRIMES).size).toBe(PRIMES.length);
  });

  it('keep products of residues exact', () => {
    expect(multiplyMod(P - 1, P - 1, P)).toBe(1);
    expect(BigInt(multiplyMod(P - 2, P - 3, P))).toBe((BigInt(P - 2) * BigInt(P - 3)) % BigInt(P));
  });
});

describe('inverse', () => {
  it('of random residues, and of negative numbers', () => {
    const random = new Random(firstSeed(1));
    for (let i = 0; i < runs(500); i++) {
      const a = 1 + random.below(P - 1);
      expect(multiplyMod(a, inverseMod(a, P), P)).toBe(1);
    }
    expect(multiplyMod(P - 5, inverseMod(-5, P), P)).toBe(1);
  });

  it('of 0 does not exist', () => {
    expect(() => inverseMod(0, P)).toThrow(RangeError);
    expect(() => inverseMod(P, P)).toThrow(RangeError);
  });
});

describe('residue and reconstruction', () => {
  it('are inverse for small rationals', () => {
    const random = new Random(firstSeed(2));
    for (let i = 0; i < runs(2000); i++) {
      const x = rational(random.below(4001) - 2000, 1 + random.below(2000));
      const back = reconstruct([residue(x, P)], [P]);
      expect(back !== undefined && equalRational(back, x), `${x.num}/${x.den}`).toBe(true);
    }
  });

  it('are inverse for larger ones with more primes', () => {
    const random = new Random(firstSeed(4));
    for (let i = 0; i < runs(1000); i++) {
      for (const [n, size] of [
        [2, 40_000_000],
        [3, 300_000_000_000],
      ] as const) {
        const draw = (): bigint => (BigInt(random.below(2 ** 31)) * BigInt(random.below(2 ** 31))) % BigInt(size);
        const x = rational(draw() - BigInt(size / 2), 1n + draw());
        const primes = PRIMES.slice(0, n);
        const back = reconstruct(
          primes.map((p) => residue(x, p)),
          primes,
        );
        expect(back !== undefined && equalRational(back, x), `${x.num}/${x.den}`).toBe(true);
      }
    }
  });

  it('knows when there is no small rational', () => {
    const random = new Random(firstSeed(3));
    const bound = Math.sqrt(P / 2);
    for (let i = 0; i < runs(500); i++) {
      const a = random.below(P);
      const x = reconstruct([a], [P]);
      if (x === undefined) continue;
      expect(residue(x, P)).toBe(a);
      expect(Math.max(Math.abs(Number(x.num)), Number(x.den))).toBeLessThanOrEqual(bound);
    }
  });

  it('refuses a denominator that the prime divides', () => {
    expect(() => residue(rational(1, P), P)).toThrow(RangeError);
  });
});

describe('echelonMod', () => {
  it('finds the rank and the combination of random dependent columns', () => {
    for (let run = 0; run < runs(50); run++) {
      const seed = firstSeed(100) + run;
      const random = new Random(seed);
      const [n, rank] = [6, 1 + random.below(4)];
      const columns = Array.from({ length: rank }, () => Array.from({ length: n }, () => random.below(P)));
      const factors = Array.from({ length: 3 }, () => Array.from({ length: rank }, () => random.below(P)));
      const rows = Array.from({ length: n }, (_, i) =>
        Float64Array.from([
          ...columns.map((c) => c[i]!),
          ...factors.map((f) => f.reduce((s, x, k) => (s + multiplyMod(x, columns[k]![i]!, P)) % P, 0)),
        ]),
      );
      const pivots = echelonMod(rows, P);
      expect(pivots, `seed ${seed}`).toEqual(Array.from({ length: rank }, (_, i) => i));
      factors.forEach((f, j) => {
        expect(
          pivots.map((_, row) => rows[row]![rank + j]!),
          `seed ${seed}`,
        ).toEqual(f);
      });
    }
  });

  it('of nothing, and of zero', () => {
    expect(echelonMod([], P)).toEqual([]);
    expect(echelonMod([new Float64Array(3)], P)).toEqual([]);
  });
});
