import { describe, expect, it } from 'vitest';
import { isCanonicalFraction } from '../src/algebra/fraction.js';
import { infix } from '../src/algebra/infix.js';
import type { Derivation, SpinElimination, SpinResult } from '../src/derivation.js';
import { derive } from '../src/derive.js';
import { fractionText } from '../src/emit/constrained-json.js';
import { readTheory } from '../src/notation/read-theory.js';
import { errorText } from './notation/rendered.js';
import { theoryText, type Wanted } from './oracle/pipeline.js';
import { firstSeed, Random, runs } from './oracle/random.js';

const S = 'S: { indices: 3, symmetry: "S_{abc} = -S_{acb}", dimension: mass^3 }';
const of = (wanted: Wanted): Derivation & { readonly spin: SpinResult } =>
  derive(readTheory(theoryText(wanted), 'swell.yaml')) as never;
const solution = (d: Derivation): Record<string, string> => {
  const elimination = d.spin!.elimination as SpinElimination;
  for (const f of [...elimination.solution.values(), elimination.rho]) expect(isCanonicalFraction(f)).toBe(true);
  return Object.fromEntries(
    [...elimination.solution, ['rho', elimination.rho] as const].map(([q, f]) => [q, fractionText(f)]),
  );
};

describe('spinInteraction', () => {
  it('an axial density adds qσψ: N q sigma psi per unit coordinate volume, in both signatures', () => {
    for (const [signature, lagrangian] of [
      ['-+++', 'M^2 R'],
      ['+---', '-M^2 R'],
    ] as const) {
      const d = of({ lagrangian, signature, constants: ['q'], matter: ['{ spin: sigma, axial: q }'] });
      expect(infix(d.spin.interaction)).toBe('q*sigma*N*psi');
    }
  });

  it('the mean of the three axes on Bianchi I', () => {
    const d = of({ lagrangian: 'M^2 R', geometry: 'bianchi-i', matter: ['{ spin: sigma, axial: 3 }'] });
    expect(infix(d.spin.interaction)).toBe('sigma*N*psi_x + sigma*N*psi_y + sigma*N*psi_z');
  });

  it('a spin tensor has two of 24 components on an isotropic geometry', () => {
    const d = of({ lagrangian: '1/2 M^2 R', tensors: [S], matter: ['{ spin: S, coupling: "S_{abc} T^{abc}" }'] });
    expect(d.spin.tensors.map((t) => [t.components.length, t.independent])).toEqual([[2, 24]]);
    expect(infix(d.spin.interaction)).toBe('6*S_1*N*phi + 12*S_2*N*psi - 6*S_1*D(a,1)/a');
    expect(solution(d)).toEqual({
      phi: '-S_1/(M^2*a^3) + D(a,1)/(N*a)',
      psi: '2*S_2/(M^2*a^3)',
      rho: '3*S_1^2/(M^2*a^6) - 12*S_2^2/(M^2*a^6)',
    });
    expect(d.theory.symbols.filter((s) => s.role === 'spin').map((s) => s.latex)).toEqual(['S_{1}', 'S_{2}']);
  });

  it('traces of the tensor, other contractions and constants in front', () => {
    const matter = ['{ spin: S, coupling: "c S^b{}_{ab} T^a + S_{abc} T^{bac}" }'];
    const d = of({ lagrangian: 'M^2 R', constants: ['c'], tensors: [S], matter });
    // S^b_ab = 3 S_1 along time, T_0 = 3u; S_abc T^bac has half of S_abc T^abc for the vector part, −1 for the axial one.
    expect(infix(d.spin.interaction)).toBe(
      '9*c*S_1*N*phi + 3*S_1*N*phi - 12*S_2*N*psi - 9*c*S_1*D(a,1)/a - 3*S_1*D(a,1)/a',
    );
  });

  it('a coupling to curvature is varied like the rest', () => {
    const matter = ['{ spin: V, coupling: "V_{abcd} R^{abcd}" }'];
    const d = of({ lagrangian: 'M^2 R', tensors: ['V: { indices: 4 }'], matter });
    expect(d.checks.every((c) => c.holds)).toBe(true);
    expect(d.spin.tensors[0]!.components).toHaveLength(14);
  });

  it('refuses tensors of which the symmetry leaves nothing, and names that are taken', () => {
    const antisymmetric = 'F: { indices: 2, symmetry: "F_{ab} = -F_{ba}" }';
    const nothing = { lagrangian: 'R', tensors: [antisymmetric], matter: ['{ spin: F, coupling: "F_{ab} R^{ab}" }'] };
    expect(errorText(() => of(nothing))).toContain('leaves no component of F');
    const taken = {
      lagrangian: 'S_1 R',
      constants: ['S_1'],
      tensors: [S],
      matter: ['{ spin: S, coupling: "S_{abc} T^{abc}" }'],
    };
    expect(errorText(() => of(taken))).toContain('S_1');
  });
});

describe('spinResult', () => {
  it('says why the connection cannot be eliminated', () => {
    const d = of({ lagrangian: 'M^2 R + R^2', matter: ['{ spin: sigma, axial: 1 }'] });
    expect(d.spin.elimination).toContain('torsion propagates');
    const free = of({ lagrangian: 'T_a T^a M^2', matter: ['{ spin: sigma, axial: 1 }'] });
    expect(free.spin.elimination).toContain('do not determine');
    const quartic = of({ lagrangian: '(A_a A^a)^2 + T_a T^a', matter: ['{ spin: sigma, axial: 1 }'] });
    expect(quartic.spin.elimination).toContain('not linear');
  });

  it('eliminates multipliers with the connection', () => {
    const d = of({ lagrangian: '1/2 M^2 R', constrain: ['T_a'], matter: ['{ spin: sigma, axial: 1 }'] });
    expect(solution(d).psi).toBe('sigma/(6*M^2*a^3)');
    expect(solution(d).rho).toBe('-sigma^2/(12*M^2*a^6)');
  });

  it('passes its checks for random torsion-squared theories: the solution put back, and ρ_T', () => {
    const TERMS = [
      '1/2 M^2 R',
      'M^2 c1 \\epsilon^{abcd} R_{abcd}',
      'M^2 c2 T_a T^a',
      'M^2 T_{abc} T^{bac}',
      '2 M^2 A_a A^a',
      'M^2 c1 T_a A^a',
    ];
    const SOURCES = [
      '{ spin: sigma, axial: c1 }',
      '{ spin: S, coupling: "S_{abc} T^{abc}" }',
      '{ spin: tau, axial: "1/2 c2" }',
    ];
    for (let run = 0; run < runs(12); run++) {
      const seed = firstSeed(870) + run;
      const random = new Random(seed);
      const lagrangian = random
        .shuffled(TERMS)
        .slice(0, 2 + random.below(3))
        .join(' + ');
      const matter = ['dust', ...random.shuffled(SOURCES).slice(0, 1 + random.below(3))];
      const wanted = { lagrangian, constants: ['c1', 'c2'], tensors: [S], matter };
      const d = of(wanted);
      expect(
        d.checks.every((c) => c.holds),
        `seed ${seed}\n${theoryText(wanted)}`,
      ).toBe(true);
      if (typeof d.spin.elimination === 'string') continue;
      expect(d.checks.map((c) => c.name)).toContain('energy density of spin');
    }
  });
});
