/**
 * Random three-dimensional Lie algebras as structure equations of one-forms: dθ^k = ½ C^k_ij θ^i∧θ^j with
 * C^k_ij = ε_ijl n^lk + δ^k_j a_i − δ^k_i a_j, n symmetric, n·a = 0, which is every one of them (class A: a = 0).
 */
import type { Poly } from '../../src/algebra/poly.js';
import { constant } from '../../src/algebra/poly.js';
import type { Ring } from '../../src/algebra/ring.js';
import { type Form, maskOf } from '../../src/geometry/forms.js';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import { levi } from '../oracle/geometry.js';
import type { Random } from '../oracle/random.js';
import { toRational } from '../random-poly.js';

export interface LieAlgebra {
  /** C^k_ij by k, i, j from 1 to 3; index 0 is time and closed. */
  readonly constants: readonly (readonly (readonly Q[])[])[];
}

const SPACE = [1, 2, 3] as const;

export function randomLieAlgebra(random: Random, kind: 'A' | 'B'): LieAlgebra {
  const n = [0, 1, 2, 3].map(() => [0, 1, 2, 3].map(() => E.ZERO));
  const a = [E.ZERO, E.ZERO, E.ZERO, E.ZERO];
  const set = (i: number, j: number): void => {
    n[i]![j] = random.rational();
    n[j]![i] = n[i]![j]!;
  };
  if (kind === 'A') for (const i of SPACE) for (const j of SPACE) set(i, j);
  else {
    // n·a = 0 with a along the third axis; a general basis would only hide it.
    set(1, 1);
    set(1, 2);
    set(2, 2);
    a[3] = random.rational(true);
  }
  const delta = (i: number, j: number): Q => E.q(i === j ? 1 : 0);
  const at = (k: number, i: number, j: number): Q =>
    E.sum(
      ...SPACE.map((l) => E.mul(E.q(levi(i - 1, j - 1, l - 1)), n[l]![k]!)),
      E.mul(delta(k, j), a[i]!),
      E.neg(E.mul(delta(k, i), a[j]!)),
    );
  return {
    constants: [0, 1, 2, 3].map((k) =>
      [0, 1, 2, 3].map((i) => [0, 1, 2, 3].map((j) => (k * i * j === 0 ? E.ZERO : at(k, i, j)))),
    ),
  };
}

/** Structure constants that violate the Jacobi identity. */
export function brokenLieAlgebra(random: Random): LieAlgebra {
  const { constants } = randomLieAlgebra(random, 'B');
  // n^33 a_3 ≠ 0.
  const more = random.rational(true);
  return {
    constants: constants.map((plane, k) =>
      plane.map((row, i) =>
        row.map((x, j) => (k === 3 && i * j === 2 ? E.add(x, E.mul(E.q(levi(i - 1, j - 1, 2)), more)) : x)),
      ),
    ),
  };
}

/** dθ^k as forms, the first one closed. */
export function structureOf({ constants }: LieAlgebra, ring: Ring): Form[] {
  return constants.map((plane) => {
    const form = new Map<number, Poly>();
    for (const i of SPACE)
      for (const j of SPACE) {
        const x = plane[i]![j]!;
        if (i < j && !E.isZero(x)) form.set(maskOf([i, j]), constant(ring, toRational(x)));
      }
    return form;
  });
}
