/**
 * Products of tensors on random components in any dimension, by brute force: every assignment of 0..d−1 to every index,
 * straight from the definitions R_ab = R^c_acb, R = η^ab R_ab, T_a = T^b_ab, A^a = ε^abcd T_bcd, ε_0123 = +1, with
 * η = diag(−1, 1, …, 1), modulo a prime. Shares nothing with src/.
 */
import { Random } from './random.js';

/** Below 2^26, so that products of residues are exact. */
export const PRIME = 67_108_747;

export interface OracleSlot {
  readonly name: string;
  readonly up: boolean;
}

export interface OracleTensor {
  readonly head: string;
  readonly slots: readonly OracleSlot[];
}

/** new[i] = old[places[i]], times the sign. */
export interface OracleSymmetry {
  readonly places: readonly number[];
  readonly sign: number;
}

const mod = (x: number): number => ((x % PRIME) + PRIME) % PRIME;

/** Sign of a permutation, 0 when an entry repeats. */
export function parity(indices: readonly number[]): number {
  let sign = 1;
  for (let i = 0; i < indices.length; i++)
    for (let j = i + 1; j < indices.length; j++) {
      if (indices[i] === indices[j]) return 0;
      if (indices[i]! > indices[j]!) sign = -sign;
    }
  return sign;
}

/** Lowered components of every tensor at one random point. */
export class RandomTensors {
  private readonly arrays = new Map<string, readonly number[]>();

  constructor(
    readonly seed: number,
    readonly dimension: number,
    /** Symmetry groups, closed, of further tensors by `head/slots`; others have none. */
    private readonly groups: ReadonlyMap<string, readonly OracleSymmetry[]> = new Map(),
  ) {}

  private get range(): number[] {
    return Array.from({ length: this.dimension }, (_, i) => i);
  }

  private eta(i: number): number {
    return i === 0 ? -1 : 1;
  }

  private drawn(key: string, slots: number): readonly number[] {
    const known = this.arrays.get(key);
    if (known !== undefined) return known;
    const random = new Random(this.seed + 7919 * [...key].reduce((n, c) => (n * 31 + c.charCodeAt(0)) % 99_991, 3));
    const raw = Array.from({ length: this.dimension ** slots }, () => random.below(PRIME));
    this.arrays.set(key, raw);
    return raw;
  }

  private raw(key: string, indices: readonly number[]): number {
    return this.drawn(key, indices.length)[indices.reduce((n, i) => n * this.dimension + i, 0)]!;
  }

  /** A component with all indices lowered. */
  component(head: string, at: readonly number[]): number {
    const [a, b, c, d] = at as [number, number, number, number];
    const key = `${head}/${at.length}`;
    switch (key) {
      case 'T/3':
        return mod(this.raw('T', [a, b, c]) - this.raw('T', [a, c, b]));
      case 'R/4': {
        const half = (i: number, j: number): number => this.raw('R', [i, j, c, d]) - this.raw('R', [i, j, d, c]);
        return mod(half(a, b) - half(b, a));
      }
      case 'R/2':
        return mod(this.range.reduce((n, e) => n + this.eta(e) * this.component('R', [e, a, e, b]), 0));
      case 'R/0':
        return mod(this.range.reduce((n, e) => n + this.eta(e) * this.component('R', [e, e]), 0));
      case 'T/1':
        return mod(this.range.reduce((n, e) => n + this.eta(e) * this.component('T', [e, a, e]), 0));
      case 'A/1': {
        let total = 0;
        for (const i of this.range)
          for (const j of this.range)
            for (const k of this.range) {
              const sign = parity([a, i, j, k]) * this.eta(i) * this.eta(j) * this.eta(k);
              if (sign !== 0) total += sign * this.component('T', [i, j, k]);
            }
        return mod(total);
      }
      case 'epsilon/4':
        if (this.dimension !== 4) throw new Error('ε has four indices in four dimensions only');
        return mod(parity(at));
      case 'eta/2':
      case 'delta/2':
        return mod(a === b ? this.eta(a) : 0);
    }
    const group = this.groups.get(key);
    if (group === undefined) return this.raw(key, at);
    return mod(
      group.reduce(
        (n, g) =>
          n +
          g.sign *
            this.raw(
              key,
              g.places.map((p) => at[p]!),
            ),
        0,
      ),
    );
  }

