/**
 * The bi-scalar form of random theories, reduced again from its covariant form with the second derivatives of the metric
 * curvature left in, against the torsion theory at random exact points: at k = 0 as it stands, at every k with the
 * curvature obstruction. A refusal must be deserved.
 */
import { describe, expect, it } from 'vitest';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import type { Point } from '../oracle/geometry.js';
import { circumstances, type DerivedJson, derived, equationsAt, shown } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { factorsOf } from '../oracle/reading.js';
import { type BiScalarTexts, biScalarValues } from '../oracle/scalar-tensor.js';
import { torsionTheory } from '../oracle/variation.js';
import { type RandomTheory, randomTheory, SYMBOLS } from './wanted.js';

const still = (x: Q): Q[] => [x, E.ZERO, E.ZERO];

/** A point without the value 0, where a condition may hold by accident. */
function nowhereZero(random: Random, derivatives: number): Point {
  const point = random.point('flrw', SYMBOLS, derivatives);
  const fields = Object.entries(point.fields).map(
    ([name, jet]) => [name, jet.map(() => random.rational(true))] as const,
  );
  return { ...point, fields: Object.fromEntries(fields) };
}

/** The Hessian of L in (ȧ, φ̇, ψ̇): minus the coefficients of the accelerations in the equations. */
function hessian(json: DerivedJson, point: Point): Record<string, Q> {
  const names = ['a', 'phi', 'psi'];
  const base = equationsAt(json, point);
  const out: Record<string, Q> = {};
  for (const column of names) {
    const jet = [...point.fields[column]!];
    jet[2] = E.add(jet[2]!, E.ONE);
    const moved = equationsAt(json, { ...point, fields: { ...point.fields, [column]: jet } });
    for (const row of names) out[`${row},${column}`] = E.sub(base[row]!, moved[row]!);
  }
  return out;
}

/** Derivative at 0 of the polynomial through (j, y_j), j = 0, 1 …: exact when its degree is below the number of points. */
function slope(values: readonly Q[]): Q {
  let row = [...values];
  let total = E.ZERO;
  for (let n = 1; row.length > 1; n++) {
    row = row.slice(1).map((y, j) => E.sub(y, row[j]!));
    total = E.add(total, E.mul(row[0]!, E.q(n % 2 === 1 ? 1 : -1, n)));
  }
  return total;
}

/** Whether no Lagrangian of the class has these equations at k = 0, lapse 1. */
function isOutsideTheClass(json: DerivedJson, random: Random): boolean {
  const at = (): Point => {
    const point = nowhereZero(random, 2);
    const { fields } = point;
    return {
      ...point,
      k: E.ZERO,
      fields: { ...fields, N: still(E.ONE), a: [E.ONE, ...fields.a!.slice(1)] },
    };
  };
  const first = at();
  const second = at();
  const faster = {
    ...first,
    fields: Object.fromEntries(
      Object.entries(first.fields).map(([name, jet]) => [name, [jet[0]!, ...second.fields[name]!.slice(1)]]),
    ),
  };
  const one = hessian(json, first);
  if (JSON.stringify(shown(one)) !== JSON.stringify(shown(hessian(json, faster)))) return true;
  return ['phi', 'psi'].some((field) => {
    const values = Array.from({ length: 16 }, (_, j) => {
      const jet = [...first.fields[field]!];
      jet[0] = E.add(jet[0]!, E.q(j));
      return hessian(json, { ...first, fields: { ...first.fields, [field]: jet } })['a,a']!;
    });
    // At a = 1 the coefficient of H² is half of ∂²L/∂ȧ², that of H φ̇ is ∂²L/∂ȧ∂φ̇.
    return !E.same(E.div(slope(values), E.q(2)), one[`a,${field}`]!);
  });
}

