/**
 * Constraints by multipliers on a geometry: the multiplier tensor has the indices and slot symmetries of the constrained
 * expression and the components that the isotropy leaves; each of them becomes a field of time whose equation is one
 * constraint. Components along which the constraint says nothing new are left out.
 */
import { coefficientOf, moveTo } from './algebra/collect.js';
import { dependsOn, echelon, primitive } from './algebra/linear.js';
import { add, generator, isZero, leadingCoefficient, multiply, type Poly, scale, sum } from './algebra/poly.js';
import { addRational, divideRational, multiplyRational, type Rational, rational, ZERO } from './algebra/rational.js';
import { constantsOf, makeRing, type Ring } from './algebra/ring.js';
import { componentEvaluator, ringWith } from './geometry/covariant-components.js';
import type { Geometry, GeometrySymbol } from './geometry/geometry.js';
import { type InvariantTensor, invariantComponents } from './geometry/invariant-components.js';
import { InputError } from './notation/diagnostics.js';
import { dimensionOf } from './notation/lagrangian.js';
import type { SlotSymmetry, TensorConstraint, Theory } from './notation/theory.js';
import { unpackIndices } from './tensor/components.js';
import type { FrameMetric } from './tensor/contraction.js';
import { canonicalSum, type TensorSum } from './tensor/expression.js';
import { kindTable } from './tensor/kinds.js';
import { tensorTerms } from './tensor/lagrangian-sum.js';
import { expandParts } from './tensor/parts.js';
import { exchange } from './tensor/symmetry.js';

/** A field λ_i(t) that enters the Lagrangian as volume · λ_i · value. */
export interface Multiplier extends GeometrySymbol {
  /** The multiplier tensor along λ_i, all indices lowered: λ = Σ λ_i tensor_i. */
  readonly tensor: InvariantTensor;
  /** The constraint: it vanishes on solutions. In the ring that the caller gave. */
  readonly value: Poly;
}

export interface ConstrainedTensor {
  readonly constraint: TensorConstraint;
  /** Independent components by the slot symmetries, and those that the isotropy leaves: 36 and 4 for curvature. */
  readonly independent: number;
  readonly invariant: number;
  readonly multipliers: readonly Multiplier[];
}

/** Slots beyond which only exchanges of two slots and of neighbouring pairs are looked for among the symmetries. */
const ALL_PERMUTATIONS = 4;

/**
 * @param ring has the jets of the geometry and the symbols of the constraints.
 * @param couple applies the relations between couplings.
 * @throws InputError `geometry-class-b`, `empty-constraint`.
 */
export function constrainedTensors(
  { constraints = [], symbols }: Pick<Theory, 'constraints' | 'symbols'>,
  geometry: Geometry,
  ring: Ring,
  couple: (p: Poly) => Poly,
): readonly ConstrainedTensor[] {
  if (constraints.length === 0) return [];
  // Components of single tensors may contain roots of the geometry's parameters; contractions do not.
  const wide = ringWith(geometry, ring);
  const evaluator = componentEvaluator(geometry, wide);
  const { metric } = geometry.tensors;
  const kinds = kindTable();
  const dimensions = new Map(symbols.map((s) => [s.name, s.dimension]));
  const known: Poly[] = [];
  let count = 0;
  return constraints.map((constraint): ConstrainedTensor => {
    // Heights do not matter here: the components are those with all indices lowered.
    const free = constraint.free.map((s) => s.name);
    const written = tensorTerms(ring, expandParts(constraint.terms).terms).map((t) => ({
      coefficient: couple(t.coefficient),
      factors: t.factors.map((f) => ({
        ...f,
        slots: f.slots.map((s) => (free.includes(s.name) ? { ...s, up: false } : s)),
      })),
    }));
    const lowered = canonicalSum(written, kinds);
    if (lowered.length === 0) throw emptyConstraint(constraint);
    const symmetries = slotSymmetries(lowered, free, (s) => canonicalSum(s, kinds));
    const { basis, independent } = invariantComponents(geometry.isotropy, metric, free.length, symmetries);
    const components = evaluator.components(lowered, free);
    const dimension = 4 - dimensionOf(constraint.terms[0]!, dimensions);
    const values = basis.map((tensor) =>
      moveTo(contracted(tensor, components.entries, free.length, metric, wide), ring),
    );
    const multipliers = simplest(basis, values).flatMap(({ tensor, value }): Multiplier[] => {
      if (dependsOn(value, known)) return [];
      known.push(value);
      const name = `lambda_${++count}`;
      const meaning = `multiplier of ${constraint.text}`;
      return [{ name, latex: `\\lambda_{${count}}`, meaning, dimension, tensor, value }];
    });
    return { constraint, independent, invariant: basis.length, multipliers };
  });
}

