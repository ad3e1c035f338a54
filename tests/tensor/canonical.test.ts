import { describe, expect, it } from 'vitest';
import { CanonicalLimitError, canonicalForm, type Factor, type Kind } from '../../src/tensor/canonical.js';
import { kindTable, makeKind } from '../../src/tensor/kinds.js';
import { exchange } from '../../src/tensor/symmetry.js';

const KINDS = kindTable();
const kind = (name: string): Kind => KINDS.get(name)!;
const product = (...factors: readonly (readonly [string | Kind, ...number[]])[]): Factor[] =>
  factors.map(([k, ...lines]) => ({ kind: typeof k === 'string' ? kind(k) : k, lines }));
const form = (factors: readonly Factor[], firstDummy = 0): string => {
  const found = canonicalForm(factors, firstDummy);
  return found === undefined ? '0' : `${found.sign > 0 ? '' : '-'}${found.key}`;
};
/** Symmetric or antisymmetric in all slots. */
const total = (name: string, slots: number, sign: 1 | -1): Kind =>
  makeKind(
    name,
    slots,
    Array.from({ length: slots - 1 }, (_, i) => exchange(slots, i, i + 1, sign)),
  );

describe('canonicalForm', () => {
  it('moves slots by their symmetries and keeps the sign', () => {
    expect(form(product(['T/3', 5, 7, 6], ['T/3', 5, 6, 7]))).toBe('-T/3(0,1,2)T/3(0,1,2)');
    expect(form(product(['R/4', 1, 0, 3, 2], ['R/4', 2, 3, 0, 1]))).toBe('R/4(0,1,2,3)R/4(2,3,0,1)');
  });

  it('does not exchange the pairs of the curvature', () => {
    const same = form(product(['R/4', 0, 1, 2, 3], ['R/4', 0, 1, 2, 3]));
    const crossed = form(product(['R/4', 0, 1, 2, 3], ['R/4', 2, 3, 0, 1]));
    expect(same).not.toBe(crossed);
  });

  it('finds what vanishes', () => {
    // Antisymmetric pair traced; symmetric times antisymmetric; the square of an odd cycle.
    expect(form(product(['R/4', 0, 0, 1, 1]))).toBe('0');
    expect(form(product(['T/3', 0, 1, 1], ['T/1', 0]))).toBe('0');
    expect(form(product(['R/2', 0, 1], ['eta/2', 0, 1]))).not.toBe('0');
    expect(form(product([total('F', 2, -1), 0, 1], [total('S', 2, 1), 0, 1]))).toBe('0');
    const F = total('F', 2, -1);
    expect(form(product([F, 0, 1], [F, 1, 2], [F, 2, 0]))).toBe('0');
    expect(form(product([F, 0, 1], [F, 1, 2], [F, 2, 3], [F, 3, 0]))).not.toBe('0');
    // ε^{abcd} T_{eab} T^e_{cd} survives, ε^{abcd} T_a T_b does not.
    expect(form(product(['epsilon/4', 0, 1, 2, 3], ['T/3', 4, 0, 1], ['T/3', 4, 2, 3]))).not.toBe('0');
    expect(form(product(['epsilon/4', 0, 1, 2, 3], ['T/1', 0], ['T/1', 1], ['R/2', 2, 3]))).toBe('0');
  });

  it('keeps free lines, and numbers dummies after them', () => {
    expect(form(product(['T/3', 1, 9, 0], ['T/1', 9]), 2)).toBe('-T/1(2)T/3(1,0,2)');
    expect(form(product(['R/4', 0, 1, 3, 2]), 4)).toBe('-R/4(0,1,2,3)');
  });

  it('treats unconnected parts alike whatever their order', () => {
    const a = product(['T/1', 0], ['T/1', 0], ['R/2', 1, 2], ['R/2', 2, 1]);
    const b = product(['R/2', 7, 8], ['T/1', 3], ['R/2', 8, 7], ['T/1', 3]);
    expect(form(a)).toBe(form(b));
    expect(form(a)).toBe('R/2(0,1)R/2(1,0)T/1(2)T/1(2)');
  });

  it('of nothing is the empty product', () => {
    expect(canonicalForm([], 0)).toEqual({ sign: 1, factors: [], key: '' });
  });

  it('of symmetric tensors with many slots takes no time per exchange of dummies', () => {
    for (const sign of [1, -1] as const) {
      const S = total('S', 7, sign);
      const start = performance.now();
      expect(form(product([S, 0, 1, 2, 3, 4, 5, 6], [S, 6, 4, 5, 3, 2, 0, 1]))).toMatch(/^-?S\/7/);
      expect(performance.now() - start).toBeLessThan(3000);
    }
  });

  it('vanishes when a pair symmetric in one tensor meets an antisymmetric one', () => {
    const S = total('S', 4, 1);
    expect(form(product([S, 0, 1, 2, 3], ['R/4', 0, 1, 4, 5], ['R/4', 2, 3, 4, 5]))).toBe('0');
  });

  it('does 16 indices and 6 equal factors in milliseconds', () => {
    const T = 'T/3';
    const ring = product([T, 0, 1, 2], [T, 0, 2, 3], [T, 4, 3, 5], [T, 4, 5, 6], [T, 7, 6, 8], [T, 7, 8, 1]);
    const curvatures = product(['R/4', 0, 1, 2, 3], ['R/4', 2, 4, 0, 5], ['R/4', 4, 6, 7, 1], ['R/4', 5, 7, 3, 6]);
    for (const factors of [ring, curvatures]) {
      form(factors);
      const start = performance.now();
      for (let i = 0; i < 20; i++) form(factors);
      expect((performance.now() - start) / 20).toBeLessThan(20);
    }
  });

  it('refuses a product with too many equivalent arrangements instead of waiting', () => {
    // Every one of six tensors joined with every one of six others: 2 · 6!² arrangements are alike.
    const S = total('S', 6, 1);
    const range = [0, 1, 2, 3, 4, 5];
    const factors = [
      ...range.map((i): Factor => ({ kind: S, lines: range.map((j) => 6 * i + j) })),
      ...range.map((j): Factor => ({ kind: S, lines: range.map((i) => 6 * i + j) })),
    ];
    expect(() => canonicalForm(factors, 0)).toThrow(CanonicalLimitError);
  }, 60_000);
});
