/**
 * Reduction: the value of a product of tensors on a geometry, first in its component symbols, then as a density in
 * jets of the fields. Values are remembered per geometry, so that a survey over couplings contracts each product once.
 */
import { involves, substitute } from '../algebra/collect.js';
import { remember } from '../algebra/memo.js';
import { multiply, type Poly } from '../algebra/poly.js';
import type { TensorFactor } from '../notation/theory.js';
import { dummyFreeKey, type InvariantEvaluator, makeEvaluator } from '../tensor/invariants.js';
import type { Geometry } from './geometry.js';

interface Memory {
  readonly evaluator: InvariantEvaluator;
  readonly images: ReadonlyMap<string, Poly>;
  readonly densities: Map<string, Poly>;
}

const memories = new WeakMap<Geometry, Memory>();

function memoryOf(geometry: Geometry): Memory {
  let memory = memories.get(geometry);
  if (!memory) {
    memory = {
      evaluator: makeEvaluator(geometry.tensors),
      images: new Map(geometry.components.map((c) => [c.name, c.value])),
      densities: new Map(),
    };
    memories.set(geometry, memory);
  }
  return memory;
}

/** The product of the factors in the ring of component symbols. */
export const symbolicValue = (geometry: Geometry, factors: readonly TensorFactor[]): Poly =>
  memoryOf(geometry).evaluator.value(factors);

/**
 * The product of the factors times the determinant of the coframe, in `geometry.ring`.
 * @throws Error when an odd power of a radical survives, which a geometry with the claimed symmetry cannot give.
 */
export function density(geometry: Geometry, factors: readonly TensorFactor[]): Poly {
  const memory = memoryOf(geometry);
  return remember(memory.densities, dummyFreeKey(factors), () => {
    const value = substitute(memory.evaluator.value(factors), memory.images, geometry.ring);
    for (const g of geometry.ring.generators)
      if (g.kind === 'radical' && involves(value, g.name))
        throw new Error(`an odd power of ${g.name} survives in a scalar of the geometry ${geometry.id}`);
    return multiply(geometry.volume, value);
  });
}
