/**
 * Euler–Lagrange values without symbolic differentiation. Varying q by tᵐ/m! changes L by δ_m; with
 * δ_m^(m)(0) = Σ_n C(m,n) (d/dt)ⁿ ∂L/∂q^(n), the inverse binomial transform gives
 *   E_q = Σ_n (−d/dt)ⁿ ∂L/∂q^(n) = Σ_{m ≤ order} (−1)^m C(order+1, m+1) δ_m^(m)(0)
 * for every L with derivatives up to `order`.
 */
import { Contraction, type Lagrangian, type Signature } from './contraction.js';
import type { Q } from './exact.js';
import * as E from './exact.js';
import { direction, FIELDS, type Frame, fieldJets, frameOf, type GeometryName, type Point } from './geometry.js';
import { type Algebra, Jet } from './jet.js';

/** A fluid of the theory file; vacuum has w = −1 and its own symbol as density. */
export interface Fluid {
  readonly density: string;
  readonly w: Q;
}

export interface OracleTheory {
  readonly geometry: GeometryName;
  readonly signature: Signature;
  readonly lagrangian: Lagrangian;
  readonly matter: readonly Fluid[];
}

export interface Values {
  readonly lagrangian: Q;
  readonly equations: Readonly<Record<string, Q>>;
}

/** Energy density along the jets: at a = 1 for integer 3w, else the value now with dρ/da = −3(1+w)ρ/a. */
export function density(fluid: Fluid, now: Q, scaleFactor: Jet, algebra: Algebra): Jet {
  const exponent = E.mul(E.q(-3), E.add(E.ONE, fluid.w));
  const number = Jet.number(algebra, now, scaleFactor.length);
  if (exponent.d === 1n) return number.times(scaleFactor.power(Number(exponent.n)));
  return number.times(scaleFactor.relativePower(exponent));
}

/** E_q of a functional of the fields at t = 0, for every field of the point. */
export function eulerLagrange(
  point: Point,
  order: number,
  functional: (fields: Readonly<Record<string, Jet>>, algebra: Algebra) => Jet,
): Values {
  const algebra: Algebra = { kSquared: point.k };
  const jet = functional(fieldJets(point, algebra, order), algebra);
  const equations: Record<string, Q> = {};
  for (const name of Object.keys(point.fields)) {
    let value = E.ZERO;
    for (let m = 0, sign = 1, choose = order + 1; m <= order; m++, sign = -sign) {
      value = E.add(value, E.mul(E.q(sign * choose), jet.variationAt(direction(name, m), m)));
      choose = (choose * (order - m)) / (m + 2);
    }
    equations[name] = value;
  }
  return { lagrangian: jet.rationalAt(0), equations };
}

/** Reduced Lagrangian with volume and matter, and its Euler–Lagrange values, of the torsion theory. */
export function torsionTheory(theory: OracleTheory, point: Point): Values {
  for (const name of FIELDS[theory.geometry])
    if (point.fields[name] === undefined) throw new Error(`the point has no field ${name}`);
  return eulerLagrange(point, 1, (fields, algebra) => {
    const frame: Frame = frameOf(theory.geometry, fields, algebra);
    const gravity = new Contraction(frame, theory.signature).lagrangian(theory.lagrangian, point.constants);
    let out = gravity.times(frame.volume);
    for (const fluid of theory.matter) {
      const now = point.constants[fluid.density];
      if (now === undefined) throw new Error(`the point has no value for ${fluid.density}`);
      if (fields.a === undefined && !E.same(fluid.w, E.q(-1)))
        throw new Error('a fluid other than vacuum needs the scale factor a');
      const rho =
        fields.a === undefined ? Jet.number(algebra, now, frame.volume.length) : density(fluid, now, fields.a, algebra);
      out = out.minus(rho.times(frame.volume));
    }
    return out;
  });
}