const emptyConstraint = ({ text, origin }: TensorConstraint): InputError => {
  const message = `the constraint ${text} is zero already`;
  return new InputError([{ code: 'empty-constraint', severity: 'error', message, hint: 'leave it out', ...origin }]);
};

/** λ^{ab…} C_ab… for one invariant tensor. */
function contracted(
  tensor: InvariantTensor,
  entries: ReadonlyMap<number, Poly>,
  slots: number,
  metric: FrameMetric,
  ring: Ring,
): Poly {
  return sum(
    ring,
    [...tensor].flatMap(([packed, factor]) => {
      const value = entries.get(packed);
      if (!value) return [];
      const sign = unpackIndices(packed, slots).reduce((s, i) => s * metric[i]!, 1);
      return [scale(value, multiplyRational(factor, rational(sign)))];
    }),
  );
}

/**
 * Combinations of the invariant tensors whose constraints are as simple as linear algebra makes them: a reduced echelon
 * basis, so that a derivative or another leading monomial stands in one constraint only. Those that vanish are left out.
 */
function simplest(
  basis: readonly InvariantTensor[],
  values: readonly Poly[],
): readonly { readonly tensor: InvariantTensor; readonly value: Poly }[] {
  const [first] = values;
  if (!first) return [];
  const { ring } = first;
  // Names that no user can spell; the mark stands first, so that leading monomials are those of the constraints.
  const names = basis.map((_, i) => `tensor ${i}`);
  const marked = makeRing([...constantsOf(['constraint']), ...ring.generators, ...constantsOf(names)]);
  const mark = generator(marked, 'constraint');
  const rows = values.map((v, i) => add(multiply(mark, moveTo(v, marked)), generator(marked, names[i]!)));
  return echelon(rows).flatMap((row) => {
    const value = moveTo(coefficientOf(row, 'constraint', 1), ring);
    if (isZero(value)) return [];
    const simple = primitive(value);
    const by = divideRational(leadingCoefficient(simple), leadingCoefficient(value));
    const tensor = new Map<number, Rational>();
    basis.forEach((t, i) => {
      const part = coefficientOf(row, names[i]!, 1);
      if (isZero(part)) return;
      const factor = multiplyRational(by, leadingCoefficient(part));
      for (const [packed, entry] of t) {
        const total = addRational(tensor.get(packed) ?? ZERO, multiplyRational(factor, entry));
        if (total.num === 0n) tensor.delete(packed);
        else tensor.set(packed, total);
      }
    });
    return [{ tensor, value: simple }];
  });
}

/** Signed permutations of the free indices that leave the sum as it is. */
export function slotSymmetries(
  sum_: TensorSum,
  free: readonly string[],
  canonical: (sum: TensorSum) => TensorSum,
): readonly SlotSymmetry[] {
  const found: SlotSymmetry[] = [];
  for (const places of candidates(free.length)) {
    // Slot n of the permuted copy carries the name that slot places[n] had.
    const names = new Map(free.map((name, n) => [name, free[places[n]!]!]));
    const moved = sum_.map((t) => ({
      ...t,
      factors: t.factors.map((f) => ({
        ...f,
        slots: f.slots.map((s) => ({ ...s, name: names.get(s.name) ?? s.name })),
      })),
    }));
    for (const sign of [1, -1] as const) {
      const difference = [...sum_, ...moved.map((t) => ({ ...t, coefficient: scale(t.coefficient, -sign) }))];
      if (canonical(difference).length === 0) found.push({ places, sign });
    }
  }
  return found;
}

function candidates(slots: number): readonly (readonly number[])[] {
  const identity = Array.from({ length: slots }, (_, i) => i);
  if (slots <= ALL_PERMUTATIONS) return permutations(identity).slice(1);
  const exchanges = identity.flatMap((i) => identity.slice(i + 1).map((j) => exchange(slots, i, j, 1).places));
  const pairs = identity.slice(0, -3).map((i) => {
    const places = [...identity];
    places.splice(i, 4, i + 2, i + 3, i, i + 1);
    return places;
  });
  return [...exchanges, ...pairs];
}

const permutations = (of: readonly number[]): number[][] =>
  of.length <= 1
    ? [[...of]]
    : of.flatMap((first, i) => permutations([...of.slice(0, i), ...of.slice(i + 1)]).map((rest) => [first, ...rest]));
