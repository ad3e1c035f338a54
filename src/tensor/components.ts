/**
 * Sparse tensors by components: only the non-zero ones, all indices lowered, values polynomials in one ring.
 * Invariant: no zero value, every index list as long as the rank. May not import geometry.
 */
import { add, isZero, type Poly, sum } from '../algebra/poly.js';

/** Frame indices run from 0 (time) to 3. */
export const DIMENSION = 4;

/** A component: its frame indices packed in base 4, the first slot most significant, and its value. */
export interface SparseTensor {
  readonly rank: number;
  readonly entries: ReadonlyMap<number, Poly>;
}

export const packIndices = (indices: readonly number[]): number => indices.reduce((n, i) => n * DIMENSION + i, 0);

export function unpackIndices(packed: number, rank: number): number[] {
  const indices = new Array<number>(rank);
  let rest = packed;
  for (let s = rank - 1; s >= 0; s--) {
    indices[s] = rest % DIMENSION;
    rest = Math.floor(rest / DIMENSION);
  }
  return indices;
}

/** Collects contributions to components and adds them up once at the end. */
export class TensorBuilder {
  private readonly parts = new Map<number, Poly[]>();
  readonly rank: number;

  constructor(rank: number) {
    this.rank = rank;
  }

  get size(): number {
    return this.parts.size;
  }

  put(packed: number, value: Poly): void {
    const list = this.parts.get(packed);
    if (!list) this.parts.set(packed, [value]);
    // Few distinct products meet in one component: adding early keeps lists short.
    else if (list.length < 64) list.push(value);
    else this.parts.set(packed, [sum(value.ring, list), value]);
  }

  build(): SparseTensor {
    const entries = new Map<number, Poly>();
    for (const [packed, list] of this.parts) {
      const value =
        list.length === 1 ? list[0]! : list.length === 2 ? add(list[0]!, list[1]!) : sum(list[0]!.ring, list);
      if (!isZero(value)) entries.set(packed, value);
    }
    return { rank: this.rank, entries };
  }
}
