/**
 * Values of products of tensors on random components modulo a prime, in four dimensions: the instrument that finds and
 * tests linear relations. Deterministic for a seed. Dense on purpose: random components have no zeros to skip.
 */
import { remember } from '../algebra/memo.js';
import { multiplyMod } from '../algebra/modular.js';
import type { TensorSymbol } from './expression.js';
import { type KindTable, kindName, plainKind, type TensorKind } from './kinds.js';

const SIZE = 4;
/** η, whose sign pattern is immaterial for relations but must not be Euclidean. */
const SIGNS = [-1, 1, 1, 1];

/** Dense components, all indices down, first slot most significant. */
interface Dense {
  readonly rank: number;
  readonly values: Float64Array;
}

/** Components of every tensor at one random point. */
export interface RandomPoint {
  readonly prime: number;
  /** Value of a product whose indices are all contracted. */
  value(factors: readonly TensorSymbol[]): number;
}

/** Linear congruential steps are enough here: what is needed is independence, not secrecy. */
function generatorOf(seed: number): () => number {
  let state = (seed * 2_654_435_761) >>> 0;
  return () => {
    state = (Math.imul(state ^ (state >>> 15), 2_246_822_519) + 0x9e3779b9) >>> 0;
    return state ^ (state >>> 13);
  };
}

const digitsOf = (packed: number, rank: number): number[] =>
  Array.from({ length: rank }, (_, s) => Math.floor(packed / SIZE ** (rank - 1 - s)) % SIZE);
const pack = (digits: readonly number[]): number => digits.reduce((n, d) => n * SIZE + d, 0);

/** Random components with the symmetries of a kind. */
function randomTensor(kind: TensorKind, prime: number, next: () => number): Dense {
  const values = new Float64Array(SIZE ** kind.slots);
  const done = new Uint8Array(values.length);
  for (let n = 0; n < values.length; n++) {
    if (done[n]) continue;
    const digits = digitsOf(n, kind.slots);
    const images = kind.group.map(({ places, sign }) => [pack(places.map((p) => digits[p]!)), sign] as const);
    const vanishes = images.some(([m, sign]) => m === n && sign < 0);
    const value = vanishes ? 0 : (next() >>> 0) % prime;
    for (const [m, sign] of images) {
      values[m] = sign > 0 ? value : (prime - value) % prime;
      done[m] = 1;
    }
  }
  return { rank: kind.slots, values };
}

function traceOf({ rank, values }: Dense, i: number, j: number, prime: number): Dense {
  const out = new Float64Array(SIZE ** (rank - 2));
  values.forEach((value, n) => {
    const digits = digitsOf(n, rank);
    if (digits[i] !== digits[j]) return;
    const m = pack(digits.filter((_, s) => s !== i && s !== j));
    out[m] = (out[m]! + (SIGNS[digits[i]!]! < 0 ? prime - value : value)) % prime;
  });
  return { rank: rank - 2, values: out };
}

interface Placed {
  readonly names: readonly string[];
  readonly tensor: Dense;
}

/** Sum over the names that two tensors share. */
function join(a: Placed, b: Placed, prime: number): Placed {
  const shared = a.names.filter((n) => b.names.includes(n));
  const freeA = a.names.filter((n) => !shared.includes(n));
  const freeB = b.names.filter((n) => !shared.includes(n));
  const offsets = (names: readonly string[], of: Placed): Int32Array => {
    const table = new Int32Array(SIZE ** names.length);
    for (let n = 0; n < table.length; n++) {
      const digits = digitsOf(n, names.length);
      table[n] = names.reduce(
        (sum, name, s) => sum + digits[s]! * SIZE ** (of.names.length - 1 - of.names.indexOf(name)),
        0,
      );
    }
    return table;
  };
  const [rowA, rowB, sumA, sumB] = [offsets(freeA, a), offsets(freeB, b), offsets(shared, a), offsets(shared, b)];
  const sign = Array.from(sumA, (_, n) => digitsOf(n, shared.length).reduce((s, d) => s * SIGNS[d]!, 1));
  const values = new Float64Array(rowA.length * rowB.length);
  for (let i = 0; i < rowA.length; i++)
    for (let j = 0; j < rowB.length; j++) {
      let total = 0;
      for (let s = 0; s < sumA.length; s++) {
        const product = multiplyMod(
          a.tensor.values[rowA[i]! + sumA[s]!]!,
          b.tensor.values[rowB[j]! + sumB[s]!]!,
          prime,
        );
        total += sign[s]! > 0 ? product : prime - product;
      }
      values[i * rowB.length + j] = total % prime;
    }
  return { names: [...freeA, ...freeB], tensor: { rank: freeA.length + freeB.length, values } };
}

