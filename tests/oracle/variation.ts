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

/**
 * Energy density along the jets, ρ ∝ V^-(1+w) with V the product of the scale factors: `now` is the value at V = 1 when all
 * exponents are integers, else the present one.
 */
export function density(fluid: Fluid, now: Q, scaleFactors: readonly Jet[], algebra: Algebra): Jet {
  // On FLRW the three scale factors are one field.
  const [factors, times] = scaleFactors.length === 1 ? [scaleFactors, -3] : [scaleFactors, -1];
  const exponent = E.mul(E.q(times), E.add(E.ONE, fluid.w));
  const number = Jet.number(algebra, now, factors[0]!.length);
  const power = (a: Jet): Jet => (exponent.d === 1n ? a.power(Number(exponent.n)) : a.relativePower(exponent));
  return factors.reduce((rho, a) => rho.times(power(a)), number);
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
      const scaleFactors = theory.geometry === 'flrw' ? [fields.a!] : [fields.a_x!, fields.a_y!, fields.a_z!];
      const rho = density(fluid, now, scaleFactors, algebra);
      out = out.minus(rho.times(frame.volume));
    }
    return out;
  });
}
