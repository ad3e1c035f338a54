import { describe, expect, it } from 'vitest';
import { closeGroup, exchange, type SignedPermutation, SymmetryError } from '../../src/tensor/symmetry.js';

const keys = (group: readonly SignedPermutation[]): string[] => group.map((g) => `${g.sign}:${g.places.join('')}`);

describe('closeGroup', () => {
  it('the identity alone without generators, and for no slots', () => {
    expect(keys(closeGroup(3, []))).toEqual(['1:012']);
    expect(keys(closeGroup(0, []))).toEqual(['1:']);
  });

  it('starts with the identity and is closed under composition, signs included', () => {
    const pairs = closeGroup(4, [exchange(4, 0, 1, -1), exchange(4, 2, 3, -1), { places: [2, 3, 0, 1], sign: 1 }]);
    expect(pairs).toHaveLength(8);
    expect(keys(pairs)[0]).toBe('1:0123');
    const all = new Set(keys(pairs));
    for (const a of pairs)
      for (const b of pairs)
        expect(all.has(`${a.sign * b.sign}:${a.places.map((p) => b.places[p]).join('')}`)).toBe(true);
  });

  it('antisymmetry gives the sign of every permutation', () => {
    const group = closeGroup(
      4,
      [0, 1, 2].map((i) => exchange(4, i, i + 1, -1)),
    );
    expect(group).toHaveLength(24);
    for (const { places, sign } of group) {
      let inversions = 0;
      for (let i = 0; i < 4; i++) for (let j = i + 1; j < 4; j++) if (places[i]! > places[j]!) inversions++;
      expect(sign).toBe(inversions % 2 === 0 ? 1 : -1);
    }
  });

  it('refuses symmetries that force the tensor to vanish', () => {
    // Symmetric in the first two slots, antisymmetric in the last two: zero.
    expect(() => closeGroup(3, [exchange(3, 0, 1, 1), exchange(3, 1, 2, -1)])).toThrow(SymmetryError);
    expect(() => closeGroup(2, [{ places: [0, 1], sign: -1 }])).toThrow(/vanish/);
  });

  it('refuses groups beyond the limit', () => {
    const swaps = Array.from({ length: 8 }, (_, i) => exchange(9, i, i + 1, 1));
    expect(() => closeGroup(9, swaps)).toThrow(/more than 40320/);
  });
});
