import { describe, expect, it } from 'vitest';
import { moveTo } from '../src/algebra/collect.js';
import { infix } from '../src/algebra/infix.js';
import { dependsOn, independent, primitive } from '../src/algebra/linear.js';
import { equals, isCanonical, isZero, type Poly, scale, sum } from '../src/algebra/poly.js';
import { multiplyRational, rational } from '../src/algebra/rational.js';
import { loadGeometry } from '../src/geometry/build.js';
import { componentEvaluator, ringWith } from '../src/geometry/covariant-components.js';
import { type ConstrainedTensor, constrainedTensors, slotSymmetries } from '../src/multipliers.js';
import { readTheory } from '../src/notation/read-theory.js';
import type { Theory } from '../src/notation/theory.js';
import { unpackIndices } from '../src/tensor/components.js';
import { canonicalSum } from '../src/tensor/expression.js';
import { kindTable } from '../src/tensor/kinds.js';
import { ringOfNames, tensorTerms } from '../src/tensor/lagrangian-sum.js';
import { expandParts } from '../src/tensor/parts.js';
import { errorText } from './notation/rendered.js';
import { theoryText, type Wanted } from './oracle/pipeline.js';
import { firstSeed, Random, runs } from './oracle/random.js';

function constrained(constrain: readonly string[], more: Partial<Wanted> = {}): readonly ConstrainedTensor[] {
  const theory: Theory = readTheory(theoryText({ lagrangian: 'R', constrain, ...more }), 'fairway.yaml');
  const geometry = loadGeometry(theory.geometry, theory.signature);
  const ring = ringWith(geometry, ringOfNames(theory.symbols.map((s) => s.name)));
  return constrainedTensors(theory, geometry, ring, (p) => p);
}
const values = (found: readonly ConstrainedTensor[]): string[] =>
  found.flatMap((t) => t.multipliers.map((m) => infix(m.value)));

describe('constrainedTensors', () => {
  it('curvature has four multipliers, one for each of its components', () => {
    const [curvature] = constrained(['R^a_{bcd}']);
    expect([curvature!.invariant, curvature!.independent]).toEqual([4, 36]);
    expect(values([curvature!])).toEqual([
      'phi^2 - psi^2 + k/a^2',
      'phi*psi',
      'phi*D(a,1)/(N*a) + D(phi,1)/N',
      'psi*D(a,1)/(N*a) + D(psi,1)/N',
    ]);
    expect(curvature!.multipliers.map((m) => [m.name, m.latex, m.dimension])).toEqual(
      [1, 2, 3, 4].map((i) => [`lambda_${i}`, `\\lambda_{${i}}`, 2]),
    );
  });

  it('scalars have one of one, vectors the time component', () => {
    expect(constrained(['R', 'T_a']).map((t) => [t.invariant, t.independent, t.multipliers.length])).toEqual([
      [1, 1, 1],
      [1, 4, 1],
    ]);
  });

  it('what follows from constraints before it needs no multiplier', () => {
    expect(constrained(['T^a_{bc}', 'T_a', 'A_a']).map((t) => t.multipliers.length)).toEqual([2, 0, 0]);
    expect(constrained(['T^{(tensor)}_{abc}', 'R_{ab} - R_{ba}']).map((t) => t.multipliers.length)).toEqual([0, 0]);
  });

  it('symmetrised expressions have the symmetry of their slots', () => {
    expect(constrained(['R_{ab} + R_{ba}']).map((t) => t.independent)).toEqual([10]);
    expect(constrained(['R_{ab} - R_{ba}']).map((t) => t.independent)).toEqual([6]);
    expect(constrained(['T^{(axial)}_{abc}']).map((t) => t.independent)).toEqual([4]);
    expect(constrained(['R_{abcd} + R_{cdab}']).map((t) => [t.independent, t.invariant])).toEqual([[21, 3]]);
  });

  it('an expression that is zero by itself is refused', () => {
    expect(errorText(() => constrained(['T^{(vector)}_{abc} + T^{(vector)}_{acb}']))).toContain('is zero already');
  });

  it('λ^ab… C_ab… along each multiplier is its constraint, for random expressions; and together they say all that C = 0 says', () => {
    const POOL = [
      'R_{abcd}',
      'R_{acbd}',
      'T_{abc} T_d',
      'T_a T_{bcd}',
      '\\epsilon_{abcd} R',
      '\\eta_{ab} R_{cd}',
      'T_{ab}{}^e T_{ecd}',
      '\\eta_{ab} \\eta_{cd} c1',
    ];
    const SHORT = [
      'R_{ab}',
      'R_{ba}',
      'T_a T_b',
      'T_a A_b',
      '\\eta_{ab} R',
      'T_{acd} T_b{}^{cd}',
      '\\epsilon_{abcd} T^{cde} T_e',
      'c1 \\eta_{ab}',
    ];
    const THREE = [
      'T_{abc}',
      'T_{bac}',
      '\\eta_{ab} T_c',
      '\\epsilon_{abcd} A^d',
      'c1 \\epsilon_{abcd} T^d',
      'T^{(tensor)}_{cab}',
    ];
    for (let run = 0; run < runs(12); run++) {
      const seed = firstSeed(840) + run;
      const random = new Random(seed);
      const pool = random.pick([POOL, SHORT, THREE]);
      const chosen = random.shuffled(pool).slice(0, 1 + random.below(2));
      const text = chosen.map((t) => `${1 + random.below(3)} ${t}`).join(random.pick([' + ', ' - ']));
      const more: Partial<Wanted> = {
        constants: ['c1'],
        signature: random.pick(['-+++', '+---'] as const),
        geometry: random.pick(['flrw', 'bianchi-i'] as const),
      };
      const about = `seed ${seed}: ${text} on ${more.geometry}, ${more.signature}`;
      const [found] = constrained([text.replaceAll('\\', '\\\\')], more);
      expectComplete(found!, more, about);
    }
  });
});

