import { describe, expect, it } from 'vitest';
import { makeRing } from '../../src/algebra/ring.js';
import { contractions } from '../../src/tensor/enumerate.js';
import { factorsKey } from '../../src/tensor/expression.js';
import { kindTable, makeKind } from '../../src/tensor/kinds.js';
import { linearRelations } from '../../src/tensor/relations.js';
import { exchange } from '../../src/tensor/symmetry.js';
import { type Content, invariantCounts } from '../oracle/characters.js';

const RING = makeRing([]);
const KINDS = kindTable();
const [T, R, EPSILON] = [KINDS.get('T/3')!, KINDS.get('R/4')!, KINDS.get('epsilon/4')!];

const tensors = ({ torsion = 0, curvature = 0 }: Content) => [
  ...Array<typeof T>(torsion).fill(T),
  ...Array<typeof R>(curvature).fill(R),
];
const count = (content: Content, odd: boolean): number =>
  linearRelations(contractions(RING, [...tensors(content), ...(odd ? [EPSILON] : [])], KINDS), KINDS).basis.length;

describe('independent scalars by enumeration and rank, and by characters of O(4)', () => {
  const CASES: readonly (readonly [Content, even: number, odd: number, source: string])[] = [
    [{ curvature: 1 }, 1, 1, 'arXiv:1105.3504 (memory)'],
    [{ torsion: 2 }, 3, 2, 'arXiv:1105.3504 (memory)'],
    [{ curvature: 2 }, 6, 4, 'arXiv:1105.3504 (memory)'],
    [{ torsion: 2, curvature: 1 }, 21, 21, 'computed'],
    [{ torsion: 4 }, 21, 16, 'computed'],
  ];
  for (const [content, even, odd, source] of CASES)
    it(`${JSON.stringify(content)}: ${even} even, ${odd} odd — ${source}`, () => {
      const counts = invariantCounts(content);
      expect(counts.even).toBeCloseTo(even, 6);
      expect(counts.odd).toBeCloseTo(odd, 6);
      expect([count(content, false), count(content, true)]).toEqual([even, odd]);
    }, 60_000);

  it('curvature³: the rank is that of the character count', () => {
    const { even, odd } = invariantCounts({ curvature: 3 });
    expect(Math.abs(even - Math.round(even))).toBeLessThan(1e-6);
    expect(count({ curvature: 3 }, false)).toBe(Math.round(even));
    expect(count({ curvature: 3 }, true)).toBe(Math.round(odd));
  }, 120_000);
});

describe('contractions', () => {
  it('none for an odd number of slots', () => {
    expect(contractions(RING, [T], KINDS)).toEqual([]);
  });

  it('lists each canonical product once, short ones first, without those that vanish', () => {
    const keys = contractions(RING, [T, T], KINDS).map(factorsKey);
    expect(keys).toEqual(['T(_a)T(^a)', 'T(_a_b_c)T(^a^b^c)', 'T(_a_b_c)T(^b^a^c)']);
  });

  it('of a declared tensor', () => {
    const S = makeKind('S', 2, [exchange(2, 0, 1, 1)]);
    const kinds = kindTable([S]);
    expect(contractions(RING, [S, S], kinds).map(factorsKey)).toEqual(['S(_a^a)S(_b^b)', 'S(_a_b)S(^a^b)']);
    const F = makeKind('F', 2, [exchange(2, 0, 1, -1)]);
    expect(contractions(RING, [F, F], kindTable([F])).map(factorsKey)).toEqual(['F(_a_b)F(^a^b)']);
  });
});
