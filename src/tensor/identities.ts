/**
 * Identities between several terms, those special to four dimensions among them: linear relations between all products of one
 * content are found on random exact components, and dependent products are written in a basis. The basis takes the first
 * independent products in a fixed order, those of rules/bases/monomials.yaml and then short texts first, so that equal sums
 * end in equal forms. Products with
 * tensors of the user, or with more indices than can be enumerated, are compared with each other only. Total derivatives
 * may be added to the relations.
 */
import { remember } from '../algebra/memo.js';
import { scale } from '../algebra/poly.js';
import { ONE } from '../algebra/rational.js';
import { makeRing } from '../algebra/ring.js';
import { contractions } from './enumerate.js';
import { canonicalSum, factorsKey, type TensorSum, type TensorSymbol, type TensorTerm } from './expression.js';
import { MAX_CONTENT_SLOTS } from './independent-scalars.js';
import type { KindTable, TensorKind } from './kinds.js';
import { inPreferredOrder } from './preference.js';
import { TooLargeError } from './random-values.js';
import { RelationLimitError, relationsOfSums, type ScalarCombination } from './relations.js';
import type { Step } from './rewrite.js';

/** A sum that is a total derivative when the volume element is multiplied in. */
export interface Density {
  readonly ruleId: string;
  readonly why: string;
  readonly sum: ScalarCombination;
  /** The product of the sum that is to be eliminated. */
  readonly eliminates: readonly TensorSymbol[];
}

export const DIMENSION_RULE = 'four-dimensions';
const DIMENSION_WHY = 'a linear relation that holds in four dimensions, found and tested on random exact components';

export interface Reduced {
  readonly value: TensorSum;
  readonly steps: readonly Step[];
  /** Products whose relations were not looked for because of their size. */
  readonly skipped: readonly TensorSum[];
}

/** What a product is made of; products of different content are never related. */
export function contentOf(factors: readonly TensorSymbol[]): string {
  const count = new Map<string, number>();
  for (const { head, slots } of factors) {
    // R_ab counts as a curvature, T_a as a torsion; ε only by its parity.
    const built = head === 'R' || head === 'T' || head === 'epsilon';
    const key = built ? head : `${head}/${slots.length}`;
    count.set(key, (count.get(key) ?? 0) + 1);
  }
  return [...count]
    .map(([key, n]) => `${key} ${n}`)
    .sort()
    .join();
}

const isScalar = (factors: readonly TensorSymbol[]): boolean => {
  const names = factors.flatMap((f) => f.slots.map((s) => s.name));
  return names.every((name) => names.filter((n) => n === name).length === 2);
};

/**
 * The sum with dependent products replaced. Densities that are total derivatives count as zero; the coefficients of the sum
 * must then be constants.
 * @throws RangeError when the sum has free indices.
 */
export function reduceByRelations(sum: TensorSum, kinds: KindTable, densities: readonly Density[] = []): Reduced {
  if (!sum.every((t) => isScalar(t.factors))) throw new RangeError('relations are looked for between scalars only');
  const steps: Step[] = [];
  const skipped: TensorSum[] = [];
  let terms: TensorTerm[] = [];
  for (const { group, zeros } of groupsOf(sum, densities)) {
    try {
      terms = [...terms, ...reduceGroup(group, zeros, kinds, steps)];
    } catch (error) {
      if (!(error instanceof TooLargeError || error instanceof RelationLimitError)) throw error;
      skipped.push(group);
      terms = [...terms, ...group];
    }
  }
  return { value: canonicalSum(terms, kinds), steps, skipped };
}

/** Terms that may be related, with the densities that relate them. */
function groupsOf(sum: TensorSum, densities: readonly Density[]): { group: TensorTerm[]; zeros: Density[] }[] {
  const groups: { contents: Set<string>; group: TensorTerm[]; zeros: Density[] }[] = [];
  for (const density of densities) {
    // A density joins the contents of its terms.
    const contents = new Set(density.sum.map((t) => contentOf(t.factors)));
    const met = groups.filter((g) => [...contents].some((c) => g.contents.has(c)));
    for (const other of met) for (const c of other.contents) contents.add(c);
    const zeros = [...met.flatMap((g) => g.zeros), density];
    groups.splice(0, groups.length, ...groups.filter((g) => !met.includes(g)), { contents, group: [], zeros });
  }
  for (const term of sum) {
    const content = contentOf(term.factors);
    const known = groups.find((g) => g.contents.has(content));
    if (known) known.group.push(term);
    else groups.push({ contents: new Set([content]), group: [term], zeros: [] });
  }
  return groups.filter((g) => g.group.length > 0);
}

function reduceGroup(
  group: readonly TensorTerm[],
  zeros: readonly Density[],
  kinds: KindTable,
  steps: Step[],
): TensorTerm[] {
  const last = new Set(zeros.map((z) => factorsKey(z.eliminates)));
  const known = new Map<string, readonly TensorSymbol[]>();
  for (const { factors } of group) known.set(factorsKey(factors), factors);
  for (const { sum } of zeros) for (const { factors } of sum) known.set(factorsKey(factors), factors);
  for (const content of new Set([...known.values()].map(contentOf)))
    for (const factors of productsOf(content, kinds)) known.set(factorsKey(factors), factors);
  const ordered = inPreferredOrder([...known.values()], last);
  const keys = ordered.map(factorsKey);
  const products = ordered.map((factors): ScalarCombination => [{ coefficient: ONE, factors }]);
  const { basis, dependent } = relationsOfSums([...zeros.map((z) => z.sum), ...products], kinds);
  return group.flatMap((term): TensorTerm[] => {
    const coefficients = dependent.get(zeros.length + keys.indexOf(factorsKey(term.factors)));
    if (!coefficients) return [term];
    const used = coefficients.flatMap((c, n) => (c.num !== 0n && basis[n]! < zeros.length ? [zeros[basis[n]!]!] : []));
    const after = coefficients.flatMap((c, n): TensorTerm[] => {
      const at = basis[n]! - zeros.length;
      if (c.num === 0n || at < 0) return [];
      return [{ coefficient: scale(term.coefficient, c), factors: ordered[at]! }];
    });
    steps.push({
      ruleId: used.length === 0 ? DIMENSION_RULE : used.map((z) => z.ruleId).join(', '),
      before: [term],
      after: canonicalSum(after, kinds),
      why: used.length === 0 ? DIMENSION_WHY : used.map((z) => z.why).join('; '),
    });
    return after;
  });
}

const enumerated = new Map<string, readonly (readonly TensorSymbol[])[]>();

/** All canonical products of a content of torsion, curvature and ε; none when they are too many. */
function productsOf(content: string, kinds: KindTable): readonly (readonly TensorSymbol[])[] {
  const tensors = content.split(',').flatMap((entry): TensorKind[] | undefined => {
    const [head, n] = entry.split(' ') as [string, string];
    const kind = kinds.get(SLOTS[head] ?? '');
    return kind && Array.from({ length: Number(n) }, () => kind);
  });
  if (content === '' || tensors.includes(undefined)) return [];
  const all = tensors.filter((k) => k !== undefined);
  const slots = all.reduce((n, k) => n + (k.head === 'epsilon' ? 0 : k.slots), 0);
  return slots > MAX_CONTENT_SLOTS ? [] : remember(enumerated, content, () => contractions(makeRing([]), all, kinds));
}

const SLOTS: Readonly<Record<string, string>> = { R: 'R/4', T: 'T/3', epsilon: 'epsilon/4' };
