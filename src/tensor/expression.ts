/**
 * Sums of products of tensors in canonical form. Metrics are contracted away, products of two ε are expanded, traces get
 * their names, the axial vector is written out, dummies are a, b, c, … with the first of a pair down.
 * Invariant: terms differ in their factors, none vanishes, the order is that of their keys.
 */
import { add, isZero, negate, type Poly, scale } from '../algebra/poly.js';
import type { IndexSlot } from '../notation/theory.js';
import { canonicalForm, type Factor } from './canonical.js';
import { type KindTable, kindOf, type TensorKind } from './kinds.js';

/** A tensor with index slots; heads beyond the built-in ones are tensors of the user or of a derivation. */
export interface TensorSymbol {
  readonly head: string;
  /** An irreducible part; absent for the whole tensor. */
  readonly part?: string;
  readonly slots: readonly IndexSlot[];
}

export interface TensorTerm {
  readonly coefficient: Poly;
  readonly factors: readonly TensorSymbol[];
}

export type TensorSum = readonly TensorTerm[];

/** Dimension of space-time; the trace of the metric. */
const DIMENSION = 4;

const kindOfSymbol = (kinds: KindTable, { head, part, slots }: TensorSymbol): TensorKind =>
  kindOf(kinds, head, slots.length, part);

/** Canonical form of a sum. Free indices keep name and height. */
export function canonicalSum(terms: readonly TensorTerm[], kinds: KindTable): TensorSum {
  const found = new Map<string, TensorTerm>();
  for (const term of terms)
    for (const simple of contracted(term)) {
      const canonical = canonicalTerm(simple, kinds);
      if (!canonical) continue;
      const { key, term: t } = canonical;
      const known = found.get(key);
      found.set(key, known ? { ...known, coefficient: add(known.coefficient, t.coefficient) } : t);
    }
  return [...found]
    .filter(([, t]) => !isZero(t.coefficient))
    .sort(([a], [b]) => (a.length !== b.length ? a.length - b.length : a < b ? -1 : 1))
    .map(([, t]) => t);
}

/** Head and part of a symbol of that kind. */
export const symbolOfKind = ({ head, part }: TensorKind): Omit<TensorSymbol, 'slots'> =>
  part === undefined ? { head } : { head, part };

/** Text that is equal for equal canonical factors. */
export const factorsKey = (factors: readonly TensorSymbol[]): string =>
  factors
    .map(({ head, part, slots }) => {
      const indices = slots.map((s) => `${s.up ? '^' : '_'}${s.name}`).join('');
      return `${head}${part === undefined ? '' : `[${part}]`}(${indices})`;
    })
    .join('');

const occurrences = (factors: readonly TensorSymbol[], name: string): number =>
  factors.reduce((n, f) => n + f.slots.filter((s) => s.name === name).length, 0);

/** A fresh supply of names that no user can type. */
export function freshNames(): () => string {
  let n = 0;
  return () => `#${++n}`;
}

/** Writes out A, contracts η and δ, expands ε·ε; what is left has at most one ε. */
function contracted(term: TensorTerm): TensorTerm[] {
  let { coefficient } = term;
  let factors: TensorSymbol[] = [];
  const fresh = freshNames();
  for (const f of term.factors) {
    if (f.head !== 'A') {
      factors.push(f.head === 'delta' ? { head: 'eta', slots: f.slots } : f);
      continue;
    }
    const dummies = [fresh(), fresh(), fresh()];
    const at = (up: boolean): IndexSlot[] => dummies.map((name) => ({ name: `A${name}`, up }));
    factors.push({ head: 'epsilon', slots: [f.slots[0]!, ...at(true)] }, { head: 'T', slots: at(false) });
  }
  for (;;) {
    const at = factors.findIndex((f) => f.head === 'eta' && f.slots.some((s) => occurrences(factors, s.name) === 2));
    if (at < 0) break;
    const [i, j] = factors[at]!.slots as [IndexSlot, IndexSlot];
    factors = factors.filter((_, n) => n !== at);
    if (i.name === j.name) {
      coefficient = scale(coefficient, DIMENSION);
      continue;
    }
    const [dummy, other] = occurrences(factors, i.name) === 1 ? [i, j] : [j, i];
    factors = factors.map((f) => ({ ...f, slots: f.slots.map((s) => (s.name === dummy.name ? other : s)) }));
  }
  const volumes = factors.flatMap((f, n) => (f.head === 'epsilon' ? [n] : []));
  if (volumes.length < 2) return [{ coefficient, factors }];
  const [p, q] = volumes as [number, number];
  const rest = factors.filter((_, n) => n !== p && n !== q);
  const left = factors[p]!.slots;
  const right = factors[q]!.slots;
  // ε_abcd ε_efgh = −det η_.. in either signature, since det η = −1.
  return PERMUTATIONS.flatMap(({ places, sign }) =>
    contracted({
      coefficient: sign > 0 ? negate(coefficient) : coefficient,
      factors: [...rest, ...left.map((s, n): TensorSymbol => ({ head: 'eta', slots: [s, right[places[n]!]!] }))],
    }),
  );
}

