/**
 * Covariant variation of a Lagrangian L(T, R) with respect to coframe and Lorentz connection, in index notation.
 *
 * With δL = P_abc δT^abc + Q_abcd δR^abcd (P antisymmetric in bc, Q in ab and in cd) and the definitions of torsion and
 * curvature in docs/conventions.md, δS = ∫ e (E_ab δe^ab + E_abc δΓ^abc) where the last index is that of the form:
 *
 *   E_ab  = η_ab L − 2 T^c_a^d P_cbd − 2 R^cd_a^f Q_cdbf − 2 ∇^c P_acb − 2 T^c P_acb + T_b^cd P_acd
 *   E_abc = P_acb − P_bca − 2 ∇^d Q_abdc − 2 T^d Q_abdc + T_c^de Q_abde
 *
 * The terms in T come from (1/e) ∂_μ(e V^μν) = ∇_μ V^μν + T_μ V^μν − ½ T^ν_μλ V^μλ for an antisymmetric V.
 * Derived here; its components are compared with the reduced equations on every geometry at every call.
 */
import { type Poly, scale } from '../algebra/poly.js';
import { type Rational, rational } from '../algebra/rational.js';
import type { IndexSlot } from '../notation/theory.js';
import { canonicalSum, type TensorSum, type TensorSymbol, type TensorTerm } from './expression.js';
import { type KindTable, kindTable, makeKind, type TensorKind } from './kinds.js';
import { exchange, type SignedPermutation } from './symmetry.js';

/** Head of the covariant derivative of a tensor; its first slot is the derivative's. */
export const nablaOf = (head: string): string => `nabla ${head}`;
export const isNabla = (head: string): boolean => head.startsWith('nabla ');
export const differentiated = (head: string): string => head.slice('nabla '.length);

/** Heads of the field momenta when they are kept as symbols. */
export const TORSION_MOMENTUM = 'P';
export const CURVATURE_MOMENTUM = 'Q';

const behind = ({ places, sign }: SignedPermutation): SignedPermutation => ({
  places: [0, ...places.map((p) => p + 1)],
  sign,
});

/** The derivative of a kind: the same symmetries and traces behind one more slot. */
const nablaKind = (kind: TensorKind): TensorKind =>
  makeKind(
    nablaOf(kind.head),
    kind.slots + 1,
    kind.group.map(behind),
    kind.traces.map((t) => ({
      pair: [t.pair[0] + 1, t.pair[1] + 1] as const,
      to: nablaOf(t.to),
      keep: [0, ...t.keep.map((s) => s + 1)],
      sign: t.sign,
    })),
  );

/** Built-in kinds, momenta, and first derivatives of all of them. */
export function variationKinds(): KindTable {
  const momenta = [
    makeKind(TORSION_MOMENTUM, 3, [exchange(3, 1, 2, -1)]),
    makeKind(CURVATURE_MOMENTUM, 4, [exchange(4, 0, 1, -1), exchange(4, 2, 3, -1)]),
  ];
  const smooth = [...kindTable().values()].filter((k) => k.part === undefined && (k.head === 'R' || k.head === 'T'));
  return kindTable([...momenta, ...[...smooth, ...momenta].map(nablaKind)]);
}

/** Field momenta: P_abc with free indices a, b, c and Q_abcd with a, b, c, d, all down. */
export interface Momenta {
  readonly torsion: TensorSum;
  readonly curvature: TensorSum;
}

const down = (names: string): IndexSlot[] => [...names].map((name) => ({ name, up: false }));
const symbol = (head: string, slots: readonly IndexSlot[]): TensorSymbol => ({ head, slots });

/** Dummies get names that cannot meet the free ones. */
function apart(factors: readonly TensorSymbol[], prefix: string): TensorSymbol[] {
  const count = new Map<string, number>();
  for (const f of factors) for (const s of f.slots) count.set(s.name, (count.get(s.name) ?? 0) + 1);
  return renamed(factors, (name) => (count.get(name) === 2 ? `${prefix}${name}` : name));
}

const renamed = (factors: readonly TensorSymbol[], to: (name: string) => string): TensorSymbol[] =>
  factors.map((f) => ({ ...f, slots: f.slots.map((s) => ({ name: to(s.name), up: s.up })) }));

/** Renames free indices by position: letter i of `from` becomes letter i of `to`. */
function reindexed(sum: TensorSum, from: string, to: string, prefix: string): TensorTerm[] {
  return sum.map(({ coefficient, factors }) => ({
    coefficient,
    factors: renamed(apart(factors, prefix), (name) => {
      const i = from.indexOf(name);
      return name.length === 1 && i >= 0 ? to[i]! : name;
    }),
  }));
}

const scaled = (terms: readonly TensorTerm[], by: Rational): TensorTerm[] =>
  terms.map((t) => ({ ...t, coefficient: scale(t.coefficient, by) }));

const times = (terms: readonly TensorTerm[], ...more: TensorSymbol[]): TensorTerm[] =>
  terms.map((t) => ({ ...t, factors: [...t.factors, ...more] }));

/** Half the sum over a pair of exchanged free indices with a minus sign. */
const antisymmetrised = (terms: readonly TensorTerm[], x: string, y: string): TensorTerm[] => [
  ...scaled(terms, rational(1, 2)),
  ...scaled(
    terms.map((t) => ({ ...t, factors: renamed(t.factors, (n) => (n === x ? y : n === y ? x : n)) })),
    rational(-1, 2),
  ),
];

