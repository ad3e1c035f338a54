/**
 * Matter with spin: the a⁻⁶ law of the axial coupling, the Holst factor, Weyssenhoff averages.
 */
import { describe, expect, it } from 'vitest';
import * as E from '../oracle/exact.js';
import { fieldJets } from '../oracle/geometry.js';
import { atPoint } from '../oracle/infix.js';
import { derived, equationsAt, shown } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const CONSTANTS = ['M', 'q', 'sigma', 's', 'gamma', 'rho_dust'];
const HOLST = '1/2 M^2 R + M^2/4/gamma \\epsilon^{abcd} R_{abcd}';

/** −q²σ²/(12M²) with σ = sigma/a³. */
function axialDensity(c: Readonly<Record<string, E.Q>>, a: E.Q): E.Q {
  const sigma = E.div(E.mul(c.q!, c.sigma!), E.pow(a, 3));
  return E.neg(E.div(E.mul(sigma, sigma), E.mul(E.q(12), E.pow(c.M!, 2))));
}

describe('axial spin density in Einstein–Cartan theory — a⁻⁶ law of Nature Phys. Sci. 242 (1973) 7 (memory)', () => {
  const json = derived({ lagrangian: '1/2 M^2 R', constants: ['q'], matter: ['dust', '{ spin: sigma, axial: q }'] });
  const { elimination } = json.spin!;

  it('ρ_eff = p_eff = −q²σ²/(12M²)', () => {
    for (let run = 0; run < runs(4); run++) {
      const point = new Random(firstSeed(660) + run).point('flrw', CONSTANTS, 3);
      const expected = axialDensity(point.constants, point.fields.a![0]!);
      expect(E.show(atPoint(elimination!.rho!, point))).toBe(E.show(expected));
      expect(E.show(atPoint(elimination!.p!, point))).toBe(E.show(expected));
    }
  });

  it('the equations of all fields say the same: ψ = qσ/(6M²), 3M²(H² + k/a²) = ρ + ρ_eff', () => {
    for (let run = 0; run < runs(4); run++) {
      const random = new Random(firstSeed(670) + run);
      const point = random.point('flrw', CONSTANTS, 3);
      const { N, a } = fieldJets(point, { kSquared: point.k }, -1);
      const hubble = a!.rate().over(a!.times(N!));
      const c = point.constants;
      const amount = E.div(E.mul(c.q!, c.sigma!), E.mul(E.q(6), E.pow(c.M!, 2)));
      const psi = a!.power(-3).scaled(amount);
      const solved = { ...point, fields: { ...point.fields, phi: hubble.derivatives(), psi: psi.derivatives() } };
      const at = equationsAt(json, solved);
      expect([shown(at).phi, shown(at).psi]).toEqual(['0', '0']);
      const scale = point.fields.a![0]!;
      const H = hubble.rationalAt(0);
      const curvature = E.div(point.k, E.pow(scale, 2));
      const rho = E.add(E.div(c.rho_dust!, E.pow(scale, 3)), axialDensity(c, scale));
      const friedmann = E.sub(E.product(E.q(3), E.pow(c.M!, 2), E.add(E.mul(H, H), curvature)), rho);
      expect(E.show(at.N!)).toBe(E.show(E.mul(E.pow(scale, 3), friedmann)));
    }
  });
});

describe('with a Holst term the density gains γ²/(1 + γ²) — gr-qc/0505081 (abstract seen)', () => {
  const matter = ['{ spin: sigma, axial: q }'];
  const json = derived({ lagrangian: HOLST, constants: ['q', 'gamma'], matter });

  it('exactly, for any γ', () => {
    for (let run = 0; run < runs(4); run++) {
      const random = new Random(firstSeed(680) + run);
      const point = random.point('flrw', CONSTANTS, 3);
      const gamma2 = E.pow(point.constants.gamma!, 2);
      const factor = E.div(gamma2, E.add(E.ONE, gamma2));
      const expected = E.mul(axialDensity(point.constants, point.fields.a![0]!), factor);
      expect(E.show(atPoint(json.spin!.elimination!.rho!, point))).toBe(E.show(expected));
      expect(E.show(atPoint(json.spin!.elimination!.p!, point))).toBe(E.show(expected));
    }
  });
});

