import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { add, generator, multiply, type Poly, scale } from '../../src/algebra/poly.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import { vectorRoles } from '../../src/every-k.js';
import { loadGeometry } from '../../src/geometry/build.js';
import { density, symbolicValue } from '../../src/geometry/reduction.js';
import type { TensorFactor } from '../../src/notation/theory.js';
import { constantsIn, constraintVector, type VectorRoles } from '../../src/scalartensor/constraint-vector.js';

const geometry = loadGeometry('flrw', '-+++');
const roles = vectorRoles(geometry)!;
const SCALARS = ['phi', 'psi'];
const ring = makeRing([...['N', 'a', ...SCALARS].flatMap((q) => jetsOf(q, 3)), ...constantsOf(['k', 'c', 'A1'])]);
const R: TensorFactor[] = [{ head: 'R', slots: [] }];
const coupling = (name: string): Poly => generator(ring, name);
const gravityOf = (factors: TensorFactor[], name = 'c'): Poly =>
  multiply(coupling(name), density(geometry, factors, ring));

describe('constraintVector', () => {
  it('finds what replaces the components from the kinematics of the geometry', () => {
    const outcome = constraintVector(gravityOf(R), undefined, roles, SCALARS);
    if (!outcome.found) throw new Error(outcome.reason);
    expect(Object.fromEntries([...outcome.vector.components].map(([n, p]) => [n, infix(p)]))).toEqual({
      A1: 'D(phi,n) + div(n)*phi/3',
      A2: '2*phi*psi',
      A3: 'D(psi,n) + div(n)*psi/3',
      A4: 'R3(n)/6 + phi^2 - psi^2',
      u: 'div(n)/3 - phi',
      v: 'psi',
    });
  });

  it('goes by the components too, and keeps them apart from constants of the same name', () => {
    const terms = [{ coefficient: coupling('A1'), value: symbolicValue(geometry, R) }];
    const outcome = constraintVector(gravityOf(R, 'A1'), terms, roles, SCALARS);
    if (!outcome.found) throw new Error(outcome.reason);
    expect(infix(outcome.vector.inComponents!)).toBe('6*component A1*A1 + 6*component A4*A1');
  });

  it('stops the program when components and Lagrangian differ', () => {
    const terms = [{ coefficient: scale(coupling('c'), 2), value: symbolicValue(geometry, R) }];
    expect(() => constraintVector(gravityOf(R), terms, roles, SCALARS)).toThrow('another constraint-vector form');
  });

  it('has no word for a Lagrangian that is no scalar', () => {
    const odd = add(gravityOf(R), generator(ring, 'a'));
    expect(constraintVector(odd, undefined, roles, SCALARS)).toMatchObject({ found: false });
  });

  it('refuses kinematics with shear', () => {
    const sheared: VectorRoles = { ...roles, comoving: { ...roles.comoving, isShearFree: false } };
    const outcome = constraintVector(gravityOf(R), undefined, sheared, SCALARS);
    expect(outcome.found ? '' : outcome.reason).toContain('shear');
  });

  it('has other numbers when the vector grows otherwise: nothing about θ = 3H is typed in', () => {
    const fast: VectorRoles = {
      ...roles,
      comoving: { ...roles.comoving, expansion: scale(roles.comoving.expansion, 2) },
    };
    const outcome = constraintVector(gravityOf(R), undefined, fast, SCALARS);
    if (!outcome.found) throw new Error(outcome.reason);
    expect(infix(outcome.vector.components.get('u')!)).toBe('div(n)/6 - phi');
  });
});

describe('constantsIn', () => {
  it('leaves the spatial curvature out', () => {
    expect(constantsIn(ring, 'k')).toEqual(['c', 'A1']);
  });
});
