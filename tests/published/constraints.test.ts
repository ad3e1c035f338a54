/**
 * Constraints by multipliers: the teleparallel equivalent at every spatial curvature and general relativity from torsion
 * that is constrained to vanish.
 */
import { describe, expect, it } from 'vitest';
import * as E from '../oracle/exact.js';
import { fieldJets, type Point } from '../oracle/geometry.js';
import { atPoint } from '../oracle/infix.js';
import { type BranchJson, derived, equationsAt } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const MATTER = ['dust', 'radiation', '{ vacuum: Lambda }'];
const CONSTANTS = ['M', 'rho_dust', 'rho_radiation', 'Lambda'];
const TELEPARALLEL = '-1/2 M^2 (1/4 T_{abc} T^{abc} + 1/2 T_{abc} T^{bac} - T_a T^a)';

/** a³(3M²(H² + k/a²) − ρ) and 3a²N(M²(2Ḣ + 3H² + k/a²) + p): the equations of general relativity. */
function generalRelativity(point: Point): { readonly N: E.Q; readonly a: E.Q } {
  const { N, a } = fieldJets(point, { kSquared: point.k }, -1);
  const hubble = a!.rate().over(a!.times(N!));
  const c = point.constants;
  const scale = point.fields.a![0]!;
  const dust = E.div(c.rho_dust!, E.pow(scale, 3));
  const radiation = E.div(c.rho_radiation!, E.pow(scale, 4));
  const rho = E.sum(dust, radiation, c.Lambda!);
  const p = E.sub(E.div(radiation, E.q(3)), c.Lambda!);
  const H = hubble.rationalAt(0);
  const Hdot = hubble.rate().over(N!).rationalAt(0);
  const kOverA2 = E.div(point.k, E.pow(scale, 2));
  const M2 = E.pow(c.M!, 2);
  const friedmann = E.sub(E.product(E.q(3), M2, E.add(E.mul(H, H), kOverA2)), rho);
  const tension = E.sum(E.mul(E.q(2), Hdot), E.product(E.q(3), H, H), kOverA2);
  return {
    N: E.mul(E.pow(scale, 3), friedmann),
    a: E.product(E.q(3), E.pow(scale, 2), point.fields.N![0]!, E.add(E.mul(M2, tension), p)),
  };
}

/** A point with k = ±root², or 0, and multipliers that are any functions. */
function pointWith(seed: number, sign: -1 | 0 | 1, multipliers: readonly string[]): Point & { readonly root: E.Q } {
  const random = new Random(seed);
  const point = random.point('flrw', CONSTANTS, 3);
  const root = random.positive();
  const fields: Record<string, readonly E.Q[]> = { ...point.fields };
  for (const name of multipliers) fields[name] = [0, 1, 2, 3].map(() => random.rational());
  return { ...point, root, k: E.product(E.q(sign), root, root), fields } as Point & { readonly root: E.Q };
}

/** The connection of a branch along the curve: s/a with its derivatives, or 0. */
function connectionOn(branch: BranchJson, point: Point & { readonly root: E.Q }): Point {
  const { a } = fieldJets(point, { kSquared: point.k }, -1);
  const overA = a!.inverse().scaled(point.root).derivatives();
  const zero = overA.map(() => E.ZERO);
  const jets = (q: string): readonly E.Q[] => (branch.solution[q] === '0' ? zero : overA);
  return { ...point, fields: { ...point.fields, phi: jets('phi'), psi: jets('psi') } };
}

