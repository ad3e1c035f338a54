/**
 * The stated order of products in which linear relations are resolved: those of rules/bases/monomials.yaml in its order, then
 * short texts first, then alphabetical. A basis takes the first independent ones.
 */
import { bundledBasis } from './basis-file.js';
import { factorsKey, type TensorSymbol } from './expression.js';

/** The basis whose invariants come first. */
const PREFERRED = 'monomials';

/** Sorts canonical products; those of `last` come after all others. */
export function inPreferredOrder(
  products: readonly (readonly TensorSymbol[])[],
  last: ReadonlySet<string> = new Set(),
): (readonly TensorSymbol[])[] {
  const { entries } = bundledBasis(PREFERRED);
  const place = new Map(entries.map((e, i) => [factorsKey(e.sum[0]!.factors), i]));
  return products
    .map((factors) => {
      const key = factorsKey(factors);
      return { factors, key, rank: last.has(key) ? entries.length + 1 : (place.get(key) ?? entries.length) };
    })
    .sort((a, b) => a.rank - b.rank || a.key.length - b.key.length || (a.key < b.key ? -1 : 1))
    .map((p) => p.factors);
}
