/**
 * Components that a symmetry leaves to a tensor: the tensors with given slot symmetries that the isotropy group of a
 * geometry does not change. They are the solutions of linear conditions, one for each generator and component, solved
 * exactly; nothing about them is listed by hand.
 */
import { remember } from '../algebra/memo.js';
import { nullspace, type SparseRow } from '../algebra/nullspace.js';
import { addRational, ONE, type Rational, rational, ZERO } from '../algebra/rational.js';
import type { SlotSymmetry } from '../notation/theory.js';
import { DIMENSION, packIndices, unpackIndices } from '../tensor/components.js';
import type { FrameMetric } from '../tensor/contraction.js';
import { closeGroup, type SignedPermutation } from '../tensor/symmetry.js';

/** Generators of the isotropy group, acting on the frame at one point. */
export interface Isotropy {
  /** Pairs of frame axes: the rotation (or boost) in their plane, as a one-parameter group. */
  readonly rotations: readonly (readonly [number, number])[];
  /** Sets of frame axes that one transformation reverses together. */
  readonly reversals: readonly (readonly number[])[];
}

/** Indices of a tensor whose invariant components are asked for; 4^n unknowns. */
export const MAX_INVARIANT_SLOTS = 6;

/** One invariant tensor: its non-zero components, all indices lowered, by packed indices. */
export type InvariantTensor = ReadonlyMap<number, Rational>;

export interface InvariantComponents {
  /** A basis of the invariant tensors, each with lowest component 1. */
  readonly basis: readonly InvariantTensor[];
  /** Independent components of a tensor with the slot symmetries alone: 24 for torsion. */
  readonly independent: number;
}

/** Components that are equal up to the sign, by the slot symmetries: packed → representative and sign, or zero. */
interface Orbits {
  readonly of: readonly { readonly number: number; readonly sign: number }[];
  /** Members of each orbit with their signs, orbits numbered from 0. */
  readonly members: readonly (readonly (readonly [packed: number, sign: number])[])[];
}

function orbitsOf(slots: number, group: readonly SignedPermutation[]): Orbits {
  const of = new Array<{ number: number; sign: number }>(DIMENSION ** slots);
  const members: (readonly [number, number])[][] = [];
  for (let packed = 0; packed < of.length; packed++) {
    if (of[packed]) continue;
    const indices = unpackIndices(packed, slots);
    const signs = new Map<number, number>();
    let vanishes = false;
    for (const { places, sign } of group) {
      const image = packIndices(places.map((p) => indices[p]!));
      const known = signs.get(image);
      if (known === undefined) signs.set(image, sign);
      else if (known !== sign) vanishes = true;
    }
    for (const [image, sign] of signs) of[image] = { number: members.length, sign: vanishes ? 0 : sign };
    if (!vanishes) members.push([...signs]);
  }
  return { of, members };
}

/** The conditions (δT)_{ab…} = 0 for the plane of a rotation: δ exchanges its two axes in one slot at a time. */
function* rotationRows(
  slots: number,
  orbits: Orbits,
  [i, j]: readonly [number, number],
  metric: FrameMetric,
): Iterable<SparseRow> {
  // ω_ij = −ω_ji = 1 and δT_a = −ω^b_a T_b: index i is replaced by j with η^jj, index j by i with −η^ii.
  const other = new Map([
    [i, [j, metric[j]!] as const],
    [j, [i, -metric[i]!] as const],
  ]);
  for (let packed = 0; packed < DIMENSION ** slots; packed++) {
    const indices = unpackIndices(packed, slots);
    const row = new Map<number, Rational>();
    indices.forEach((index, slot) => {
      const turned = other.get(index);
      if (!turned) return;
      const image = orbits.of[packed + (turned[0] - index) * DIMENSION ** (slots - 1 - slot)]!;
      const value = addRational(row.get(image.number) ?? ZERO, rational(turned[1] * image.sign));
      if (value.num === 0n) row.delete(image.number);
      else row.set(image.number, value);
    });
    if (row.size > 0) yield row;
  }
}

/** T = −T for components with an odd number of reversed indices. */
function* reversalRows(slots: number, orbits: Orbits, axes: readonly number[]): Iterable<SparseRow> {
  for (const [number, [first]] of orbits.members.entries()) {
    const reversed = unpackIndices(first![0], slots).filter((index) => axes.includes(index)).length;
    if (reversed % 2 === 1) yield new Map([[number, ONE]]);
  }
}

const known = new WeakMap<Isotropy, Map<string, InvariantComponents>>();

/**
 * The invariant tensors with a number of slots and slot symmetries.
 * @throws RangeError for more than MAX_INVARIANT_SLOTS slots; SymmetryError when the symmetries leave nothing.
 */
export function invariantComponents(
  isotropy: Isotropy,
  metric: FrameMetric,
  slots: number,
  generators: readonly SlotSymmetry[] = [],
): InvariantComponents {
  if (slots > MAX_INVARIANT_SLOTS) throw new RangeError(`a tensor of ${slots} indices; at most ${MAX_INVARIANT_SLOTS}`);
  const group = closeGroup(slots, generators);
  const memo = known.get(isotropy) ?? new Map<string, InvariantComponents>();
  known.set(isotropy, memo);
  const key = `${metric.join()}/${slots}/${group.map((g) => `${g.places.join()}${g.sign}`).sort()}`;
  return remember(memo, key, () => {
    const orbits = orbitsOf(slots, group);
    const rows = function* (): Iterable<SparseRow> {
      for (const axes of isotropy.reversals) yield* reversalRows(slots, orbits, axes);
      for (const plane of isotropy.rotations) yield* rotationRows(slots, orbits, plane, metric);
    };
    const solutions = nullspace(orbits.members.length, rows());
    return { basis: solutions.map((s) => spread(s, orbits)), independent: orbits.members.length };
  });
}

/** Values on orbits as values on components. */
function spread(values: SparseRow, { members }: Orbits): InvariantTensor {
  const out = [...values].flatMap(([number, value]) =>
    members[number]!.map(([packed, sign]) => [packed, sign > 0 ? value : rational(-value.num, value.den)] as const),
  );
  return new Map(out.sort(([a], [b]) => a - b));
}

/** Whether components are unchanged by the isotropy group, tested on each generator. */
export function isInvariant<V>(
  entries: ReadonlyMap<number, V>,
  slots: number,
  isotropy: Isotropy,
  metric: FrameMetric,
  vanishes: (sum: readonly (readonly [sign: number, value: V])[]) => boolean,
): boolean {
  const identity: Orbits = {
    of: Array.from({ length: DIMENSION ** slots }, (_, number) => ({ number, sign: 1 })),
    members: Array.from({ length: DIMENSION ** slots }, (_, number) => [[number, 1] as const]),
  };
  const holds = (row: SparseRow): boolean =>
    vanishes(
      [...row].flatMap(([packed, factor]) => {
        const value = entries.get(packed);
        return value === undefined ? [] : [[Number(factor.num), value] as const];
      }),
    );
  for (const axes of isotropy.reversals)
    for (const row of reversalRows(slots, identity, axes)) if (!holds(row)) return false;
  for (const plane of isotropy.rotations)
    for (const row of rotationRows(slots, identity, plane, metric)) if (!holds(row)) return false;
  return true;
}
