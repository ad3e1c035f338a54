/** Identities that every reduced theory must obey whatever its couplings; a violation means that the program is wrong. */
import { timeDerivative } from '../algebra/calculus.js';
import { generator, multiply, type Poly, subtract, sum } from '../algebra/poly.js';
import { jetName } from '../algebra/ring.js';

/**
 * Noether identity of time reparametrisation: Σ_{q ≠ N} q̇ E_q − N dE_N/dt, zero identically for a Lagrangian with lapse
 * (common practice; any text on constrained systems).
 */
export function noetherResidual(equations: ReadonlyMap<string, Poly>, lapse: string): Poly {
  const ofLapse = equations.get(lapse)!;
  const { ring } = ofLapse;
  const others = [...equations].filter(([q]) => q !== lapse);
  const work = sum(
    ring,
    others.map(([q, e]) => multiply(generator(ring, jetName(q, 1)), e)),
  );
  return subtract(work, multiply(generator(ring, lapse), timeDerivative(ofLapse)));
}
