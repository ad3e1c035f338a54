/**
 * Reduces a form in the metric g̃ = Ω² g on the metric geometry, with ã = Ωa and Ñ = ΩN, and compares it with the form
 * that it comes from. Ω is kept as a symbol whose square is known and whose rate ω̇ is (Ω²)˙/(2Ω²), so no root is taken.
 */

import { collect, moveTo, substitute } from '../algebra/collect.js';
import {
  addFraction,
  equalFraction,
  type Fraction,
  fraction,
  multiplyFraction,
  timeDerivativeOfFraction,
} from '../algebra/fraction.js';
import { add, generator, monomial, multiply, type Poly, power, scale, sum, zero } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { jetName, makeRing } from '../algebra/ring.js';
import type { BiScalarFunctions, BiScalarRoles } from './biscalar.js';
import { reducedForm } from './biscalar.js';
import { type FrameFunctions, inverse, powerOf, scaledFraction } from './conformal.js';

/** Names that no user can type. */
const FACTOR = 'conformal factor';
const RATE = 'rate of the conformal factor';
const SECOND = 'second rate of the conformal factor';

/** An expression of the conformal geometry in terms of the given one: a → Ωa, N → ΩN and their derivatives. */
function inConformalFields(p: Poly, omega2: Fraction, rate: Fraction, roles: BiScalarRoles): Fraction {
  const { ring } = p;
  const wide = makeRing([
    ...ring.generators,
    ...[FACTOR, RATE, SECOND].map((name) => ({ kind: 'constant', name }) as const),
  ]);
  const [s, w, w2] = [FACTOR, RATE, SECOND].map((name) => generator(wide, name)) as [Poly, Poly, Poly];
  const images = new Map<string, Poly>();
  for (const q of [roles.lapse, roles.scale]) {
    const [zeroth, first, second] = [0, 1, 2].map((n) => generator(wide, jetName(q, n))) as [Poly, Poly, Poly];
    images.set(jetName(q, 0), multiply(s, zeroth));
    images.set(jetName(q, 1), multiply(s, add(first, multiply(w, zeroth))));
    images.set(jetName(q, 2), multiply(s, sum(wide, [second, scale(multiply(w, first), 2), multiply(w2, zeroth)])));
  }
  const secondRate = addFraction(timeDerivativeOfFraction(rate), multiplyFraction(rate, rate));
  const values = [omega2, rate, secondRate];
  const places = [FACTOR, RATE, SECOND].map((name) => wide.position.get(name)!);
  const parts = collect(substitute(p, images, wide), (g) => places.includes(g)).map(
    ({ monomial: powers, coefficient }) => {
      let value = fraction(moveTo(coefficient, ring));
      for (const [g, e] of powers) {
        const n = g === places[0] ? e / 2 : e;
        if (!Number.isInteger(n)) throw new Error('an odd power of the conformal factor is left');
        const base = values[places.indexOf(g)]!;
        value = multiplyFraction(value, powerOf(n < 0 ? inverse(base) : base, Math.abs(n)));
      }
      return value;
    },
  );
  return parts.reduce(addFraction, fraction(zero(ring)));
}

/**
 * Compares the two reduced Lagrangians exactly at every k; they differ by d/dt of 6 (volume) F ω̇/N², the boundary term of
 * the map. The branch +J_A Ȧ/N of the root is taken in both.
 * @throws Error when they do not agree: the program would be wrong.
 */
export function verifyFrame(
  jordan: BiScalarFunctions,
  frame: FrameFunctions,
  omega2: Fraction,
  roles: BiScalarRoles,
): void {
  const { ring } = jordan.g4;
  const rate = scaledFraction(multiplyFraction(timeDerivativeOfFraction(omega2), inverse(omega2)), rational(1, 2));
  const conformal = (p: Poly): Fraction => inConformalFields(p, omega2, rate, roles);
  const velocity = (q: string): Poly =>
    monomial(ring, rational(1), [
      [jetName(q, 1), 1],
      [roles.lapse, -1],
    ]);
  const volume = conformal(roles.volume);
  const inOwnTime = inverse(omega2);
  const terms: Fraction[] = [
    multiplyFraction(frame.coupling, conformal(multiply(roles.volume, roles.metricCurvature))),
  ];
  for (const [key, k] of frame.kinetic) {
    const [x, y] = key.split(',') as [string, string];
    const squared = multiplyFraction(fraction(multiply(velocity(x), velocity(y))), inOwnTime);
    terms.push(scaledFraction(multiplyFraction(volume, multiplyFraction(k, squared)), rational(1, 2)));
  }
  // √root is Ω, which meets the 1/Ω of the velocity.
  if (!equalFraction(frame.root, omega2)) throw new Error('the root in the current is not the conformal factor');
  for (const [q, j] of frame.current) terms.push(multiplyFraction(volume, multiplyFraction(j, fraction(velocity(q)))));
  terms.push(scaledFraction(multiplyFraction(volume, frame.potential), -1));
  const boundary = scaledFraction(
    multiplyFraction(
      rate,
      fraction(multiply(multiply(roles.volume, jordan.g4), power(generator(ring, roles.lapse), -2))),
    ),
    6,
  );
  const original = addFraction(fraction(reducedForm(jordan, roles, ring)), timeDerivativeOfFraction(boundary));
  if (!equalFraction(terms.reduce(addFraction), original))
    throw new Error('the form in the conformal frame differs from the form that it comes from');
}
