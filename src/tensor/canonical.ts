/**
 * Canonical form of a product of tensors: one representative of all products that differ by slot symmetries, the order of
 * factors and the names of dummies. With a metric-compatible connection heights of contracted pairs do not matter.
 *
 * Method: each connected part of the product is walked from every factor in every arrangement of its slots, always
 * continuing at the factor that holds the other end of the lowest open dummy. A walk writes a sequence of numbers; the
 * smallest sequence is the form. Only walks that tie for the smallest prefix are kept, and walks that have reached the same
 * state are merged, so the work is (factors × arrangements of one factor) plus the ties, which are symmetries of the
 * product. Two equal walks with opposite signs mean that the product vanishes. Of dummies that may be exchanged because both
 * of their tensors are (anti)symmetric in them only one order is walked.
 * Bound: at most MAX_WALKS tied walks and MAX_PLACEMENTS tensors placed; beyond them the product is refused.
 */
import type { SignedPermutation } from './symmetry.js';

/** A tensor as the algorithm sees it. */
export interface Kind {
  readonly name: string;
  readonly slots: number;
  /** Closed group, identity first. */
  readonly group: readonly SignedPermutation[];
  /** Whether it stands before kinds of other names. */
  readonly leads?: boolean;
}

/** Kinds are ordered by this text. */
const rankName = ({ name, leads }: Kind): string => (leads ? ` ${name}` : name);

/** Lines that connect slots: a number that occurs twice is a dummy, once is a free index. */
export interface Factor {
  readonly kind: Kind;
  readonly lines: readonly number[];
}

/** A product with its sign; `undefined` in place of it means zero. */
export interface Canonical {
  readonly sign: 1 | -1;
  /**
   * Factors in canonical order. Free lines keep their numbers; dummies are renumbered from `firstDummy` by first
   * appearance.
   */
  readonly factors: readonly Factor[];
  /** Equal exactly for equal products up to sign. */
  readonly key: string;
}

export const MAX_WALKS = 100_000;
/** A few seconds. */
export const MAX_PLACEMENTS = 5_000_000;

/** Thrown when a product has too many symmetries for this method. */
export class CanonicalLimitError extends RangeError {
  constructor() {
    super('a product of tensors has too many equivalent arrangements');
  }
}

/** A partial walk; all walks of one generation have written the same sequence. */
interface Walk {
  readonly placed: readonly number[];
  /** Dummy line → its number in this walk. */
  readonly numbers: ReadonlyMap<number, number>;
  readonly arranged: readonly Factor[];
  readonly sign: 1 | -1;
}

/** Occurrences of each line: (factor, slot). */
function endsOf(factors: readonly Factor[]): Map<number, number[]> {
  const ends = new Map<number, number[]>();
  factors.forEach((f, i) => {
    for (const line of f.lines) ends.set(line, [...(ends.get(line) ?? []), i]);
  });
  return ends;
}

/** Groups of factors that share lines, directly or through others. */
function connectedParts(factors: readonly Factor[], ends: ReadonlyMap<number, readonly number[]>): number[][] {
  const part = factors.map((_, i) => i);
  const root = (i: number): number => (part[i] === i ? i : root(part[i]!));
  for (const [a, b] of ends.values()) if (b !== undefined) part[root(a!)] = root(b);
  const groups = new Map<number, number[]>();
  factors.forEach((_, i) => {
    groups.set(root(i), [...(groups.get(root(i)) ?? []), i]);
  });
  return [...groups.values()];
}

/**
 * The canonical form, or undefined when the product vanishes by its symmetries.
 * @param firstDummy number of the first dummy in the result; larger than every free line.
 * @throws CanonicalLimitError beyond MAX_WALKS or MAX_PLACEMENTS.
 */
export function canonicalForm(factors: readonly Factor[], firstDummy: number): Canonical | undefined {
  const ends = endsOf(factors);
  let sign: 1 | -1 = 1;
  const parts: { code: number[]; names: string; factors: readonly Factor[] }[] = [];
  for (const group of connectedParts(factors, ends)) {
    const walked = walkPart(factors, group, ends);
    if (!walked) return undefined;
    sign = (sign * walked.sign) as 1 | -1;
    parts.push(walked);
  }
  parts.sort((a, b) => (a.names < b.names ? -1 : a.names > b.names ? 1 : compareCodes(a.code, b.code)));
  let next = firstDummy;
  const ordered: Factor[] = [];
  for (const { factors: arranged } of parts) {
    const renamed = new Map<number, number>();
    for (const f of arranged)
      ordered.push({
        kind: f.kind,
        lines: f.lines.map((line) => {
          if (ends.get(line)!.length === 1) return line;
          if (!renamed.has(line)) renamed.set(line, next++);
          return renamed.get(line)!;
        }),
      });
  }
  return { sign, factors: ordered, key: ordered.map((f) => `${f.kind.name}(${f.lines})`).join('') };
}

function compareCodes(a: readonly number[], b: readonly number[]): number {
  for (let i = 0; i < Math.min(a.length, b.length); i++) if (a[i] !== b[i]) return a[i]! - b[i]!;
  return a.length - b.length;
}

const signsOfGroups = new WeakMap<readonly SignedPermutation[], ReadonlyMap<string, 1 | -1>>();

/** Sign with which the group exchanges two slots; undefined when it does not. */
function exchangeSign({ group, slots }: Kind, i: number, j: number): 1 | -1 | undefined {
  let signs = signsOfGroups.get(group);
  if (!signs) {
    signs = new Map(group.map((g) => [g.places.join(), g.sign]));
    signsOfGroups.set(group, signs);
  }
  return signs.get(Array.from({ length: slots }, (_, s) => (s === i ? j : s === j ? i : s)).join());
}

