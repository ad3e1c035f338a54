import { describe, expect, it } from 'vitest';
import { add, isZero, multiply, type Poly, scale, sum, zero } from '../../src/algebra/poly.js';
import { Certifier, certifies } from '../../src/compare/certificate.js';
import { type Arena, leaderOf, makeLink, reduce } from '../../src/compare/elimination.js';
import { BOUNDS, budgetOf, equationsOf, solve } from '../../src/compare/system.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { arenaIn, derivationOf, one, poly, spaceOf } from './derivations.js';

const WANTED = { lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] };
const space = spaceOf(WANTED);
const certifier = () => new Certifier(space, budgetOf(BOUNDS[1]));

describe('certificates', () => {
  it('of a polynomial divided by a chain with pivots', () => {
    const arena: Arena = arenaIn(space);
    const given = poly(space, [1, 'psi', 'D(phi,1)'], [1, 'H', 'D(phi,1)'], [-1, 'c']);
    const link = makeLink(arena, { kind: 'given', poly: given, name: 'E' }, leaderOf(arena, given)!);
    // The derivative of the relation, times something: φ̈ is divided out with the pivot ψ + H.
    const p = multiply(space.rate(given), poly(space, [1, 'psi'], [2, 'k']));
    const { rest, steps } = reduce(arena, p, [link]);
    expect(isZero(rest)).toBe(true);
    const certificate = certifier().ofZero(steps);
    expect(certifies(space, certificate, p)).toBe(true);
    expect(certificate.cofactors.map((c) => [c.name, c.order])).toContainEqual(['E', 1]);
  });

  it('is refused when any cofactor, the denominator or the polynomial is another', () => {
    const { given, arena, solutions } = solve(equationsOf(space, derivationOf(WANTED), true), 'connection', BOUNDS[0]);
    const p = multiply(given[2]!.poly, poly(space, [1, 'H'], [1, 'k']));
    const { rest, steps } = reduce(arena, p, solutions.branches[0]!.links);
    expect(isZero(rest)).toBe(true);
    const certificate = certifier().ofZero(steps);
    expect(certifies(space, certificate, p)).toBe(true);
    expect(certifies(space, certificate, scale(p, 2))).toBe(false);
    expect(
      certifies(space, { ...certificate, denominator: [{ base: poly(space, [1, 'H'], [3, 'c']), power: 1 }] }, p),
    ).toBe(false);
    const [first, ...others] = certificate.cofactors;
    const spoilt = { ...certificate, cofactors: [{ ...first!, value: add(first!.value, one(space)) }, ...others] };
    expect(certifies(space, spoilt, p)).toBe(false);
  });

  it('of random combinations of equations and their derivatives', () => {
    const solved = solve(equationsOf(space, derivationOf(WANTED), true), 'connection', BOUNDS[1]);
    for (let run = 0; run < runs(12); run++) {
      const random = new Random(firstSeed(9600) + run);
      const names = ['a', 'phi', 'psi', 'H', 'D(phi,1)', 'M', 'k'];
      const terms = solved.given.map(({ poly: e }) => {
        const cofactor = randomPoly(random, space.ring, names, { terms: 2, factors: 2, exponents: [0, 1] });
        return multiply(cofactor, random.chance(40) ? space.rate(e) : e);
      });
      const p: Poly = random.chance(5) ? zero(space.ring) : sum(space.ring, terms);
      for (const branch of solved.solutions.branches) {
        const { rest, steps } = reduce(solved.arena, p, branch.links);
        expect(isZero(rest), `seed ${random.seed}`).toBe(true);
        const made = certifier().ofZero(steps);
        expect(certifies(space, made, p), `seed ${random.seed}`).toBe(true);
      }
    }
  });

  it('of every link of a chain', () => {
    const solved = solve(equationsOf(space, derivationOf(WANTED), true), 'expansion', BOUNDS[1]);
    const all = certifier();
    for (const branch of solved.solutions.branches)
      for (const { known } of branch.links) {
        const certificate = all.of(known);
        expect(certifies(space, certificate, known.poly)).toBe(true);
      }
  });
});
