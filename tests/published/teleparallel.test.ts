/**
 * The torsion scalar of the teleparallel equivalent, 𝕋 = ¼ T_abc T^abc + ½ T_abc T^bac − T_a T^a.
 * Sources: review arXiv:1511.07586; Phys. Rev. D 19 (1979) 3524 (memory).
 */
import { describe, expect, it } from 'vitest';
import type { Signature } from '../oracle/contraction.js';
import * as E from '../oracle/exact.js';
import { fieldJets, type Point } from '../oracle/geometry.js';
import { along, atPoint } from '../oracle/infix.js';
import type { Jet } from '../oracle/jet.js';
import { derived, shown } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { eulerLagrange } from '../oracle/variation.js';

const SCALAR = '1/4 T_{abc} T^{abc} + 1/2 T_{abc} T^{bac} - T_a T^a';

function perVolume(text: string, point: Point): E.Q {
  const volume = E.mul(E.pow(point.fields.a![0]!, 3), point.fields.N![0]!);
  return E.div(atPoint(text, point), volume);
}

function hubble(point: Point): E.Q {
  return E.div(point.fields.a![1]!, E.mul(point.fields.a![0]!, point.fields.N![0]!));
}

describe('teleparallel equivalent — arXiv:1511.07586, Phys. Rev. D 19 (1979) 3524 (memory)', () => {
  for (const signature of ['-+++', '+---'] as const) {
    const sign = signature === '-+++' ? 1 : -1;
    it(`flat FLRW with zero connection: 𝕋 = ${sign === 1 ? '+' : '−'}6H² for ${signature}`, () => {
      const json = derived({ lagrangian: SCALAR, signature });
      for (let run = 0; run < runs(3); run++) {
        const random = new Random(firstSeed(500) + run).point('flrw', ['M']);
        const zero = random.fields.phi!.map(() => E.ZERO);
        const point = { ...random, k: E.ZERO, fields: { ...random.fields, phi: zero, psi: zero } };
        const H = hubble(point);
        expect(E.show(perVolume(json.lagrangian, point))).toBe(E.show(E.product(E.q(6 * sign), H, H)));
      }
    });

    it(`R = R° + 𝕋 + 2 ∇°T^μ_μ for every connection, ${signature}`, () => {
      const json = derived({ lagrangian: `R - (${SCALAR})`, signature });
      for (let run = 0; run < runs(3); run++) expectMetricPart(json.lagrangian, firstSeed(510) + run, signature);
    });
  }

  it('−½M² 𝕋 is −3M²(u² − v²)', () => {
    const json = derived({ lagrangian: `-1/2 M^2 (${SCALAR})` });
    for (let run = 0; run < runs(3); run++) {
      const point = new Random(firstSeed(520) + run).point('flrw', ['M']);
      const u = E.sub(hubble(point), point.fields.phi![0]!);
      const v = point.fields.psi![0]!;
      const value = E.product(E.q(-3), E.pow(point.constants.M!, 2), E.sub(E.mul(u, u), E.mul(v, v)));
      expect(E.show(perVolume(json.lagrangian, point))).toBe(E.show(value));
    }
  });

  it('with zero curvature it is general relativity at every k: φ = 0, ψ² = k/a² or φ² = −k/a², ψ = 0', () => {
    const json = derived({ lagrangian: `-1/2 M^2 (${SCALAR})` });
    for (let run = 0; run < runs(3); run++) {
      const random = new Random(firstSeed(530) + run).point('flrw', ['M'], 2);
      const root = E.q(1 + run, 2);
      for (const closed of [true, false]) {
        const k = E.mul(E.mul(root, root), E.q(closed ? 1 : -1));
        const { N, a } = random.fields as { N: readonly E.Q[]; a: readonly E.Q[] };
        const base = { ...random, k, fields: { N, a } };
        const torsion = eulerLagrange(base, 1, (fields, algebra) => {
          const flat = fields.a!.inverse().scaled(root);
          const none = flat.scaled(E.ZERO);
          const connection = closed ? { phi: none, psi: flat } : { phi: flat, psi: none };
          return along(json.lagrangian, { ...fields, ...connection }, base.constants, algebra);
        });
        const metric = eulerLagrange(base, 1, (fields, algebra) =>
          along('-3*M^2*(a*D(a,1)^2/N - k*a*N)', fields, base.constants, algebra),
        );
        // For k < 0 the cross term 6M² Hφ a³N = 6M²√−k aȧ is a total derivative.
        expect(shown(torsion.equations)).toEqual(shown(metric.equations));
      }
    }
  });

  it('has G4 = ½M²', () => {
    const form = derived({ lagrangian: `-1/2 M^2 (${SCALAR})` }).scalarTensor;
    if (form.form === 'none') throw new Error(form.reason);
    const point = new Random(firstSeed(540)).point('flrw', ['M']);
    expect(E.show(atPoint(form.G4, point))).toBe(E.show(E.div(E.pow(point.constants.M!, 2), E.q(2))));
  });
});

/** R − 𝕋 at a point against 6(Ḣ + 2H² + k/a²) + 2∇·T with T_0 = 3u. */
function expectMetricPart(lagrangian: string, seed: number, signature: Signature): void {
  const sign = signature === '-+++' ? 1 : -1;
  const point = new Random(seed).point('flrw', ['M']);
  const { N, a, phi } = fieldJets(point, { kSquared: point.k }, -1) as Record<string, Jet>;
  const H = a!.rate().over(a!.times(N!));
  const kOverA2 = a!.power(-2).scaled(point.k);
  const metric = H.rate()
    .over(N!)
    .plus(H.power(2).scaled(E.q(2)))
    .plus(kOverA2)
    .scaled(E.q(6));
  const volume = a!.power(3);
  const divergence = volume.times(H.minus(phi!)).scaled(E.q(-3)).rate().over(volume.times(N!));
  const expected = metric.plus(divergence.scaled(E.q(2))).scaled(E.q(sign));
  expect(E.show(perVolume(lagrangian, point)), `seed ${seed}`).toBe(E.show(expected.rationalAt(0)));
}
