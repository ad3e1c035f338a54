import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { isZero, multiply, type Poly } from '../../src/algebra/poly.js';
import { relationsOf, type Solutions, solutionsOf } from '../../src/compare/branches.js';
import { BoundError } from '../../src/compare/budget.js';
import { leaderName, reduce } from '../../src/compare/elimination.js';
import type { RankingName } from '../../src/compare/ranking.js';
import { arenaIn, poly, spaceOf } from './derivations.js';

const space = spaceOf({ lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] });

function solved(
  polys: readonly Poly[],
  options: { nonzero?: Poly[]; trial?: Poly[]; ranking?: RankingName } = {},
): Solutions {
  const given = polys.map((p, i) => ({ kind: 'given', poly: p, name: `${i}` }) as const);
  return solutionsOf(arenaIn(space, options.ranking), given, options.nonzero ?? [], options.trial ?? []);
}

const shown = ({ branches }: Solutions) =>
  branches.map((b) => [relationsOf(b).join(', '), b.links.map((l) => infix(l.known.poly)).join(', ')]).sort();

describe('branches of solutions', () => {
  it('a linear system is one chain', () => {
    const s = solved([poly(space, [1, 'phi'], [1, 'H']), poly(space, [1, 'phi'], [-1, 'H'], [2, 'psi'])]);
    expect(shown(s)).toEqual([['', 'phi + H, psi - H']]);
    expect(s.branches[0]!.links.map(leaderName)).toEqual(['phi', 'psi']);
  });

  it('a product splits, and each factor is its own branch', () => {
    const s = solved([poly(space, [1, 'phi', 'psi'])]);
    expect(shown(s)).toEqual([
      ['phi = 0, psi != 0', 'phi'],
      ['psi = 0', 'psi'],
    ]);
  });

  it('a factor that is taken not to vanish does not split', () => {
    const s = solved([poly(space, [1, 'phi', 'psi'])], { nonzero: [poly(space, [1, 'psi'])] });
    expect(shown(s)).toEqual([['psi != 0', 'phi']]);
  });

  it('a power vanishes only with its base', () => {
    expect(shown(solved([poly(space, [1, ['psi', 2], 'a'])]))).toEqual([['psi = 0', 'psi']]);
  });

  it('sums are split by the polynomials that are tried', () => {
    const u = poly(space, [1, 'phi'], [-1, 'H']);
    const p = multiply(u, poly(space, [1, 'psi'], [-1, 'k']));
    expect(solved([p]).branches.length).toBe(1);
    expect(shown(solved([p], { trial: [u] }))).toEqual([
      ['phi - H != 0', 'psi - k'],
      ['phi - H = 0', 'phi - H'],
    ]);
  });

  it('differentiates what is needed: ψ² = k/M makes ψ constant', () => {
    const s = solved([poly(space, [1, ['psi', 2], 'M'], [-1, 'k']), poly(space, [1, 'D(psi,1)'], [1, 'D(phi,1)'])]);
    expect(shown(s)).toEqual([['', 'M*psi^2 - k, D(phi,1)']]);
  });

  it('a relation for a density is differentiated with the law of the density', () => {
    const s = solved([poly(space, [1, 'rho_dust'], [-1, 'phi'])]);
    // ρ at a = 1 is constant.
    expect(shown(s)).toEqual([['', 'D(phi,1), phi - rho_dust']]);
  });

  it('a relation between couplings alone ends a branch and is told', () => {
    const s = solved([poly(space, [1, 'psi'], [-1, 'c']), poly(space, [1, 'psi'], [-1, 'k'])]);
    expect(s.branches).toEqual([]);
    expect(s.deadEnds.map((e) => infix(e.needs))).toEqual(['k - c']);
  });

  it('where a pivot has to vanish, its zeros are followed', () => {
    // (φ − k)² = 0 is not seen to be a square; φ = k with ψ̇ = c solves everything, but φ − k is divided by.
    const s = solved([
      poly(space, [1, ['phi', 2]], [-2, 'phi', 'k'], [1, ['k', 2]]),
      poly(space, [1, 'D(psi,1)', 'phi'], [-1, 'D(psi,1)', 'k'], [1, 'D(phi,1)']),
      poly(space, [1, 'D(psi,1)'], [-1, 'c']),
    ]);
    expect(shown(s).map(([, links]) => links)).toContain('phi - k, D(psi,1) - c');
  });

  it('equations that were multiplied by zero on the way are taken up again', () => {
    // ψ(φ̇ + 1) divides out of the first two; then ψ = 0, and φ̇ = H would be lost.
    const s = solved([
      poly(space, [1, 'psi', 'D(phi,1)'], [1, ['psi', 2]]),
      poly(space, [1, 'D(phi,1)'], [-1, 'H'], [1, 'psi']),
      poly(space, [1, 'psi', 'H']),
    ]);
    for (const branch of s.branches)
      for (const p of [poly(space, [1, 'D(phi,1)'], [-1, 'H'], [1, 'psi'])])
        expect(isZero(reduce(arenaIn(space), p, branch.links).rest)).toBe(true);
    expect(s.branches.length).toBeGreaterThan(0);
  });

  it('what was taken not to vanish must not', () => {
    const s = solved([poly(space, [1, 'phi'], [-1, 'H']), poly(space, [1, 'phi'], [1, 'H'])], {
      nonzero: [poly(space, [1, 'H'])],
    });
    expect([s.branches, s.deadEnds.length]).toEqual([[], 1]);
  });

  it('gives up at its bound', () => {
    const p = poly(space, [1, ['phi', 3]], [1, 'psi', 'H'], [1, 'c']);
    const q = poly(space, [1, ['phi', 2], ['psi', 2]], [1, 'H'], [1, 'k']);
    const given = [p, q].map((poly, i) => ({ kind: 'given', poly, name: `${i}` }) as const);
    const tiny = arenaIn(space, 'connection', { products: 5, terms: 5 });
    expect(() => solutionsOf(tiny, given, [], [])).toThrow(BoundError);
  });
});
