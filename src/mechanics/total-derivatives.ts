/**
 * Lagrangians up to total time derivatives. The representative is unique: no second derivatives that a boundary term
 * removes, and no term linear in one velocity whose coefficient can be integrated in the field of that velocity without
 * touching the fields before it. So a first-order Lagrangian is a total derivative exactly when its representative is 0
 * (logarithms apart, which stay).
 */
import { antiderivative, orderIn, timeDerivative } from '../algebra/calculus.js';
import { coefficientOf, partition } from '../algebra/collect.js';
import { add, isZero, type Poly, subtract, zero } from '../algebra/poly.js';
import { jetName, positionOf } from '../algebra/ring.js';

export interface WithoutBoundary {
  /** The representative. */
  readonly reduced: Poly;
  /** lagrangian = reduced + d/dt primitive. */
  readonly primitive: Poly;
}

/**
 * Drops total derivatives from a Lagrangian in the given fields.
 * @param fields the order decides which velocities go first; the lapse is not among them.
 */
export function dropTotalDerivatives(lagrangian: Poly, fields: readonly string[], lapse: string): WithoutBoundary {
  let reduced = lagrangian;
  let primitive = zero(lagrangian.ring);
  const drop = (part: Poly): void => {
    if (isZero(part)) return;
    primitive = add(primitive, part);
    reduced = subtract(reduced, timeDerivative(part));
  };
  for (const q of fields)
    if (orderIn(reduced, q) === 2)
      drop(antiderivative(coefficientOf(reduced, jetName(q, 2), 1), jetName(q, 1)).primitive);
  fields.forEach((q, place) => {
    const velocity = positionOf(reduced.ring, jetName(q, 1));
    const mustBeAbsent = reduced.ring.generators.flatMap((g, i) => {
      if (i === velocity || g.kind === 'constant' || g.kind === 'radical') return [];
      if (g.kind === 'source' || g.field === lapse || g.order > 0) return [i];
      return fields.indexOf(g.field) < place ? [i] : [];
    });
    const [linear] = partition(reduced, (e) => e(velocity) === 1 && mustBeAbsent.every((i) => e(i) === 0));
    if (!isZero(linear)) drop(antiderivative(coefficientOf(linear, jetName(q, 1), 1), q).primitive);
  });
  return { reduced, primitive };
}
