/**
 * Cartan's structure equations: torsion T^a = de^a + Γ^a_b ∧ e^b and curvature R^a_b = dΓ^a_b + Γ^a_c ∧ Γ^c_b of a
 * coframe and connection given on an invariant cobasis, and the connection without torsion.
 * The coframe is e^a = c_a θ^a with single-term c_a, so that components in the frame stay Laurent polynomials.
 */
import { isZero, multiply, negate, type Poly, power, product, scale, sum } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import type { Ring } from '../algebra/ring.js';
import { packIndices, type SparseTensor, TensorBuilder } from '../tensor/components.js';
import type { FrameMetric } from '../tensor/contraction.js';
import { addForms, exteriorDerivative, type Form, maskOf, twoFormComponent, wedge } from './forms.js';

const FRAME = [0, 1, 2, 3] as const;

/** Coframe factors c_a, structure dθ^a and connection one-forms Γ^a_b on one cobasis. */
export interface FrameData {
  readonly ring: Ring;
  /** dθ^a. */
  readonly structure: readonly Form[];
  /** c_a in e^a = c_a θ^a, one term each. */
  readonly coframe: readonly Poly[];
}

/** Γ^a_b as one-forms, by row and column. */
export type Connection = readonly (readonly Form[])[];

const coframeForm = (frame: FrameData, a: number): Form => new Map([[maskOf([a]), frame.coframe[a]!]]);

/** T^a as two-forms on the cobasis. */
export function torsionForms(frame: FrameData, connection: Connection): Form[] {
  return FRAME.map((a) =>
    addForms(
      exteriorDerivative(coframeForm(frame, a), frame.structure),
      ...FRAME.map((b) => wedge(connection[a]![b]!, coframeForm(frame, b))),
    ),
  );
}

/** R^a_b as two-forms on the cobasis. */
export function curvatureForms(frame: FrameData, connection: Connection): Form[][] {
  return FRAME.map((a) =>
    FRAME.map((b) =>
      addForms(
        exteriorDerivative(connection[a]![b]!, frame.structure),
        ...FRAME.map((c) => wedge(connection[a]![c]!, connection[c]![b]!)),
      ),
    ),
  );
}

/** Frame component of a two-form: the coefficient of e^c ∧ e^d. */
function frameComponent(frame: FrameData, form: Form, c: number, d: number): Poly | undefined {
  const value = twoFormComponent(form, c, d);
  return value && product(frame.ring, [value, power(frame.coframe[c]!, -1), power(frame.coframe[d]!, -1)]);
}

/** Writes the frame components of a two-form into slots after the given ones, the first of which is lowered. */
function putComponents(
  builder: TensorBuilder,
  frame: FrameData,
  form: Form,
  slots: readonly number[],
  metric: FrameMetric,
): void {
  for (const c of FRAME)
    for (const d of FRAME) {
      const value = frameComponent(frame, form, c, d);
      if (value) builder.put(packIndices([...slots, c, d]), metric[slots[0]!]! < 0 ? negate(value) : value);
    }
}

/** T_abc with all indices lowered. */
export function torsionTensor(frame: FrameData, connection: Connection, metric: FrameMetric): SparseTensor {
  const builder = new TensorBuilder(3);
  torsionForms(frame, connection).forEach((form, a) => {
    putComponents(builder, frame, form, [a], metric);
  });
  return builder.build();
}

/** R_abcd with all indices lowered. */
export function curvatureTensor(frame: FrameData, connection: Connection, metric: FrameMetric): SparseTensor {
  const builder = new TensorBuilder(4);
  curvatureForms(frame, connection).forEach((row, a) => {
    row.forEach((form, b) => {
      putComponents(builder, frame, form, [a, b], metric);
    });
  });
  return builder.build();
}

/**
 * The metric-compatible connection without torsion, from the anholonomy of the coframe:
 * with de_a = ½ F_abc e^b ∧ e^c, Γ_ab = ½ (F_abc + F_bca − F_cab) e^c (common practice in any text on moving frames;
 * the torsion computed from the result is checked to vanish).
 */
export function torsionFreeConnection(frame: FrameData, metric: FrameMetric): Connection {
  const de = FRAME.map((a) => exteriorDerivative(coframeForm(frame, a), frame.structure));
  const lowered = (a: number, b: number, c: number): Poly[] => {
    const value = frameComponent(frame, de[a]!, b, c);
    return value ? [metric[a]! < 0 ? negate(value) : value] : [];
  };
  const connection = FRAME.map((a) =>
    FRAME.map((b): Form => {
      const form = new Map<number, Poly>();
      for (const c of FRAME) {
        const component = sum(frame.ring, [...lowered(a, b, c), ...lowered(b, c, a), ...lowered(c, a, b).map(negate)]);
        if (isZero(component)) continue;
        const half = scale(multiply(component, frame.coframe[c]!), rational(metric[a]!, 2));
        form.set(maskOf([c]), half);
      }
      return form;
    }),
  );
  if (torsionForms(frame, connection).some((form) => form.size > 0))
    throw new Error('the connection computed from the coframe has torsion');
  return connection;
}