  /**
   * A product; `free` gives values to indices that occur once. Heights of free indices are honoured, each contracted pair
   * counts as one up and one down.
   */
  value(factors: readonly OracleTensor[], free: ReadonlyMap<string, number> = new Map()): number {
    const names = [...new Set(factors.flatMap((f) => f.slots.map((s) => s.name)))].filter((n) => !free.has(n));
    const at = new Map(free);
    // A factor is multiplied in as soon as its last index has a value.
    const ready = names.map((_, depth) =>
      factors.filter((f) => {
        const depths = f.slots.map((s) => names.indexOf(s.name));
        return Math.max(-1, ...depths) === depth;
      }),
    );
    const of = (f: OracleTensor): number => {
      const indices = f.slots.map((s) => at.get(s.name)!);
      const raised = f.slots.reduce((n, s, i) => (free.has(s.name) && s.up ? n * this.eta(indices[i]!) : n), 1);
      return mod(raised * this.component(f.head, indices));
    };
    const visit = (depth: number, product: number): number => {
      if (product === 0) return 0;
      if (depth === names.length) return product;
      let total = 0;
      for (const i of this.range) {
        at.set(names[depth]!, i);
        const here = ready[depth]!.reduce((n, f) => (n * of(f)) % PRIME, mod(product * this.eta(i)));
        total += visit(depth + 1, here);
      }
      return total % PRIME;
    };
    const constant = factors.filter((f) => f.slots.every((s) => free.has(s.name)));
    return mod(
      visit(
        0,
        constant.reduce((n, f) => (n * of(f)) % PRIME, 1),
      ),
    );
  }
}

/** A product with the given tensors, slots joined in random pairs; `free` of them stay unpaired, as `f0`, `f1`, …. */
export function randomContraction(
  random: Random,
  tensors: readonly (readonly [head: string, slots: number])[],
  free = 0,
): OracleTensor[] {
  const owners = tensors.flatMap(([, count], i) => Array<number>(count).fill(i));
  if ((owners.length - free) % 2 !== 0) throw new Error('an odd number of slots cannot be paired');
  const slots: OracleSlot[] = owners.map(() => ({ name: '', up: false }));
  const order = random.shuffled(owners.map((_, i) => i));
  for (let i = 0; i < free; i++) slots[order[i]!] = { name: `f${i}`, up: i % 2 === 1 };
  const letters = random.shuffled([...'abcdeghijklmnopqrstuvwxyz']);
  for (let i = free; i < order.length; i += 2) {
    const up = random.chance(50);
    const name = letters[(i - free) / 2]!;
    slots[order[i]!] = { name, up };
    slots[order[i + 1]!] = { name, up: !up };
  }
  return tensors.map(([head], i) => ({ head, slots: slots.filter((_, s) => owners[s] === i) }));
}

/** The same product up to sign: dummies renamed and turned over, factors shuffled, slots moved by their symmetries. */
export function disguised(
  random: Random,
  factors: readonly OracleTensor[],
  groups: ReadonlyMap<string, readonly OracleSymmetry[]>,
): { readonly factors: readonly OracleTensor[]; readonly sign: number } {
  const counts = new Map<string, number>();
  for (const f of factors) for (const s of f.slots) counts.set(s.name, (counts.get(s.name) ?? 0) + 1);
  const dummies = [...counts].filter(([, n]) => n === 2).map(([name]) => name);
  const letters = random.shuffled([...'abcdeghijklmnopqrstuvwxyz']);
  const renamed = new Map(dummies.map((name, i) => [name, { name: letters[i]!, turned: random.chance(50) }]));
  let sign = 1;
  const moved = random.shuffled(factors).map(({ head, slots }) => {
    const group = groups.get(`${head}/${slots.length}`);
    const g = group === undefined ? undefined : random.pick(group);
    if (g !== undefined) sign *= g.sign;
    const arranged = g === undefined ? slots : g.places.map((p) => slots[p]!);
    return {
      head,
      slots: arranged.map((s) => {
        const to = renamed.get(s.name);
        return to === undefined ? s : { name: to.name, up: to.turned ? !s.up : s.up };
      }),
    };
  });
  return { factors: moved, sign };
}