/**
 * Dummies between the same two factors whose exchange changes nothing: line → the next smaller one like it.
 * Undefined when an exchange changes the sign, so that the product vanishes.
 */
function interchangeable(
  factors: readonly Factor[],
  group: readonly number[],
  ends: ReadonlyMap<number, readonly number[]>,
): ReadonlyMap<number, number> | undefined {
  const before = new Map<number, number>();
  const lines = [...new Set(group.flatMap((f) => factors[f]!.lines))].sort((a, b) => a - b);
  const between = lines.filter((line) => ends.get(line)!.length === 2 && ends.get(line)![0] !== ends.get(line)![1]);
  for (const [n, line] of between.entries())
    for (let m = n - 1; m >= 0; m--) {
      const other = between[m]!;
      const [f, g] = ends.get(line)!;
      if (ends.get(other)![0] !== f || ends.get(other)![1] !== g) continue;
      const signs = [factors[f!]!, factors[g!]!].map(({ kind, lines: at }) =>
        exchangeSign(kind, at.indexOf(line), at.indexOf(other)),
      );
      if (signs.includes(undefined)) continue;
      if (signs[0] !== signs[1]) return undefined;
      before.set(line, other);
      break;
    }
  return before;
}

/** Walks one connected part; undefined when it vanishes. */
function walkPart(
  factors: readonly Factor[],
  group: readonly number[],
  ends: ReadonlyMap<number, readonly number[]>,
): { sign: 1 | -1; code: number[]; names: string; factors: readonly Factor[] } | undefined {
  const start: Walk = { placed: [], numbers: new Map(), arranged: [], sign: 1 };
  const before = interchangeable(factors, group, ends);
  if (!before) return undefined;
  const kinds = [...new Set(group.map((i) => rankName(factors[i]!.kind)))].sort();
  const code: number[] = [];
  let walks: Walk[] = [start];
  let placements = 0;
  for (let step = 0; step < group.length; step++) {
    let best: number[] | undefined;
    let kept = new Map<string, Walk>();
    for (const walk of walks) {
      const candidates = step === 0 ? group : [nextFactor(walk, ends)];
      for (const f of candidates) {
        const rank = kinds.indexOf(rankName(factors[f]!.kind));
        placements += factors[f]!.kind.group.length;
        if (placements > MAX_PLACEMENTS) throw new CanonicalLimitError();
        for (const element of factors[f]!.kind.group) {
          const placed = write(walk, rank, factors[f]!, element, ends, before);
          if (!placed) continue;
          const { written, fresh } = placed;
          const order = best === undefined ? -1 : compareCodes(written, best);
          if (order > 0) continue;
          if (order < 0) {
            best = written;
            kept = new Map();
          }
          const next = advance(walk, f, factors[f]!, element, fresh);
          const key = stateKey(next);
          const twin = kept.get(key);
          if (twin === undefined) kept.set(key, next);
          // The same arrangement is reached with both signs: every continuation cancels.
          else if (twin.sign !== next.sign) return undefined;
        }
      }
      if (kept.size > MAX_WALKS) throw new CanonicalLimitError();
    }
    code.push(...best!);
    walks = [...kept.values()];
  }
  if (walks.some((w) => w.sign !== walks[0]!.sign)) return undefined;
  const { sign, arranged } = walks[0]!;
  const names = arranged.map((f) => rankName(f.kind)).join();
  return { sign, code, names, factors: arranged };
}

/** Dummies are numbered in the order in which they are met, so their order tells their numbers. */
const stateKey = (walk: Walk): string => `${[...walk.placed].sort((a, b) => a - b)}|${[...walk.numbers.keys()].join()}`;

/** The unplaced factor at the other end of the lowest open dummy. */
function nextFactor(walk: Walk, ends: ReadonlyMap<number, readonly number[]>): number {
  let least = Number.POSITIVE_INFINITY;
  let found = -1;
  for (const [line, number] of walk.numbers) {
    if (number >= least) continue;
    const open = ends.get(line)!.find((f) => !walk.placed.includes(f));
    if (open === undefined) continue;
    least = number;
    found = open;
  }
  return found;
}

/**
 * What a factor writes in one arrangement of its slots, and the dummies that it numbers. Undefined when interchangeable
 * dummies would come in another order than their own.
 */
function write(
  { numbers }: Walk,
  rank: number,
  { lines }: Factor,
  { places }: SignedPermutation,
  ends: ReadonlyMap<number, readonly number[]>,
  before: ReadonlyMap<number, number>,
): { written: number[]; fresh: number[] } | undefined {
  const fresh: number[] = [];
  const written = [rank];
  for (const place of places) {
    const line = lines[place]!;
    if (ends.get(line)!.length === 1) {
      // Free indices come first, in their own order.
      written.push(line - 1e6);
      continue;
    }
    const known = numbers.get(line);
    if (known !== undefined) {
      written.push(known);
      continue;
    }
    let at = fresh.indexOf(line);
    if (at < 0) {
      const first = before.get(line);
      if (first !== undefined && !numbers.has(first) && !fresh.includes(first)) return undefined;
      at = fresh.push(line) - 1;
    }
    written.push(numbers.size + at + 1);
  }
  return { written, fresh };
}

/** The walk with one more factor. */
const advance = (
  walk: Walk,
  f: number,
  { kind, lines }: Factor,
  { places, sign }: SignedPermutation,
  fresh: readonly number[],
): Walk => ({
  placed: [...walk.placed, f],
  numbers: new Map([...walk.numbers, ...fresh.map((line, i) => [line, walk.numbers.size + i + 1] as const)]),
  arranged: [...walk.arranged, { kind, lines: places.map((p) => lines[p]!) }],
  sign: (walk.sign * sign) as 1 | -1,
});
