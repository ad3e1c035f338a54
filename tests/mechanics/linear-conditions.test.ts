import { describe, expect, it } from 'vitest';
import { involves, substitute } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { add, constant, generator, isZero, multiply, type Poly, scale, sum } from '../../src/algebra/poly.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { solveConditions } from '../../src/mechanics/linear-conditions.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { toRational } from '../random-poly.js';

const COUPLINGS = ['a', 'b', 'c', 'd'];
const ring = makeRing(constantsOf([...COUPLINGS, 'M']));
const g = (name: string, e = 1): Poly => generator(ring, name, e);

const shown = (conditions: readonly Poly[]) => {
  const { impossible, solved, open } = solveConditions(conditions, COUPLINGS);
  return { impossible, solved: [...solved].map(([n, p]) => `${n} = ${infix(p)}`), open: open.map(infix) };
};

describe('solveConditions', () => {
  it('solves for the last coupling, a single one too', () => {
    expect(shown([add(g('a'), scale(g('b'), 2))])).toEqual({ impossible: false, solved: ['b = -a/2'], open: [] });
    expect(shown([scale(g('c'), 3)])).toEqual({ impossible: false, solved: ['c = 0'], open: [] });
  });

  it('leaves what is not linear, or has a coupling or a scale in front', () => {
    const square = add(multiply(g('a'), g('a')), constant(ring, -1));
    expect(shown([square]).open).toEqual(['a^2 - 1']);
    expect(shown([multiply(g('a'), g('b'))]).open).toEqual(['a*b']);
    expect(shown([add(multiply(g('M', 2), g('a')), g('b'))])).toEqual({
      impossible: false,
      solved: ['b = -a*M^2'],
      open: [],
    });
    expect(shown([add(multiply(g('M', 2), g('a')), constant(ring, 1))]).open).toEqual(['a*M^2 + 1']);
  });

  it('uses a solution in the other conditions, also in those that were not linear before', () => {
    const conditions = [add(g('b'), g('a')), add(multiply(g('b'), g('b')), multiply(g('a'), g('b')))];
    expect(shown(conditions)).toEqual({ impossible: false, solved: ['b = -a'], open: [] });
  });

  it('says when a number or a scale would have to vanish', () => {
    expect(shown([constant(ring, 2)]).impossible).toBe(true);
    expect(shown([g('M', 2)]).impossible).toBe(true);
    expect(shown([add(g('a'), constant(ring, 1)), g('a')]).impossible).toBe(true);
    expect(shown([]).impossible).toBe(false);
  });

  it('keeps a condition in which the solution would be divided by', () => {
    expect(shown([g('a'), add(g('a', -1), g('b', 2))]).open).toHaveLength(1);
  });

  it('solves random linear systems: every condition holds, and no solution contains a solved coupling', () => {
    for (let run = 0; run < runs(40); run++) {
      const random = new Random(firstSeed(71_000) + run);
      const conditions = Array.from({ length: 1 + random.below(4) }, () =>
        sum(
          ring,
          COUPLINGS.map((name) => scale(g(name), toRational(random.rational()))),
        ),
      );
      const { solved, open } = solveConditions(conditions, COUPLINGS);
      expect(open).toEqual([]);
      for (const c of conditions) expect(isZero(substitute(c, solved)), infix(c)).toBe(true);
      for (const p of solved.values()) for (const name of solved.keys()) expect(involves(p, name)).toBe(false);
    }
  });
});