function expectComplete(found: ConstrainedTensor, more: Partial<Wanted>, about: string): void {
  const geometry = loadGeometry(more.geometry!, more.signature!);
  const ring = ringWith(geometry, ringOfNames(['c1', 'M']));
  const { terms, free } = found.constraint;
  const names = free.map((s) => s.name);
  const lowered = tensorTerms(ring, expandParts(terms).terms).map((t) => ({
    ...t,
    factors: t.factors.map((f) => ({
      ...f,
      slots: f.slots.map((s) => (names.includes(s.name) ? { ...s, up: false } : s)),
    })),
  }));
  const { entries } = componentEvaluator(geometry, ring).components(canonicalSum(lowered, kindTable()), names);
  const own = found.multipliers.map((m) => moveTo(m.value, ring));
  for (const [i, m] of found.multipliers.entries()) {
    expect(isCanonical(m.value)).toBe(true);
    const contraction = sum(
      ring,
      [...m.tensor].flatMap(([packed, factor]) => {
        const value = entries.get(packed);
        const sign = unpackIndices(packed, names.length).reduce((s, n) => s * geometry.tensors.metric[n]!, 1);
        return value ? [scale(value, multiplyRational(factor, rational(sign)))] : [];
      }),
    );
    expect(equals(contraction, own[i]!), about).toBe(true);
    expect(equals(primitive(own[i]!), own[i]!), about).toBe(true);
  }
  expect(independent(own).length, about).toBe(own.length);
  for (const value of entries.values()) expect(isZero(value) || dependsOn(value, own), about).toBe(true);
  const span = independent([...entries.values()] as Poly[]);
  expect(span.length, about).toBe(own.length);
  expect(own.length, about).toBeLessThanOrEqual(found.invariant);
}

describe('slotSymmetries', () => {
  it('finds signed permutations of free indices', () => {
    const kinds = kindTable();
    const ring = ringOfNames([]);
    const [constraint] = readTheory(theoryText({ lagrangian: 'R', constrain: ['R_{abcd}'] }), 'x').constraints!;
    const terms = tensorTerms(ring, constraint!.terms);
    const found = slotSymmetries(terms, ['a', 'b', 'c', 'd'], (s) => canonicalSum(s, kinds));
    expect(found.map((s) => `${s.sign > 0 ? '+' : '-'}${s.places.join('')}`)).toEqual(['-0132', '-1023', '+1032']);
  });
});
