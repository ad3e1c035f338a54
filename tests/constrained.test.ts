import { describe, expect, it } from 'vitest';
import { infix } from '../src/algebra/infix.js';
import { isCanonical } from '../src/algebra/poly.js';
import type { Constrained, Derivation } from '../src/derivation.js';
import { derive } from '../src/derive.js';
import { readTheory } from '../src/notation/read-theory.js';
import { errorText } from './notation/rendered.js';
import { theoryText, type Wanted } from './oracle/pipeline.js';
import { firstSeed, Random, runs } from './oracle/random.js';

const TELEPARALLEL = '-1/2 M^2 (1/4 T_{abc} T^{abc} + 1/2 T_{abc} T^{bac} - T_a T^a)';
function of(wanted: Wanted, extra = ''): Derivation & { readonly constrained: Constrained } {
  return derive(readTheory(theoryText(wanted) + extra, 'narrows.yaml')) as never;
}
const form = (d: Derivation): string =>
  d.scalarTensor.form === 'none' ? d.scalarTensor.reason : `${d.scalarTensor.validFor}: ${infix(d.scalarTensor.g4)}`;

describe('constrained theories', () => {
  it('have the multipliers as fields with the constraints as their equations', () => {
    const d = of({ lagrangian: 'R', constrain: ['T^a_{bc}'] });
    expect(d.fields.map((f) => f.name)).toEqual(['N', 'a', 'phi', 'psi', 'lambda_1', 'lambda_2']);
    expect(infix(d.equations.get('lambda_2')!)).toBe('N*a^3*psi');
    expect(d.checks.every((c) => c.holds)).toBe(true);
    expect(d.checks.map((c) => c.name)).toContain('equations of a branch');
  });

  it('a value of k that is imposed leaves its branch alone', () => {
    const d = of({ lagrangian: TELEPARALLEL, constrain: ['R^a_{bcd}'], impose: ['k = 0'] });
    expect(d.constrained.branches.map((b) => b.name)).toEqual(['phi = psi = 0']);
    const [branch] = d.constrained.branches;
    expect([infix(branch!.friedmann!.rhoT), infix(branch!.friedmann!.pT)]).toEqual(['0', '0']);
    expect(form(d)).toBe('every k: M^2/2');
  });

  it('assumptions rule branches out', () => {
    const d = of({ lagrangian: TELEPARALLEL, constrain: ['R^a_{bcd}'] }, 'assume: ["k > 0"]\n');
    expect(d.constrained.branches.map((b) => [b.name, b.used])).toEqual([['phi = 0, psi = sqrt(k)/a', ['k > 0']]]);
    expect(d.constrained.excluded.map((b) => b.name)).toEqual([
      'phi = psi = 0 (k = 0)',
      'psi = 0, phi = sqrt(-k)/a (k < 0)',
    ]);
    expect(form(d)).toBe('every k: M^2/2');
  });

  it('say what stays: unsolved constraints keep their multipliers', () => {
    const d = of({ lagrangian: '1/2 M^2 R', constrain: ['R'] });
    const [branch] = d.constrained.branches;
    expect([branch!.name, branch!.remaining]).toEqual(['no field is fixed', [0]]);
    expect([...branch!.equations.keys()]).toEqual(['N', 'a', 'phi', 'psi', 'lambda_1']);
    expect(form(d)).toContain('lambda_1');
  });

  it('without a solution there is no branch and no form', () => {
    const d = of({ lagrangian: '1/2 M^2 R', constrain: ['A_a A^a + c1'], constants: ['c1'], impose: ['c1 = -1'] });
    expect(d.constrained.branches).toEqual([]);
    expect(form(d)).toBe('the constraints have no solution');
  });

  it('a scalar that is left makes a form of its own', () => {
    const d = of({ lagrangian: '1/2 M^2 R + c1 R_{ab} R^{ab}', constants: ['c1'], constrain: ['R_{ab}', 'A_a'] });
    expect(d.constrained.branches.map((b) => b.name)).toEqual([
      'psi = 0, phi = sqrt(-k)/a (k < 0)',
      'psi = phi = 0 (k = 0)',
    ]);
    const trace = of({ lagrangian: '1/2 M^2 R', constrain: ['T_a'] });
    expect(form(trace)).toBe('every k: M^2/2');
    expect(trace.scalarTensor.form !== 'none' && infix(trace.scalarTensor.potential)).toBe('3*M^2*psi^2');
  });

  it('a double constraint fixes the field and not the multiplier, and further equations are conditions', () => {
    const d = of({ lagrangian: '1/2 M^2 R + c1 T_a A^a', constants: ['c1'], constrain: ['T_a T^a'] });
    const [branch] = d.constrained.branches;
    expect([branch!.name, branch!.undetermined]).toEqual(['phi = D(a,1)/(N*a)', ['lambda_1']]);
    expect([...branch!.further].map(([q, p]) => [q, infix(p)])).toEqual([['phi', '36*c1*N*a^3*psi']]);
  });

  it('on Bianchi I torsion constrained to vanish gives the metric Lagrangian', () => {
    const d = of({ lagrangian: '1/2 M^2 R', constrain: ['T^a_{bc}'], geometry: 'bianchi-i' });
    const [branch, ...more] = d.constrained.branches;
    expect(more).toEqual([]);
    expect(infix(branch!.reduced)).toBe(
      '-M^2*a_z*D(a_x,1)*D(a_y,1)/N - M^2*a_y*D(a_x,1)*D(a_z,1)/N - M^2*a_x*D(a_y,1)*D(a_z,1)/N',
    );
  });

  it('refuse names of their multipliers, too many free indices, and covariant equations', async () => {
    expect(errorText(() => of({ lagrangian: 'lambda_1 R', constants: ['lambda_1'], constrain: ['R'] }))).toContain(
      'lambda_1 is multiplier of R',
    );
    const many = 'R_{abcd} T_{efg}';
    expect(errorText(() => of({ lagrangian: 'R', constrain: [many] }))).toContain('7 free indices; at most 6');
    const { withCovariant } = await import('../src/covariant.js');
    expect(errorText(() => withCovariant(of({ lagrangian: 'R', constrain: ['T_a'] }), false))).toContain(
      'without multipliers and spin',
    );
  });

  it('random theories with random constraints pass every exact check', () => {
    const TERMS = [
      'R',
      'c1 R^2',
      'c1 R_{ab} R^{ba}',
      'T_a T^a',
      'c1 T_{abc} T^{abc}',
      'A_a A^a',
      '\\epsilon^{abcd} R_{abcd}',
      'c1 T_a A^a',
      'R T_a T^a',
    ];
    const CONSTRAINTS = [
      'T_a',
      'A_a',
      'T^a_{bc}',
      'R_{ab}',
      'R^a_{bcd}',
      'R_{ab} - T_a T_b',
      'R_{abcd} - R_{cdab}',
      'T_a + A_a',
      'R - 6 T_a T^a',
      'R_{ab} T^b',
    ];
    for (let run = 0; run < runs(16); run++) {
      const seed = firstSeed(850) + run;
      const random = new Random(seed);
      const lagrangian = random
        .shuffled(TERMS)
        .slice(0, 1 + random.below(3))
        .join(' + ');
      const constrain = random.shuffled(CONSTRAINTS).slice(0, 1 + random.below(2));
      const geometry = random.pick(['flrw', 'flrw', 'flrw', 'bianchi-i'] as const);
      const wanted = { lagrangian, constants: ['c1'], constrain, geometry, matter: ['dust'] };
      const about = `seed ${seed}\n${theoryText(wanted)}`;
      const d = of(wanted);
      expect(
        d.checks.every((c) => c.holds),
        about,
      ).toBe(true);
      for (const b of d.constrained.branches) {
        for (const p of [b.lagrangian, b.reduced, ...b.equations.values(), ...b.solution.values()])
          expect(isCanonical(p), about).toBe(true);
      }
    }
  });
});
