/**
 * The general even-parity quadratic theory: what its background sees (P, S, W, t_u, t_v, c0), its scalar-tensor form, its
 * curvature obstruction and k-screening. Values: computed; counting of invariants as in CQG 28 (2011) 215017,
 * arXiv:1105.3504 (memory).
 */
import { describe, expect, it } from 'vitest';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import type { Point } from '../oracle/geometry.js';
import { along, atPoint } from '../oracle/infix.js';
import { derived, equationsAt, shown } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { eulerLagrange } from '../oracle/variation.js';

const EVEN = `c0 R
  + a1 R^2 + a2 R_{ab} R^{ab} + a3 R_{ab} R^{ba}
  + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} + a6 R_{abcd} R^{cdab}
  + b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a`;
const NAMES = ['c0', 'a1', 'a2', 'a3', 'a4', 'a5', 'a6', 'b1', 'b2', 'b3'];

/** Background couplings from the table of contractions, A1 A4 − A2 A3 being a total derivative. */
function background(c: Readonly<Record<string, Q>>): Record<'c0' | 'P' | 'S' | 'W' | 'tu' | 'tv', Q> {
  const combine = (...parts: readonly (readonly [number, string])[]): Q =>
    E.sum(...parts.map(([n, name]) => E.mul(E.q(n), c[name]!)));
  return {
    c0: c.c0!,
    P: combine([36, 'a1'], [12, 'a2'], [12, 'a3'], [12, 'a4'], [6, 'a5'], [12, 'a6']),
    S: combine([-12, 'a4'], [6, 'a5']),
    W: combine([72, 'a1'], [12, 'a2'], [12, 'a3'], [12, 'a5'], [-24, 'a6']),
    tu: combine([-6, 'b1'], [-3, 'b2'], [-9, 'b3']),
    tv: combine([24, 'b1'], [-24, 'b2']),
  };
}

const H = '(D(a,1)/(a*N))';
const A1 = `(D(phi,1)/N + ${H}*phi)`;
const A3 = `(D(psi,1)/N + ${H}*psi)`;
const A2 = '(2*phi*psi)';
const A4 = '(k/a^2 + phi^2 - psi^2)';
const REDUCED = `a^3*N*(6*c0*(${A1} + ${A4}) + P*(${A1}^2 + ${A4}^2) + S*(${A2}^2 + ${A3}^2) + W*${A2}*${A3}
  + tu*(${H} - phi)^2 + tv*psi^2)`.replace(/\s+/g, ' ');

function points(seed: number, count: number, names: readonly string[] = NAMES): Point[] {
  return Array.from({ length: runs(count) }, (_, i) => new Random(firstSeed(seed) + i).point('flrw', ['M', ...names]));
}

describe('even quadratic theory on FLRW (computed)', () => {
  const json = derived({ lagrangian: EVEN, constants: NAMES });

  it('reduces to 6c0(A1 + A4) + P(A1² + A4²) + S(A2² + A3²) + W A2 A3 + t_u u² + t_v v² for every k', () => {
    for (const point of points(600, 5)) {
      const couplings = background(point.constants);
      const expected = eulerLagrange(point, 1, (fields, algebra) => along(REDUCED, fields, couplings, algebra));
      expect(shown(equationsAt(json, point))).toEqual(shown(expected.equations));
    }
  });

  it('has the stated scalar-tensor functions and curvature obstruction', () => {
    const form = json.scalarTensor;
    if (form.form === 'none') throw new Error(form.reason);
    const formulas: Readonly<Record<string, readonly [text: string, value: string]>> = {
      G4: [form.G4, '-(P*phi^2 + S*psi^2 + tu)/6'],
      'X^φφ': [form.kinetic['phi,phi']!, '2*P'],
      'X^φψ': [form.kinetic['phi,psi']!, '0'],
      'X^ψψ': [form.kinetic['psi,psi']!, '2*S'],
      // −⅔ W ψ³ ∂(φ/ψ) = −⅔ W (ψ² ∂φ − φψ ∂ψ)
      J_φ: [form.current.phi!, '2/3*tu + 4*c0 - 2/3*W*psi^2'],
      J_ψ: [form.current.psi!, '2/3*W*phi*psi'],
      V: [form.potential, '-(6*c0*(phi^2 - psi^2) + P*(phi^2 - psi^2)^2 + 4*S*phi^2*psi^2 + tu*phi^2 + tv*psi^2)'],
      obstruction: [form.curvatureObstruction, 'k/a^2*(3*P*phi^2 + (S - 2*P)*psi^2 + 6*c0 + tu) + P*k^2/a^4'],
    };
    for (const point of points(620, 4)) {
      const closed = { ...point, constants: background(point.constants) };
      for (const [name, [text, value]] of Object.entries(formulas))
        expect(E.show(atPoint(text, point)), name).toBe(E.show(atPoint(value, closed)));
    }
    expect(form.validFor).toBe('k = 0');
  });

  it('k drops out of the equations when P = 0 and c0 = 0, and only then', () => {
    const P = 'a6 = -3 a1 - a2 - a3 - a4 - 1/2 a5';
    const screened = derived({ lagrangian: EVEN, constants: NAMES, impose: ['c0 = 0', P] });
    for (const text of Object.values(screened.equations)) expect(text).not.toMatch(/\bk\b/);
    for (const relation of ['c0 = 0', P]) {
      const not = derived({ lagrangian: EVEN, constants: NAMES, impose: [relation] });
      expect(Object.values(not.equations).join(' ')).toMatch(/\bk\b/);
    }
  });
});

describe('parity-odd quadratic theory on FLRW (computed)', () => {
  const names = ['d1', 'd2', 'd3', 'd4', 'd5'];
  const json = derived({
    lagrangian: `d1 \\epsilon^{abcd} R_{abcd} + d2 \\epsilon^{abcd} R_{abef} R_{cd}{}^{ef}
      + d3 \\epsilon^{abcd} R_{efab} R^{ef}{}_{cd} + d4 T_a A^a + d5 \\epsilon^{abcd} T_{eab} T^e{}_{cd}`,
    constants: names,
  });

  it('has the values of the table and no trace of the Pontryagin density in its equations', () => {
    const text = `a^3*N*(12*d1*(${A2} + ${A3}) + 48*d2*(${A1}*${A3} + ${A2}*${A4}) - (36*d4 + 48*d5)*(${H} - phi)*psi)`;
    for (const point of points(640, 4, names)) {
      const expected = eulerLagrange(point, 1, (fields, algebra) => along(text, fields, point.constants, algebra));
      expect(shown(equationsAt(json, point))).toEqual(shown(expected.equations));
    }
    for (const text of Object.values(json.equations)) expect(text).not.toMatch(/\bd3\b/);
  });

  it('k drops out when the coefficient of A1 A3 + A2 A4 vanishes', () => {
    for (const text of Object.values(json.equations)) expect(text).not.toMatch(/(^|[+-] )[^+-]*\bk\b[^+-]*d[1345]/);
    expect(Object.values(json.equations).join(' ')).toMatch(/\bk\b/);
  });

  it('adds φ̇ψ̇ to the kinetic terms and φψ to G4', () => {
    const form = json.scalarTensor;
    if (form.form === 'none') throw new Error(form.reason);
    for (const point of points(660, 3, names)) {
      const at = (text: string): string => E.show(atPoint(text, point));
      // 48 d2 A1 A3 ∋ 48 d2 (φ̇ψ̇ + H² φψ + …)
      expect(at(form.kinetic['phi,psi']!)).toBe(at('96*d2'));
      expect(at(form.G4)).toBe(at('-8*d2*phi*psi'));
    }
  });
});
