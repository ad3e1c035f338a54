/**
 * All scalar contractions of given tensors: one pair of open slots after another, keeping one representative of each
 * partial contraction, so that the many equivalent ways to pair the indices are never listed.
 */

import { constant } from '../algebra/poly.js';
import type { Ring } from '../algebra/ring.js';
import { canonicalForm, type Factor, type Kind } from './canonical.js';
import { canonicalSum, factorsKey, symbolOfKind, type TensorSymbol } from './expression.js';
import type { KindTable, TensorKind } from './kinds.js';

/** More partial contractions than this are refused. */
export const MAX_PARTIAL = 200_000;

/** An open slot is the end of a line that holds a marker; markers are alike and have no sign. */
const OPEN: Kind = { name: 'zz open', slots: 1, group: [{ places: [0], sign: 1 }] };

/** The kind with all signs positive: partial contractions are told apart up to sign only. */
const unsigned = (kind: TensorKind): TensorKind => ({ ...kind, group: kind.group.map((g) => ({ ...g, sign: 1 })) });

/**
 * Canonical products of the tensors with all indices contracted; those that vanish by symmetry are left out.
 * The order is that of canonical sums: short ones first.
 * @throws RangeError beyond MAX_PARTIAL partial contractions.
 */
export function contractions(ring: Ring, tensors: readonly TensorKind[], kinds: KindTable): TensorSymbol[][] {
  const slots = tensors.reduce((n, k) => n + k.slots, 0);
  if (slots % 2 !== 0) return [];
  const plain = tensors.map(unsigned);
  let next = 0;
  const start: Factor[] = plain.map((kind) => ({ kind, lines: Array.from({ length: kind.slots }, () => next++) }));
  let level = new Map([['', [...start, ...open(start)]]]);
  for (let pairs = 0; pairs < slots / 2; pairs++) {
    const following = new Map<string, Factor[]>();
    for (const factors of level.values())
      for (const joined of joinFirstOpen(factors)) {
        const canonical = canonicalForm(joined, 0)!;
        following.set(canonical.key, [...canonical.factors]);
        if (following.size > MAX_PARTIAL) throw new RangeError(`more than ${MAX_PARTIAL} partial contractions`);
      }
    level = following;
  }
  const one = constant(ring, 1);
  const found = new Map<string, TensorSymbol[]>();
  for (const factors of level.values()) {
    const symbols = factors.map(
      ({ kind, lines }): TensorSymbol => ({
        ...symbolOfKind(kind as TensorKind),
        slots: lines.map((line) => ({ name: `l${line}`, up: false })),
      }),
    );
    for (const term of canonicalSum([{ coefficient: one, factors: symbols }], kinds))
      found.set(factorsKey(term.factors), [...term.factors]);
  }
  return [...found].sort(([a], [b]) => a.length - b.length || (a < b ? -1 : 1)).map(([, f]) => f);
}

const open = (factors: readonly Factor[]): Factor[] =>
  factors.flatMap((f) => f.lines.map((line) => ({ kind: OPEN, lines: [line] })));

/** The first open slot, in canonical order, joined with every other open slot. */
function joinFirstOpen(factors: readonly Factor[]): Factor[][] {
  const openLines = factors.filter((f) => f.kind === OPEN).map((f) => f.lines[0]!);
  const tensors = factors.filter((f) => f.kind !== OPEN);
  const first = tensors.flatMap((f) => f.lines).find((line) => openLines.includes(line))!;
  return openLines
    .filter((line) => line !== first)
    .map((line) => {
      const rejoin = (lines: readonly number[]): number[] => lines.map((l) => (l === line ? first : l));
      return [
        ...tensors.map((f) => ({ kind: f.kind, lines: rejoin(f.lines) })),
        ...openLines.filter((l) => l !== line && l !== first).map((l) => ({ kind: OPEN, lines: [l] })),
      ];
    });
}
