import { describe, expect, it } from 'vitest';
import { deriveClassB } from '../src/class-b.js';
import { derive } from '../src/derive.js';
import { derivationObject } from '../src/emit/json.js';
import { InputError } from '../src/notation/diagnostics.js';
import { readTheory } from '../src/notation/read-theory.js';
import * as E from './oracle/exact.js';
import { q } from './oracle/exact.js';
import { atPoint } from './oracle/infix.js';

const text = `untwist: 1
name: Open shelf
constants: [c]
scales: { M: mass }
lagrangian: 1/2 M^2 R + c R_{ab} R^{ba}
impose: ["c = 0"]
geometry: bianchi-v
matter: [dust]
`;
const theory = (source: string) => readTheory(source, 'open-shelf.yaml');

describe('geometries with a trace in their structure constants', () => {
  it('are refused where a reduced Lagrangian would be varied', () => {
    let error: unknown;
    try {
      derive(theory(text));
    } catch (e) {
      error = e;
    }
    expect(error).toBeInstanceOf(InputError);
    expect((error as InputError).diagnostics[0]).toMatchObject({
      code: 'geometry-class-b',
      message: 'the structure constants of the geometry bianchi-v have a non-zero trace',
    });
  });

  const json = derivationObject(deriveClassB(theory(text), false)) as {
    equations: Record<string, string>;
    constraints: Record<string, string>;
    checks: { holds: boolean }[];
  };
  const constants = { M: q(1), rho_dust: q(0) };
  /** Jets of t^p at t, four orders. */
  const powerLaw = (t: E.Q, p: number): E.Q[] => {
    let factor = q(1);
    return [0, 1, 2, 3].map((n) => {
      const value = E.mul(factor, E.pow(t, p - n));
      factor = E.mul(factor, q(p - n));
      return value;
    });
  };

  it('give the open vacuum universe a = t in Einstein–Cartan theory (Milne; any textbook)', () => {
    const t = q(7, 3);
    const a = powerLaw(t, 1);
    const rate = powerLaw(t, -1);
    const fields = { N: [q(1), q(0), q(0), q(0)], a_x: a, a_y: a, a_z: a };
    const connection = { phi_x: rate, phi_y: rate, phi_z: rate, chi_y: rate, chi_z: rate };
    const point = { k: q(0), fields: { ...fields, ...connection }, constants };
    for (const [name, expression] of [...Object.entries(json.equations), ...Object.entries(json.constraints)])
      expect(E.show(atPoint(expression, point)), name).toBe('0');
  });

  it('demand H_y + H_z = 2 H_x of the scale factors, which no field of the ansatz gives (Bianchi V; any textbook)', () => {
    const t = q(5, 2);
    const fields: Record<string, E.Q[]> = { N: [q(1), q(0), q(0), q(0)] };
    const powers = { x: 1, y: 3, z: 2 };
    for (const [axis, p] of Object.entries(powers)) {
      fields[`a_${axis}`] = powerLaw(t, p);
      fields[`phi_${axis}`] = powerLaw(t, -1).map((v) => E.mul(q(p), v));
    }
    // No torsion: χ = 1/a_x.
    fields.chi_y = powerLaw(t, -1);
    fields.chi_z = powerLaw(t, -1);
    const value = atPoint(json.constraints.E_10!, { k: q(0), fields, constants });
    // −M²(2 H_x − H_y − H_z)/a_x up to the sign of the first index.
    expect(E.show(value)).toBe(E.show(E.div(q(powers.y + powers.z - 2 * powers.x), E.mul(t, t))));
  });

  it('carry the checks of the covariant equations', () => {
    expect(json.checks.length).toBeGreaterThan(3);
    expect(json.checks.every((c) => c.holds)).toBe(true);
  });
});