describe('teleparallel equivalent with R^a_bcd constrained to 0 — arXiv:1511.07586, Phys. Rev. D 19 (1979) 3524 (memory)', () => {
  const json = derived({ lagrangian: TELEPARALLEL, constrain: ['R^a_{bcd}'], matter: MATTER });
  const multipliers = json.multipliers![0]!;
  const names = multipliers.fields.map((f) => f.name);

  it('curvature and with it the multiplier has 4 of 36 components — Phys. Lett. A 75 (1979) 27 (memory)', () => {
    expect([multipliers.invariant, multipliers.independent, names.length]).toEqual([4, 36, 4]);
    expect(json.variables).toEqual(['N', 'a', 'phi', 'psi', ...names]);
  });

  it('k > 0: φ = 0, ψ = √k/a; k = 0: φ = ψ = 0; k < 0: ψ = 0, φ = √−k/a', () => {
    expect(json.branches!.map((b) => b.name)).toEqual([
      'phi = 0, psi = sqrt(k)/a (k > 0)',
      'phi = psi = 0 (k = 0)',
      'psi = 0, phi = sqrt(-k)/a (k < 0)',
    ]);
  });

  for (const [index, sign] of ([1, 0, -1] as const).entries()) {
    it(`is general relativity at k ${['> 0', '= 0', '< 0'][index]}, whatever the multipliers`, () => {
      const branch = json.branches![index]!;
      for (let run = 0; run < runs(4); run++) {
        const point = connectionOn(branch, pointWith(firstSeed(600 + 10 * index) + run, sign, names) as never);
        const expected = generalRelativity(point);
        expect(E.show(atPoint(branch.equations.N!, point))).toBe(E.show(expected.N));
        expect(E.show(atPoint(branch.equations.a!, point))).toBe(E.show(expected.a));
        // The same from the equations of all fields, restricted to the branch by the chain rule for s/a.
        const all = equationsAt(json, point);
        expect(E.show(all.N!)).toBe(E.show(expected.N));
        const a = point.fields.a![0]!;
        const [phi, psi] = [point.fields.phi![0]!, point.fields.psi![0]!];
        const work = E.div(E.add(E.mul(phi, all.phi!), E.mul(psi, all.psi!)), a);
        expect(E.show(E.sub(all.a!, work))).toBe(E.show(expected.a));
        for (const name of names) expect(E.show(all[name]!)).toBe('0');
        expect([branch.friedmann.rho_T, branch.friedmann.p_T]).toEqual(['0', '0']);
      }
    });
  }

  it('has the Einstein–Hilbert Lagrangian as its form, G4 = ½M², for every k', () => {
    const form = json.scalarTensor;
    if (form.form === 'none') throw new Error(form.reason);
    expect([form.validFor, form.G4, form.potential]).toEqual(['every k', 'M^2/2', '0']);
    expect([...Object.values(form.kinetic), ...Object.values(form.current)].every((t) => t === '0')).toBe(true);
  });
});

describe('½M²R with torsion constrained to vanish is general relativity — any textbook (memory)', () => {
  for (const constrain of [['T^a_{bc}'], ['T_a', 'A_a'], ['T_{abc} - T_{bac}', 'T_a', 'A^a']]) {
    it(constrain.join(', '), () => {
      const json = derived({ lagrangian: '1/2 M^2 R', constrain, matter: MATTER });
      const [branch, ...more] = json.branches!;
      expect(more).toEqual([]);
      expect(branch!.name).toBe('psi = 0, phi = D(a,1)/(N*a)');
      expect(branch!.undetermined).toEqual([]);
      for (let run = 0; run < runs(3); run++) {
        const point = new Random(firstSeed(640) + run).point('flrw', CONSTANTS, 3);
        const expected = generalRelativity(point);
        expect(E.show(atPoint(branch!.equations.N!, point))).toBe(E.show(expected.N));
        expect(E.show(atPoint(branch!.equations.a!, point))).toBe(E.show(expected.a));
      }
      const form = json.scalarTensor;
      if (form.form === 'none') throw new Error(form.reason);
      expect([form.validFor, form.G4, form.potential]).toEqual(['every k', 'M^2/2', '0']);
    });
  }

  it('isotropic torsion and its multiplier have 2 of 24 components — Phys. Lett. A 75 (1979) 27 (memory)', () => {
    const json = derived({ lagrangian: '1/2 M^2 R', constrain: ['T^a_{bc}'] });
    expect([json.multipliers![0]!.invariant, json.multipliers![0]!.independent]).toEqual([2, 24]);
  });

  it('in the signature +−−− too', () => {
    const json = derived({ lagrangian: '-1/2 M^2 R', constrain: ['T^a_{bc}'], signature: '+---', matter: MATTER });
    const point = new Random(firstSeed(650)).point('flrw', CONSTANTS, 3);
    expect(E.show(atPoint(json.branches![0]!.equations.N!, point))).toBe(E.show(generalRelativity(point).N));
  });
});
