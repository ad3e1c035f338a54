/**
 * A Lagrangian of the torsionful connection in terms of the metric connection and torsion. With Γ_abc = Γ°_abc + K_abc
 * (form index last) and T_abc = K_acb − K_abc,
 *
 *   K_abc  = ½ (T_cab − T_abc − T_bca)
 *   R_abcd = R°_abcd + ∇°_c K_abd − ∇°_d K_abc + K_aec K^e_bd − K_aed K^e_bc ,
 *
 * where ° marks the connection without torsion (common practice; follows from the definitions in docs/conventions.md).
 */
import { scale } from '../algebra/poly.js';
import { type Rational, rational } from '../algebra/rational.js';
import type { IndexSlot } from '../notation/theory.js';
import { canonicalSum, type TensorSum, type TensorSymbol, type TensorTerm } from './expression.js';
import { type KindTable, kindTable, makeKind } from './kinds.js';
import { exchange } from './symmetry.js';

/** Heads of the metric connection's curvature and of its derivative of the torsion. */
export const METRIC_CURVATURE = 'metric R';
export const METRIC_NABLA_TORSION = 'metric nabla T';

/** Built-in kinds and those of the metric connection, whose curvature also has the exchange of pairs. */
export function metricKinds(): KindTable {
  const pairs = { places: [2, 3, 0, 1], sign: 1 } as const;
  const ricci = (pair: readonly [number, number], keep: readonly number[], sign: 1 | -1) => ({
    pair,
    to: METRIC_CURVATURE,
    keep,
    sign,
  });
  return kindTable([
    makeKind(METRIC_CURVATURE, 0),
    makeKind(METRIC_CURVATURE, 2, [exchange(2, 0, 1, 1)], [ricci([0, 1], [], 1)]),
    makeKind(
      METRIC_CURVATURE,
      4,
      [exchange(4, 0, 1, -1), exchange(4, 2, 3, -1), pairs],
      [ricci([0, 2], [1, 3], 1), ricci([0, 3], [1, 2], -1), ricci([1, 2], [0, 3], -1), ricci([1, 3], [0, 2], 1)],
    ),
    makeKind(METRIC_NABLA_TORSION, 2),
    makeKind(
      METRIC_NABLA_TORSION,
      4,
      [exchange(4, 2, 3, -1)],
      [
        { pair: [1, 2], to: METRIC_NABLA_TORSION, keep: [0, 3], sign: -1 },
        { pair: [1, 3], to: METRIC_NABLA_TORSION, keep: [0, 2], sign: 1 },
      ],
    ),
  ]);
}

type Pieces = readonly (readonly [Rational, readonly TensorSymbol[]])[];

const down = (...names: string[]): IndexSlot[] => names.map((name) => ({ name, up: false }));

/** K_abc as torsions, each behind the given head and slots. */
function contortion(a: string, b: string, c: string, make: (slots: IndexSlot[]) => TensorSymbol): Pieces {
  const half = rational(1, 2);
  const minus = rational(-1, 2);
  return [
    [half, [make(down(c, a, b))]],
    [minus, [make(down(a, b, c))]],
    [minus, [make(down(b, c, a))]],
  ];
}

const torsion = (slots: IndexSlot[]): TensorSymbol => ({ head: 'T', slots });

const multiplied = (left: Pieces, right: Pieces, sign: 1 | -1): Pieces =>
  left.flatMap(([x, f]) =>
    right.map(([y, g]) => [rational(x.num * y.num * BigInt(sign), x.den * y.den), [...f, ...g]] as const),
  );

/** R_abcd of the torsionful connection; `e` is a name that occurs nowhere else. */
function curvature(a: string, b: string, c: string, d: string, e: string): Pieces {
  const nabla =
    (by: string) =>
    (slots: IndexSlot[]): TensorSymbol => ({
      head: METRIC_NABLA_TORSION,
      slots: [...down(by), ...slots],
    });
  const minus = ([x, f]: Pieces[number]): Pieces[number] => [rational(-x.num, x.den), f];
  return [
    [rational(1), [{ head: METRIC_CURVATURE, slots: down(a, b, c, d) }]],
    ...contortion(a, b, d, nabla(c)),
    ...contortion(a, b, c, nabla(d)).map(minus),
    ...multiplied(contortion(a, e, c, torsion), contortion(e, b, d, torsion), 1),
    ...multiplied(contortion(a, e, d, torsion), contortion(e, b, c, torsion), -1),
  ];
}

/** The sum with every curvature replaced; free indices must be down. */
export function inMetricTerms(sum: TensorSum, kinds: KindTable): TensorSum {
  let fresh = 0;
  const name = (): string => `°${++fresh}`;
  let terms: TensorTerm[] = [...sum];
  for (;;) {
    const next = terms.flatMap((term): TensorTerm[] => {
      const at = term.factors.findIndex((f) => f.head === 'R');
      if (at < 0) return [term];
      const { slots } = term.factors[at]!;
      const rest = term.factors.filter((_, i) => i !== at);
      const [p, q] = [name(), name()];
      const names = slots.map((s) => s.name);
      const [a, b, c, d] =
        names.length === 4 ? names : names.length === 2 ? [p, names[0]!, p, names[1]!] : [p, q, p, q];
      return curvature(a!, b!, c!, d!, name()).map(([by, factors]) => ({
        coefficient: scale(term.coefficient, by),
        factors: [...rest, ...factors],
      }));
    });
    if (next.length === terms.length) return canonicalSum(next, kinds);
    // Collecting after each curvature keeps powers of R from growing like 25^n.
    terms = [...canonicalSum(next, kinds)];
  }
}
