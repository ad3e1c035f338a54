/**
 * The public API.
 *
 *     const theory = readTheory(text, 'theory.yaml');
 *     const derivation = derive(theory);
 *     console.log(derivationJson(derivation));
 */
export { infix } from './algebra/infix.js';
export type { Poly } from './algebra/poly.js';
export { termsOf } from './algebra/poly.js';
export type { Rational } from './algebra/rational.js';
export type { Ring } from './algebra/ring.js';
export type * from './derivation.js';
export { derive } from './derive.js';
export { derivationJson, derivationObject } from './emit/json.js';
export type { Geometry } from './geometry/geometry.js';
export { type Diagnostic, InputError, renderDiagnostic } from './notation/diagnostics.js';
export { readTheory } from './notation/read-theory.js';
export type { Theory } from './notation/theory.js';
