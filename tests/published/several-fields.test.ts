/**
 * Published background equations of scalar-tensor theories, fed with the bi-scalar functions of a torsion theory, against
 * the Euler–Lagrange expressions of that torsion theory itself, flat space, N = 1.
 */
import { describe, expect, it } from 'vitest';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import { fieldJets, type Point } from '../oracle/geometry.js';
import { along, atPoint } from '../oracle/infix.js';
import { Jet } from '../oracle/jet.js';
import { derived, equationsAt } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const NAMES = ['c0', 'a1', 'a4', 'a5', 'a6', 'b1', 'b2', 'b3', 'd1', 'd2', 'd4'];
const json = derived({
  lagrangian: `c0 R + a1 R^2 + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} + a6 R_{abcd} R^{cdab}
    + b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a
    + d1 \\epsilon^{abcd} R_{abcd} + d2 \\epsilon^{abcd} R_{abef} R_{cd}{}^{ef} + d4 T_a A^a`,
  constants: NAMES,
  matter: ['dust', 'radiation'],
});
if (json.scalarTensor.form === 'none') throw new Error(json.scalarTensor.reason);
const form = json.scalarTensor;

const SYMBOLS = ['M', 'rho_dust', 'rho_radiation', ...NAMES];

/** k = 0 and N = 1; ψ = 0 with the odd couplings off when only φ shall move. */
function flatPoint(seed: number, oneField: boolean): Point {
  const point = new Random(seed).point('flrw', SYMBOLS);
  const zero = point.fields.psi!.map(() => E.ZERO);
  return {
    k: E.ZERO,
    constants: oneField ? { ...point.constants, d1: E.ZERO, d2: E.ZERO, d4: E.ZERO } : point.constants,
    fields: { ...point.fields, N: [E.ONE, E.ZERO, E.ZERO], ...(oneField ? { psi: zero } : {}) },
  };
}

function cosmology(point: Point): { a: Q; H: Q; Hdot: Q; rho: Q; p: Q } {
  const [a, velocity, acceleration] = point.fields.a as [Q, Q, Q];
  const H = E.div(velocity, a);
  const { rho_dust, rho_radiation } = point.constants as { rho_dust: Q; rho_radiation: Q };
  const radiation = E.div(rho_radiation, E.pow(a, 4));
  return {
    a,
    H,
    Hdot: E.sub(E.div(acceleration, a), E.mul(H, H)),
    rho: E.add(E.div(rho_dust, E.pow(a, 3)), radiation),
    p: E.div(radiation, E.q(3)),
  };
}

const n = (x: number, ...factors: readonly Q[]): Q => E.product(E.q(x), ...factors);

describe('several scalar fields, L = ½F(φ)R° + K(φ, φ̇) (memory)', () => {
  it('3FH² + 3HḞ = φ̇ K_φ̇ − K + ρ and F(2Ḣ + 3H²) + F̈ + 2HḞ = −K − p', () => {
    for (let run = 0; run < runs(5); run++) {
      const point = flatPoint(firstSeed(1000) + run, false);
      const { a, H, Hdot, rho, p } = cosmology(point);
      const algebra = { kSquared: E.ZERO };
      const curve = along(form.G4, fieldJets(point, algebra, -1), point.constants, algebra);
      const [F, Fdot, Fddot] = [0, 1, 2].map((m) => n(2, curve.rationalAt(m))) as [Q, Q, Q];
      const at = (text: string): Q => atPoint(text, point);
      const speed = { phi: point.fields.phi![1]!, psi: point.fields.psi![1]! };
      let second = E.ZERO;
      for (const [pair, text] of Object.entries(form.kinetic)) {
        const [first, other] = pair.split(',') as ['phi' | 'psi', 'phi' | 'psi'];
        second = E.add(second, E.div(E.product(at(text), speed[first], speed[other]), E.q(2)));
      }
      const linear = E.add(E.mul(at(form.current.phi!), speed.phi), E.mul(at(form.current.psi!), speed.psi));
      const V = at(form.potential);
      const K = E.sub(E.add(second, linear), V);
      const energy = E.add(second, V);
      const constraint = E.sub(E.add(n(3, F, H, H), n(3, H, Fdot)), E.add(energy, rho));
      const bending = E.sum(E.mul(F, E.add(n(2, Hdot), n(3, H, H))), Fddot, n(2, H, Fdot), K, p);
      const equations = equationsAt(json, point);
      expect(E.show(equations.N!)).toBe(E.show(E.mul(E.pow(a, 3), constraint)));
      expect(E.show(equations.a!)).toBe(E.show(n(3, E.pow(a, 2), bending)));
    }
  });
});

describe('G2(φ, X) + G4(φ) R — Prog. Theor. Phys. 126 (2011) 511, arXiv:1105.5723 (memory)', () => {
  it('E_N = −a³(E2 + E4 + ρ) and E_a = 3a²(P2 + P4 + p), with the current as J√(2X) in G2', () => {
    for (let run = 0; run < runs(5); run++) {
      const point = flatPoint(firstSeed(1020) + run, true);
      const { a, H, Hdot, rho, p } = cosmology(point);
      const [phi, speed, acceleration] = point.fields.phi as [Q, Q, Q];
      const X = E.div(E.mul(speed, speed), E.q(2));
      const algebra = { kSquared: E.ZERO };
      const line = {
        phi: Jet.taylor(algebra, [phi, E.ONE, E.ZERO]),
        psi: Jet.taylor(algebra, [E.ZERO, E.ZERO, E.ZERO]),
      };
      const G4 = along(form.G4, line, point.constants, algebra);
      const [g, g1, g2] = [0, 1, 2].map((m) => G4.rationalAt(m)) as [Q, Q, Q];
      const at = (text: string): Q => atPoint(text, point);
      const kinetic = at(form.kinetic['phi,phi']!);
      const V = at(form.potential);
      // G2 = cX + J√(2X) − V: the root drops out of 2X G2_X − G2.
      const E2 = E.add(E.mul(kinetic, X), V);
      const P2 = E.sub(E.add(E.mul(kinetic, X), E.mul(at(form.current.phi!), speed)), V);
      const E4 = E.add(n(-6, H, H, g), n(-6, H, speed, g1));
      const P4 = E.sum(
        n(2, E.add(n(3, H, H), n(2, Hdot)), g),
        n(2, E.add(acceleration, n(2, H, speed)), g1),
        n(4, X, g2),
      );
      const equations = equationsAt(json, point);
      expect(E.show(equations.N!)).toBe(E.show(n(-1, E.pow(a, 3), E.sum(E2, E4, rho))));
      expect(E.show(equations.a!)).toBe(E.show(n(3, E.pow(a, 2), E.sum(P2, P4, p))));
    }
  });
});
