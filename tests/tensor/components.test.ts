import { describe, expect, it } from 'vitest';
import { add, constant, equals, isZero, negate, type Poly, zero } from '../../src/algebra/poly.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { packIndices, TensorBuilder, unpackIndices } from '../../src/tensor/components.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';

const ring = makeRing(constantsOf(['x', 'y']));

describe('packed indices', () => {
  it('are the digits of a number in base four, the first slot most significant', () => {
    expect(packIndices([3, 0, 2, 1])).toBe(3 * 64 + 0 * 16 + 2 * 4 + 1);
    expect(packIndices([])).toBe(0);
  });

  it('come back for every list up to rank six', () => {
    for (let rank = 0; rank <= 6; rank++)
      for (let n = 0; n < 4 ** rank; n++) expect(packIndices(unpackIndices(n, rank))).toBe(n);
  });

  it('come back for ranks beyond 32 bits', () => {
    const random = new Random(firstSeed(1));
    for (let i = 0; i < runs(50); i++) {
      const indices = Array.from({ length: 24 }, () => random.below(4));
      expect(unpackIndices(packIndices(indices), 24)).toEqual(indices);
    }
  });
});

describe('TensorBuilder', () => {
  it('adds contributions to one component however many there are', () => {
    for (const count of [1, 2, 3, 63, 64, 65, 200]) {
      const random = new Random(firstSeed(count));
      const builder = new TensorBuilder(2);
      let total: Poly = zero(ring);
      for (let i = 0; i < count; i++) {
        const p = randomPoly(random, ring, ['x', 'y']);
        total = add(total, p);
        builder.put(6, p);
      }
      const { rank, entries } = builder.build();
      expect(rank).toBe(2);
      expect(equals(entries.get(6) ?? zero(ring), total), `${count} contributions`).toBe(true);
    }
  });

  it('keeps no component that is zero', () => {
    const builder = new TensorBuilder(1);
    const p = constant(ring, 5);
    builder.put(0, p);
    builder.put(0, negate(p));
    builder.put(1, zero(ring));
    builder.put(2, p);
    builder.put(3, p);
    builder.put(3, p);
    builder.put(3, constant(ring, -10));
    const { entries } = builder.build();
    expect([...entries.keys()]).toEqual([2]);
    expect([...entries.values()].some(isZero)).toBe(false);
  });

  it('counts components, not contributions', () => {
    const builder = new TensorBuilder(1);
    for (const place of [0, 0, 3]) builder.put(place, constant(ring, 1));
    expect(builder.size).toBe(2);
  });
});
