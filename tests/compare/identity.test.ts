import { describe, expect, it } from 'vitest';
import { multiply, type Poly } from '../../src/algebra/poly.js';
import { certifies } from '../../src/compare/certificate.js';
import { identically } from '../../src/compare/identity.js';
import { BOUNDS, equationsOf } from '../../src/compare/system.js';
import { derivationOf, poly, spaceOf, type Wanted } from './derivations.js';

/** Too large to be solved within the bounds. */
const CUBIC: Wanted = {
  lagrangian: 'b R_{ab} T^a T^b + c T_a A^a T_b T^b + d R^3 + e R^2',
  constants: ['b', 'c', 'd', 'e'],
};

describe('obvious combinations', () => {
  const space = spaceOf(CUBIC);
  const equations = equationsOf(space, derivationOf(CUBIC), true);
  const find = (p: Poly) => identically(equations, p, BOUNDS[0]);

  it('a multiple of one equation', () => {
    const p = multiply(poly(space, [1, 'phi'], [2, 'k']), equations.given[0]!.poly);
    const found = find(p);
    expect(found?.verdict).toBe('follows');
    expect(found?.verdict === 'follows' && certifies(space, found.certificate, p)).toBe(true);
  });

  it('the balance of energy', () => {
    const p = poly(space, [1, 'D(rho,1)'], [3, 'H', 'rho'], [3, 'H', 'p']);
    const found = find(p);
    if (found?.verdict !== 'follows') throw new Error('not found');
    expect(certifies(space, found.certificate, p)).toBe(true);
    expect(found.certificate.cofactors.map((c) => c.name)).toContain('phi');
    expect(found.conditions).toEqual([]);
  });

  it('nothing is found for what does not follow, and nothing is said', () => {
    expect(find(poly(space, [1, 'H']))).toBeUndefined();
    expect(find(poly(space, [1, 'D(rho,1)'], [3, 'H', 'rho'], [2, 'H', 'p']))).toBeUndefined();
  });

  it('a certificate that divides by a field does not count: ψ = 0 does not follow from ψ² H = 0 alone', () => {
    const given = [{ kind: 'given', poly: poly(space, [1, 'psi', 'H']), name: 'x' }] as const;
    const own = { ...equations, given };
    expect(identically(own, poly(space, [1, 'psi']), BOUNDS[0])).toBeUndefined();
    expect(identically(own, poly(space, [1, 'psi', 'H', 'phi']), BOUNDS[0])?.verdict).toBe('follows');
  });
});