const PERMUTATIONS: readonly { places: readonly number[]; sign: number }[] = [0, 1, 2, 3].flatMap((a) =>
  [0, 1, 2, 3].flatMap((b) =>
    [0, 1, 2, 3].flatMap((c) => {
      const d = 6 - a - b - c;
      const places = [a, b, c, d];
      if (new Set(places).size !== 4) return [];
      let sign = 1;
      for (let i = 0; i < 4; i++) for (let j = i + 1; j < 4; j++) if (places[i]! > places[j]!) sign = -sign;
      return [{ places, sign }];
    }),
  ),
);

/** Gives traces their names; undefined when one vanishes because the pair is antisymmetric. */
function traced(term: TensorTerm, kinds: KindTable): TensorTerm | undefined {
  let { coefficient } = term;
  let factors = term.factors;
  for (;;) {
    let changed = false;
    const next: TensorSymbol[] = [];
    for (const f of factors) {
      const trace = kindOfSymbol(kinds, f).traces.find(({ pair: [i, j] }) => f.slots[i]!.name === f.slots[j]!.name);
      if (!trace) {
        next.push(f);
        continue;
      }
      changed = true;
      if (trace.sign < 0) coefficient = negate(coefficient);
      next.push({ head: trace.to, slots: trace.keep.map((s) => f.slots[s]!) });
    }
    factors = next;
    if (!changed) return { coefficient, factors };
  }
}

/** Canonical form of one term without contracted metrics; undefined when it vanishes. */
function canonicalTerm(given: TensorTerm, kinds: KindTable): { key: string; term: TensorTerm } | undefined {
  const term = traced(given, kinds);
  if (!term) return undefined;
  const free = new Map<string, IndexSlot>();
  for (const f of term.factors)
    for (const s of f.slots) if (occurrences(term.factors, s.name) === 1) free.set(s.name, s);
  const freeNames = [...free.keys()].sort();
  const lines = new Map(freeNames.map((name, i) => [name, i]));
  const factors: Factor[] = term.factors.map((f) => ({
    kind: kindOfSymbol(kinds, f),
    lines: f.slots.map((s) => {
      const known = lines.get(s.name);
      if (known !== undefined) return known;
      lines.set(s.name, lines.size);
      return lines.size - 1;
    }),
  }));
  const canonical = canonicalForm(factors, freeNames.length);
  if (!canonical) return undefined;
  const names = dummyNames(freeNames);
  const seen = new Set<number>();
  const renamed = canonical.factors.map(
    (f): TensorSymbol => ({
      ...symbolOfKind(f.kind as TensorKind),
      slots: f.lines.map((line): IndexSlot => {
        if (line < freeNames.length) return free.get(freeNames[line]!)!;
        const up = seen.has(line);
        seen.add(line);
        return { name: names(line - freeNames.length), up };
      }),
    }),
  );
  const coefficient = canonical.sign < 0 ? negate(term.coefficient) : term.coefficient;
  return { key: factorsKey(renamed), term: { coefficient, factors: renamed } };
}

const LETTERS = 'abcdefghijklmnopqrstuvwxyz';
/** a, b, c, … without the names of free indices; after z the Greek macros of TeX would follow, but products are shorter. */
function dummyNames(taken: readonly string[]): (n: number) => string {
  const names = [...LETTERS].filter((c) => !taken.includes(c));
  return (n) => names[n] ?? `i${n}`;
}
