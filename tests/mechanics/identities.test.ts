import { describe, expect, it } from 'vitest';
import { eulerLagrange, timeDerivative } from '../../src/algebra/calculus.js';
import { infix } from '../../src/algebra/infix.js';
import { add, generator, isZero, multiply, type Poly, subtract } from '../../src/algebra/poly.js';
import { noetherResidual } from '../../src/mechanics/identities.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { FIELDS, invariantLagrangian, LAPSE, nonZeroFunction, ring } from './reduced-lagrangian.js';

const equationsOf = (lagrangian: Poly): Map<string, Poly> =>
  new Map([LAPSE, ...FIELDS].map((q) => [q, eulerLagrange(lagrangian, q)]));

describe('noetherResidual', () => {
  it('vanishes for every Lagrangian N ℓ(q, q̇/N)', () => {
    for (let i = 0; i < runs(40); i++) {
      const seed = firstSeed(23 * i);
      const lagrangian = invariantLagrangian(new Random(seed), 4);
      expect(infix(noetherResidual(equationsOf(lagrangian), LAPSE)), `seed ${seed}`).toBe('0');
    }
  });

  it('vanishes up to total derivatives of the fields', () => {
    const random = new Random(firstSeed(2));
    const lagrangian = add(invariantLagrangian(random), timeDerivative(nonZeroFunction(random)));
    expect(infix(noetherResidual(equationsOf(lagrangian), LAPSE))).toBe('0');
  });

  it('does not vanish for a Lagrangian that knows what time is', () => {
    for (let i = 0; i < runs(20); i++) {
      const seed = firstSeed(29 * i);
      const random = new Random(seed);
      const potential = nonZeroFunction(random, ['a', 'phi']);
      // A function of the fields without the lapse, unless it is constant.
      if (FIELDS.every((q) => isZero(eulerLagrange(potential, q)))) continue;
      const lagrangian = add(invariantLagrangian(random), potential);
      expect(isZero(noetherResidual(equationsOf(lagrangian), LAPSE)), `seed ${seed}`).toBe(false);
    }
  });

  it('does not vanish for equations of another theory', () => {
    const random = new Random(firstSeed(3));
    const equations = equationsOf(invariantLagrangian(random));
    const wrong = new Map(equations).set('phi', subtract(equations.get('phi')!, generator(ring, 'phi')));
    const rate = multiply(generator(ring, 'D(phi,1)'), generator(ring, 'phi'));
    expect(infix(add(noetherResidual(wrong, LAPSE), rate))).toBe('0');
  });
});
