import { describe, expect, it } from 'vitest';
import { involves } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { add, constant, equals, isZero, multiply, type Poly } from '../../src/algebra/poly.js';
import {
  type Arena,
  derivativeOf,
  type Link,
  leaderName,
  leaderOf,
  makeLink,
  orderedLinks,
  pivotOf,
  reduce,
} from '../../src/compare/elimination.js';
import { expandFactors } from '../../src/compare/factors.js';
import type { Step } from '../../src/compare/known.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { arenaIn, poly, spaceOf } from './derivations.js';

const space = spaceOf({ lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] });
const NAMES = ['a', 'phi', 'D(phi,1)', 'D(phi,2)', 'psi', 'D(psi,1)', 'H', 'D(H,1)', 'c', 'k', 'M'];

const linkOf = (arena: Arena, p: Poly): Link =>
  makeLink(arena, { kind: 'given', poly: p, name: 'test' }, leaderOf(arena, p)!);

/** Every step is u · before = d · after + q · known. */
function replay(p: Poly, steps: readonly Step[], rest: Poly): void {
  let before = p;
  steps.forEach((step, i) => {
    const left = multiply(expandFactors(space, step.u), before);
    const known = multiply(step.q, step.known.poly);
    const after = (steps[i + 1] as (Step & { before?: Poly }) | undefined) === undefined ? rest : undefined;
    if (after) {
      expect(equals(left, add(multiply(expandFactors(space, step.d), after), known))).toBe(true);
      return;
    }
    before = (step as Step & { after: Poly }).after;
    expect(equals(left, add(multiply(expandFactors(space, step.d), before), known))).toBe(true);
  });
}

describe('pseudo-division by a chain', () => {
  it('finds the leader by the ranking', () => {
    const p = poly(space, [1, 'phi'], [-1, 'H']);
    expect(space.ring.generators[leaderOf(arenaIn(space, 'connection'), p)!]!.name).toBe('phi');
    expect(space.ring.generators[leaderOf(arenaIn(space, 'expansion'), p)!]!.name).toBe('H');
    expect(leaderOf(arenaIn(space), poly(space, [1, 'c'], [2, 'k']))).toBeUndefined();
    expect(leaderOf(arenaIn(space), poly(space))).toBeUndefined();
  });

  it('replaces a leader and its derivatives', () => {
    const arena = arenaIn(space);
    const link = linkOf(arena, poly(space, [1, 'phi'], [-1, 'H']));
    expect([leaderName(link), link.degree]).toEqual(['phi', 1]);
    const { rest } = reduce(arena, poly(space, [1, ['phi', 2]], [1, 'D(phi,2)']), [link]);
    expect(equals(rest, poly(space, [1, ['H', 2]], [1, 'D(H,2)']))).toBe(true);
    expect(infix(derivativeOf(arena, link, 3).poly)).toBe('D(phi,3) - D(H,3)');
  });

  it('knows the separant of a power', () => {
    const arena = arenaIn(space);
    const link = linkOf(arena, poly(space, [1, ['psi', 3]], [1, 'c', 'psi'], [-1, 'k']));
    expect(link.initial.factors).toEqual([]);
    expect(link.separant.factors.map((f) => infix(f.base))).toEqual(['3*psi^2 + c']);
    const { rest, steps } = reduce(arena, poly(space, [1, 'D(psi,1)']), [link]);
    expect(isZero(rest)).toBe(true);
    expect(steps[0]!.u.map((f) => infix(f.base))).toEqual(['3*psi^2 + c']);
  });

  it('puts a pivot in factors and learns new ones', () => {
    const arena = arenaIn(space);
    const u = poly(space, [1, 'phi'], [-1, 'H']);
    expect(pivotOf(arena, u).factors.length).toBe(1);
    expect(arena.pivots.map(infix)).toEqual(['phi - H']);
    const p = multiply(multiply(u, u), poly(space, [3, 'c', 'psi']));
    expect(pivotOf(arena, p).factors.map((f) => [infix(f.base), f.power])).toEqual([
      ['psi', 1],
      ['phi - H', 2],
    ]);
    expect(infix(pivotOf(arena, p).unit)).toBe('3*c');
    expect(arena.pivots.length).toBe(1);
  });

  it('every step is an identity and nothing can be replaced in the rest, on random chains', () => {
    for (let run = 0; run < runs(25); run++) {
      const random = new Random(firstSeed(9400) + run);
      const arena = arenaIn(space, random.pick(['connection', 'expansion', 'metric'] as const));
      const wishes = { terms: 3, factors: 2, exponents: [0, 2] } as const;
      const links = ['D(psi,1)', 'D(phi,1)'].flatMap((leader) => {
        const lower = leader === 'D(psi,1)' ? ['psi', 'H', 'c', 'a', 'k'] : ['phi', 'H', 'c', 'a', 'k'];
        const initial = randomPoly(random, space.ring, lower, wishes);
        if (isZero(initial)) return [];
        const tail = randomPoly(random, space.ring, lower, wishes);
        return [linkOf(arena, add(multiply(initial, poly(space, [1, leader])), tail))];
      });
      const p = randomPoly(random, space.ring, NAMES, wishes);
      const { rest, steps } = reduce(arena, p, links);
      replay(p, steps, rest);
      for (const link of links)
        for (const name of ['D(psi,1)', 'D(psi,2)', 'D(phi,1)', 'D(phi,2)'])
          if (name.includes(link.field)) expect(involves(rest, name)).toBe(false);
    }
  });

  it('clears a scale factor that a link fixes from denominators', () => {
    const arena = arenaIn(space);
    const link = linkOf(arena, poly(space, [1, ['a', 2], 'c'], [-1, 'k']));
    expect(leaderName(link)).toBe('a');
    const { rest } = reduce(arena, poly(space, [1, 'k', ['a', -2]], [-1, 'c']), [link]);
    expect(isZero(rest)).toBe(true);
    expect(isZero(reduce(arena, poly(space, [1, ['a', -2]], [-1, 'c']), [link]).rest)).toBe(false);
  });

  it('orders links by their leaders', () => {
    const arena = arenaIn(space);
    const links = ['D(psi,2)', 'H', 'phi'].map((name) =>
      linkOf(arena, add(poly(space, [1, name]), constant(space.ring, 1))),
    );
    expect(orderedLinks(arena, links).map(leaderName)).toEqual(['H', 'phi', 'D(psi,2)']);
  });
});
