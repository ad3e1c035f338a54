/** Theories with frames and canonical fields that the tests of the emitters look at. */
import type { Derivation } from '../../src/derivation.js';
import { derive } from '../../src/derive.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { withScalarFields } from '../../src/scalar-fields.js';

const HEAD = 'untwist: 1\nscales: { M: mass }\n';

/** A single decoupled scalar with few couplings: everything has a closed form. */
export const DECOUPLED = `${HEAD}name: Decoupled
constants: [s, b3, c0]
lagrangian: 1/2 c0 M^2 R + s ( R_{abcd} R^{abcd} - R_{abcd} R^{cdab} ) + b3 M^2 T_a T^a
matter: [ dust ]
`;

/** All ten couplings: both scalars mix. */
export const TEN = `${HEAD}name: Ten mixed
constants: [c0, a1, a2, a3, a4, a5, a6, b1, b2, b3]
lagrangian: |
  1/2 c0 M^2 R
  + a1 R^2 + a2 R_{ab} R^{ab} + a3 R_{ab} R^{ba}
  + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} + a6 R_{abcd} R^{cdab}
  + M^2 ( b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a )
assume: [ "a4 > 0", "b2 < b3" ]
matter: [ radiation ]
`;

/** No curvature scalar in the form. */
export const BARE = `${HEAD}name: Bare\nlagrangian: 1/2 M^2 R\n`;

export const withFields = (text: string, omega2?: string): Promise<Derivation> =>
  withScalarFields(derive(readTheory(text, 'test.yaml')), { einstein: true, omega2, canonical: true, order: 4 });