function compare(seed: number, random: Random, { wanted, oracle }: RandomTheory): 'bi-scalar' | 'none' {
  const json = derived(wanted);
  const form = json.scalarTensor;
  const point = random.point('flrw', SYMBOLS, 4);
  const about = circumstances(seed, wanted, point);
  if (form.form === 'none') {
    expect(form.reason, about).not.toBe('');
    expect(isOutsideTheClass(json, random), about).toBe(true);
    return 'none';
  }
  expect(form.validFor, about).toBe(form.curvatureObstruction === '0' ? 'every k' : 'k = 0');
  const flat = { ...point, k: E.ZERO };
  const gravity = { ...oracle, matter: [] };
  expect(shown(biScalarValues(form, flat, false).equations), `${about}\nat k = 0`).toEqual(
    shown(torsionTheory(gravity, flat).equations),
  );
  expect(shown(biScalarValues(form, point, true).equations), about).toEqual(
    shown(torsionTheory(gravity, point).equations),
  );
  if (form.curvatureObstruction.includes('D(')) expect(needsVelocities(form, random), about).toBe(true);
  return 'bi-scalar';
}

/** Whether the equations of the obstruction depend on velocities at lapse 1: if not, a total derivative removes them. */
function needsVelocities(form: BiScalarTexts, random: Random): boolean {
  const first = nowhereZero(random, 4);
  const second = nowhereZero(random, 4);
  const movable = ['a', 'phi', 'psi'];
  const [one, other] = [first, second].map((speeds) => {
    const fields: Record<string, readonly Q[]> = { N: [E.ONE, ...Array<Q>(4).fill(E.ZERO)] };
    for (const name of movable) fields[name] = [first.fields[name]![0]!, ...speeds.fields[name]!.slice(1)];
    const point = { ...first, k: E.q(3, 2), fields };
    const [without, included] = [false, true].map((flag) => biScalarValues(form, point, flag).equations);
    return movable.map((name) => E.show(E.sub(included![name]!, without![name]!)));
  });
  return JSON.stringify(one) !== JSON.stringify(other);
}

describe('scalar-tensor form of a random theory', () => {
  it(
    'at most quadratic in torsion and curvature: there always is one',
    () => {
      for (let run = 0; run < runs(16); run++) {
        const seed = firstSeed(310_000) + run;
        const random = new Random(seed);
        const theory = randomTheory(random, {
          geometry: 'flrw',
          degree: [1, 2],
          terms: 5,
          matter: 20,
          liberty: 'brackets',
        });
        expect(compare(seed, random, theory), `seed ${seed}`).toBe('bi-scalar');
      }
    },
    runs(60_000),
  );

  it(
    'of degree up to four: one that agrees, or a deserved refusal',
    () => {
      const outcomes = new Set<string>();
      for (let run = 0; run < runs(24); run++) {
        const seed = firstSeed(320_000) + run;
        const random = new Random(seed);
        const theory = randomTheory(random, { geometry: 'flrw', degree: [2, 4], terms: 2, matter: 20 });
        outcomes.add(compare(seed, random, theory));
      }
      if (process.env.UNTWIST_RUNS === undefined) expect(outcomes.size).toBe(2);
    },
    runs(60_000),
  );

  it('of higher degree with an obstruction that keeps a velocity: 6912 k φψψ̇/a² for Gauss–Bonnet times A_a A^a', () => {
    const wanted = { lagrangian: '(R^2 - 4 R_{ab} R^{ba} + R_{abcd} R^{cdab}) A_e A^e' };
    const form = derived(wanted).scalarTensor;
    if (form.form === 'none') throw new Error(form.reason);
    expect(form.curvatureObstruction).toContain('D(');
    const parts = [['R R', 1] as const, ['R_{ab} R^{ba}', -4] as const, ['R_{abcd} R^{cdab}', 1] as const];
    const lagrangian = parts.map(([pair, n]) => ({
      coefficient: E.q(n),
      symbols: [],
      factors: factorsOf(`${pair} A_e A^e`),
    }));
    const theory = { wanted, oracle: { geometry: 'flrw', signature: '-+++', lagrangian, matter: [] } as const };
    for (let run = 0; run < runs(3); run++)
      expect(compare(firstSeed(330_000) + run, new Random(firstSeed(330_000) + run), theory)).toBe('bi-scalar');
  });
});
