/**
 * Densities that are total derivatives in Riemann–Cartan space: every Euler–Lagrange expression vanishes identically.
 */
import { describe, expect, it } from 'vitest';
import * as E from '../oracle/exact.js';
import { fieldJets, type GeometryName } from '../oracle/geometry.js';
import { atPoint } from '../oracle/infix.js';
import { derived } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const GAUSS_BONNET = 'R^2 - 4 R_{ab} R^{ba} + R_{abcd} R^{cdab}';
const NIEH_YAN = '1/2 \\epsilon^{abcd} R_{abcd} - 1/4 \\epsilon^{abcd} T_{eab} T^e{}_{cd}';

const TOTAL: readonly (readonly [name: string, source: string, text: string])[] = [
  ['Gauss–Bonnet', 'J. Math. Phys. 21 (1980) 1439 (memory)', GAUSS_BONNET],
  ['Gauss–Bonnet from two ε', 'the same (memory)', '\\epsilon^{abcd} \\epsilon^{efgh} R_{abef} R_{cdgh}'],
  ['Pontryagin', 'J. Math. Phys. 21 (1980) 1439 (memory)', '\\epsilon^{abcd} R_{efab} R^{ef}{}_{cd}'],
  ['Nieh–Yan', 'J. Math. Phys. 23 (1982) 373 (identity seen)', NIEH_YAN],
];

/** Look-alikes that are none. */
const NOT_TOTAL: readonly (readonly [text: string, on: GeometryName])[] = [
  ['R^2 - 4 R_{ab} R^{ba} + R_{abcd} R^{abcd}', 'flrw'],
  ['\\epsilon^{abcd} R_{abef} R_{cd}{}^{ef}', 'flrw'],
  ['\\epsilon^{abcd} R_{abcd}', 'bianchi-i'],
];

describe('topological densities', () => {
  for (const [name, source, text] of TOTAL)
    for (const geometry of ['flrw', 'bianchi-i'] as const)
      for (const signature of ['-+++', '+---'] as const)
        it(`${name} on ${geometry}, ${signature} — ${source}`, () => {
          // In Nieh–Yan both terms have an odd number of metrics, in the others an even one: no relative sign flips.
          const json = derived({ lagrangian: `c1 (${text})`, constants: ['c1'], geometry, signature });
          expect(new Set(Object.values(json.equations))).toEqual(new Set(['0']));
          expect(json.lagrangian).not.toBe('0');
        });

  for (const [text, geometry] of NOT_TOTAL)
    it(`${text} is not one on ${geometry} (computed)`, () => {
      const json = derived({ lagrangian: `c1 (${text})`, constants: ['c1'], geometry });
      expect(new Set(Object.values(json.equations))).not.toEqual(new Set(['0']));
    });

  it('Nieh–Yan density is 6(v̇ + 3Hv) per volume — J. Math. Phys. 23 (1982) 373 (value computed)', () => {
    const json = derived({ lagrangian: NIEH_YAN });
    for (let run = 0; run < runs(3); run++) {
      const point = new Random(firstSeed(400) + run).point('flrw', ['M']);
      const { N, a, psi } = fieldJets(point, { kSquared: point.k }, -1);
      const boundary = psi!.times(a!.power(3)).scaled(E.q(6)).rate();
      expect(N!.length).toBeGreaterThan(1);
      expect(E.show(atPoint(json.lagrangian, point))).toBe(E.show(boundary.rationalAt(0)));
    }
  });

  it('Gauss–Bonnet density is 24 d/dt(k h + h³/3 − h f²), h = aφ, f = aψ (computed)', () => {
    const json = derived({ lagrangian: GAUSS_BONNET });
    for (let run = 0; run < runs(3); run++) {
      const point = new Random(firstSeed(410) + run).point('flrw', ['M']);
      const { a, phi, psi } = fieldJets(point, { kSquared: point.k }, -1);
      const [h, f] = [a!.times(phi!), a!.times(psi!)];
      const primitive = h
        .scaled(point.k)
        .plus(h.power(3).scaled(E.q(1, 3)))
        .minus(h.times(f).times(f));
      expect(E.show(atPoint(json.lagrangian, point))).toBe(E.show(primitive.rate().scaled(E.q(24)).rationalAt(0)));
    }
  });
});