/** Random components for a seed; tensors are drawn when first met. */
export function randomPoint(seed: number, prime: number, kinds: KindTable): RandomPoint {
  const drawn = new Map<string, Dense>();
  const tensorOf = (name: string, head: string, slots: number): Dense =>
    remember(drawn, name, () => {
      if (head === 'epsilon') return volume(prime);
      if (head === 'eta') return metric(prime);
      if (head === 'R' && slots === 2) return traceOf(tensorOf('R/4', 'R', 4), 0, 2, prime);
      if (head === 'R' && slots === 0) return traceOf(tensorOf('R/2', 'R', 2), 0, 1, prime);
      if (head === 'T' && slots === 1) return traceOf(tensorOf('T/3', 'T', 3), 0, 2, prime);
      // Each tensor has its own stream, so that the order in which they are met does not matter.
      const stream = generatorOf(seed + [...name].reduce((h, c) => (h * 31 + c.charCodeAt(0)) % 1_000_003, 7));
      return randomTensor(kinds.get(name) ?? plainKind(head, slots), prime, stream);
    });
  return {
    prime,
    value(factors) {
      let rest: Placed[] = factors.map(({ head, slots }) => ({
        names: slots.map((s) => s.name),
        tensor: tensorOf(kindName(head, slots.length), head, slots.length),
      }));
      rest = rest.map((p) => withoutSelfPairs(p, prime));
      let scalar = 1;
      while (rest.length > 0) {
        const [first, ...others] = rest as [Placed, ...Placed[]];
        if (first.names.length === 0) {
          scalar = multiplyMod(scalar, first.tensor.values[0]!, prime);
          rest = others;
          continue;
        }
        const sharedWith = (p: Placed): number => p.names.filter((n) => first.names.includes(n)).length;
        const best = others.reduce((b, p, i) => (sharedWith(p) > sharedWith(others[b]!) ? i : b), 0);
        const joined = withoutSelfPairs(join(first, others[best]!, prime), prime);
        rest = [joined, ...others.filter((_, i) => i !== best)];
      }
      return scalar;
    },
  };
}

function withoutSelfPairs(placed: Placed, prime: number): Placed {
  let { names, tensor } = placed;
  for (;;) {
    const i = names.findIndex((n, s) => names.indexOf(n, s + 1) >= 0);
    if (i < 0) return { names, tensor };
    const j = names.indexOf(names[i]!, i + 1);
    tensor = traceOf(tensor, i, j, prime);
    names = names.filter((_, s) => s !== i && s !== j);
  }
}

function volume(prime: number): Dense {
  const values = new Float64Array(256);
  for (let n = 0; n < 256; n++) {
    const d = digitsOf(n, 4);
    if (new Set(d).size !== 4) continue;
    let sign = 1;
    for (let i = 0; i < 4; i++) for (let j = i + 1; j < 4; j++) if (d[i]! > d[j]!) sign = -sign;
    values[n] = sign > 0 ? 1 : prime - 1;
  }
  return { rank: 4, values };
}

function metric(prime: number): Dense {
  const values = new Float64Array(16);
  SIGNS.forEach((s, i) => {
    values[pack([i, i])] = s > 0 ? 1 : prime - 1;
  });
  return { rank: 2, values };
}
