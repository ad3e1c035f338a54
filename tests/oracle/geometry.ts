/**
 * Torsion and curvature of a homogeneous frame from the commutators of its vectors, by dense loops over components:
 *   [E_a, E_b] = C^c_ab E_c,   ω^a_bc = Γ^a_b(E_c),
 *   T^a_bc = ω^a_cb − ω^a_bc − C^a_bc,
 *   R^a_bcd = E_c ω^a_bd − E_d ω^a_bc + ω^a_fc ω^f_bd − ω^a_fd ω^f_bc − C^f_cd ω^a_bf.
 * Fields are jets in t; nothing is simplified by hand. No exterior algebra.
 */

import type { Q } from './exact.js';
import * as E from './exact.js';
import { type Algebra, Jet } from './jet.js';

export type GeometryName = 'flrw' | 'bianchi-i';

/** A point of the jet space: derivatives q, q̇, q̈ … of every field at t = 0, and k (0 outside FLRW). */
export interface Point {
  readonly k: Q;
  readonly fields: Readonly<Record<string, readonly Q[]>>;
  /** Constants, scales, densities by their symbols. */
  readonly constants: Readonly<Record<string, Q>>;
}

export const FIELDS: Readonly<Record<GeometryName, readonly string[]>> = {
  flrw: ['N', 'a', 'phi', 'psi'],
  'bianchi-i': ['N', 'a_x', 'a_y', 'a_z', 'phi_x', 'phi_y', 'phi_z', 'psi_x', 'psi_y', 'psi_z'],
};

/** Name of the variation of a field by tᵐ/m!. */
export function direction(field: string, m: number): string {
  return `${field}#${m}`;
}

/** The fields of a point as jets, each varied by t⁰, t¹ … t^order/order!. */
export function fieldJets(point: Point, algebra: Algebra, order: number): Record<string, Jet> {
  const out: Record<string, Jet> = {};
  for (const [name, derivatives] of Object.entries(point.fields)) {
    let factorial = 1n;
    const coefficients = derivatives.map((x, n) => {
      if (n > 0) factorial *= BigInt(n);
      return E.div(x, E.q(factorial));
    });
    const directions = new Map(Array.from({ length: order + 1 }, (_, m) => [direction(name, m), m] as const));
    out[name] = Jet.taylor(algebra, coefficients, directions);
  }
  return out;
}

export interface Frame {
  readonly algebra: Algebra;
  /** √|det g|: the volume element per coordinate volume. */
  readonly volume: Jet;
  /** T^a_bc at [a][b][c]. */
  readonly torsion: readonly (readonly (readonly Jet[])[])[];
  /** R^a_bcd at [a][b][c][d]. */
  readonly curvature: readonly (readonly (readonly (readonly Jet[])[])[])[];
}

export const RANGE = [0, 1, 2, 3] as const;

/** Sign of the permutation (i, j, k …) of 0, 1, 2 …; 0 when two agree. */
export function levi(...indices: readonly number[]): number {
  let sign = 1;
  for (let i = 0; i < indices.length; i++)
    for (let j = i + 1; j < indices.length; j++) {
      if (indices[i] === indices[j]) return 0;
      if (indices[i]! > indices[j]!) sign = -sign;
    }
  return sign;
}

/** The frame of physics-reference FLRW (any k) or of Bianchi I, from jets of its fields. */
export function frameOf(geometry: GeometryName, fields: Readonly<Record<string, Jet>>, algebra: Algebra): Frame {
  const get = (name: string): Jet => {
    const jet = fields[name];
    if (jet === undefined) throw new Error(`the point has no field ${name}`);
    return jet;
  };
  const lapse = get('N');
  const kappa = Jet.kappa(algebra, lapse.length);
  const zero = Jet.number(algebra, E.ZERO, lapse.length);
  const axes = ['x', 'y', 'z'];
  const isotropic = geometry === 'flrw';
  const scale = axes.map((s) => get(isotropic ? 'a' : `a_${s}`));
  const boost = axes.map((s) => get(isotropic ? 'phi' : `phi_${s}`));
  // Γ^i_j = −(ψ + κ/a) ε_ijk e^k; on Bianchi I the group is Abelian: κ = 0.
  const spin = axes.map((s, i) => (isotropic ? get('psi').plus(kappa.over(scale[i]!)) : get(`psi_${s}`)));

  const table2 = (): Jet[][] => RANGE.map(() => RANGE.map(() => zero));
  const table3 = (): Jet[][][] => RANGE.map(table2);
  const omega = table3();
  const commutator = table3();
  for (let i = 1; i <= 3; i++) {
    omega[i]![0]![i] = boost[i - 1]!;
    omega[0]![i]![i] = boost[i - 1]!;
    const drag = scale[i - 1]!.rate().over(scale[i - 1]!.times(lapse));
    commutator[i]![0]![i] = drag.negated();
    commutator[i]![i]![0] = drag;
    for (let j = 1; j <= 3; j++)
      for (let k = 1; k <= 3; k++) {
        const sign = levi(i, j, k);
        if (sign === 0) continue;
        omega[i]![j]![k] = spin[k - 1]!.scaled(E.q(-sign));
        // dθ^i = −κ ε_ijk θ^j∧θ^k is [X_j, X_k] = 2κ ε_ijk X_i.
        if (isotropic)
          commutator[i]![j]![k] = kappa
            .times(scale[i - 1]!)
            .over(scale[j - 1]!.times(scale[k - 1]!))
            .scaled(E.q(2 * sign));
      }
  }
  const perTime = lapse.inverse();
  const along = (c: number, f: Jet): Jet => (c === 0 && !f.isZero() ? f.rate().times(perTime) : zero);
  const torsion = RANGE.map((a) =>
    RANGE.map((b) => RANGE.map((c) => omega[a]![c]![b]!.minus(omega[a]![b]![c]!).minus(commutator[a]![b]![c]!))),
  );
  const curvature = RANGE.map((a) =>
    RANGE.map((b) =>
      RANGE.map((c) =>
        RANGE.map((d) => {
          let r = along(c, omega[a]![b]![d]!).minus(along(d, omega[a]![b]![c]!));
          for (const f of RANGE) {
            r = addProduct(r, 1, omega[a]![f]![c]!, omega[f]![b]![d]!);
            r = addProduct(r, -1, omega[a]![f]![d]!, omega[f]![b]![c]!);
            r = addProduct(r, -1, commutator[f]![c]![d]!, omega[a]![b]![f]!);
          }
          return r;
        }),
      ),
    ),
  );
  for (const jet of [torsion, curvature].flat(4) as Jet[])
    if (!jet.isRational()) throw new Error('an odd power of κ survived in torsion or curvature');
  const volume = scale.reduce((v, s) => v.times(s), lapse);
  return { algebra, volume, torsion, curvature };
}

function addProduct(sum: Jet, sign: 1 | -1, x: Jet, y: Jet): Jet {
  if (x.isZero() || y.isZero()) return sum;
  const p = x.times(y);
  return sign === 1 ? sum.plus(p) : sum.minus(p);
}
