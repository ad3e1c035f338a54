/**
 * Whether a potential of at most two scalars is definite or bounded, as far as the signs of its coefficients are known.
 * Sound: `undecided` is the answer when a sign is missing, with the polynomials whose signs would decide.
 */
import { collect, involves } from '../algebra/collect.js';
import { equals, isZero, multiply, type Poly, scale, subtract, zero } from '../algebra/poly.js';
import { type Knowledge, NEGATIVE, POSITIVE, signOf, VANISHING, type Verdict } from '../algebra/signs.js';

export type BoundVerdict =
  | 'zero'
  | 'positive'
  | 'non-negative'
  | 'negative'
  | 'non-positive'
  | 'bounded below'
  | 'bounded above'
  | 'unbounded'
  | 'undecided';

export interface PotentialBound {
  /** For all real values of the scalars. `unbounded`: neither below nor above. */
  readonly verdict: BoundVerdict;
  /** Assumptions on which the verdict rests. */
  readonly used: readonly string[];
  /** Polynomials in the constants on whose signs it depends; empty when it is decided. */
  readonly open: readonly Poly[];
}

/** p by its exponents in the scalars. */
function coefficients(p: Poly, scalars: readonly string[]): ReadonlyMap<string, { powers: number[]; value: Poly }> {
  const places = scalars.map((q) => p.ring.position.get(q)!);
  return new Map(
    collect(p, (g) => places.includes(g)).map(({ monomial, coefficient }) => {
      const powers = places.map((place) => monomial.find(([g]) => g === place)?.[1] ?? 0);
      return [powers.join(), { powers, value: coefficient }];
    }),
  );
}

const decided = (verdict: BoundVerdict, ...by: readonly Verdict[]): PotentialBound => ({
  verdict,
  used: [...new Set(by.flatMap((v) => v.used))],
  open: [],
});

/** Definite when every sign is known, else bounded when the terms of highest degree say so. */
export function boundOf(potential: Poly, scalars: readonly string[], knowledge: Knowledge): PotentialBound {
  if (isZero(potential)) return decided('zero');
  const whole = signOf(potential, knowledge);
  switch (whole.signs) {
    case POSITIVE:
      return decided('positive', whole);
    case NEGATIVE:
      return decided('negative', whole);
    case POSITIVE | VANISHING:
      return decided('non-negative', whole);
    case NEGATIVE | VANISHING:
      return decided('non-positive', whole);
    case VANISHING:
      return decided('zero', whole);
  }
  const present = scalars.filter((q) => involves(potential, q));
  const terms = [...coefficients(potential, present).values()];
  const degreeOf = (powers: readonly number[]): number => powers.reduce((n, e) => n + e, 0);
  const degree = Math.max(...terms.map((t) => degreeOf(t.powers)));
  const top = terms.filter((t) => degreeOf(t.powers) === degree);
  const unknown = (...open: readonly Poly[]): PotentialBound => {
    const missing = open.filter((p, i) => {
      const { signs } = signOf(p, knowledge);
      const isKnown = signs === POSITIVE || signs === NEGATIVE || signs === VANISHING;
      return !isKnown && !open.slice(0, i).some((q) => equals(p, q));
    });
    return { verdict: 'undecided', used: [], open: missing };
  };
  if (present.length === 1 || degree === 0) return inOneField(top[0]!.value, degree, knowledge, unknown);
  if (present.length !== 2) return unknown();
  const at = (i: number, j: number): Poly =>
    top.find((t) => t.powers[0] === i && t.powers[1] === j)?.value ?? zero(potential.ring);
  if (degree === 2) return inForm([at(2, 0), at(1, 1), at(0, 2)], false, knowledge, unknown);
  const isEven = top.every((t) => t.powers.every((e) => e % 2 === 0));
  if (degree === 4 && isEven) return inForm([at(4, 0), at(2, 2), at(0, 4)], true, knowledge, unknown);
  return unknown(...top.map((t) => t.value));
}

type Unknown = (...open: readonly Poly[]) => PotentialBound;

function inOneField(leading: Poly, degree: number, knowledge: Knowledge, unknown: Unknown): PotentialBound {
  const sign = signOf(leading, knowledge);
  if (degree % 2 === 1) return sign.signs & VANISHING ? unknown(leading) : decided('unbounded', sign);
  if (sign.signs === POSITIVE) return decided('bounded below', sign);
  if (sign.signs === NEGATIVE) return decided('bounded above', sign);
  return unknown(leading);
}

/** A x² + B xy + C y², for all x and y, or for x, y ≥ 0 only. */
function inForm(
  [a, b, c]: readonly [Poly, Poly, Poly],
  isCone: boolean,
  knowledge: Knowledge,
  unknown: Unknown,
): PotentialBound {
  const [ofA, ofB, ofC] = [a, b, c].map((p) => signOf(p, knowledge)) as [Verdict, Verdict, Verdict];
  const discriminant = subtract(scale(multiply(a, c), 4), multiply(b, b));
  const rest = signOf(discriminant, knowledge);
  for (const [sign, verdict] of [
    [POSITIVE, 'bounded below'],
    [NEGATIVE, 'bounded above'],
  ] as const) {
    if (ofA.signs !== sign || ofC.signs !== sign) continue;
    const isSame = (ofB.signs & ~(sign | VANISHING)) === 0;
    const isOpposite = (ofB.signs & (sign | VANISHING)) === 0;
    if (isCone && isSame) return decided(verdict, ofA, ofB, ofC);
    if (rest.signs === POSITIVE) return decided(verdict, ofA, ofC, rest);
    // Between the axes the mixed term wins.
    if (rest.signs === NEGATIVE && (isOpposite || !isCone)) return decided('unbounded', ofA, ofB, ofC, rest);
    return unknown(b, discriminant);
  }
  const isOpposite =
    (ofA.signs === POSITIVE && ofC.signs === NEGATIVE) || (ofA.signs === NEGATIVE && ofC.signs === POSITIVE);
  if (isOpposite) return decided('unbounded', ofA, ofC);
  if (!isCone && rest.signs === NEGATIVE) return decided('unbounded', rest);
  if (isZero(a) && isZero(c)) return unknown(b);
  return unknown(a, c, b, discriminant);
}
