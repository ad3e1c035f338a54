import { describe, expect, it } from 'vitest';
import { commonRing } from '../../src/compare/common-ring.js';
import { derivationOf, EINSTEIN_CARTAN, type Wanted } from './derivations.js';

const ring = (a: Wanted, b: Wanted) => commonRing(derivationOf(a), derivationOf(b));

describe('one ring for two theories', () => {
  it('has the symbols of both and jets enough for a redefinition', () => {
    const names = ring(
      { lagrangian: 'b R^2', constants: ['b'] },
      { lagrangian: 'c R^2', constants: ['c'], matter: ['dust'] },
    );
    for (const name of ['b', 'c', 'Lambda', 'rho_dust', 'D(phi,6)', 'D(a,6)'])
      expect(names.position.has(name)).toBe(true);
  });

  it('refuses theories that cannot be compared', () => {
    expect(() => ring(EINSTEIN_CARTAN, { ...EINSTEIN_CARTAN, geometry: 'bianchi-i' })).toThrow(
      /on the geometry flrw, .* on bianchi-i/,
    );
    const brine = (w: string): Wanted => ({ ...EINSTEIN_CARTAN, matter: [`{ fluid: brine, w: "${w}" }`] });
    expect(() => ring(brine('1/5'), brine('1/7'))).toThrow('rho_brine does not mean the same in both theories');
    expect(() => ring(brine('1/5'), brine('1/5'))).not.toThrow();
    const constrained: Wanted = { ...EINSTEIN_CARTAN, constrain: ['T^a_{bc}'] };
    const multiplier = [...derivationOf(constrained).equations.keys()].at(-1)!;
    expect(() => ring(constrained, { lagrangian: `${multiplier} R`, constants: [multiplier] })).toThrow(
      `${multiplier} is a field of one theory and a constant of the other`,
    );
  });
});
