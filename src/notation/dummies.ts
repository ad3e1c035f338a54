/**
 * Dummy indices of two monomials kept apart when they are multiplied. Names that do not meet are left as the user typed
 * them; a dummy that meets another index gets the first free Latin letter, then a Greek one. An index variable `?a` of a
 * pattern stays a variable.
 */

import type { TensorFactor } from './theory.js';
import { GREEK } from './tokens.js';

const FRESH: readonly string[] = [
  ...'abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ',
  ...GREEK.map((name) => `\\${name}`),
];

/** How often each index occurs. */
function occurrences(factors: readonly TensorFactor[]): Map<string, number> {
  const counts = new Map<string, number>();
  for (const { slots } of factors) {
    for (const { name } of slots) counts.set(name, (counts.get(name) ?? 0) + 1);
  }
  return counts;
}

function renamed(factors: readonly TensorFactor[], names: ReadonlyMap<string, string>): readonly TensorFactor[] {
  if (names.size === 0) return factors;
  return factors.map((factor) => ({
    ...factor,
    slots: factor.slots.map((slot) => ({ name: names.get(slot.name) ?? slot.name, up: slot.up })),
  }));
}

/**
 * The factors of a product a·b. An index that occurs once in a and once in b is contracted by the product; one that
 * occurs twice in a factor is bound there and is renamed when the other factor uses its name.
 */
export function renamedApart(a: readonly TensorFactor[], b: readonly TensorFactor[]): readonly TensorFactor[] {
  const inA = occurrences(a);
  const inB = occurrences(b);
  const used = new Set([...inA.keys(), ...inB.keys()]);
  const fresh = (instead: string): string => {
    // The slots of a product are fewer than the letters (MAX_FACTORS times MAX_SLOTS), so the list cannot run out.
    const sigil = instead.startsWith('?') ? '?' : '';
    const letter = FRESH.find((candidate) => !used.has(sigil + candidate))!;
    used.add(sigil + letter);
    return sigil + letter;
  };
  const namesA = new Map<string, string>();
  const namesB = new Map<string, string>();
  for (const [name, count] of inB) if (count === 2 && inA.has(name)) namesB.set(name, fresh(name));
  for (const [name, count] of inA) if (count === 2 && inB.get(name) === 1) namesA.set(name, fresh(name));
  return [...renamed(a, namesA), ...renamed(b, namesB)];
}
