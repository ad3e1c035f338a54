/**
 * The Friedmann form: torsion and curvature moved to the right-hand side as an effective fluid,
 * 3M²(H² + k/a²) = ρ + ρ_T and −M²(2Ḣ + 3H² + k/a²) = p + p_T, with M the reduced Planck mass and Ḣ, H per unit of N dt.
 */
import { timeDerivative } from '../algebra/calculus.js';
import { add, generator, monomial, multiply, negate, type Poly, power, scale, subtract, sum } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { jetName } from '../algebra/ring.js';

export interface FriedmannRoles {
  readonly lapse: string;
  readonly scale: string;
  readonly curvature: string;
  /** M² in the ring: the square of the reduced Planck mass, or what `impose` made of it. */
  readonly planckMassSquared: Poly;
}

/** ρ_T and p_T from the Euler–Lagrange expressions of the gravitational Lagrangian alone. */
export function friedmannForm(
  gravityEquations: ReadonlyMap<string, Poly>,
  roles: FriedmannRoles,
): { readonly rhoT: Poly; readonly pT: Poly } {
  const { lapse, scale: a } = roles;
  const { ring } = roles.planckMassSquared;
  const hubble = monomial(ring, rational(1), [
    [jetName(a, 1), 1],
    [a, -1],
    [lapse, -1],
  ]);
  const hubbleRate = multiply(timeDerivative(hubble), generator(ring, lapse, -1));
  const curvature = monomial(ring, rational(1), [
    [roles.curvature, 1],
    [a, -2],
  ]);
  const square = power(hubble, 2);
  const energy = scale(add(square, curvature), 3);
  const tension = sum(ring, [scale(hubbleRate, 2), scale(square, 3), curvature]);
  const perVolume = generator(ring, a, -3);
  const perArea = monomial(ring, rational(1, 3), [
    [a, -2],
    [lapse, -1],
  ]);
  return {
    rhoT: subtract(multiply(roles.planckMassSquared, energy), multiply(gravityEquations.get(lapse)!, perVolume)),
    pT: add(negate(multiply(roles.planckMassSquared, tension)), multiply(gravityEquations.get(a)!, perArea)),
  };
}

/**
 * d/dt ρ_T + 3 (ȧ/a)(ρ_T + p_T) + Σ_{q ≠ N, a} q̇ E_q/(a³N): zero identically, so that ρ_T is conserved on the equations
 * of the connection.
 */
export function conservationResidual(
  form: { readonly rhoT: Poly; readonly pT: Poly },
  gravityEquations: ReadonlyMap<string, Poly>,
  roles: FriedmannRoles,
): Poly {
  const { lapse, scale: a } = roles;
  const { ring } = form.rhoT;
  const dilution = monomial(ring, rational(3), [
    [jetName(a, 1), 1],
    [a, -1],
  ]);
  const perVolume = monomial(ring, rational(1), [
    [a, -3],
    [lapse, -1],
  ]);
  const work = [...gravityEquations]
    .filter(([q]) => q !== lapse && q !== a)
    .map(([q, e]) => multiply(generator(ring, jetName(q, 1)), e));
  return sum(ring, [
    timeDerivative(form.rhoT),
    multiply(dilution, add(form.rhoT, form.pT)),
    multiply(perVolume, sum(ring, work)),
  ]);
}
