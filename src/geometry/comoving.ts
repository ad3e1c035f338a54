/**
 * The unit vector n = e_0 of the coframe and what the metric connection makes of it: expansion, and the curvature scalar of
 * the surfaces that it is normal to. Values in `geometry.ring`; signature −+++ whatever the theory's. Computed from the
 * coframe, so that nothing about a particular geometry is written here.
 */
import { isZero, multiply, type Poly, power, scale, subtract, sum, zero } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { packIndices } from '../tensor/components.js';
import { makeEvaluator } from '../tensor/invariants.js';
import { curvatureTensor, torsionFreeConnection } from './cartan.js';
import { maskOf } from './forms.js';
import type { Geometry } from './geometry.js';

export interface Comoving {
  /** θ = ∇_μ n^μ. */
  readonly expansion: Poly;
  /** ³R = R + 2 R_μν n^μ n^ν − θ² + ∇_μ n_ν ∇^ν n^μ (Gauss' equation), all of the metric connection. */
  readonly spatialCurvature: Poly;
  /** Whether n is geodesic and ∇_i n_j = θ/3 δ_ij: no acceleration, shear or vorticity. */
  readonly isShearFree: boolean;
}

const SPACE = [1, 2, 3] as const;
const METRIC = [-1, 1, 1, 1] as const;

/** The kinematics of n on a geometry. */
export function comovingOf(geometry: Geometry): Comoving {
  const { frame } = geometry;
  const { ring, coframe } = frame;
  const connection = torsionFreeConnection(frame, METRIC);
  /** ∇_b n^a = Γ^a_0(e_b), since n has constant frame components. */
  const gradient = (a: number, b: number): Poly => {
    const component = connection[a]![0]!.get(maskOf([b]));
    return component ? multiply(component, power(coframe[b]!, -1)) : zero(ring);
  };
  const frameIndices = [0, ...SPACE];
  const expansion = sum(
    ring,
    frameIndices.map((a) => gradient(a, a)),
  );
  const square = sum(
    ring,
    frameIndices.flatMap((a) => frameIndices.map((b) => multiply(gradient(a, b), gradient(b, a)))),
  );
  const curvature = curvatureTensor(frame, connection, METRIC);
  const evaluator = makeEvaluator({ ring, metric: METRIC, torsion: { rank: 3, entries: new Map() }, curvature });
  const slots = ['a', 'b'].map((name) => ({ name, up: false }));
  const ricci = evaluator.tensor({ head: 'R', slots });
  const alongNormal = ricci.entries.get(packIndices([0, 0])) ?? zero(ring);
  const spatialCurvature = sum(ring, [
    geometry.metricCurvature,
    scale(alongNormal, 2),
    scale(multiply(expansion, expansion), -1),
    square,
  ]);
  const third = scale(expansion, rational(1, 3));
  const isShearFree =
    SPACE.every((i) => isZero(gradient(i, 0))) &&
    SPACE.every((i) => SPACE.every((j) => isZero(i === j ? subtract(gradient(i, j), third) : gradient(i, j))));
  return { expansion, spatialCurvature, isShearFree };
}
