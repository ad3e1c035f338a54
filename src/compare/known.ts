/**
 * Polynomials that are known to vanish, each with the reason: it was given, it is the time derivative of a known one, or it
 * was combined from known ones by pseudo-division. Reasons are what certificates are made of. Imports algebra, factors.
 */
import type { Poly } from '../algebra/poly.js';
import type { Factors } from './factors.js';

/**
 * One step of a pseudo-division: u · before = d · after + q · known. Neither u nor d vanishes where the conditions of the
 * elimination hold.
 */
export interface Step {
  readonly u: Factors;
  readonly d: Factors;
  readonly q: Poly;
  readonly known: Known;
}

export type Known =
  | { readonly kind: 'given'; readonly poly: Poly; readonly name: string }
  | { readonly kind: 'rate'; readonly poly: Poly; readonly of: Known }
  | {
      readonly kind: 'combined';
      readonly poly: Poly;
      readonly base: Known;
      readonly steps: readonly Step[];
      /** The last rest was `unit · Π divided · poly`; the unit is one term in couplings and scale factors. */
      readonly unit: Poly;
      readonly divided: Factors;
    };
