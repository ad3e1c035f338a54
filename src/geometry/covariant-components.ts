/**
 * Components of index expressions on a geometry, covariant derivatives included, and the projection of covariant field
 * equations on the fields of the geometry: the second route to its reduced equations.
 */
import { partial, timeDerivative } from '../algebra/calculus.js';
import { moveTo, substitute } from '../algebra/collect.js';
import { remember } from '../algebra/memo.js';
import { multiply, negate, type Poly, power, sum } from '../algebra/poly.js';
import { constantsOf, makeRing, type Ring } from '../algebra/ring.js';
import { packIndices, type SparseTensor, TensorBuilder, unpackIndices } from '../tensor/components.js';
import { contractOpen, type FrameMetric, namesOf } from '../tensor/contraction.js';
import type { TensorSum, TensorSymbol } from '../tensor/expression.js';
import { type InvariantEvaluator, makeEvaluator } from '../tensor/invariants.js';
import { METRIC_CURVATURE, METRIC_NABLA_TORSION } from '../tensor/metric-decomposition.js';
import { type CovariantEquations, differentiated, isNabla } from '../tensor/variation.js';
import { type Connection, curvatureTensor, torsionFreeConnection } from './cartan.js';
import { maskOf } from './forms.js';
import type { Geometry } from './geometry.js';

/** Jets of a geometry and every constant of a ring. */
export function ringWith(geometry: Geometry, ring: Ring): Ring {
  const known = new Set(geometry.ring.generators.map((g) => g.name));
  const constants = ring.generators.filter((g) => g.kind === 'constant' && !known.has(g.name)).map((g) => g.name);
  return makeRing([...geometry.ring.generators, ...constantsOf(constants)]);
}

/** Evaluates index expressions of one geometry in a ring that holds its jets and the couplings. */
export interface ComponentEvaluator {
  /** Components of a sum whose terms have the given free indices, slots in that order, all lowered. */
  components(terms: TensorSum, free: readonly string[]): SparseTensor;
}

/** Γ_abc: Lorentz pair ab lowered, form index c, in the frame. */
function connectionTensor(geometry: Geometry, connection: Connection, ring: Ring): SparseTensor {
  const { frame, tensors } = geometry;
  const builder = new TensorBuilder(3);
  connection.forEach((row, a) => {
    row.forEach((form, b) => {
      for (let c = 0; c < 4; c++) {
        const value = form.get(maskOf([c]));
        if (!value) continue;
        const inFrame = moveTo(multiply(value, power(frame.coframe[c]!, -1)), ring);
        builder.put(packIndices([a, b, c]), tensors.metric[a]! < 0 ? negate(inFrame) : inFrame);
      }
    });
  });
  return builder.build();
}

/** ∇_d X_ab… = e_d(X_ab…) − Γ^f_ad X_fb… − …, the derivative's slot first; components depend on time only. */
function covariantDerivative(
  x: SparseTensor,
  gamma: SparseTensor,
  timeFactor: Poly,
  metric: FrameMetric,
): SparseTensor {
  const builder = new TensorBuilder(x.rank + 1);
  for (const [packed, value] of x.entries) {
    const indices = unpackIndices(packed, x.rank);
    builder.put(packIndices([0, ...indices]), multiply(timeDerivative(value), timeFactor));
    // The entry X_…f… enters every component with f replaced by a.
    for (const [place, component] of gamma.entries) {
      const [f, a, d] = unpackIndices(place, 3) as [number, number, number];
      indices.forEach((index, slot) => {
        if (index !== f) return;
        const target = [d, ...indices];
        target[slot + 1] = a;
        const product = multiply(component, value);
        builder.put(packIndices(target), metric[f]! < 0 ? product : negate(product));
      });
    }
  }
  return builder.build();
}

/** What belongs to the connection without torsion. */
interface MetricPart {
  readonly gamma: SparseTensor;
  readonly evaluator: InvariantEvaluator;
}

function metricPartOf(geometry: Geometry, ring: Ring): MetricPart {
  const { metric } = geometry.tensors;
  const connection = torsionFreeConnection(geometry.frame, metric);
  const own = curvatureTensor(geometry.frame, connection, metric);
  const curvature = { rank: 4, entries: new Map([...own.entries].map(([n, p]) => [n, moveTo(p, ring)])) };
  const torsion: SparseTensor = { rank: 3, entries: new Map() };
  return {
    gamma: connectionTensor(geometry, connection, ring),
    evaluator: makeEvaluator({ ring, metric, torsion, curvature }),
  };
}

