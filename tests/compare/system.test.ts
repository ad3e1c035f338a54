import { describe, expect, it } from 'vitest';
import { BoundError } from '../../src/compare/budget.js';
import { leaderName } from '../../src/compare/elimination.js';
import { arenaOf, BOUNDS, equationsOf, solve } from '../../src/compare/system.js';
import { derivationOf, poly, spaceOf } from './derivations.js';

describe('the equations of a theory, solved', () => {
  const wanted = { lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] };
  const space = spaceOf(wanted);
  const d = derivationOf(wanted);

  it('have names, and factors that are tried', () => {
    const { given, trial, nonzero } = equationsOf(space, d, true, {
      zero: [{ name: 'psi = 0', poly: poly(space, [1, 'psi']) }],
      nonzero: [poly(space, [1, 'H'])],
    });
    expect(given.map((g) => g.kind === 'given' && g.name)).toEqual(['N', 'a', 'phi', 'psi', 'psi = 0']);
    expect(trial.length).toBeGreaterThan(2);
    expect(nonzero.length).toBe(1);
  });

  it('Einstein–Cartan theory: one branch, the connection, density and pressure given', () => {
    const own = spaceOf();
    const { solutions } = solve(
      equationsOf(own, derivationOf({ lagrangian: '1/2 M^2 R' }), true),
      'connection',
      BOUNDS[0],
    );
    expect(solutions.branches.map((b) => b.links.map(leaderName))).toEqual([['phi', 'psi', 'rho', 'p']]);
  });

  it('stay within the bound or say so', () => {
    expect(() => solve(equationsOf(space, d, false), 'connection', { products: 20, terms: 20 })).toThrow(BoundError);
  });

  it('a contradiction is a solution set without branches', () => {
    const zero = [
      { name: 'x', poly: poly(space, [1, 'psi'], [-1, 'k']) },
      { name: 'y', poly: poly(space, [1, 'psi'], [-1, 'c']) },
    ];
    const { solutions } = solve(equationsOf(space, d, true, { zero }), 'connection', BOUNDS[0]);
    expect(solutions.branches).toEqual([]);
    expect(solutions.deadEnds.length).toBeGreaterThan(0);
  });

  it('each branch has an arena with a fresh bound and its own pivots', () => {
    const solved = solve(equationsOf(space, d, true), 'connection', BOUNDS[0]);
    const [branch] = solved.solutions.branches;
    const arena = arenaOf(solved, branch!);
    arena.pivots.push(poly(space, [1, 'H'], [1, 'c']));
    expect(arenaOf(solved, branch!).pivots.length).toBe(branch!.pivots.length);
  });
});
