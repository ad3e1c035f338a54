/**
 * Scalar-mode quadratic cosmology, L = (a0/2) R + (b/24) R² + 3 a1 (u² − v²), for every k at v = 0.
 * Sources: Phys. Rev. D 78 (2008) 023522; arXiv:0908.3323, 1009.5112, 1207.0579 (memory). With μ = a0 + a1, Φ = 3u, 𝒯 = 3p − ρ:
 *   Ḣ = (μR + 𝒯)/(6a1) − 2H² − k/a²,   Φ̇ = (a0 R + 𝒯)/(2a1) − 3HΦ + ⅓Φ²,   Ṙ = −⅔ (R + 6μ/b) Φ,
 *   ρ = (b/18)(R + 6μ/b)(3H − Φ)² − (b/24)R² − 3a1 H² + (3k/a²)(a0 + bR/6).
 */
import { describe, expect, it } from 'vitest';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import type { Point } from '../oracle/geometry.js';
import { atPoint } from '../oracle/infix.js';
import { type DerivedJson, derived, equationsAt, shown } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const SCALAR = '1/4 T_{abc} T^{abc} + 1/2 T_{abc} T^{bac} - T_a T^a';
const json: DerivedJson = derived({
  lagrangian: `a0/2 R + b/24 R^2 + a1/2 (${SCALAR})`,
  constants: ['a0', 'a1', 'b'],
  matter: ['dust', 'radiation', '{ vacuum: Lambda }'],
});

/** A point of the published system: free H, Φ, R, k, a and fluids; dust chosen by the constraint, rates by the equations. */
function published(seed: number, constantBranch: boolean): Point {
  const random = new Random(seed);
  const base = random.point('flrw', ['M', 'a0', 'a1', 'b', 'rho_radiation', 'Lambda', 'H', 'Phi', 'R', 'aNow']);
  const c: Record<string, Q> = { ...base.constants };
  const value = (text: string, extra: Readonly<Record<string, Q>> = {}): Q =>
    atPoint(text, { k: base.k, fields: {}, constants: { ...c, ...extra } });
  if (constantBranch) c.R = value('-6*(a0 + a1)/b');
  c.rho = value('b/18*(R + 6*(a0 + a1)/b)*(3*H - Phi)^2 - b/24*R^2 - 3*a1*H^2 + 3*k/aNow^2*(a0 + b*R/6)');
  c.rho_dust = value('aNow^3*(rho - rho_radiation/aNow^4 - Lambda)');
  c.trace = value('3*(rho_radiation/(3*aNow^4) - Lambda) - rho');
  c.Hdot = value('((a0 + a1)*R + trace)/(6*a1) - 2*H^2 - k/aNow^2');
  c.Phidot = value('(a0*R + trace)/(2*a1) - 3*H*Phi + Phi^2/3');
  c.Rdot = value('-2/3*(R + 6*(a0 + a1)/b)*Phi');
  // φ = H − Φ/3; φ̈ from the rate of R = 6(φ̇ + Hφ + k/a² + φ²).
  c.phi = value('H - Phi/3');
  c.phidot = value('Hdot - Phidot/3');
  c.phiddot = value('Rdot/6 - Hdot*phi - H*phidot + 2*k*H/aNow^2 - 2*phi*phidot');
  const still = [E.ZERO, E.ZERO, E.ZERO];
  return {
    k: base.k,
    constants: c,
    fields: {
      N: [E.ONE, E.ZERO, E.ZERO],
      a: [c.aNow!, value('aNow*H'), value('aNow*(Hdot + H^2)')],
      phi: [c.phi, c.phidot, c.phiddot],
      psi: still,
    },
  };
}

describe('scalar-mode quadratic cosmology — Phys. Rev. D 78 (2008) 023522, arXiv:0908.3323 (memory)', () => {
  it('R along the published rates is the curvature scalar', () => {
    for (let run = 0; run < runs(3); run++) {
      const point = published(firstSeed(700) + run, false);
      const [phi, phidot] = point.fields.phi as [Q, Q];
      const c = point.constants;
      const a2 = E.pow(c.aNow!, 2);
      const R = E.mul(E.q(6), E.sum(phidot, E.mul(c.H!, phi), E.div(point.k, a2), E.mul(phi, phi)));
      expect(E.show(R)).toBe(E.show(c.R!));
    }
  });

  it('the published system solves the derived equations, for every k', () => {
    for (let run = 0; run < runs(6); run++) {
      const point = published(firstSeed(710) + run, false);
      expect(shown(equationsAt(json, point))).toEqual({ N: '0', a: '0', phi: '0', psi: '0' });
    }
  });

  it('and nothing else does: each rate is fixed by them', () => {
    for (let run = 0; run < runs(4); run++) {
      const point = published(firstSeed(720) + run, false);
      // Rows E_a, E_φ against the unknown rates ä, φ̈; E_N against the density.
      const shifted = (field: string, order: number): Record<string, Q> => {
        const jet = [...point.fields[field]!];
        jet[order] = E.add(jet[order]!, E.ONE);
        return equationsAt(json, { ...point, fields: { ...point.fields, [field]: jet } });
      };
      expect(E.isZero(shifted('phi', 2).phi!)).toBe(false);
      expect(E.isZero(shifted('a', 2).phi!) && E.isZero(shifted('a', 2).a!)).toBe(false);
      const heavier = { ...point.constants, rho_dust: E.add(point.constants.rho_dust!, E.ONE) };
      expect(E.isZero(equationsAt(json, { ...point, constants: heavier }).N!)).toBe(false);
    }
  });

  it('branch R = −6μ/b: −3a1(H² + k/a²) = ρ + 3μ²/(2b)', () => {
    for (let run = 0; run < runs(4); run++) {
      const point = published(firstSeed(730) + run, true);
      expect(shown(equationsAt(json, point))).toEqual({ N: '0', a: '0', phi: '0', psi: '0' });
      const { constants } = point;
      const at = (text: string): string => E.show(atPoint(text, { ...point, fields: {}, constants }));
      expect(at('-3*a1*(H^2 + k/aNow^2)')).toBe(at('rho + 3*(a0 + a1)^2/(2*b)'));
    }
  });
});
