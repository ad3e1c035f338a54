/**
 * Einstein–Cartan theory, L = ½ M² R: without spin its torsion vanishes and general relativity remains.
 */
import { describe, expect, it } from 'vitest';
import * as E from '../oracle/exact.js';
import { fieldJets, type Point } from '../oracle/geometry.js';
import { atPoint } from '../oracle/infix.js';
import { derived, equationsAt, shown } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const MATTER = ['dust', 'radiation', '{ vacuum: Lambda }'];
const CONSTANTS = ['M', 'gamma', 'rho_dust', 'rho_radiation', 'Lambda'];

/** The point with φ = H along the whole curve and ψ = 0. */
function torsionFree(point: Point): Point {
  const { N, a } = fieldJets(point, { kSquared: point.k }, -1);
  const hubble = a!.rate().over(a!.times(N!));
  return {
    ...point,
    fields: { ...point.fields, phi: hubble.derivatives(), psi: point.fields.psi!.map(() => E.ZERO) },
  };
}

/** ρ and p of the three fluids, and k/a², H² and dH/(N dt). */
function background(point: Point): Record<'rho' | 'p' | 'kOverA2' | 'H' | 'Hdot' | 'M2', E.Q> {
  const { N, a } = fieldJets(point, { kSquared: point.k }, -1);
  const hubble = a!.rate().over(a!.times(N!));
  const c = point.constants;
  const scale = point.fields.a![0]!;
  const dust = E.div(c.rho_dust!, E.pow(scale, 3));
  const radiation = E.div(c.rho_radiation!, E.pow(scale, 4));
  return {
    rho: E.sum(dust, radiation, c.Lambda!),
    p: E.sub(E.div(radiation, E.q(3)), c.Lambda!),
    kOverA2: E.div(point.k, E.pow(scale, 2)),
    H: hubble.rationalAt(0),
    Hdot: hubble.rate().over(N!).rationalAt(0),
    M2: E.pow(c.M!, 2),
  };
}

describe('general relativity from Einstein–Cartan theory — any textbook (memory)', () => {
  const json = derived({ lagrangian: '1/2 M^2 R', matter: MATTER });
  for (let run = 0; run < runs(5); run++) {
    const seed = firstSeed(300) + run;
    const point = new Random(seed).point('flrw', CONSTANTS, 3);
    const { rho, p, kOverA2, H, Hdot, M2 } = background(point);
    const volume = E.mul(E.pow(point.fields.a![0]!, 3), point.fields.N![0]!);

    it(`E_φ = 6M² a³N (φ − H), E_ψ = −6M² a³N ψ: no torsion, seed ${seed}`, () => {
      const at = equationsAt(json, point);
      const [phi, psi] = [point.fields.phi![0]!, point.fields.psi![0]!];
      // L/(a³N) = 3M²(A1 + A4): φ enters as φ² − 2Hφ after one total derivative, ψ as −ψ².
      expect(E.show(at.phi!)).toBe(E.show(E.product(E.q(6), M2, volume, E.sub(phi, H))));
      expect(E.show(at.psi!)).toBe(E.show(E.product(E.q(-6), M2, volume, psi)));
    });

    it(`then 3M²(H² + k/a²) = ρ and −M²(2Ḣ + 3H² + k/a²) = p, seed ${seed}`, () => {
      const free = torsionFree(point);
      const at = equationsAt(json, free);
      const H2 = E.mul(H, H);
      const friedmann = E.sub(E.product(E.q(3), M2, E.add(H2, kOverA2)), rho);
      const pressure = E.add(E.product(M2, E.sum(E.mul(E.q(2), Hdot), E.mul(E.q(3), H2), kOverA2)), p);
      const a = point.fields.a![0]!;
      expect(shown(at)).toEqual({
        N: E.show(E.mul(E.pow(a, 3), friedmann)),
        a: E.show(E.product(E.q(3), E.pow(a, 2), point.fields.N![0]!, pressure)),
        phi: '0',
        psi: '0',
      });
      expect(E.show(atPoint(json.friedmann.rho_T, free))).toBe('0');
      expect(E.show(atPoint(json.friedmann.p_T, free))).toBe('0');
    });
  }
});

describe('scalar-tensor form: a quadratic cuscuton — Phys. Rev. D 75 (2007) 083513, 123509 (memory)', () => {
  const form = derived({ lagrangian: '1/2 M^2 R' }).scalarTensor;
  it('G4 = 0, no kinetic term, J = 2M² ∂φ, −V = 3M²(φ² − ψ²)', () => {
    if (form.form === 'none') throw new Error(form.reason);
    expect([form.G4, ...Object.values(form.kinetic), form.current.psi]).toEqual(['0', '0', '0', '0', '0']);
    for (let run = 0; run < runs(3); run++) {
      const point = new Random(firstSeed(330) + run).point('flrw', ['M']);
      const [phi, psi, M] = [point.fields.phi![0]!, point.fields.psi![0]!, point.constants.M!];
      const M2 = E.mul(M, M);
      expect(E.show(atPoint(form.current.phi!, point))).toBe(E.show(E.mul(E.q(2), M2)));
      const difference = E.sub(E.mul(psi, psi), E.mul(phi, phi));
      expect(E.show(atPoint(form.potential, point))).toBe(E.show(E.product(E.q(3), M2, difference)));
    }
  });
});

describe('Holst term — J. Math. Phys. 23 (1982) 373, gr-qc/0505081 (memory; abstract seen)', () => {
  const json = derived({
    lagrangian: '1/2 M^2 R + M^2/4/gamma \\epsilon^{abcd} R_{abcd}',
    constants: ['gamma'],
    matter: MATTER,
  });
  const plain = derived({ lagrangian: '1/2 M^2 R', matter: MATTER });
  const mixed = derived({ lagrangian: '1/2 M^2 R + M^2/6/gamma T_a A^a', constants: ['gamma'], matter: MATTER });

  it('is −(6M²/γ) u v up to a total derivative: the equations of T_a A^a M²/(6γ)', () => {
    expect(json.equations).toEqual(mixed.equations);
  });

  it('changes no solution without spin', () => {
    for (let run = 0; run < runs(4); run++) {
      const free = torsionFree(new Random(firstSeed(350) + run).point('flrw', CONSTANTS, 3));
      expect(shown(equationsAt(json, free))).toEqual(shown(equationsAt(plain, free)));
    }
  });

  it('and still leaves no torsion: E_φ, E_ψ are regular and homogeneous in φ − H and ψ', () => {
    const point = new Random(firstSeed(360)).point('flrw', CONSTANTS, 3);
    const free = torsionFree(point);
    const shifted = (field: 'phi' | 'psi'): E.Q[] => {
      const jet = [...free.fields[field]!];
      jet[0] = E.add(jet[0]!, E.ONE);
      const at = equationsAt(json, { ...free, fields: { ...free.fields, [field]: jet } });
      return [at.phi!, at.psi!];
    };
    const [[p, q], [r, s]] = [shifted('phi'), shifted('psi')] as [[E.Q, E.Q], [E.Q, E.Q]];
    expect(E.isZero(E.sub(E.mul(p, s), E.mul(q, r)))).toBe(false);
  });
});
