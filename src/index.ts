/**
 * The public API.
 *
 *     const theory = readTheory(text, 'theory.yaml');
 *     const derivation = derive(theory);
 *     console.log(derivationJson(derivation));
 *
 * `withCovariant` adds the field equations in index notation; the emitters take a derivation and return text.
 */
export { infix } from './algebra/infix.js';
export type { Poly } from './algebra/poly.js';
export { termsOf } from './algebra/poly.js';
export type { Rational } from './algebra/rational.js';
export type { Ring } from './algebra/ring.js';
export { deriveClassB } from './class-b.js';
export { withCovariant } from './covariant.js';
export type * from './derivation.js';
export { derive } from './derive.js';
export { LANGUAGES, typescriptModule } from './emit/code.js';
export type * from './emit/code-description.js';
export type { Language } from './emit/code-language.js';
export { codeModel } from './emit/code-model.js';
export { derivationJson, derivationObject } from './emit/json.js';
export { derivationTex, equationsTex } from './emit/latex.js';
export { reportHtml } from './emit/report.js';
export { withEveryK } from './every-k.js';
export type { Geometry } from './geometry/geometry.js';
export { type Diagnostic, InputError, renderDiagnostic } from './notation/diagnostics.js';
export { readTheory } from './notation/read-theory.js';
export type { Theory } from './notation/theory.js';
export { independentScalars } from './tensor/independent-scalars.js';
export { simplify } from './tensor/simplify.js';
export { translate } from './tensor/translate.js';
