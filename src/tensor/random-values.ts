/**
 * Values of products of tensors on random components modulo a prime, in any dimension: the instrument that finds and tests
 * linear relations. Deterministic for a seed. Dense on purpose: random components have no zeros to skip.
 */
import { remember } from '../algebra/memo.js';
import { multiplyMod } from '../algebra/modular.js';
import type { TensorSymbol } from './expression.js';
import { type KindTable, kindOf, type TensorKind } from './kinds.js';

/** Components by the packed value of their indices, all indices down, first slot most significant. */
interface Dense {
  readonly rank: number;
  readonly values: Float64Array;
}

interface Placed {
  readonly names: readonly string[];
  readonly tensor: Dense;
}

/** Components of every tensor at one random point. */
export interface RandomPoint {
  readonly prime: number;
  /** Value of a product whose indices are all contracted. */
  value(factors: readonly TensorSymbol[]): number;
  /**
   * Components of a product with free indices, all down: the first of `free` most significant.
   * @throws RangeError when `free` are not the free indices of the product.
   */
  components(factors: readonly TensorSymbol[], free: readonly string[]): Float64Array;
}

/** More components than this in an intermediate product are refused. */
export const MAX_DENSE = 4 ** 11;

/** Thrown when a product needs more intermediate components than MAX_DENSE. */
export class TooLargeError extends RangeError {
  constructor() {
    super(`a product of tensors needs more than ${MAX_DENSE} intermediate components`);
  }
}

/** Linear congruential steps are enough here: what is needed is independence, not secrecy. */
function generatorOf(seed: number): () => number {
  let state = (seed * 2_654_435_761) >>> 0;
  return () => {
    state = (Math.imul(state ^ (state >>> 15), 2_246_822_519) + 0x9e3779b9) >>> 0;
    return state ^ (state >>> 13);
  };
}

/**
 * Random components for a seed; tensors are drawn when first met, each from its own stream, so that the order in which
 * they are met does not matter.
 * @param size the dimension; ε and A exist in four dimensions only (RangeError).
 */
export function randomPoint(seed: number, prime: number, kinds: KindTable, size = 4): RandomPoint {
  const space = new Space(size, prime);
  const drawn = new Map<string, Dense>();
  const whole = (head: string, slots: number): Dense =>
    remember(drawn, `${head}/${slots}`, () => {
      if (head === 'epsilon') return space.volume();
      if (head === 'eta' || head === 'delta') return space.metric();
      if (head === 'R' && slots === 2) return space.trace(whole('R', 4), 0, 2);
      if (head === 'R' && slots === 0) return space.trace(whole('R', 2), 0, 1);
      if (head === 'T' && slots === 1) return space.trace(whole('T', 3), 0, 2);
      if (head === 'A')
        return space.join({ names: [...'abcd'], tensor: space.volume() }, { names: [...'bcd'], tensor: whole('T', 3) })
          .tensor;
      const kind = kindOf(kinds, head, slots);
      const stream = generatorOf(seed + [...kind.name].reduce((h, c) => (h * 31 + c.charCodeAt(0)) % 1_000_003, 7));
      return space.random(kind, stream);
    });
  const placed = ({ head, part, slots }: TensorSymbol): Placed => {
    if (part !== undefined) throw new RangeError(`the part (${part}) must be written out first`);
    return { names: slots.map((s) => s.name), tensor: whole(head, slots.length) };
  };
  const product = (factors: readonly TensorSymbol[]): Placed => space.contract(factors.map(placed));
  return {
    prime,
    value(factors) {
      const { names, tensor } = product(factors);
      if (names.length > 0) throw new RangeError('the product has free indices');
      return tensor.values[0]!;
    },
    components(factors, free) {
      const { names, tensor } = product(factors);
      if (names.length !== free.length || free.some((name) => !names.includes(name)))
        throw new RangeError('the product has other free indices');
      return space.reorder(
        tensor,
        free.map((name) => names.indexOf(name)),
      );
    },
  };
}

/** Dense tensors in `size` dimensions over the residues of a prime. */
class Space {
  constructor(
    private readonly size: number,
    private readonly prime: number,
  ) {}

  /** η is diag(−1, 1, …); relations do not depend on the signs. */
  private isNegative(index: number): boolean {
    return index === 0;
  }

  private digits(packed: number, rank: number): number[] {
    return Array.from({ length: rank }, (_, s) => Math.floor(packed / this.size ** (rank - 1 - s)) % this.size);
  }

  private pack(digits: readonly number[]): number {
    return digits.reduce((n, d) => n * this.size + d, 0);
  }

  /** One number for each assignment of digits, the first most significant, made digit by digit from 0. */
  private grid(weights: readonly number[], step: (so: number, weight: number, digit: number) => number): Int32Array {
    let table = Int32Array.of(0);
    for (const weight of weights) {
      const next = new Int32Array(table.length * this.size);
      let k = 0;
      for (const so of table) for (let digit = 0; digit < this.size; digit++) next[k++] = step(so, weight, digit);
      table = next;
    }
    return table;
  }

