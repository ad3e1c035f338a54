/**
 * Slot symmetries: signed permutations under which a tensor is unchanged, closed into a group.
 * Invariant: the identity comes first; no permutation occurs twice (with both signs the tensor would vanish).
 */

/** Slots move as new[i] = old[places[i]]; the tensor's value is multiplied by the sign. */
export interface SignedPermutation {
  readonly places: readonly number[];
  readonly sign: 1 | -1;
}

/** Elements of a symmetry group; larger groups are refused. */
export const MAX_GROUP = 40_320;

/** Thrown for a symmetry that forces the tensor to vanish or is too large. */
export class SymmetryError extends RangeError {}

const compose = (a: SignedPermutation, b: SignedPermutation): SignedPermutation => ({
  places: a.places.map((p) => b.places[p]!),
  sign: (a.sign * b.sign) as 1 | -1,
});

/**
 * The group that signed permutations of `slots` slots generate.
 * @throws SymmetryError when the group contains a permutation with both signs, or more than MAX_GROUP elements.
 */
export function closeGroup(slots: number, generators: readonly SignedPermutation[]): readonly SignedPermutation[] {
  const identity: SignedPermutation = { places: Array.from({ length: slots }, (_, i) => i), sign: 1 };
  const found = new Map<string, SignedPermutation>([[identity.places.join(), identity]]);
  const queue = [identity];
  for (let head = queue.pop(); head; head = queue.pop())
    for (const g of generators) {
      const next = compose(head, g);
      const key = next.places.join();
      const known = found.get(key);
      if (known) {
        if (known.sign !== next.sign) throw new SymmetryError('the symmetries force the tensor to vanish');
        continue;
      }
      if (found.size >= MAX_GROUP) throw new SymmetryError(`the symmetry group has more than ${MAX_GROUP} elements`);
      found.set(key, next);
      queue.push(next);
    }
  return [...found.values()];
}

/** Exchange of two slots with a sign. */
export function exchange(slots: number, i: number, j: number, sign: 1 | -1): SignedPermutation {
  const places = Array.from({ length: slots }, (_, s) => (s === i ? j : s === j ? i : s));
  return { places, sign };
}
