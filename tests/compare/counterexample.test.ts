import { describe, expect, it } from 'vitest';
import { symbolsOf } from '../../src/algebra/collect.js';
import { counterexample } from '../../src/compare/counterexample.js';
import { decideClaims } from '../../src/compare/decide.js';
import { BOUNDS, equationsOf } from '../../src/compare/system.js';
import { derivationOf, poly, spaceOf, type Wanted } from './derivations.js';

const SQUARE: Wanted = { lagrangian: '1/2 M^2 R + c R^2 + b M^2 T_a T^a', constants: ['b', 'c'], matter: ['dust'] };

describe('counterexamples at particular couplings', () => {
  const space = spaceOf(SQUARE);
  const d = derivationOf(SQUARE);
  const equations = equationsOf(space, d, true, { nonzero: [poly(space, [1, 'H'])] });
  const find = (...terms: Parameters<typeof poly>[1][]) =>
    counterexample(equations, poly(space, ...terms), ['connection'], BOUNDS[0]);

  it('name the couplings that occur, and nothing else', () => {
    const found = find([1, 'phi'], [-1, 'H'])!;
    expect(found.couplings.map((text) => text.split(' = ')[0])).toEqual(['k', 'b', 'c', 'M']);
    for (const text of found.couplings) expect(Number(text.split(' = ')[1])).toBeGreaterThan(0);
    expect(symbolsOf(poly(space, [1, 'phi']))).toEqual(['phi']);
  });

  it('are not found for what follows', () => {
    expect(find([1, 'D(rho,1)'], [3, 'H', 'rho'], [3, 'H', 'p'])).toBeUndefined();
  });

  it('are not found beyond the bound', () => {
    expect(counterexample(equations, poly(space, [1, 'H']), ['connection'], { products: 3, terms: 3 })).toBeUndefined();
  });
});

it('a claim that fails for any matter but is undecided for the fluids keeps its residual', () => {
  const square = { lagrangian: '1/2 M^2 R + c R^2', constants: ['c'], matter: ['dust', 'radiation'] };
  const [report] = decideClaims(derivationOf(square), {
    claims: ['phi = H'],
    bounds: [{ products: 1_000_000, terms: 100 }],
  }).claims;
  expect(report).toMatchObject({ verdict: 'undecided', residual: expect.anything() });
  expect(report!.reason).toMatch(/^it does not hold for matter of any pressure; for the fluids of the theory /);
});