describe('Weyssenhoff fluid: ρ → ρ − κs²/4, p → p − κs²/4 — Rev. Mod. Phys. 48 (1976) 393 (memory)', () => {
  for (const [signature, lagrangian] of [
    ['-+++', '1/2 M^2 R'],
    ['+---', '-1/2 M^2 R'],
  ] as const)
    it(`with κ = 1/M², s ∝ a⁻³, signature ${signature}`, () => {
      const json = derived({ lagrangian, signature, matter: ['dust', '{ spin: s, average: weyssenhoff }'] });
      const plain = derived({ lagrangian, signature, matter: ['dust'] });
      for (let run = 0; run < runs(3); run++) {
        const point = new Random(firstSeed(690) + run).point('flrw', CONSTANTS, 3);
        const a = point.fields.a![0]!;
        const s = E.div(point.constants.s!, E.pow(a, 3));
        const density = E.neg(E.div(E.mul(s, s), E.mul(E.q(4), E.pow(point.constants.M!, 2))));
        const { rho, p } = json.spin!.averages.s!;
        expect([E.show(atPoint(rho, point)), E.show(atPoint(p, point))]).toEqual([E.show(density), E.show(density)]);
        // E_N = a³(… − ρ), E_a = 3a²N(… + p).
        const [with_, without] = [equationsAt(json, point), equationsAt(plain, point)];
        expect(E.show(E.sub(without.N!, with_.N!))).toBe(E.show(E.mul(E.pow(a, 3), density)));
        const area = E.product(E.q(3), E.pow(a, 2), point.fields.N![0]!);
        expect(E.show(E.sub(with_.a!, without.a!))).toBe(E.show(E.mul(area, density)));
      }
    });

  it('bounces where a³ = κ s₀²/(4 ρ₀): the flat Friedmann equation with torsion eliminated', () => {
    const json = derived({ lagrangian: '1/2 M^2 R', matter: ['dust', '{ spin: s, average: weyssenhoff }'] });
    const random = new Random(firstSeed(695));
    const [M, s, rho] = [random.positive(), random.positive(), random.positive()];
    // ρ₀/a³ = s₀²/(4M²a⁶) at the bounce: choose ρ₀ so that a there is rational.
    const a = random.positive();
    const density = E.div(E.mul(s, s), E.product(E.q(4), E.pow(M, 2), E.pow(a, 3)));
    const point = random.point('flrw', CONSTANTS, 3);
    const still = { ...point, k: E.ZERO, constants: { ...point.constants, M, s, rho_dust: density } };
    const fields = { ...point.fields, a: [a, E.ZERO, rho, rho], phi: point.fields.phi!.map(() => E.ZERO) };
    const at = equationsAt(json, { ...still, fields: { ...fields, psi: point.fields.psi!.map(() => E.ZERO) } });
    expect(E.show(at.N!)).toBe('0');
  });

  it('with a Holst term divides by a sum, which has no place in a Lagrangian of single terms', () => {
    const wanted = { lagrangian: HOLST, constants: ['gamma'], matter: ['{ spin: s, average: weyssenhoff }'] };
    expect(() => derived(wanted)).toThrow(/divides by a sum of couplings/);
    const fixed = derived({ ...wanted, impose: ['gamma = 2'] });
    const point = new Random(firstSeed(698)).point('flrw', CONSTANTS, 3);
    const s = E.div(point.constants.s!, E.pow(point.fields.a![0]!, 3));
    const factor = E.q(4, 5);
    const density = E.neg(E.div(E.product(factor, s, s), E.mul(E.q(4), E.pow(point.constants.M!, 2))));
    expect(E.show(atPoint(fixed.spin!.averages.s!.rho, point))).toBe(E.show(density));
  });
});
