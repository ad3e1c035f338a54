import { describe, expect, it } from 'vitest';
import { scale } from '../src/algebra/poly.js';
import { rational } from '../src/algebra/rational.js';
import { covariantMismatches, covariantTheory } from '../src/covariant.js';
import { derive } from '../src/derive.js';
import { readTheory } from '../src/notation/read-theory.js';
import type { TensorSum } from '../src/tensor/expression.js';
import { CONSTANTS, randomTerm, write } from './oracle/lagrangian.js';
import { theoryText, type Wanted } from './oracle/pipeline.js';
import { firstSeed, Random, runs } from './oracle/random.js';

const theoryOf = (wanted: Wanted) => derive(readTheory(theoryText(wanted), 'outer-mole.yaml'));

describe('covariant field equations of random theories', () => {
  const constants = CONSTANTS.filter((c) => c !== 'M' && c !== 'mu');
  for (let n = 0; n < runs(14); n++) {
    const seed = firstSeed(7100) + n;
    it(`agree with the reduced equations on every geometry, seed ${seed}`, () => {
      const random = new Random(seed);
      const wishes = { degree: [1, 3] as const, epsilon: 30, metric: 10, constants };
      const terms = Array.from({ length: 1 + random.below(3) }, () => randomTerm(random, wishes));
      const wanted: Wanted = {
        lagrangian: write(random, terms, 'none').text,
        constants,
        signature: random.pick(['-+++', '+---'] as const),
      };
      const found = covariantTheory(theoryOf(wanted));
      expect(found.checks.length, theoryText(wanted)).toBeGreaterThan(0);
      expect(found.checks.every((c) => c.holds)).toBe(true);
    });
  }
});

describe('the comparison by components', () => {
  const wanted: Wanted = {
    lagrangian: '1/2 M^2 R + c R_{ab} R^{ba} + b M^2 T_{abc} T^{bac} + q M^2 T_a A^a + s R_{abcd} T^{abe} T^{cd}{}_e',
    constants: ['c', 'b', 'q', 's'],
  };
  const derivation = theoryOf(wanted);
  const { equations } = covariantTheory(derivation);

  it('accepts the equations themselves', () => {
    expect(covariantMismatches(derivation, equations)).toEqual([]);
  });

  // A term may vanish on both geometries by symmetry (the tensor part of torsion on the isotropic one, for instance);
  // Bianchi I has enough components for most of them to be seen.
  const spoiled = (sum: TensorSum, i: number): TensorSum =>
    sum.map((t, n) => (n === i ? { ...t, coefficient: scale(t.coefficient, rational(-1)) } : t));
  it('notices a wrong sign in most single terms of either equation', () => {
    let seen = 0;
    let tried = 0;
    equations.coframe.forEach((_, i) => {
      tried++;
      if (covariantMismatches(derivation, { ...equations, coframe: spoiled(equations.coframe, i) }).length > 0) seen++;
    });
    equations.connection.forEach((_, i) => {
      tried++;
      const connection = spoiled(equations.connection, i);
      if (covariantMismatches(derivation, { ...equations, connection }).length > 0) seen++;
    });
    expect(tried).toBeGreaterThan(30);
    expect(seen / tried).toBeGreaterThan(0.7);
  });
});

describe('published field equations', () => {
  it('Einstein–Cartan theory: Einstein tensor, and torsion that vanishes (Rev. Mod. Phys. 48 (1976) 393; memory)', () => {
    const d = theoryOf({ lagrangian: '1/2 M^2 R' });
    const { equations } = covariantTheory(d);
    const text = (sum: TensorSum) =>
      sum.map((t) => [
        t.factors.map((f) => f.head + f.slots.map((s) => s.name).join('')).join(' '),
        t.coefficient.size,
      ]);
    expect(text(equations.coframe)).toEqual([
      ['Rba', 1],
      ['R etaab', 1],
    ]);
    // T_cab + η_ac T_b − η_bc T_a up to ½M²: its trace and then itself vanish.
    expect(equations.connection).toHaveLength(3);
  });

  it('R = R° + 𝕋 + 2 ∇°_a T^a with 𝕋 = ¼T_abc T^abc + ½T_abc T^bac − T_a T^a (review arXiv:1511.07586; memory)', () => {
    for (const signature of ['-+++', '+---'] as const) {
      const d = theoryOf({ lagrangian: 'M^2 R', signature });
      const { inMetricTerms } = covariantTheory(d);
      const found = new Map(
        inMetricTerms.map((t) => [
          t.factors.map((f) => `${f.head}${f.slots.map((s) => s.name).join('')}`).join(' '),
          t.coefficient,
        ]),
      );
      const M2 = found.get('metric R')!;
      const value = (key: string) => found.get(key);
      expect([...found.keys()].sort()).toEqual(['Ta Ta', 'Tabc Tabc', 'Tabc Tbac', 'metric R', 'metric nabla Taa']);
      expect(value('Tabc Tabc')).toEqual(scale(M2, rational(1, 4)));
      expect(value('Tabc Tbac')).toEqual(scale(M2, rational(1, 2)));
      expect(value('Ta Ta')).toEqual(scale(M2, rational(-1)));
      expect(value('metric nabla Taa')).toEqual(scale(M2, rational(2)));
    }
  });
});
