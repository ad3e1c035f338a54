import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { add, equals, isZero, multiply, power, product } from '../../src/algebra/poly.js';
import {
  basesOf,
  degreeIn,
  divideIn,
  divideOut,
  expandFactors,
  isPolynomial,
  isUnit,
  isVariable,
  joinFactors,
  lackingFactors,
  mergeFactors,
  splitFactors,
} from '../../src/compare/factors.js';
import { BOUNDS, budgetOf } from '../../src/compare/system.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { one, poly, spaceOf } from './derivations.js';

const space = spaceOf();
const at = (name: string): number => space.ring.position.get(name)!;
const u = poly(space, [1, 'phi'], [-1, 'H']);
const budget = () => budgetOf(BOUNDS[0]);

describe('units, variables and factors', () => {
  it('tells what may vanish', () => {
    expect(['phi', 'D(H,1)', 'rho', 'rho_dust'].every((n) => isVariable(space, at(n)))).toBe(true);
    expect(['a', 'k', 'M', 'Lambda'].some((n) => isVariable(space, at(n)))).toBe(false);
    expect(isUnit(space, poly(space, [3, ['a', -2], 'M']))).toBe(true);
    expect(isUnit(space, poly(space, [3, 'phi']))).toBe(false);
    expect(isUnit(space, u)).toBe(false);
    expect(isPolynomial(space, poly(space, [1, ['a', -1], 'phi']))).toBe(true);
    expect(isPolynomial(space, poly(space, [1, ['phi', -1]]))).toBe(false);
  });

  it('splits into unit, variables and rest', () => {
    for (let run = 0; run < runs(30); run++) {
      const p = randomPoly(new Random(firstSeed(9300) + run), space.ring, ['a', 'phi', 'psi', 'H', 'M', 'k']);
      if (isZero(p)) continue;
      const { unit, variables, rest } = splitFactors(space, p);
      const back = product(space.ring, [
        unit,
        rest,
        ...variables.map(([g, n]) => power(poly(space, [1, space.ring.generators[g]!.name]), n)),
      ]);
      expect(equals(back, p)).toBe(true);
      expect(isUnit(space, unit)).toBe(true);
      expect(splitFactors(space, rest).variables).toEqual([]);
    }
  });

  it('divides without putting variables into denominators', () => {
    expect(divideIn(space, poly(space, [1, 'psi']), poly(space, [1, 'phi']))).toBeUndefined();
    expect(infix(divideIn(space, poly(space, [2, 'psi', 'phi']), poly(space, [4, 'a', 'phi']))!)).toBe('psi/(2*a)');
    expect(divideIn(space, add(u, one(space)), u)).toBeUndefined();
  });

  it('divides as often as it goes', () => {
    const p = multiply(power(u, 3), poly(space, [1, 'psi'], [1, 'k']));
    expect(divideOut(space, budget(), p, u).power).toBe(3);
    const twice = divideOut(space, budget(), p, u, 2);
    expect([twice.power, equals(multiply(twice.rest, power(u, 2)), p)]).toEqual([2, true]);
    expect(() => divideOut(space, budget(), p, one(space))).toThrow('for ever');
  });

  it('multiplies lists of factors', () => {
    const v = poly(space, [1, 'psi'], [1, 'k']);
    const a = [{ base: u, power: 2 }];
    const b = [
      { base: u, power: 1 },
      { base: v, power: 1 },
    ];
    const value = (f: typeof b) => expandFactors(space, f);
    expect(equals(value([...mergeFactors(a, b)]), multiply(value(a), value(b)))).toBe(true);
    expect(equals(value([...joinFactors(a, b)]), multiply(power(u, 2), v))).toBe(true);
    expect(lackingFactors(a, b).map((f) => [infix(f.base), f.power])).toEqual([[infix(v), 1]]);
    expect(lackingFactors(b, a).map((f) => f.power)).toEqual([1]);
  });

  it('lists what must not vanish', () => {
    const p = multiply(poly(space, [3, ['psi', 2], 'a', 'M']), u);
    expect(basesOf(space, p).map(infix)).toEqual(['psi', infix(u)]);
    expect(basesOf(space, poly(space, [5, 'M', ['a', -3]]))).toEqual([]);
    expect(degreeIn(p, at('psi'))).toBe(2);
  });
});
