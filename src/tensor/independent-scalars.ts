/** All independent scalars of a given content of torsion and curvature, with the relations of the others to them. */

import type { Rational } from '../algebra/rational.js';
import { makeRing } from '../algebra/ring.js';
import { InputError } from '../notation/diagnostics.js';
import { contractions } from './enumerate.js';
import type { TensorSymbol } from './expression.js';
import { type KindTable, kindTable } from './kinds.js';
import { inPreferredOrder } from './preference.js';
import { linearRelations } from './relations.js';

export interface Content {
  readonly torsion: number;
  readonly curvature: number;
}

export type Parity = 'even' | 'odd';

export interface IndependentScalars {
  readonly parity: Parity;
  /** In the order of preference.ts, each product that is no combination of earlier ones. */
  readonly basis: readonly (readonly TensorSymbol[])[];
  /** The other canonical products, along the basis. */
  readonly dependent: readonly { readonly factors: readonly TensorSymbol[]; readonly along: readonly Rational[] }[];
}

/** Slots of torsion and curvature together: beyond this the enumeration takes minutes. */
export const MAX_CONTENT_SLOTS = 12;

/**
 * Scalars without derivatives that contain so many torsions and curvatures, traces counted as what they are traces of;
 * odd ones contain one ε.
 * @throws InputError `content-limit`.
 */
export function independentScalars(
  { torsion, curvature }: Content,
  parity: Parity,
  kinds: KindTable = kindTable(),
): IndependentScalars {
  if (3 * torsion + 4 * curvature > MAX_CONTENT_SLOTS)
    throw new InputError([
      {
        code: 'content-limit',
        severity: 'error',
        message: `${torsion} torsions and ${curvature} curvatures have more than ${MAX_CONTENT_SLOTS} indices`,
        hint: 'enumerate products of lower degree',
      },
    ]);
  const tensors = [
    ...Array.from({ length: torsion }, () => kinds.get('T/3')!),
    ...Array.from({ length: curvature }, () => kinds.get('R/4')!),
    ...(parity === 'odd' ? [kinds.get('epsilon/4')!] : []),
  ];
  const products = inPreferredOrder(contractions(makeRing([]), tensors, kinds));
  const { basis, dependent } = linearRelations(products, kinds);
  return {
    parity,
    basis: basis.map((i) => products[i]!),
    dependent: [...dependent].map(([i, along]) => ({ factors: products[i]!, along })),
  };
}
