/**
 * Conformal frames and canonical fields of torsion theories against published forms: the Einstein-frame background
 * equations of several scalars, the conformally coupled scalar, the current whose weight depends on one field only.
 */
import { describe, expect, it } from 'vitest';
import { derivationObject, derive, readTheory } from '../../src/index.js';
import { withScalarFields } from '../../src/scalar-fields.js';
import { backgroundResiduals } from '../oracle/einstein-frame.js';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import { atPoint } from '../oracle/infix.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const file = (lagrangian: string, constants: string, more = ''): string =>
  `untwist: 1\nname: Inner basin\nconstants: [${constants}]\nscales: { M: mass }\nlagrangian: ${lagrangian}\n${more}`;

// biome-ignore lint/suspicious/noExplicitAny: the JSON of a derivation as other programs see it
type Json = any;

async function derived(text: string, omega2?: string): Promise<Json> {
  const options = { einstein: true, omega2, canonical: true, order: 4 };
  return derivationObject(await withScalarFields(derive(readTheory(text, 'inner-basin.yaml')), options));
}

/** P = 0: a4 + a5/2 + a6 = 0 without R² and the Ricci squares. */
const P_ZERO = file(
  '1/2 c0 M^2 R + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} - (a4 + 1/2 a5) R_{abcd} R^{cdab} + M^2 (b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a)',
  'c0, a4, a5, b1, b2, b3',
);

describe('Einstein-frame background equations (several fields with F = M², Prog. Theor. Phys. 126 (2011) 511, memory)', () => {
  it('3M²H̃² = ½K̃ȦḂ + Ṽ and −M²(2H̃˙ + 3H̃²) = ½K̃ȦḂ + J̃Ȧ − Ṽ are those of the torsion theory at k = 0', async () => {
    const general = file(
      '1/2 c0 M^2 R + a1 R^2 + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} + a6 R_{abcd} R^{cdab} + M^2 (b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a) + d1 \\epsilon^{abcd} R_{abef} R_{cd}{}^{ef} + d2 M^2 T_a A^a',
      'c0, a1, a4, a5, a6, b1, b2, b3, d1, d2',
    );
    const names = ['c0', 'a1', 'a4', 'a5', 'a6', 'b1', 'b2', 'b3', 'd1', 'd2', 'M'];
    const json = await derived(general);
    for (let run = 0; run < runs(4); run++) {
      const point = new Random(firstSeed(1100) + run).point('flrw', names);
      const { residual, expected } = backgroundResiduals(json.frames[0], json, point);
      expect(residual.map(E.show)).toEqual(expected.map(E.show));
    }
  });
});

describe('the conformally coupled scalar (Ann. Phys. 82 (1974) 535, memory): for P = 0 the scalar ψ', () => {
  it('has z = √6 M artanh(ψ/λ) with λ² = −t_u/S and s² = 6M²', async () => {
    const json = await derived(P_ZERO);
    const [einstein] = json.canonical;
    const [hyperbolic, circular] = einstein.cases;
    expect(hyperbolic.scale).toEqual({ value: '6*M^2', lambda: 0 });
    expect(hyperbolic.kineticSign).toBe('positive');
    expect(hyperbolic.branches.map((b: Json) => [b.function, b.inverse, b.domain])).toEqual([
      ['artanh', 'tanh', 'x^2 < 1'],
      ['arcoth', 'coth', 'x^2 > 1'],
    ]);
    expect(circular).toMatchObject({ kineticSign: 'negative', antiderivative: 'arctan(x)' });
    // −t_u/S from the functions of the form: G4 = −(Sψ² + t_u)/6 and K_ψψ = 2S.
    const point = new Random(firstSeed(1110)).point('flrw', ['c0', 'a4', 'a5', 'b1', 'b2', 'b3', 'M']);
    const still = { ...point, fields: { ...point.fields, psi: [E.ZERO, E.ZERO, E.ZERO] } };
    const at = (text: string): Q => atPoint(text, still);
    const minusTu = E.mul(E.q(6), at(json.scalarTensor.G4));
    const s = E.div(at(json.scalarTensor.kinetic['psi,psi']), E.q(2));
    expect(E.show(at(hyperbolic.lambda.value))).toBe(E.show(E.div(minusTu, s)));
  });

  it('leaves a cuscuton with a weight that depends on z only: φ = ζ|g|^½, √|J²| ∝ |g|^(3/2) |∂ζ|', async () => {
    const json = await derived(P_ZERO);
    const { current } = json.canonical[0];
    expect(current).toMatchObject({
      field: 'phi',
      w: { field: '0', bracket: '1/2' },
      weight: { field: '0', bracket: '3/2' },
    });
    expect(json.classification.scalars.phi.kind).toBe('quadratic-cuscuton');
    // J_φ = factor · g.
    const point = new Random(firstSeed(1120)).point('flrw', ['c0', 'a4', 'a5', 'b1', 'b2', 'b3', 'M']);
    const product = E.mul(atPoint(current.weight.factor, point), atPoint(current.bracket, point));
    expect(E.show(product)).toBe(E.show(atPoint(json.scalarTensor.current.phi, point)));
  });

  it('is decided by assumptions: S t_u < 0 leaves the hyperbolic case alone', async () => {
    const json = await derived(`${P_ZERO}assume: ["2 a4 > a5", "2 b1 + b2 + 3 b3 < 0"]\n`);
    expect(json.canonical[0].cases).toHaveLength(1);
    expect(json.canonical[0].cases[0].kineticSign).toBe('positive');
    expect(json.assumptions).toEqual([
      { text: '2 a4 > a5', used: true },
      { text: '2 b1 + b2 + 3 b3 < 0', used: true },
    ]);
  });
});

describe('Einstein–Cartan (Phys. Rev. D 75 (2007) 083513 for the cuscuton)', () => {
  it('has no Einstein frame; φ is a quadratic cuscuton and ψ auxiliary', async () => {
    const json = await derived(file('1/2 M^2 R', ''));
    expect(json.frames).toEqual([{ frame: 'none', reason: expect.stringContaining('G4 vanishes') }]);
    expect(json.classification.scalars).toMatchObject({
      phi: { kind: 'quadratic-cuscuton' },
      psi: { kind: 'auxiliary' },
    });
    expect(json.canonical).toEqual([]);
  });
});
