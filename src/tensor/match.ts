/**
 * Where the left side of a rule occurs in a product: factors of the product for its factors, arranged by their slot
 * symmetries, and an index for every variable. Heights of contracted pairs do not matter, so neither do they in patterns.
 */
import type { IndexSlot } from '../notation/theory.js';
import type { TensorSymbol } from './expression.js';
import { type KindTable, kindOf } from './kinds.js';
import { isVariable } from './rule.js';

export interface Match {
  /** Positions in the product of the factors that the left side takes, in its order. */
  readonly taken: readonly number[];
  /** Slot that each variable stands for, with the height it has in the product. */
  readonly bound: ReadonlyMap<string, IndexSlot>;
  /** From the slot symmetries. */
  readonly sign: 1 | -1;
}

interface Partial extends Match {
  /** Dummy of the left side → dummy of the product. */
  readonly dummies: ReadonlyMap<string, string>;
}

/**
 * All matches, in the order of the factors of the product. An empty left side matches nothing.
 * The number of tries is at most Π (factors × arrangements) over the factors of the left side, cut where indices differ.
 */
export function* matches(
  left: readonly TensorSymbol[],
  product: readonly TensorSymbol[],
  kinds: KindTable,
): Generator<Match> {
  if (left.length === 0 || left.length > product.length) return;
  yield* extended(left, product, kinds, { taken: [], bound: new Map(), sign: 1, dummies: new Map() });
}

function* extended(
  left: readonly TensorSymbol[],
  product: readonly TensorSymbol[],
  kinds: KindTable,
  so: Partial,
): Generator<Match> {
  const pattern = left[so.taken.length];
  if (!pattern) {
    yield so;
    return;
  }
  for (const [at, { head, part, slots }] of product.entries()) {
    const alike = head === pattern.head && part === pattern.part && slots.length === pattern.slots.length;
    if (!alike || so.taken.includes(at)) continue;
    for (const { places, sign } of kindOf(kinds, head, slots.length, part).group) {
      const names = namesBound(
        pattern.slots,
        places.map((p) => slots[p]!),
        so,
      );
      if (!names) continue;
      yield* extended(left, product, kinds, {
        taken: [...so.taken, at],
        sign: (so.sign * sign) as 1 | -1,
        ...names,
      });
    }
  }
}

/** The bindings with those of one more factor; undefined when they contradict. */
function namesBound(
  pattern: readonly IndexSlot[],
  slots: readonly IndexSlot[],
  so: Partial,
): Pick<Partial, 'bound' | 'dummies'> | undefined {
  const bound = new Map(so.bound);
  const dummies = new Map(so.dummies);
  for (const [i, { name }] of pattern.entries()) {
    const slot = slots[i]!;
    if (isVariable(name)) {
      bound.set(name, slot);
      continue;
    }
    const known = dummies.get(name);
    if (known !== undefined && known !== slot.name) return undefined;
    dummies.set(name, slot.name);
  }
  return { bound, dummies };
}
