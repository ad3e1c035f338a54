import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compareKeys, mergeBigs, mergeDoubles, TermTable } from '../../src/algebra/terms.js';
import { integers, tries } from './arbitrary.js';

const SAFE = Number.MAX_SAFE_INTEGER;
/** Words as packed monomials have them, with many collisions in the low bits. */
const word = fc.oneof(
  fc.integer({ min: -2, max: 2 }),
  fc.integer({ min: -511, max: 511 }).map((e) => e * 1024 ** 4),
  fc.integer({ min: -(2 ** 49), max: 2 ** 49 }),
);
const words = fc.constantFrom(1, 2, 3);
const monomials = (n: number) => fc.array(word, { minLength: n, maxLength: n });

const byKey = (a: readonly number[], b: readonly number[]): number => {
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return b[i]! - a[i]!;
  return 0;
};

/** Collects in a plain map, keys in descending order. */
function collected(rows: readonly (readonly [number[], bigint])[]): [number[], bigint][] {
  const map = new Map<string, [number[], bigint]>();
  for (const [key, c] of rows) {
    const found = map.get(key.join());
    if (found) found[1] += c;
    else map.set(key.join(), [key, c]);
  }
  return [...map.values()].filter(([, c]) => c !== 0n).sort(([a], [b]) => byKey(a, b));
}

const rowsOf = (n: number, keys: Float64Array, coefficients: ArrayLike<number | bigint>): [number[], bigint][] =>
  Array.from({ length: coefficients.length }, (_, i) => [
    Array.from(keys.subarray(i * n, (i + 1) * n)),
    BigInt(coefficients[i]!),
  ]);

describe('TermTable', () => {
  for (const big of [false, true])
    it(`collects like a map, in ${big ? 'BigInts' : 'doubles'}`, () => {
      const coefficient = big ? integers : fc.bigInt({ min: -1000n, max: 1000n });
      fc.assert(
        fc.property(
          words.chain((n) =>
            fc.tuple(
              fc.constant(n),
              fc.array(monomials(n), { minLength: 1, maxLength: 40 }),
              fc.array(fc.tuple(fc.nat(), coefficient), { maxLength: 120 }),
            ),
          ),
          fc.constantFrom(0, 1, 1000),
          ([n, pool, picks], expected) => {
            const rows = picks.map(([at, c]): [number[], bigint] => [pool[at % pool.length]!, c]);
            const table = new TermTable(n, expected, big);
            for (const [key, c] of rows) {
              table.key.set(key);
              const s = table.slot();
              if (table.bigs) table.bigs[s]! += c;
              else table.numbers[s]! += Number(c);
            }
            const { keys, coefficients } = table.sorted();
            expect(rowsOf(n, keys, coefficients)).toEqual(collected(rows));
          },
        ),
        tries(200),
      );
    });

  it('keeps its counts while it grows', () => {
    const table = new TermTable(2, 0, false);
    for (let round = 0; round < 3; round++)
      for (let i = 0; i < 5000; i++) {
        table.key[0] = i % 7;
        table.key[1] = i;
        const s = table.slot();
        table.numbers[s]! += i;
      }
    const { keys, coefficients } = table.sorted();
    expect(coefficients.length).toBe(4999);
    expect(Array.from(coefficients as Float64Array).every((c, i) => c === 3 * keys[2 * i + 1]!)).toBe(true);
  });
});

describe('merging two sorted lists', () => {
  const lists = words.chain((n) => {
    const list = fc.array(fc.tuple(monomials(n), integers), { maxLength: 12 }).map(collected);
    const other = fc.oneof(
      list.map((b) => (_: [number[], bigint][]) => b),
      fc.constant((a: [number[], bigint][]) => a),
      fc.constant((a: [number[], bigint][]) => a.map(([key, c]): [number[], bigint] => [key, -c])),
    );
    return fc.tuple(fc.constant(n), list, other).map(([m, a, f]) => ({ n: m, a, b: f(a) }));
  });

  it('collects like a map', () => {
    fc.assert(
      fc.property(lists, ({ n, a, b }) => {
        const keysOf = (rows: typeof a) => Float64Array.from(rows.flatMap(([key]) => key));
        const out = new Float64Array((a.length + b.length) * n);
        const want = collected([...a, ...b]);
        const bigs = (rows: typeof a) => rows.map(([, c]) => c);
        const opposite = b.map(([key, c]): [number[], bigint] => [key, -c]);
        expect(rowsOf(n, out, mergeBigs(n, keysOf(a), bigs(a), keysOf(b), bigs(b), 1, out))).toEqual(want);
        out.fill(0);
        expect(rowsOf(n, out, mergeBigs(n, keysOf(a), bigs(a), keysOf(b), bigs(opposite), -1, out))).toEqual(want);

        const safe = (rows: typeof a) => rows.every(([, c]) => c <= SAFE && c >= -SAFE);
        if (!safe(a) || !safe(b)) return;
        const doubles = (rows: typeof a) => Float64Array.from(rows, ([, c]) => Number(c));
        out.fill(0);
        const sums = mergeDoubles(n, keysOf(a), doubles(a), keysOf(b), doubles(b), 1, out);
        if (safe(want)) expect(rowsOf(n, out, sums!)).toEqual(want);
        else expect(sums).toBeUndefined();
        out.fill(0);
        const same = mergeDoubles(n, keysOf(a), doubles(a), keysOf(b), doubles(opposite), -1, out);
        if (safe(want)) expect(rowsOf(n, out, same!)).toEqual(want);
        else expect(same).toBeUndefined();
      }),
      tries(300),
    );
  });

  it('compares words in order', () => {
    const keys = Float64Array.from([1, 5, 1, -5, 2, 0]);
    expect(compareKeys(keys, 0, keys, 0, 2)).toBe(0);
    expect(compareKeys(keys, 0, keys, 2, 2)).toBeGreaterThan(0);
    expect(compareKeys(keys, 2, keys, 4, 2)).toBeLessThan(0);
  });
});
