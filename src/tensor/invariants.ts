/**
 * Values of index expressions on given torsion and curvature: the definitions of the derived tensors
 * (R_ab = R^c_acb, R = η^ab R_ab, T_a = T^b_ab, A^a = ε^abcd T_bcd) and the evaluation of whole monomials.
 * May not import geometry.
 */
import { remember } from '../algebra/memo.js';
import { constant, negate, type Poly } from '../algebra/poly.js';
import type { Ring } from '../algebra/ring.js';
import type { TensorFactor } from '../notation/theory.js';
import { DIMENSION, packIndices, type SparseTensor, TensorBuilder } from './components.js';
import { contract, type FrameMetric, namesOf, type Placed, trace } from './contraction.js';

/** Torsion T_abc and curvature R_abcd with all indices lowered, over the frame metric's signs. */
export interface GeometricTensors {
  readonly ring: Ring;
  readonly metric: FrameMetric;
  readonly torsion: SparseTensor;
  readonly curvature: SparseTensor;
}

/** Evaluates monomials on one geometry; equal contractions are computed once. */
export interface InvariantEvaluator {
  /** Value of the product of the factors, scalar coefficient not included. */
  value(factors: readonly TensorFactor[]): Poly;
  /** Components of one tensor, all indices lowered. */
  tensor(factor: TensorFactor): SparseTensor;
}

/** Thrown for a tensor without components on a geometry: a declared one, or an irreducible part that was not written out. */
export class NoComponentsError extends Error {
  constructor({ head, part }: TensorFactor) {
    super(
      part === undefined ? `the tensor ${head} has no components` : `the part ${part} of ${head} is not written out`,
    );
    this.name = 'NoComponentsError';
  }
}

/** Sign of a permutation of 0..n-1, or 0 when an entry repeats. */
function permutationSign(indices: readonly number[]): number {
  let sign = 1;
  for (let i = 0; i < indices.length; i++)
    for (let j = i + 1; j < indices.length; j++) {
      if (indices[i] === indices[j]) return 0;
      if (indices[i]! > indices[j]!) sign = -sign;
    }
  return sign;
}

/** Totally antisymmetric, ε_0123 = +1. */
function volumeTensor(ring: Ring): SparseTensor {
  const builder = new TensorBuilder(4);
  const one = constant(ring, 1);
  for (let n = 0; n < DIMENSION ** 4; n++) {
    const indices = [n >> 6, (n >> 4) & 3, (n >> 2) & 3, n & 3];
    const sign = permutationSign(indices);
    if (sign !== 0) builder.put(n, sign > 0 ? one : negate(one));
  }
  return builder.build();
}

function metricTensor(ring: Ring, metric: FrameMetric): SparseTensor {
  const builder = new TensorBuilder(2);
  metric.forEach((sign, i) => {
    builder.put(packIndices([i, i]), constant(ring, sign));
  });
  return builder.build();
}

/** Text that is the same for products that differ only in the names of dummies. */
export function dummyFreeKey(factors: readonly TensorFactor[]): string {
  const seen = new Map<string, number>();
  return factors
    .map(({ head, part, slots }) => {
      const numbers = slots.map(({ name }) => {
        const known = seen.get(name) ?? seen.size;
        seen.set(name, known);
        return known;
      });
      return part === undefined ? `${head}(${numbers})` : `${head}.${part}(${numbers})`;
    })
    .join('');
}

/** An evaluator over the given tensors; derived tensors are made when first needed. */
export function makeEvaluator(tensors: GeometricTensors): InvariantEvaluator {
  const { ring, metric, torsion, curvature } = tensors;
  const made = new Map<string, SparseTensor>();
  const derive = (key: string, make: () => SparseTensor): SparseTensor => remember(made, key, make);
  const traced = (tensor: SparseTensor, names: string): SparseTensor =>
    trace({ tensor, names: [...names] }, metric).tensor;
  const ricci = () => derive('ricci', () => traced(curvature, 'cacb'));
  const volume = () => derive('volume', () => volumeTensor(ring));
  const eta = () => derive('eta', () => metricTensor(ring, metric));

  function tensorOf(factor: TensorFactor): SparseTensor {
    const { head, slots } = factor;
    if (factor.part !== undefined) throw new NoComponentsError(factor);
    switch (head) {
      case 'R':
        if (slots.length === 4) return curvature;
        return slots.length === 2 ? ricci() : derive('scalar', () => traced(ricci(), 'aa'));
      case 'T':
        return slots.length === 3 ? torsion : derive('torsion trace', () => traced(torsion, 'bab'));
      case 'A':
        return derive('axial', () => axialOf(volume(), torsion, metric, ring));
      case 'epsilon':
        return volume();
      case 'eta':
      case 'delta':
        // With all indices lowered, δ^a_b has the components of η_ab.
        return eta();
      default:
        throw new NoComponentsError(factor);
    }
  }

  const values = new Map<string, Poly>();
  return {
    tensor: tensorOf,
    value(factors) {
      return remember(values, dummyFreeKey(factors), () => {
        const placed = factors.map((f): Placed => ({ tensor: tensorOf(f), names: namesOf(f.slots) }));
        return contract(ring, placed, metric);
      });
    },
  };
}

/** A_a = ε_a^bcd T_bcd. */
function axialOf(volume: SparseTensor, torsion: SparseTensor, metric: FrameMetric, ring: Ring): SparseTensor {
  const builder = new TensorBuilder(1);
  for (let a = 0; a < DIMENSION; a++) {
    const row = new TensorBuilder(3);
    for (const [packed, value] of volume.entries) if (Math.floor(packed / 64) === a) row.put(packed % 64, value);
    const names = ['b', 'c', 'd'];
    builder.put(
      a,
      contract(
        ring,
        [
          { tensor: row.build(), names },
          { tensor: torsion, names },
        ],
        metric,
      ),
    );
  }
  return builder.build();
}
