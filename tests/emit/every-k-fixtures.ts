/** Derivations with the form for every curvature and with auxiliary fields, for tests of what is written about them. */
import { withAuxiliaryRoute } from '../../src/auxiliary-route.js';
import type { Derivation } from '../../src/derivation.js';
import { derive } from '../../src/derive.js';
import { withEveryK } from '../../src/every-k.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { theoryText } from '../oracle/pipeline.js';

const QUADRATIC = `1/2 c0 M^2 R + a1 R^2 + a2 R_{ab} R^{ab} + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd}
  + M^2 ( b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a )`;

const derived = (lagrangian: string, constants: string[] = []): Derivation =>
  derive(readTheory(theoryText({ lagrangian, constants }), 'sluice.yaml'));

export const einsteinCartan = withEveryK(derived('1/2 M^2 R'));
export const quadratic = withEveryK(derived(QUADRATIC, ['c0', 'a1', 'a2', 'a4', 'a5', 'b1', 'b2', 'b3']));
export const steep = withEveryK(derived('1/2 M^2 R + g (T_a T^a)^2', ['g']));
export const squared = await withAuxiliaryRoute(derived('1/2 M^2 R + c R^2 + b3 M^2 T_a T^a', ['c', 'b3']), {
  linearise: ['R'],
  integrate: undefined,
});
/** A cubic equation that nobody splits, and a field that stays. */
export const cubic = await withAuxiliaryRoute(
  derived('1/2 M^2 R + d (A_a A^a)^2 + q M^2 T_a A^a + g R^2', ['d', 'q', 'g']),
  { linearise: [], integrate: ['psi', 'phi'] },
);
/** Two branches, one of them with a square root in the solution only. */
export const branched = await withAuxiliaryRoute(derived('1/2 M^2 R + d (A_a A^a)^2', ['d']), {
  linearise: [],
  integrate: ['psi'],
});
export const components = await withAuxiliaryRoute(derived('1/2 M^2 R + c R_{ab} R^{ab}', ['c']), {
  linearise: ['curvature'],
  integrate: undefined,
});

export const ALL = { einsteinCartan, quadratic, steep, squared, cubic, branched, components };