/** What multiplies the variation of one factor: η's that lead from its slots to free indices. */
function slotsTo(
  head: string,
  slots: readonly IndexSlot[],
): { free: string; names: string[]; metrics: TensorSymbol[] } | undefined {
  const eta = (x: string, y: string): TensorSymbol => symbol('eta', [...down(x), ...down(y)]);
  if (head === 'T') {
    if (slots.length === 3) return { free: 'abc', names: ['a', 'b', 'c'], metrics: [] };
    return { free: 'abc', names: ['b'], metrics: [eta('a', 'c')] };
  }
  if (head !== 'R') return undefined;
  if (slots.length === 4) return { free: 'abcd', names: ['a', 'b', 'c', 'd'], metrics: [] };
  if (slots.length === 2) return { free: 'abcd', names: ['b', 'd'], metrics: [eta('a', 'c')] };
  return { free: 'abcd', names: [], metrics: [eta('a', 'c'), eta('b', 'd')] };
}

/** ∂L/∂T_abc and ∂L/∂R_abcd of a canonical Lagrangian. */
export function fieldMomenta(lagrangian: TensorSum, kinds: KindTable): Momenta {
  const found: Record<'T' | 'R', TensorTerm[]> = { T: [], R: [] };
  for (const { coefficient, factors } of lagrangian) {
    const safe = apart(factors, '~');
    safe.forEach((factor, i) => {
      const place = slotsTo(factor.head, factor.slots);
      if (!place) return;
      const to = new Map(factor.slots.map((s, n) => [s.name, place.names[n]!]));
      const self = factor.slots.some((s, n) => factor.slots.findIndex((t) => t.name === s.name) !== n);
      if (self) throw new Error('a canonical term has an unnamed trace');
      const rest = renamed(
        safe.filter((_, n) => n !== i),
        (name) => to.get(name) ?? name,
      ).map((f) => ({ ...f, slots: f.slots.map((s) => (s.name.length === 1 ? { ...s, up: false } : s)) }));
      found[factor.head as 'T' | 'R'].push({ coefficient, factors: [...rest, ...place.metrics] });
    });
  }
  return {
    torsion: canonicalSum(antisymmetrised(found.T, 'b', 'c'), kinds),
    curvature: canonicalSum(antisymmetrised(antisymmetrised(found.R, 'a', 'b'), 'c', 'd'), kinds),
  };
}

/** ∇ of each factor in turn, by the rule of Leibniz; η and ε are constant since the connection is metric. */
function nabla(terms: readonly TensorTerm[], index: string): TensorTerm[] {
  return terms.flatMap(({ coefficient, factors }) =>
    factors.flatMap((f, i) => {
      if (f.head === 'eta' || f.head === 'epsilon') return [];
      const derived = symbol(nablaOf(f.head), [...down(index), ...f.slots]);
      return [{ coefficient, factors: factors.map((g, n) => (n === i ? derived : g)) }];
    }),
  );
}

/** Both field equations: E_ab (frame index a, form index b) and E_abc (Lorentz pair ab, form index c). */
export interface CovariantEquations {
  readonly coframe: TensorSum;
  readonly connection: TensorSum;
}

/**
 * The field equations from the Lagrangian and its momenta; give the momenta as symbols to keep them unexpanded.
 * Heights of repeated indices are not tracked: canonicalSum writes one of each pair up.
 */
export function fieldEquations(lagrangian: TensorSum, momenta: Momenta, kinds: KindTable): CovariantEquations {
  const P = (to: string): TensorTerm[] => reindexed(momenta.torsion, 'abc', to, '~');
  const Q = (to: string): TensorTerm[] => reindexed(momenta.curvature, 'abcd', to, '~');
  const T = (slots: string): TensorSymbol => symbol('T', down(slots));
  const R = (slots: string): TensorSymbol => symbol('R', down(slots));
  const minusTwo = rational(-2);
  const coframe = [
    ...times(reindexed(lagrangian, '', '', '~'), symbol('eta', down('ab'))),
    ...scaled(times(P('cbd'), T('cad')), minusTwo),
    ...scaled(times(Q('cdbf'), R('cdaf')), minusTwo),
    ...scaled(nabla(P('acb'), 'c'), minusTwo),
    ...scaled(times(P('acb'), T('c')), minusTwo),
    ...times(P('acd'), T('bcd')),
  ];
  const connection = [
    ...P('acb'),
    ...scaled(P('bca'), rational(-1)),
    ...scaled(nabla(Q('abdc'), 'd'), minusTwo),
    ...scaled(times(Q('abdc'), T('d')), minusTwo),
    ...times(Q('abde'), T('cde')),
  ];
  return { coframe: canonicalSum(coframe, kinds), connection: canonicalSum(connection, kinds) };
}

/** The momenta as symbols P_abc and Q_abcd, zero where the Lagrangian does not depend on torsion or curvature. */
export function momentumSymbols(momenta: Momenta, one: Poly): Momenta {
  const term = (head: string, slots: string): TensorSum => [{ coefficient: one, factors: [symbol(head, down(slots))] }];
  return {
    torsion: momenta.torsion.length > 0 ? term(TORSION_MOMENTUM, 'abc') : [],
    curvature: momenta.curvature.length > 0 ? term(CURVATURE_MOMENTUM, 'abcd') : [],
  };
}
