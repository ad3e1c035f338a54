import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { vanishes } from '../../src/notation/slot-symmetry.js';
import type { SlotSymmetry } from '../../src/notation/theory.js';

const SLOTS = 4;
const permutation = fc.shuffledSubarray([0, 1, 2, 3], { minLength: SLOTS });
const symmetry = fc.record({ places: permutation, sign: fc.constantFrom<1 | -1>(1, -1) });

/** Averages a random array over the group by repeated projection until it does not change. */
function survivor(generators: readonly SlotSymmetry[]): number[] {
  let values = Array.from({ length: 4 ** SLOTS }, (_, n) => Math.sin(n + 1));
  const at = (indices: readonly number[]): number => indices.reduce((n, i) => 4 * n + i, 0);
  for (let pass = 0; pass < 200; pass++) {
    for (const { places, sign } of generators) {
      values = values.map((value, n) => {
        const indices = [n >> 6, (n >> 4) & 3, (n >> 2) & 3, n & 3];
        return (value + sign * values[at(places.map((p) => indices[p]!))]!) / 2;
      });
    }
  }
  return values;
}

describe('vanishes', () => {
  it('exactly when averaging over the symmetries leaves nothing', () => {
    fc.assert(
      fc.property(fc.array(symmetry, { maxLength: 2 }), (generators) => {
        const rest = Math.max(...survivor(generators).map(Math.abs));
        expect(vanishes(SLOTS, generators)).toBe(rest < 1e-3);
      }),
      { numRuns: 40 },
    );
  });

  it('not for a totally antisymmetric tensor', () => {
    const swap = (places: number[]): SlotSymmetry => ({ places, sign: -1 });
    expect(vanishes(4, [swap([1, 0, 2, 3]), swap([0, 2, 1, 3]), swap([0, 1, 3, 2])])).toBe(false);
    expect(vanishes(3, [swap([1, 0, 2]), { places: [0, 2, 1], sign: 1 }])).toBe(true);
  });
});
