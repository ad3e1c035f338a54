import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { echelonMod, inverseMod, multiplyMod, PRIMES, reconstruct, residue } from '../../src/algebra/modular.js';
import { isCanonicalRational, rational } from '../../src/algebra/rational.js';
import { integers, tries } from './arbitrary.js';

const primes = fc.constantFrom(...PRIMES, 7, 11);
const mod = (n: bigint, p: number): number => Number(((n % BigInt(p)) + BigInt(p)) % BigInt(p));

describe('residues', () => {
  it('multiply and invert as integers do', () => {
    fc.assert(
      fc.property(primes, fc.nat(2 ** 26), fc.nat(2 ** 26), (p, x, y) => {
        const [a, b] = [x % p, y % p];
        expect(multiplyMod(a, b, p)).toBe(mod(BigInt(a) * BigInt(b), p));
        if (a !== 0) expect(multiplyMod(a, inverseMod(a, p), p)).toBe(1);
        else expect(() => inverseMod(a, p)).toThrow('division by zero');
      }),
      tries(300),
    );
  });

  it('are those of primes, largest first', () => {
    for (const p of PRIMES) {
      expect(p).toBeLessThan(2 ** 26);
      for (let d = 2; d * d <= p; d++) if (p % d === 0) throw new Error(`${p} = ${d} · ${p / d}`);
    }
    expect(PRIMES[0]).not.toBe(PRIMES[1]);
  });

  it('of rationals solve d x = n', () => {
    fc.assert(
      fc.property(primes, integers, integers, (p, n, d) => {
        fc.pre(d !== 0n);
        const q = rational(n, d);
        if (q.den % BigInt(p) === 0n) expect(() => residue(q, p)).toThrow('division by zero');
        else expect(mod(BigInt(residue(q, p)) * q.den, p)).toBe(mod(q.num, p));
      }),
      tries(300),
    );
  });

  it('give back small rationals, and nothing for those that are none', () => {
    const bound = Math.floor(Math.sqrt(PRIMES[0] / 2));
    fc.assert(
      fc.property(fc.integer({ min: -bound, max: bound }), fc.integer({ min: 1, max: bound }), (n, d) => {
        const q = rational(n, d);
        expect(reconstruct(residue(q, PRIMES[0]), PRIMES[0])).toEqual(q);
      }),
      tries(300),
    );
    fc.assert(
      fc.property(fc.constantFrom(...PRIMES), fc.nat(2 ** 26), (p, x) => {
        const found = reconstruct(x % p, p);
        if (!found) return;
        expect(isCanonicalRational(found)).toBe(true);
        expect(residue(found, p)).toBe(x % p);
      }),
      tries(300),
    );
    // Modulo 7 only 0, ±1 are rationals with both parts at most 1.
    expect([0, 1, 2, 3, 4, 5, 6].map((x) => reconstruct(x, 7) !== undefined)).toEqual([
      true,
      true,
      false,
      false,
      false,
      false,
      true,
    ]);
  });
});

describe('the echelon form of a matrix of residues', () => {
  it('is reduced and has the same span, by brute force over a small field', () => {
    const p = 3;
    const entry = fc.nat(p - 1);
    const span = (rows: readonly Float64Array[]): Set<string> => {
      let found = [new Float64Array(rows[0]?.length ?? 0)];
      for (const row of rows)
        found = found.flatMap((v) => [0, 1, 2].map((c) => v.map((x, j) => (x + c * row[j]!) % p)));
      return new Set(found.map((v) => v.join()));
    };
    fc.assert(
      fc.property(
        fc
          .integer({ min: 1, max: 4 })
          .chain((n) => fc.array(fc.array(entry, { minLength: n, maxLength: n }), { minLength: 1, maxLength: 4 })),
        (matrix) => {
          const rows = matrix.map((r) => Float64Array.from(r));
          const before = span(rows);
          const pivots = echelonMod(rows, p);
          expect(span(rows)).toEqual(before);
          expect(before.size).toBe(p ** pivots.length);
          expect([...pivots].sort((a, b) => a - b)).toEqual(pivots);
          pivots.forEach((c, i) => {
            expect(rows.map((r) => r[c])).toEqual(rows.map((_, j) => (j === i ? 1 : 0)));
            expect(rows[i]!.findIndex((x) => x !== 0)).toBe(c);
          });
          expect(rows.slice(pivots.length).every((r) => r.every((x) => x === 0))).toBe(true);
        },
      ),
      tries(300),
    );
    expect(echelonMod([], p)).toEqual([]);
  });
});
