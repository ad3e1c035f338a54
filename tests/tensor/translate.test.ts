import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { isZero } from '../../src/algebra/poly.js';
import { multiplyScalarTerms } from '../../src/notation/scalar-term.js';
import { basisNames, bundledBasis } from '../../src/tensor/basis-file.js';
import type { TensorSum } from '../../src/tensor/expression.js';
import { kindTable } from '../../src/tensor/kinds.js';
import { lagrangianOf, scalarsOf, sumOf } from '../../src/tensor/lagrangian-sum.js';
import { writeOutParts } from '../../src/tensor/parts.js';
import { equalSums } from '../../src/tensor/rewrite.js';
import { bundledRules } from '../../src/tensor/rule-library.js';
import { densityOf, simplify } from '../../src/tensor/simplify.js';
import { type Translation, translate } from '../../src/tensor/translate.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { NAMES, RING, shown, sum } from './rewriting.js';

const KINDS = kindTable();
const to = (text: string, basis: string): Translation => translate(RING, sum(text), bundledBasis(basis), KINDS);
const values = ({ couplings }: Translation): Record<string, string> =>
  Object.fromEntries(couplings.filter((c) => !isZero(c.value)).map((c) => [c.entry.coupling, infix(c.value)]));
/** Σ value · invariant + outside. */
const back = ({ couplings, outside }: Translation): TensorSum => {
  const terms = couplings.flatMap(({ entry, value }) =>
    scalarsOf(value).flatMap((scalar) =>
      entry.terms.map((t) => ({ ...t, scalar: multiplyScalarTerms(scalar, t.scalar) })),
    ),
  );
  return writeOutParts(sumOf(RING, [...terms, ...lagrangianOf(outside)], KINDS), KINDS).value;
};

describe('translation into a basis', () => {
  it('of the torsion squares into irreducible parts', () => {
    // T_abc T^abc is the sum of the squares of the parts; T_abc T^bac is ½ tensor² + ½ vector² − axial².
    expect(values(to('T_{abc} T^{abc}', 'irreducible'))).toEqual({ t1: '1', t2: '1', t3: '1' });
    expect(values(to('T_{abc} T^{bac}', 'irreducible'))).toEqual({ t1: '1/2', t2: '1/2', t3: '-1' });
    expect(values(to('T_a T^a', 'irreducible'))).toEqual({ t2: '3/2' });
    expect(values(to('A_a A^a', 'irreducible'))).toEqual({ t3: '-6' });
  });

  it('of the curvature squares into irreducible parts', () => {
    expect(values(to('R_{abcd} R^{abcd}', 'irreducible'))).toEqual({
      r1: '1',
      r2: '1',
      r3: '1',
      r4: '1',
      r5: '1',
      r6: '1',
    });
    expect(values(to('R_{abcd} R^{cdab}', 'irreducible'))).toEqual({
      r1: '1',
      r2: '-1',
      r3: '1',
      r4: '1',
      r5: '-1',
      r6: '1',
    });
    expect(values(to('c1 R^2', 'irreducible'))).toEqual({ r6: '6*c1' });
  });

  it(
    'there and back is the identity, for every pair of bases',
    () => {
      for (const name of basisNames()) {
        const { entries } = bundledBasis(name);
        for (let run = 0; run < runs(4); run++) {
          const random = new Random(firstSeed(84_000) + run);
          const text = entries
            .filter(() => random.chance(50))
            .flatMap((e) => e.terms)
            .map((t) => ({ ...t, scalar: { ...t.scalar, powers: [[random.pick(NAMES), 1]] as const } }));
          const typed = sumOf(RING, text, KINDS);
          for (const other of basisNames()) {
            const there = translate(RING, typed, bundledBasis(other), KINDS);
            expect(there.outside).toEqual([]);
            const again = translate(RING, back(there), bundledBasis(name), KINDS);
            const straight = translate(RING, typed, bundledBasis(name), KINDS);
            expect(values(again)).toEqual(values(straight));
          }
        }
      }
    },
    runs(60_000),
  );

  it('keeps what the basis does not span', () => {
    const text = 'c1 R^2 + x R T_a T^a + c2';
    const there = to(text, 'irreducible');
    expect(values(there)).toEqual({ r6: '6*c1' });
    expect(shown(there.outside)).toBe('c2· + x·R()T(_a)T(^a)');
    expect(equalSums(simplify(back(there), { kinds: KINDS, given: new Set() }).value, sum(text), KINDS)).toBe(true);
  });

  it('of a combination that only the whole basis spans', () => {
    const gaussBonnet = {
      ...bundledBasis('monomials'),
      entries: [
        {
          coupling: 'g',
          latex: 'g',
          terms: lagrangianOf(sum('R^2 - 4 R_{ab} R^{ba} + R_{abcd} R^{cdab}')),
          sum: densityOf(bundledRules('identities')[0]!).sum,
          origin: bundledBasis('monomials').entries[0]!.origin,
        },
      ],
    };
    const there = translate(RING, sum('c1 R^2 - 4 c1 R_{ab} R^{ba} + c1 R_{abcd} R^{cdab}'), gaussBonnet, KINDS);
    expect(values(there)).toEqual({ g: 'c1' });
    expect(there.outside).toEqual([]);
  });

  it('modulo total derivatives uses one coupling less for each', () => {
    const densities = bundledRules('identities')
      .slice(0, 3)
      .map((r) => densityOf(r));
    const there = translate(
      RING,
      sum('c1 R_{abcd} R^{cdab} + c2 \\epsilon^{abcd} R_{efab} R^{ef}{}_{cd} + R'),
      bundledBasis('monomials'),
      KINDS,
      densities,
    );
    expect(values(there)).toEqual({ c0: '1', a1: '-c1', a3: '4*c1' });
  });
});
