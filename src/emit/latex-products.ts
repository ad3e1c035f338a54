/**
 * Exact products and fractions as terms of a display. A bracket that is too wide for a line, or that has a name of its own
 * such as G4, is written by that name; names that were made up are defined where `definitions` is printed.
 * Invariant: what is written equals the product when the names are replaced by their definitions.
 */
import { splitUnit } from '../algebra/division.js';
import type { Fraction } from '../algebra/fraction.js';
import { fractionInFactors, type ProductForm } from '../algebra/known-factors.js';
import { equals, type Poly, termsOf } from '../algebra/poly.js';
import { divideRational, multiplyRational, ONE, powerRational, type Rational } from '../algebra/rational.js';
import type { Viewer } from './display.js';
import { inlineTex, sumTex, type TexTerm } from './latex-math.js';
import { widthOf } from './latex-width.js';

/** Points beyond which a bracket gets a name, and beyond which a fraction becomes factors with negative exponents. */
const WIDE_BRACKET = 120;
const WIDE_FRACTION = 150;

/** A polynomial with a name, and the power to which one unit of the name stands: Ω² is written Ω to the power 2. */
export interface NamedPoly {
  readonly name: string;
  readonly value: Poly;
  readonly step?: number;
}

export class ProductWriter {
  private readonly made: { name: string; value: Poly }[] = [];

  /**
   * @param named polynomials with a name of their own.
   * @param candidates polynomials that may divide others.
   */
  constructor(
    private readonly viewer: Viewer,
    private readonly named: readonly NamedPoly[],
    private readonly candidates: readonly Poly[],
    private readonly letter = '\\mathcal{P}',
  ) {}

  /** Names that were made up so far, with their values. */
  definitions(): readonly (readonly [string, Poly])[] {
    return this.made.map(({ name, value }) => [name, value] as const);
  }

  fraction(f: Fraction): TexTerm {
    return this.product(fractionInFactors(f, [...this.named.map((n) => n.value), ...this.candidates]));
  }

  /** One term; `more` are further factors that are TeX already. */
  product(form: ProductForm, more: readonly string[] = []): TexTerm {
    if (form.number.num === 0n) return { negative: false, head: ['0'], inner: [], tail: [] };
    let number = form.number;
    const top: string[] = [];
    const bottom: string[] = [];
    for (const { base, power: n } of form.factors) {
      const { tex, factor } = this.base(base, Math.abs(n));
      const scale = powerRational(factor, Math.abs(n));
      number = n > 0 ? multiplyRational(number, scale) : divideRational(number, scale);
      (n > 0 ? top : bottom).push(tex);
    }
    const negative = number.num < 0n;
    const size = negative ? { num: -number.num, den: number.den } : number;
    return { negative, head: this.pieces(size, top, bottom, more), inner: [], tail: [] };
  }

  private pieces(
    number: Rational,
    top: readonly string[],
    bottom: readonly string[],
    more: readonly string[],
  ): string[] {
    if (bottom.length === 0) {
      const coefficient = number.den === 1n ? `${number.num}` : `\\tfrac{${number.num}}{${number.den}}`;
      const isOne = number.num === 1n && number.den === 1n;
      const all = [...(isOne && top.length + more.length > 0 ? [] : [coefficient]), ...top, ...more];
      return all;
    }
    const above = alone(number.num === 1n && top.length > 0 ? top : [`${number.num}`, ...top]);
    const below = alone(number.den === 1n ? bottom : [`${number.den}`, ...bottom]);
    const whole = `\\frac{${above.join(' ')}}{${below.join(' ')}}`;
    if (widthOf(whole) <= WIDE_FRACTION) return [whole, ...more];
    const over = `\\frac{1}{${below.join(' ')}}`;
    return [...(number.num === 1n && top.length > 0 ? [over, ...top] : [over, ...above]), ...more];
  }

  /** A factor to a power as TeX, and what one power of the base is in units of what is written. */
  private base(base: Poly, n: number): { tex: string; factor: Rational } {
    const known = this.named.find(({ value }) => isMultiple(base, value));
    if (known) {
      const factor = divideRational(leadingOf(base), leadingOf(known.value));
      return { tex: raised(known.name, n * (known.step ?? 1)), factor };
    }
    const inner = inlineTex(sumTex(this.viewer.sum(base, { divide: false })));
    if (base.size === 1) return { tex: n === 1 ? inner : raised(inner, n), factor: ONE };
    if (widthOf(inner) <= WIDE_BRACKET) return { tex: raised(`( ${inner} )`, n), factor: ONE };
    let own = this.made.find(({ value }) => equals(value, base));
    if (!own) {
      own = { name: `${this.letter}_{${this.made.length + 1}}`, value: base };
      this.made.push(own);
    }
    return { tex: raised(own.name, n), factor: ONE };
  }
}

/** A bracket that is all there is above or below a line needs none. */
const alone = (pieces: readonly string[]): readonly string[] =>
  pieces.length === 1 ? [pieces[0]!.replace(/^\( ((?:[^()])*) \)$/, '$1')] : pieces;

const leadingOf = (p: Poly): Rational => termsOf(p)[0]!.coefficient;

/** Whether two polynomials differ by a number only. */
function isMultiple(p: Poly, q: Poly): boolean {
  if (p.size !== q.size || p.size < 2) return false;
  const a = splitUnit(p);
  const b = splitUnit(q);
  return equals(a.reduced, b.reduced) && termsOf(a.unit)[0]!.exponents.join() === termsOf(b.unit)[0]!.exponents.join();
}

const raised = (tex: string, n: number): string => (n === 1 ? tex : `${tex}^{${n}}`);
