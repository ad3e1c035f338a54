import { describe, expect, it } from 'vitest';
import { factorsKey } from '../../src/tensor/expression.js';
import { independentScalars } from '../../src/tensor/independent-scalars.js';
import { errorText } from '../notation/rendered.js';

describe('independent scalars', () => {
  it('of two torsions, even', () => {
    const { basis, dependent, parity } = independentScalars({ torsion: 2, curvature: 0 }, 'even');
    expect(parity).toBe('even');
    expect(basis.map(factorsKey)).toEqual(['T(_a_b_c)T(^a^b^c)', 'T(_a_b_c)T(^b^a^c)', 'T(_a)T(^a)']);
    expect(dependent).toEqual([]);
  });

  it('with the relations of the others', () => {
    const { basis, dependent } = independentScalars({ torsion: 2, curvature: 0 }, 'odd');
    expect(basis).toHaveLength(2);
    for (const { along } of dependent) expect(along).toHaveLength(2);
    expect(dependent.length).toBeGreaterThan(0);
  });

  it('none for an odd number of indices', () => {
    expect(independentScalars({ torsion: 1, curvature: 1 }, 'even').basis).toEqual([]);
  });

  it('refuses what would take minutes', () => {
    expect(errorText(() => independentScalars({ torsion: 0, curvature: 4 }, 'even'))).toMatch(
      /0 torsions and 4 curvatures have more than 12 indices/,
    );
  });
});