  /** Random components with the symmetries of a kind. */
  random(kind: TensorKind, next: () => number): Dense {
    const values = new Float64Array(this.size ** kind.slots);
    const done = new Uint8Array(values.length);
    for (let n = 0; n < values.length; n++) {
      if (done[n]) continue;
      const digits = this.digits(n, kind.slots);
      const images = kind.group.map(({ places, sign }) => [this.pack(places.map((p) => digits[p]!)), sign] as const);
      const vanishes = images.some(([m, sign]) => m === n && sign < 0);
      const value = vanishes ? 0 : (next() >>> 0) % this.prime;
      for (const [m, sign] of images) {
        values[m] = sign > 0 ? value : (this.prime - value) % this.prime;
        done[m] = 1;
      }
    }
    return { rank: kind.slots, values };
  }

  trace({ rank, values }: Dense, i: number, j: number): Dense {
    const out = new Float64Array(this.size ** (rank - 2));
    values.forEach((value, n) => {
      const digits = this.digits(n, rank);
      if (digits[i] !== digits[j]) return;
      const m = this.pack(digits.filter((_, s) => s !== i && s !== j));
      out[m] = (out[m]! + (this.isNegative(digits[i]!) ? this.prime - value : value)) % this.prime;
    });
    return { rank: rank - 2, values: out };
  }

  reorder({ rank, values }: Dense, places: readonly number[]): Float64Array {
    return Float64Array.from(values, (_, n) => {
      const wanted = this.digits(n, rank);
      const digits = new Array<number>(rank);
      places.forEach((place, s) => {
        digits[place] = wanted[s]!;
      });
      return values[this.pack(digits)]!;
    });
  }

  /** Sum over the names that two tensors share. */
  join(a: Placed, b: Placed): Placed {
    const { size, prime } = this;
    const shared = a.names.filter((n) => b.names.includes(n));
    const freeA = a.names.filter((n) => !shared.includes(n));
    const freeB = b.names.filter((n) => !shared.includes(n));
    if (size ** (freeA.length + freeB.length) > MAX_DENSE) throw new TooLargeError();
    const offsets = (names: readonly string[], of: Placed): Int32Array =>
      this.grid(
        names.map((name) => size ** (of.names.length - 1 - of.names.indexOf(name))),
        (offset, weight, digit) => offset + weight * digit,
      );
    const [rowA, rowB, sumA, sumB] = [offsets(freeA, a), offsets(freeB, b), offsets(shared, a), offsets(shared, b)];
    const negative = this.grid(
      shared.map(() => 1),
      (odd, _, digit) => (this.isNegative(digit) ? 1 - odd : odd),
    );
    const values = new Float64Array(rowA.length * rowB.length);
    for (let i = 0; i < rowA.length; i++)
      for (let j = 0; j < rowB.length; j++) {
        let total = 0;
        for (let s = 0; s < sumA.length; s++) {
          const left = a.tensor.values[rowA[i]! + sumA[s]!]!;
          const product = multiplyMod(left, b.tensor.values[rowB[j]! + sumB[s]!]!, prime);
          total += negative[s] ? prime - product : product;
        }
        values[i * rowB.length + j] = total % prime;
      }
    return { names: [...freeA, ...freeB], tensor: { rank: freeA.length + freeB.length, values } };
  }

  /** The whole product, summed over every name that occurs twice. */
  contract(factors: readonly Placed[]): Placed {
    let rest = factors.map((p) => this.withoutSelfPairs(p));
    if (rest.length === 0) return { names: [], tensor: { rank: 0, values: Float64Array.of(1) } };
    while (rest.length > 1) {
      const [first, ...others] = rest as [Placed, ...Placed[]];
      const sharedWith = (p: Placed): number => p.names.filter((n) => first.names.includes(n)).length;
      const best = others.reduce((b, p, i) => (sharedWith(p) > sharedWith(others[b]!) ? i : b), 0);
      // A finished scalar waits until the end, so that unconnected tensors are not multiplied out.
      if (first.names.length === 0 && others.some((p) => p.names.length > 0)) {
        rest = [...others, first];
        continue;
      }
      rest = [this.join(first, others[best]!), ...others.filter((_, i) => i !== best)];
    }
    return rest[0]!;
  }

  private withoutSelfPairs(placed: Placed): Placed {
    let { names, tensor } = placed;
    for (;;) {
      const i = names.findIndex((n, s) => names.indexOf(n, s + 1) >= 0);
      if (i < 0) return { names, tensor };
      const j = names.indexOf(names[i]!, i + 1);
      tensor = this.trace(tensor, i, j);
      names = names.filter((_, s) => s !== i && s !== j);
    }
  }

  volume(): Dense {
    if (this.size !== 4) throw new RangeError('the volume tensor has four indices in four dimensions only');
    const values = new Float64Array(256);
    for (let n = 0; n < 256; n++) {
      const d = this.digits(n, 4);
      if (new Set(d).size !== 4) continue;
      let sign = 1;
      for (let i = 0; i < 4; i++) for (let j = i + 1; j < 4; j++) if (d[i]! > d[j]!) sign = -sign;
      values[n] = sign > 0 ? 1 : this.prime - 1;
    }
    return { rank: 4, values };
  }

  metric(): Dense {
    const values = new Float64Array(this.size ** 2);
    for (let i = 0; i < this.size; i++) values[this.pack([i, i])] = this.isNegative(i) ? this.prime - 1 : 1;
    return { rank: 2, values };
  }
}
