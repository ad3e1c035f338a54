import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { add, multiply, type Poly, sum } from '../../src/algebra/poly.js';
import { BoundError } from '../../src/compare/budget.js';
import { consequence } from '../../src/compare/consequence.js';
import type { RANKINGS } from '../../src/compare/ranking.js';
import { BOUNDS, type Bound, equationsOf, type Solved, solve } from '../../src/compare/system.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { derivationOf, poly, spaceOf, type Wanted } from './derivations.js';

const THEORIES: readonly Wanted[] = [
  { lagrangian: '1/2 M^2 R' },
  { lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] },
  { lagrangian: '1/2 M^2 R + c R_{ab} R^{ab} + M^2 b T_a T^a', constants: ['b', 'c'] },
  { lagrangian: '1/2 M^2 R + b M^2 T_a A^a', constants: ['b'] },
];

function solvedUnder(wanted: Wanted, ranking: (typeof RANKINGS)[number], bound: Bound = BOUNDS[0]): Solved | undefined {
  try {
    return solve(equationsOf(spaceOf(wanted), derivationOf(wanted), true), ranking, bound);
  } catch (error) {
    if (error instanceof BoundError) return undefined;
    throw error;
  }
}

describe('consequences of equations', () => {
  it.each(THEORIES.map((wanted, i) => [wanted.lagrangian, wanted, i] as const))(
    'combinations follow from %s, others do not, whatever the ranking',
    (_, wanted, i) => {
      for (const ranking of ['connection', 'expansion'] as const) {
        const solved = solvedUnder(wanted, ranking);
        if (!solved) continue;
        const { ring } = solved.space;
        for (let run = 0; run < runs(2); run++) {
          const random = new Random(firstSeed(9700) + 100 * i + run);
          const wishes = { terms: 2, factors: 2, exponents: [0, 1] } as const;
          const cofactor = (): Poly => randomPoly(random, ring, ['phi', 'psi', 'H', 'M', 'k', 'a'], wishes);
          const p = sum(
            ring,
            solved.given.map((e) => multiply(cofactor(), e.poly)),
          );
          const label = `${ranking}, seed ${random.seed}`;
          for (const branch of solved.solutions.branches) {
            expect(consequence(solved, branch, p).verdict, label).toBe('follows');
            // A free jet is no consequence of anything.
            const other = add(p, poly(solved.space, [1, 'H'], [1, 'M']));
            expect(consequence(solved, branch, other).verdict, label).toBe('fails');
          }
        }
      }
    },
    30_000,
  );

  it('the residual is what is left modulo the equations', () => {
    const solved = solvedUnder(THEORIES[0]!, 'connection')!;
    const [branch] = solved.solutions.branches;
    const { space } = solved;
    const claim = poly(space, [2, 'phi', 'H'], [-2, ['H', 2]], [5, 'psi'], [1, 'k', ['a', -2]]);
    const verdict = consequence(solved, branch!, claim);
    expect(verdict.verdict === 'fails' && infix(verdict.residual.top)).toBe('k/a^2');
  });

  it('names what is divided by', () => {
    const solved = solvedUnder(THEORIES[0]!, 'connection')!;
    const verdict = consequence(solved, solved.solutions.branches[0]!, poly(solved.space, [1, 'psi']));
    expect(verdict.verdict === 'follows' && verdict.conditions).toEqual(['M != 0']);
    const zero = consequence(solved, solved.solutions.branches[0]!, poly(solved.space));
    expect(zero.verdict === 'follows' && zero.certificate.cofactors).toEqual([]);
  });

  it('is undecided, not guessed, when the bound is too small', () => {
    const full = solvedUnder(THEORIES[1]!, 'connection', BOUNDS[1])!;
    const tight: Solved = { ...full, bound: { products: 3, terms: 3 } };
    const claim = multiply(poly(full.space, [1, 'H'], [1, 'k']), full.given[0]!.poly);
    const verdict = consequence(tight, full.solutions.branches[0]!, claim);
    expect(verdict).toMatchObject({ verdict: 'undecided' });
    expect(verdict.verdict === 'undecided' && verdict.reason).toMatch(/more than 3/);
  });

  it('is undecided without a solution to look at', () => {
    const solved = solvedUnder(THEORIES[0]!, 'connection')!;
    const empty = { ...solved.solutions.branches[0]!, nonzero: [poly(solved.space, [1, 'psi'])] };
    expect(consequence(solved, empty, poly(solved.space, [1, 'psi'])).verdict).toBe('undecided');
    expect(consequence(solved, empty, poly(solved.space, [1, 'k'])).verdict).toBe('undecided');
  });
});
