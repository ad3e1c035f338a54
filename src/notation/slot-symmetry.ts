/** Whether signed permutations of slots leave anything of a tensor. Imports only types. */
import type { SlotSymmetry } from './theory.js';

/** Whether the group that they generate contains a permutation with both signs. The slots are few (MAX_SLOTS). */
export function vanishes(slots: number, generators: readonly SlotSymmetry[]): boolean {
  const identity = Array.from({ length: slots }, (_, i) => i);
  const signs = new Map<string, number>([[identity.join(), 1]]);
  const queue = [identity];
  for (let order = queue.pop(); order !== undefined; order = queue.pop()) {
    const sign = signs.get(order.join())!;
    for (const g of generators) {
      const next = g.places.map((place) => order![place]!);
      const known = signs.get(next.join());
      if (known === undefined) {
        signs.set(next.join(), sign * g.sign);
        queue.push(next);
      } else if (known !== sign * g.sign) return true;
    }
  }
  return false;
}