/** @param ring contains the generators of `geometry.ring` and every coupling of the expressions. */
export function componentEvaluator(geometry: Geometry, ring: Ring): ComponentEvaluator {
  const { tensors } = geometry;
  const { metric } = tensors;
  const images = new Map(geometry.components.map((c) => [c.name, moveTo(c.value, ring)]));
  const inJets = (t: SparseTensor): SparseTensor => ({
    rank: t.rank,
    entries: new Map([...t.entries].map(([n, p]) => [n, substitute(p, images, ring)])),
  });
  const values = { ring, metric, torsion: inJets(tensors.torsion), curvature: inJets(tensors.curvature) };
  const evaluator = makeEvaluator(values);
  const gamma = connectionTensor(geometry, geometry.connection, ring);
  const timeFactor = moveTo(power(geometry.frame.coframe[0]!, -1), ring);
  const made = new Map<string, SparseTensor>();
  let metricMade: MetricPart | undefined;
  const tensorOf = ({ head, slots }: TensorSymbol): SparseTensor =>
    remember(made, `${head}/${slots.length}`, () => {
      if (head === METRIC_CURVATURE || head === METRIC_NABLA_TORSION) metricMade ??= metricPartOf(geometry, ring);
      if (head === METRIC_CURVATURE) return metricMade!.evaluator.tensor({ head: 'R', slots });
      if (head === METRIC_NABLA_TORSION) {
        const base = evaluator.tensor({ head: 'T', slots: slots.slice(1) });
        return covariantDerivative(base, metricMade!.gamma, timeFactor, metric);
      }
      if (!isNabla(head)) return evaluator.tensor({ head, slots });
      const base = evaluator.tensor({ head: differentiated(head), slots: slots.slice(1) });
      return covariantDerivative(base, gamma, timeFactor, metric);
    });
  return {
    components(terms, free) {
      const builder = new TensorBuilder(free.length);
      for (const { coefficient, factors } of terms) {
        const by = moveTo(coefficient, ring);
        const placed = factors.map((f) => ({ tensor: tensorOf(f), names: namesOf(f.slots) }));
        const { tensor, names } = contractOpen(ring, placed, metric);
        const order = free.map((name) => names.indexOf(name));
        for (const [packed, value] of tensor.entries) {
          const indices = unpackIndices(packed, tensor.rank);
          builder.put(packIndices(order.map((s) => indices[s]!)), multiply(by, value));
        }
      }
      return builder.build();
    },
  };
}

/** Components E_ab and E_abc of both field equations. */
export interface EquationComponents {
  readonly coframe: SparseTensor;
  readonly connection: SparseTensor;
}

export const equationComponents = (
  equations: CovariantEquations,
  evaluator: ComponentEvaluator,
): EquationComponents => ({
  coframe: evaluator.components(equations.coframe, ['a', 'b']),
  connection: evaluator.components(equations.connection, ['a', 'b', 'c']),
});

/**
 * E_q = e (E_a^μ ∂e^a_μ/∂q + E_ab^μ ∂Γ^ab_μ/∂q) for each field q: coframe and connection contain the fields without their
 * derivatives.
 */
export function projected(geometry: Geometry, ring: Ring, components: EquationComponents): Map<string, Poly> {
  const { frame, connection, tensors, volume } = geometry;
  const { metric } = tensors;
  const raise = (p: Poly, ...indices: readonly number[]): Poly =>
    indices.reduce((s, i) => s * metric[i]!, 1) < 0 ? negate(p) : p;
  const projection = (q: string): Poly => {
    const parts: Poly[] = [];
    const put = (component: Poly | undefined, value: Poly, form: number, ...raised: readonly number[]): void => {
      const slope = partial(value, q);
      if (!component || slope.size === 0) return;
      const inFrame = multiply(slope, power(frame.coframe[form]!, -1));
      parts.push(multiply(raise(component, ...raised), moveTo(inFrame, ring)));
    };
    frame.coframe.forEach((value, a) => {
      // E_a^b with e^a_μ = c_a θ^a: raise the form index, and the frame index stays down.
      put(components.coframe.entries.get(packIndices([a, a])), value, a, a);
    });
    connection.forEach((row, a) => {
      row.forEach((form, b) => {
        for (let c = 0; c < 4; c++) {
          const value = form.get(maskOf([c]));
          // Γ^ab = Γ^a_b η^bb; E_ab^c has its pair down.
          if (value) put(components.connection.entries.get(packIndices([a, b, c])), value, c, c, b);
        }
      });
    });
    return multiply(moveTo(volume, ring), sum(ring, parts));
  };
  return new Map(geometry.fields.map((f) => [f.name, projection(f.name)]));
}
