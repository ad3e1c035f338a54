/**
 * The special case P = c0 = t_v = 0, W = −4S, t_u = −3μ²: ψ² = −t_u/(4S) constant solves everything, φ obeys
 * 4φ̇ + 4φ² + 4Hφ − 2H² − Ḣ = 0, and 3 M_eff² H² = ρ with M_eff² = ¾ μ² for any matter (computed).
 */
import { describe, expect, it } from 'vitest';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import type { Point } from '../oracle/geometry.js';
import { atPoint } from '../oracle/infix.js';
import { derived, equationsAt, shown } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

// S = −12 a4 and W = 72 a1 − 24 a6 = 48 a4 with P = 36 a1 + 12 a4 + 12 a6 = 0 give a1 = a4/6, a6 = −3 a4/2.
const json = derived({
  lagrangian: `-S/12 (R_{abcd} R^{abcd} + 1/6 R^2 - 3/2 R_{abcd} R^{cdab}) + 1/3 mu^2 T_a T^a`,
  constants: ['S'],
  scales: ['M', 'mu'],
  matter: ['dust', 'radiation', '{ vacuum: Lambda }', '{ fluid: chi, w: "1/5" }'],
});

/** A point on the branch; ψ and μ are chosen, S = 3μ²/(4ψ²) follows; dust from the Friedmann equation. */
function onBranch(seed: number, k: Q | undefined): Point {
  const random = new Random(seed);
  const names = ['M', 'mu', 'psi0', 'phi0', 'H', 'aNow', 'rho_radiation', 'Lambda', 'rho_chi'];
  const base = random.point('flrw', names);
  const c: Record<string, Q> = { ...base.constants };
  const value = (text: string): Q => atPoint(text, { k: base.k, fields: {}, constants: c });
  c.S = value('3*mu^2/(4*psi0^2)');
  c.rho = value('9/4*mu^2*H^2');
  c.rho_dust = value('aNow^3*(rho - rho_radiation/aNow^4 - Lambda - rho_chi)');
  c.p = value('rho_radiation/(3*aNow^4) - Lambda + rho_chi/5');
  // −2M_eff² Ḣ = ρ + p
  c.Hdot = value('-(rho + p)/(2*3/4*mu^2)'.replace('2*3/4', '(3/2)'));
  c.phidot = value('-phi0^2 - H*phi0 + H^2/2 + Hdot/4');
  const still = [E.ZERO, E.ZERO];
  return {
    k: k ?? base.k,
    constants: c,
    fields: {
      N: [E.ONE, ...still],
      a: [c.aNow!, value('aNow*H'), value('aNow*(Hdot + H^2)')],
      // φ̈ does not occur: P = 0.
      phi: [c.phi0!, c.phidot, random.rational()],
      psi: [c.psi0!, ...still],
    },
  };
}

describe('constant pseudoscalar torsion (computed)', () => {
  it('solves all equations with M_eff² = ¾ μ², for any mixture of matter and every k', () => {
    for (let run = 0; run < runs(6); run++) {
      const point = onBranch(firstSeed(800) + run, undefined);
      expect(shown(equationsAt(json, point))).toEqual({ N: '0', a: '0', phi: '0', psi: '0' });
    }
  });

  it('needs the stated equation of φ and the stated ψ', () => {
    for (let run = 0; run < runs(3); run++) {
      const point = onBranch(firstSeed(820) + run, E.ZERO);
      const [phi, phidot, phiddot] = point.fields.phi as [Q, Q, Q];
      const off = { ...point, fields: { ...point.fields, phi: [phi, E.add(phidot, E.ONE), phiddot] } };
      expect(E.isZero(equationsAt(json, off).psi!)).toBe(false);
      const psi = [E.add(point.fields.psi![0]!, E.ONE), E.ZERO, E.ZERO];
      expect(E.isZero(equationsAt(json, { ...point, fields: { ...point.fields, psi } }).phi!)).toBe(false);
    }
  });
});
