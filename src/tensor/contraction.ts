/**
 * Contracts products of tensors on given components, as a database joins tables: two factors at a time, only over
 * components that are not zero. The order of the joins keeps intermediate ranks small.
 * May not import geometry: it is told the components and the signs of the frame metric.
 */
import { remember } from '../algebra/memo.js';
import { constant, multiply, negate, type Poly } from '../algebra/poly.js';
import type { Ring } from '../algebra/ring.js';
import type { IndexSlot } from '../notation/theory.js';
import { DIMENSION, type SparseTensor, TensorBuilder, unpackIndices } from './components.js';

/** A tensor whose slots carry index names; a name that occurs twice in a product is summed over. */
export interface Placed {
  readonly tensor: SparseTensor;
  readonly names: readonly string[];
}

/** Diagonal of the frame metric: its signs raise indices. */
export type FrameMetric = readonly [number, number, number, number];

/** More components than this in an intermediate product are refused rather than waited for. */
export const MAX_COMPONENTS = 400_000;
/** More terms than this, added up over all products of components of one contraction, are refused as well. */
export const MAX_WORK = 4_000_000;

/** Thrown when a product of tensors would exceed a stated limit. */
export class ContractionLimitError extends RangeError {
  constructor(what: string) {
    super(`a product of tensors needs more than ${what}`);
    this.name = 'ContractionLimitError';
  }
}

/** Products of components, each formed once, and how much work they have been. */
class Products {
  private readonly memo = new Map<Poly, Map<Poly, Poly>>();
  private readonly negatives = new Map<Poly, Poly>();
  private work = 0;

  /** ±x·y. Signs are kept out of the memo, so that products that differ only in sign are formed once. */
  signed(x: Poly, y: Poly, sign: number): Poly {
    const row = remember(this.memo, x, () => new Map<Poly, Poly>());
    const value = remember(row, y, () => {
      this.count(x.size * y.size);
      return multiply(x, y);
    });
    this.count(1 + value.size);
    return sign > 0 ? value : remember(this.negatives, value, () => negate(value));
  }

  private count(terms: number): void {
    this.work += terms;
    if (this.work > MAX_WORK) throw new ContractionLimitError(`${MAX_WORK} terms in products of components`);
  }
}

/** Sums over pairs of equal names within one tensor. Each pair is one index up and one down. */
export function trace(placed: Placed, metric: FrameMetric): Placed {
  const { tensor, names } = placed;
  const partner = names.map((n, s) => names.findIndex((m, t) => m === n && t !== s));
  if (partner.every((t) => t < 0)) return placed;
  const free = names.flatMap((_, s) => (partner[s]! < 0 ? [s] : []));
  const builder = new TensorBuilder(free.length);
  for (const [packed, value] of tensor.entries) {
    const indices = unpackIndices(packed, tensor.rank);
    if (partner.some((t, s) => t >= 0 && indices[t] !== indices[s])) continue;
    let sign = 1;
    partner.forEach((t, s) => {
      if (t > s) sign *= metric[indices[s]!]!;
    });
    builder.put(
      free.reduce((n, s) => n * DIMENSION + indices[s]!, 0),
      sign < 0 ? negate(value) : value,
    );
  }
  return { tensor: builder.build(), names: free.map((s) => names[s]!) };
}

/** Product of two traced tensors, summed over the names they share. */
function join(a: Placed, b: Placed, metric: FrameMetric, products: Products): Placed {
  const shared = a.names.flatMap((n, s) => (b.names.includes(n) ? [[s, b.names.indexOf(n)] as const] : []));
  const freeA = a.names.flatMap((_, s) => (shared.some(([x]) => x === s) ? [] : [s]));
  const freeB = b.names.flatMap((_, s) => (shared.some(([, y]) => y === s) ? [] : [s]));
  const buckets = new Map<number, { free: number; value: Poly }[]>();
  for (const [packed, value] of b.tensor.entries) {
    const indices = unpackIndices(packed, b.tensor.rank);
    const key = shared.reduce((n, [, y]) => n * DIMENSION + indices[y]!, 0);
    const free = freeB.reduce((n, s) => n * DIMENSION + indices[s]!, 0);
    const bucket = buckets.get(key);
    if (bucket) bucket.push({ free, value });
    else buckets.set(key, [{ free, value }]);
  }
  const builder = new TensorBuilder(freeA.length + freeB.length);
  const shift = DIMENSION ** freeB.length;
  for (const [packed, value] of a.tensor.entries) {
    const indices = unpackIndices(packed, a.tensor.rank);
    const matches = buckets.get(shared.reduce((n, [x]) => n * DIMENSION + indices[x]!, 0));
    if (!matches) continue;
    const sign = shared.reduce((s, [x]) => s * metric[indices[x]!]!, 1);
    const left = freeA.reduce((n, s) => n * DIMENSION + indices[s]!, 0) * shift;
    for (const { free, value: right } of matches) builder.put(left + free, products.signed(value, right, sign));
    if (builder.size > MAX_COMPONENTS) throw new ContractionLimitError(`${MAX_COMPONENTS} intermediate components`);
  }
  return {
    tensor: builder.build(),
    names: [...freeA.map((s) => a.names[s]!), ...freeB.map((s) => b.names[s]!)],
  };
}

/** Expected number of components of a join, if those of each factor were spread evenly. */
function joinCost(a: Placed, b: Placed): number {
  const shared = a.names.filter((n) => b.names.includes(n)).length;
  return (a.tensor.entries.size * b.tensor.entries.size) / DIMENSION ** shared;
}

/**
 * Full contraction of a product in which every name occurs exactly twice.
 * @returns a polynomial in the ring of the components.
 * @throws ContractionLimitError beyond the stated number of components or amount of work.
 */
export const contract = (ring: Ring, factors: readonly Placed[], metric: FrameMetric): Poly =>
  contractOpen(ring, factors, metric).tensor.entries.get(0) ?? constant(ring, 0);

/** The same for a product with free indices: names that occur once stay as slots of the result, all lowered. */
export function contractOpen(ring: Ring, factors: readonly Placed[], metric: FrameMetric): Placed {
  const products = new Products();
  let rest = factors.map((f) => trace(f, metric));
  while (rest.length > 1) {
    let best: [number, number] = [0, 1];
    let least = Number.POSITIVE_INFINITY;
    for (let i = 0; i < rest.length; i++)
      for (let j = i + 1; j < rest.length; j++) {
        const linked = rest[i]!.names.some((n) => rest[j]!.names.includes(n));
        const cost =
          linked || rest.every((f) => f.names.length === 0) ? joinCost(rest[i]!, rest[j]!) : Number.MAX_VALUE;
        if (cost < least) {
          least = cost;
          best = [i, j];
        }
      }
    const [i, j] = best;
    const joined = trace(join(rest[i]!, rest[j]!, metric, products), metric);
    rest = [...rest.filter((_, s) => s !== i && s !== j), joined];
    // Nothing is left of the product; which slots it would have had no longer matters.
    if (joined.tensor.entries.size === 0) return joined;
  }
  return rest[0] ?? { tensor: { rank: 0, entries: new Map([[0, constant(ring, 1)]]) }, names: [] };
}

/** Index names of typed slots; heights are implied, since a pair is one up and one down and components are lowered. */
export const namesOf = (slots: readonly IndexSlot[]): string[] => slots.map((s) => s.name);
