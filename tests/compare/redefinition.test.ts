import { describe, expect, it } from 'vitest';
import { timeDerivative } from '../../src/algebra/calculus.js';
import { infix } from '../../src/algebra/infix.js';
import { add, equals, generator, multiply, type Poly, scale } from '../../src/algebra/poly.js';
import { commonRing } from '../../src/compare/common-ring.js';
import { readRedefinition } from '../../src/compare/redefinition.js';
import { InputError } from '../../src/notation/diagnostics.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { derivationOf } from './derivations.js';

const d = derivationOf({
  lagrangian: '1/2 M^2 R + c R^2',
  constants: ['b', 'c'],
  matter: ['dust', '{ fluid: brine, w: "1/5" }'],
});
const ring = commonRing(d, d);
const read = (...texts: string[]) => readRedefinition(ring, d.geometry, texts);
const g = (name: string): Poly => generator(ring, name);

describe('redefinitions', () => {
  it('replace fields, their jets, and constants', () => {
    const { apply, names, conditions } = read('phi = phi + 2 psi', 'b = -3 c');
    expect(equals(apply(g('D(phi,2)')), add(g('D(phi,2)'), scale(g('D(psi,2)'), 2)))).toBe(true);
    expect(infix(apply(multiply(g('b'), g('b'))))).toBe('9*c^2');
    expect([names, conditions]).toEqual([['phi', 'b'], []]);
  });

  it('understand H, dots and torsion in terms of fields', () => {
    expect(infix(read('phi = H - phi').apply(g('phi')))).toBe('-phi + D(a,1)/(N*a)');
    expect(infix(read('phi = phi + \\dot\\psi').apply(g('phi')))).toBe('phi + D(psi,1)');
  });

  it('commute with the time derivative', () => {
    const { apply } = read('phi = 2 H - phi + psi^2', 'psi = k psi');
    for (let run = 0; run < runs(10); run++) {
      const p = randomPoly(new Random(firstSeed(9900) + run), ring, [
        'phi',
        'D(phi,1)',
        'psi',
        'D(psi,1)',
        'a',
        'k',
        'N',
      ]);
      expect(equals(timeDerivative(apply(p)), apply(timeDerivative(p)))).toBe(true);
    }
  });

  it('tell where they cannot be inverted', () => {
    expect(read('phi = phi^2').conditions).toEqual(['2*phi != 0']);
    expect(read('phi = phi psi', 'psi = psi').conditions).toEqual(['psi != 0']);
  });

  it.each([
    [['phi = psi', 'psi = psi'], 'the redefinition cannot be inverted'],
    [['phi = D(phi,1)'], 'phi would be replaced by derivatives of phi, which is redefined too'],
    [['phi = psi', 'psi = phi + \\dot\\phi'], 'psi would be replaced by derivatives of phi, which is redefined too'],
    [['phi = phi', 'phi = psi'], 'phi is redefined twice'],
    [['2 phi = psi'], 'the left side is no symbol'],
    [['D(phi,1) = psi'], 'the left side is no symbol'],
    [['N = 2 N'], 'the lapse N is not redefined'],
    [['a = 2 a'], 'the density rho_brine follows its own law'],
    [['rho_brine = b'], 'the density rho_brine follows its own law'],
    [['b = phi'], 'b is a constant'],
    [['phi = D(psi,9)'], 'D(psi,9) is of too high an order'],
    [['phi = q'], 'unknown symbol q'],
  ])('%s is refused', (texts, message) => {
    try {
      read(...texts);
      expect.unreachable();
    } catch (error) {
      expect(error).toBeInstanceOf(InputError);
      expect((error as InputError).message).toBe(message);
    }
  });
});
