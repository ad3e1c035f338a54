/**
 * Products that multiply to a given value, found by trying divisors that are at hand: no search, so a factor that is left
 * whole may still split. Invariant: number · Π base^power is the value, bases primitive, single symbols before sums.
 */
import { divideExactly, splitUnit } from './division.js';
import type { Factor, Fraction } from './fraction.js';
import { compareSimplicity } from './linear.js';
import { equals, generator, isZero, leadingCoefficient, type Poly, termsOf } from './poly.js';
import { divideRational, multiplyRational, ONE, type Rational, rational } from './rational.js';
import {
  ANY,
  type Knowledge,
  NEGATIVE,
  POSITIVE,
  productSigns,
  type Signs,
  signOf,
  VANISHING,
  type Verdict,
} from './signs.js';

/** number · Π base^power with non-zero integer powers; the number 0 has no factors. */
export interface ProductForm {
  readonly number: Rational;
  readonly factors: readonly Factor[];
}

/** p as a product, as far as the candidates divide it. */
export function inFactors(p: Poly, candidates: readonly Poly[]): ProductForm {
  if (isZero(p)) return { number: rational(0), factors: [] };
  const { unit, reduced } = splitUnit(p);
  const [term] = termsOf(unit);
  const factors: Factor[] = term!.exponents.map(([g, power]) => ({
    base: generator(p.ring, p.ring.generators[g]!.name),
    power,
  }));
  let rest = reduced;
  for (const candidate of candidates) {
    if (rest.size === 1 || isZero(candidate)) continue;
    const base = splitUnit(candidate).reduced;
    if (base.size === 1) continue;
    let power = 0;
    for (let quotient = divideExactly(rest, base); quotient; quotient = divideExactly(rest, base)) {
      rest = quotient;
      power++;
    }
    if (power > 0) factors.push({ base, power });
  }
  // What is left is primitive up to sign, since quotients of primitive polynomials are.
  const left = splitUnit(rest);
  if (rest.size > 1) factors.push({ base: left.reduced, power: 1 });
  return { number: multiplyRational(term!.coefficient, leadingCoefficient(left.unit)), factors: joined(factors) };
}

/** Constants in the order of the ring, then functions of time, then sums. */
function rank(base: Poly): number {
  const { generators } = base.ring;
  if (base.size > 1) return 2 * generators.length;
  const [[place] = [0]] = termsOf(base)[0]!.exponents;
  return generators[place]!.kind === 'jet' ? generators.length + place : place;
}

/** Equal bases once; powers that cancel go. */
function joined(factors: readonly Factor[]): Factor[] {
  const out: { base: Poly; power: number }[] = [];
  for (const { base, power } of factors) {
    const twin = out.find((f) => equals(f.base, base));
    if (twin) twin.power += power;
    else out.push({ base, power });
  }
  return out
    .filter((f) => f.power !== 0)
    .sort((a, b) => rank(a.base) - rank(b.base) || compareSimplicity(a.base, b.base));
}

/** A fraction as a product; its denominator is one already. */
export function fractionInFactors({ numerator, denominator }: Fraction, candidates: readonly Poly[]): ProductForm {
  const top = inFactors(numerator, candidates);
  if (isZero(numerator)) return top;
  let { number } = top;
  const below = denominator.flatMap(({ base, power }) => {
    const form = inFactors(base, candidates);
    for (let i = 0; i < power; i++) number = divideRational(number, form.number);
    return form.factors.map((f) => ({ base: f.base, power: -f.power * power }));
  });
  return { number, factors: joined([...top.factors, ...below]) };
}

/** What is known of the sign of a product, and the factors on which it still depends. */
export interface ProductSign extends Verdict {
  /** Product of the factors of unknown sign, each once, times ±1: it has the sign of the value. */
  readonly open: ProductForm;
}

/** The sign of a product. Even powers below the line count as positive: where they vanish there is no value. */
export function signOfProduct({ number, factors }: ProductForm, knowledge: Knowledge): ProductSign {
  let signs: Signs = number.num === 0n ? VANISHING : number.num > 0n ? POSITIVE : NEGATIVE;
  const used: string[] = [];
  const open: Factor[] = [];
  let negative = number.num < 0n;
  for (const { base, power } of factors) {
    if (power % 2 === 0 && power < 0) continue;
    const verdict = signOf(base, knowledge);
    const own = power < 0 ? verdict.signs & ~VANISHING : verdict.signs;
    const of = power % 2 === 0 ? (own & VANISHING) | (own & ~VANISHING ? POSITIVE : 0) : own;
    signs = productSigns(signs, of);
    if (of === POSITIVE || of === NEGATIVE) {
      used.push(...(power % 2 === 0 && own === ANY ? [] : verdict.used));
      if (of === NEGATIVE) negative = !negative;
    } else open.push({ base, power: power % 2 === 0 ? 2 : 1 });
  }
  return {
    signs,
    used: [...new Set(used)],
    open: { number: negative ? rational(-1) : number.num === 0n ? number : ONE, factors: open },
  };
}
