/**
 * Reduction: the value of a product of tensors on a geometry, first in its component symbols, then as a density in
 * jets of the fields. Values are remembered per geometry, so that a survey over couplings contracts each product once.
 */
import { collect, involves, moveTo, substitute } from '../algebra/collect.js';
import { remember } from '../algebra/memo.js';
import { multiply, type Poly } from '../algebra/poly.js';
import type { Ring } from '../algebra/ring.js';
import type { TensorFactor } from '../notation/theory.js';
import { dummyFreeKey, type InvariantEvaluator, makeEvaluator } from '../tensor/invariants.js';
import type { Geometry } from './geometry.js';

/** A product whose density would be longer than this before like terms are collected is refused rather than waited for. */
export const MAX_EXPANSION = 400_000;
/** Terms of a whole reduced Lagrangian, couplings multiplied out. */
export const MAX_REDUCED_TERMS = 60_000;

/** Thrown when a reduced Lagrangian would exceed a stated limit. */
export class ReductionLimitError extends RangeError {
  constructor(limit: number) {
    super(`the reduced Lagrangian would have more than ${limit} terms`);
    this.name = 'ReductionLimitError';
  }
}

interface Memory {
  readonly evaluator: InvariantEvaluator;
  readonly images: ReadonlyMap<string, Poly>;
  readonly densities: Map<string, Poly>;
  /** The same in rings of theories. */
  readonly moved: WeakMap<Ring, Map<string, Poly>>;
}

const memories = new WeakMap<Geometry, Memory>();

function memoryOf(geometry: Geometry): Memory {
  let memory = memories.get(geometry);
  if (!memory) {
    memory = {
      evaluator: makeEvaluator(geometry.tensors),
      images: new Map(geometry.components.map((c) => [c.name, c.value])),
      densities: new Map(),
      moved: new WeakMap(),
    };
    memories.set(geometry, memory);
  }
  return memory;
}

/** The product of the factors in the ring of component symbols. */
export const symbolicValue = (geometry: Geometry, factors: readonly TensorFactor[]): Poly =>
  memoryOf(geometry).evaluator.value(factors);

/** Terms of (x1 + … + xk)^n. */
function powerSize(k: number, n: number): number {
  let count = 1;
  for (let i = 1; i <= n; i++) count = (count * (k + i - 1)) / i;
  return count;
}

/** An upper bound on the terms of a value after its symbols are replaced. */
function expandedSize(value: Poly, images: ReadonlyMap<string, Poly>): number {
  const sizes = value.ring.generators.map((g) => images.get(g.name)?.size ?? 1);
  return collect(value, () => true).reduce(
    (total, { monomial }) => total + monomial.reduce((n, [g, e]) => n * powerSize(sizes[g]!, e), 1),
    0,
  );
}

/**
 * The product of the factors times the determinant of the coframe, in `geometry.ring` or another ring with its symbols.
 * @throws ReductionLimitError, ContractionLimitError beyond the stated sizes; Error when an odd power of a radical
 * survives, which a geometry with the claimed symmetry cannot give.
 */
export function density(geometry: Geometry, factors: readonly TensorFactor[], ring: Ring = geometry.ring): Poly {
  const memory = memoryOf(geometry);
  const key = dummyFreeKey(factors);
  const value = remember(memory.densities, key, () => {
    const symbolic = memory.evaluator.value(factors);
    if (expandedSize(symbolic, memory.images) > MAX_EXPANSION) throw new ReductionLimitError(MAX_EXPANSION);
    const value = substitute(symbolic, memory.images, geometry.ring);
    for (const g of geometry.ring.generators)
      if (g.kind === 'radical' && involves(value, g.name))
        throw new Error(`an odd power of ${g.name} survives in a scalar of the geometry ${geometry.id}`);
    return multiply(geometry.volume, value);
  });
  if (ring === geometry.ring) return value;
  let moved = memory.moved.get(ring);
  if (!moved) {
    moved = new Map();
    memory.moved.set(ring, moved);
  }
  return remember(moved, key, () => moveTo(value, ring));
}
