/**
 * The current with its field rescaled: J = J_φ ∂φ + J_ψ ∂ψ becomes a weight times ∂ζ with φ = ζ w(ψ), when J_φ depends on ψ
 * only and J_ψ is linear in φ. Then w'/w = −J_ψ/(φ J_φ), which is integrated when w is a product of powers of |ψ| and of
 * |g|, the primitive part of J_φ. Invariant: the identity that makes the ∂ψ part vanish holds exactly.
 */
import { partial } from '../algebra/calculus.js';
import { coefficientOf, involves } from '../algebra/collect.js';
import { splitUnit } from '../algebra/division.js';
import { add, equals, generator, isZero, multiply, negate, type Poly, scale, termsOf } from '../algebra/poly.js';
import {
  addRational,
  divideRational,
  multiplyRational,
  type Rational,
  rational,
  subtractRational,
  ZERO,
} from '../algebra/rational.js';

export interface CurrentWeight {
  /** The scalar that is rescaled, and the one on which the weight depends. */
  readonly field: string;
  readonly by: string;
  /** J_φ = unit · g, a single term times a primitive polynomial (1 for a single term). */
  readonly unit: Poly;
  readonly g: Poly;
  /** w = |ψ|^ofField |g|^ofBracket. */
  readonly ofField: Rational;
  readonly ofBracket: Rational;
}

/** Σ cᵢ pᵢ = target for rational c, with at most two polynomials; undefined when there is none. */
function combination(parts: readonly Poly[], target: Poly): Rational[] | undefined {
  const keys = [...parts, target].map((p) => new Map(termsOf(p).map((t) => [t.exponents.join(';'), t.coefficient])));
  const names = [...new Set(keys.flatMap((m) => [...m.keys()]))];
  const rows = names.map((name) => keys.map((m) => m.get(name) ?? ZERO));
  const found: Rational[] = parts.map(() => ZERO);
  const pivots: number[] = [];
  let top = 0;
  for (let c = 0; c < parts.length; c++) {
    const at = rows.findIndex((row, i) => i >= top && row[c]!.num !== 0n);
    if (at < 0) continue;
    [rows[top], rows[at]] = [rows[at]!, rows[top]!];
    const pivot = rows[top]!.map((x) => divideRational(x, rows[top]![c]!));
    rows.forEach((row, i) => {
      if (i !== top) rows[i] = row.map((x, j) => subtractRational(x, multiplyRational(row[c]!, pivot[j]!)));
    });
    rows[top++] = pivot;
    pivots.push(c);
  }
  if (rows.slice(top).some((row) => row.at(-1)!.num !== 0n)) return undefined;
  pivots.forEach((c, i) => {
    found[c] = rows[i]!.at(-1)!;
  });
  return found;
}

/** The weight of a current in two scalars; undefined when it has not that form. */
export function currentWeight(
  current: ReadonlyMap<string, Poly>,
  field: string,
  by: string,
): CurrentWeight | undefined {
  const first = current.get(field)!;
  const second = current.get(by)!;
  if (isZero(first) || involves(first, field)) return undefined;
  const slope = coefficientOf(second, field, 1);
  if (!equals(multiply(slope, generator(second.ring, field)), second)) return undefined;
  if (involves(slope, field)) return undefined;
  const { unit, reduced } = splitUnit(first);
  const psi = generator(first.ring, by);
  const gain = multiply(psi, partial(reduced, by));
  // −ψ J_ψ/φ = unit (ofField · g + ofBracket · ψg'), the powers of ψ in the unit included in the single term.
  const target = negate(multiply(psi, slope));
  const hasBracket = !isZero(gain);
  const parts = hasBracket ? [multiply(unit, reduced), multiply(unit, gain)] : [multiply(unit, reduced)];
  const powers = combination(parts, target);
  if (!powers) return undefined;
  const [ofField, ofBracket = ZERO] = powers as [Rational, Rational?];
  const identity = add(multiply(psi, slope), parts.map((p, i) => scale(p, powers[i]!)).reduce(add));
  if (!isZero(identity)) throw new Error('the rescaled current keeps a second direction');
  return { field, by, unit, g: reduced, ofField, ofBracket };
}

/** The exponents of |ψ| and |g| in the weight J_φ w, and the rest of it. */
export function weightPowers({ unit, by, ofField, ofBracket, g }: CurrentWeight): {
  readonly factor: Poly;
  readonly ofField: Rational;
  readonly ofBracket: Rational;
} {
  const place = unit.ring.position.get(by)!;
  const [term] = termsOf(unit);
  const own = term!.exponents.find(([p]) => p === place)?.[1] ?? 0;
  const factor = multiply(unit, generator(unit.ring, by, -own));
  return {
    factor,
    ofField: addRational(ofField, rational(own)),
    ofBracket: g.size === 1 ? ofBracket : addRational(ofBracket, rational(1)),
  };
}
