import { describe, expect, it } from 'vitest';
import { equalRational, rational } from '../../src/algebra/rational.js';
import { makeRing } from '../../src/algebra/ring.js';
import { contractions } from '../../src/tensor/enumerate.js';
import { kindTable } from '../../src/tensor/kinds.js';
import { linearRelations, relationsOfSums } from '../../src/tensor/relations.js';
import { PRIME, RandomTensors } from '../oracle/tensors.js';

const KINDS = kindTable();
const symbol = (head: string, names: string) => ({
  head,
  slots: [...names].map((name, i) => ({ name, up: i % 2 === 1 })),
});

/** A rational modulo the prime of the oracle, by Fermat. */
const modular = ({ num, den }: { num: bigint; den: bigint }): bigint => {
  const p = BigInt(PRIME);
  let inverse = 1n;
  for (let base = den % p, n = p - 2n; n > 0n; n >>= 1n, base = (base * base) % p)
    if (n & 1n) inverse = (inverse * base) % p;
  return (((num % p) + p) * inverse) % p;
};

describe('linear relations', () => {
  it('of the same product twice, and of products that vanish', () => {
    const square = [symbol('T', 'a'), symbol('T', 'a')];
    const zero = [symbol('R', 'aabb')];
    const { basis, dependent } = linearRelations([square, square, zero], KINDS);
    expect(basis).toEqual([0]);
    expect(dependent.get(1)).toEqual([rational(1)]);
    expect(dependent.get(2)).toEqual([rational(0)]);
  });

  it('of nothing', () => {
    expect(linearRelations([], KINDS)).toEqual({ basis: [], dependent: new Map() });
  });

  it('special to four dimensions: the Pontryagin-like product with ε on the other pair', () => {
    // ε^{abcd} T_ab^e T_cde against ε^{abcd} T_eab T^e_cd: related in four dimensions through traces.
    const products = contractions(
      makeRing([]),
      ['T/3', 'T/3', 'epsilon/4'].map((n) => KINDS.get(n)!),
      KINDS,
    );
    const { basis, dependent } = linearRelations(products, KINDS);
    expect(basis).toHaveLength(2);
    expect(dependent.size).toBe(products.length - 2);
    expect(dependent.size).toBeGreaterThan(0);
  });

  it('hold for the naive enumeration on components of its own', () => {
    for (const names of [
      ['T/3', 'T/3', 'epsilon/4'],
      ['R/4', 'R/4', 'epsilon/4'],
      ['R/4', 'T/3', 'T/3'],
    ]) {
      const products = contractions(
        makeRing([]),
        names.map((n) => KINDS.get(n)!),
        KINDS,
      );
      const { basis, dependent } = linearRelations(products, KINDS);
      const tensors = new RandomTensors(77, 4);
      const value = (i: number): bigint => BigInt(tensors.value(products[i]!));
      for (const [column, coefficients] of [...dependent].slice(0, 6)) {
        const sum = coefficients.reduce((s, c, n) => s + modular(c) * (c.num === 0n ? 0n : value(basis[n]!)), 0n);
        expect(sum % BigInt(PRIME), `${names} ${column}`).toBe(value(column));
      }
    }
  }, 60_000);

  it('of sums with coefficients beyond one prime', () => {
    const large = rational(123_456_789, 10_007);
    const square = [symbol('T', 'a'), symbol('T', 'a')];
    const { dependent } = relationsOfSums(
      [[{ coefficient: rational(1), factors: square }], [{ coefficient: large, factors: square }]],
      KINDS,
    );
    expect(dependent.get(1)).toEqual([large]);
    const huge = rational(10n ** 30n + 1n, 10n ** 30n + 7n);
    expect(() =>
      relationsOfSums(
        [[{ coefficient: rational(1), factors: square }], [{ coefficient: huge, factors: square }]],
        KINDS,
      ),
    ).toThrow(/too large/);
  });

  it('prefer earlier products as basis', () => {
    const products = [[symbol('epsilon', 'abcd'), symbol('epsilon', 'abcd')], [], [symbol('eta', 'aa')]];
    const { basis, dependent } = linearRelations(products, KINDS);
    expect(basis).toEqual([0]);
    expect(equalRational(dependent.get(1)![0]!, rational(-1, 24))).toBe(true);
    expect(equalRational(dependent.get(2)![0]!, rational(-1, 6))).toBe(true);
  });
});
