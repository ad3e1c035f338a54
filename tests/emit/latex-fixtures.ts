/** Theories whose LaTeX the tests look at: the bundled kind, all ten couplings, hundreds of terms, awkward names. */

import type { Derivation } from '../../src/derivation.js';
import { derive } from '../../src/derive.js';
import { readTheory } from '../../src/notation/read-theory.js';

const TEN = `
constants: [c0, a1, a2, a3, a4, a5, a6, b1, b2, b3]
scales: { M: mass }
lagrangian: |
  1/2 c0 M^2 R
  + a1 R^2 + a2 R_{ab} R^{ab} + a3 R_{ab} R^{ba}
  + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} + a6 R_{abcd} R^{cdab}
  + M^2 ( b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a )
matter: [ dust, radiation, { vacuum: Lambda }, { fluid: chi, w: "1/5" } ]
symbols: { c0: '\\alpha_0' }
`;

/** Sixty couplings with denominators that have little in common, signature +−−−. */
const MANY = ((): string => {
  const invariants = [
    'R^2',
    'R_{ab} R^{ab}',
    'M^2 T_{abc} T^{abc}',
    'R T_a A^a',
    'R_{abcd} T^{abe} T^{cd}{}_e',
    'R^3/M^2',
  ];
  const names = Array.from({ length: 60 }, (_, i) => `kappa${i}`);
  const term = (name: string, i: number): string =>
    `  ${i % 3 === 0 ? '-' : '+'} ${i + 1}/${(i % 7) + 1} ${name} ${invariants[i % 6]} + ${name}/${i + 2} ${invariants[(i * 5) % 3]}`;
  return `
name: Many couplings
conventions: { signature: "+---" }
constants: [${names.join(', ')}]
scales: { M: mass }
lagrangian: |
  1/2 M^2 R
${names.map(term).join('\n')}
symbols: { kappa1: '\\mathrm{coupling}_{\\mathrm{long}}', kappa2: '\\hat{\\kappa}^{12}' }
`;
})();

const TEXTS = {
  'ten-couplings': `name: Ten couplings${TEN}`,
  'with-relations': `name: With relations${TEN}impose: [ "a1 = 0", "b1 = -2 b3", "a2^2 = a3^2" ]\n`,
  quartic: `
name: "Quartic & cubic: 100% of R_{ab}, élan #1"
constants: [q1, q2, q3, q4, q5, q6, q7, q8, q9, beta_1, beta_2]
scales: { M: mass }
lagrangian: |
  1/2 M^2 R + q1 R^4/M^4 + q2 R R_{ab} R^{ab}/M^2 + q3 R_{abcd} T^{abe} T^{cd}{}_e
  + q4 R^2 T_a T^a /M^2 + q5 (T_a T^a)^2 + q6 T_{abc}T^{abc} T_d A^d + q7 R_{abcd} R^{ab}{}_{ef} R^{cdef}/M^2
  + q8 R_{ab}R^{bc}R_{cd}R^{da}/M^4 + q9 \\epsilon^{abcd} R_{abef} T_c{}^{ef} T_d
  + beta_1 R_{abcd}R^{abcd} R_{ef}R^{fe}/M^4 + beta_2 (R + T_a T^a)^3/M^2
matter: [ dust, radiation ]
`,
  awkward: `
name: "Αλφα Wide names — supercalifragilisticexpialidocious_supercalifragilisticexpialidocious façade 中文 \\\\input{x} $x^2$ ~"
constants: [supercalifragilisticexpialidociousconstantnumberone, delta, epsilonprime, w1, w2, manyparts_abc_def_ghi_jkl_mno_pqr_stu]
scales: { M: mass, mu: mass }
lagrangian: |
  1/2 M^2 R + supercalifragilisticexpialidociousconstantnumberone R^2 + w1/w2^3 R_{ab} R^{ba}
  + delta^2 epsilonprime^3 T_{abc} T^{abc} M^2 + manyparts_abc_def_ghi_jkl_mno_pqr_stu^2/delta^3/epsilonprime^5 R_{abcd}R^{abcd}
  + w2 T_{abc} T^{bcd} T_{def} T^{efg} T_{ghi} T^{hia} /M^2 + mu^4
matter: [ { fluid: quintessencelikefluidwithalongname, w: "-1/3" }, { fluid: stiff, w: 1 } ]
symbols: { delta: "c'", epsilonprime: '\\tilde{c}^{\\star}_{1}', w2: '\\mathcal{W}' }
`,
  'many-couplings': MANY,
  anisotropic: `
name: Anisotropic
constants: [c0, a1, b1]
scales: { M: mass }
lagrangian: 1/2 c0 M^2 R + a1 R_{abcd} R^{abcd} + b1 M^2 T_{abc} T^{abc}
matter: [ dust ]
geometry: bianchi-i
`,
  'einstein-cartan': `
name: Einstein-Cartan
scales: { M: mass }
lagrangian: 1/2 M^2 R
matter: [ dust ]
`,
  conformal: `
name: Conformal
constants: [a4]
lagrangian: a4 R_{abcd} R^{cdab}
`,
} as const;

export type FixtureName = keyof typeof TEXTS;
export const FIXTURES = Object.keys(TEXTS) as FixtureName[];

const known = new Map<FixtureName, Derivation>();

export function fixture(name: FixtureName): Derivation {
  let derivation = known.get(name);
  if (!derivation) {
    derivation = derive(
      readTheory(`untwist: 1${TEXTS[name].startsWith('\n') ? '' : '\n'}${TEXTS[name]}`, `${name}.yaml`),
    );
    known.set(name, derivation);
  }
  return derivation;
}
