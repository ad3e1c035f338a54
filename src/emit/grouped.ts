/**
 * Plain infix texts of polynomials for claims and comparisons: terms collected by their monomial in the fields, couplings in
 * brackets in front. The grammar is that of docs/formats.md, so a text can be used again as a claim.
 */
import { collect, monomialOf } from '../algebra/collect.js';
import { infix } from '../algebra/infix.js';
import { equals, generator, isZero, multiply, type Poly, power, termsOf } from '../algebra/poly.js';
import type { Factors } from '../compare/factors.js';

/** Whether a generator is a function of time. */
const isFunction = (p: Poly, g: number): boolean => ['jet', 'source'].includes(p.ring.generators[g]!.kind);

/** `(a0 + a1)*H^2 - 3*phi`; `0` for zero. */
export function groupedText(p: Poly): string {
  if (isZero(p)) return '0';
  const groups = collect(p, (g) => isFunction(p, g));
  const texts = groups.map(({ monomial, coefficient }) => {
    if (coefficient.size === 1 || monomial.length === 0) return infixTimes(p, coefficient, monomial);
    return `(${infix(coefficient)})${withMonomial(infix(monomialOf(p.ring, monomial)))}`;
  });
  return texts.reduce((all, t) => (t.startsWith('-') ? `${all} - ${t.slice(1)}` : `${all} + ${t}`));
}

/** One term as one text: c*x with a plain coefficient. */
function infixTimes(p: Poly, coefficient: Poly, monomial: ReturnType<typeof collect>[number]['monomial']): string {
  let value = coefficient;
  for (const [g, n] of monomial) value = timesGenerator(value, p.ring.generators[g]!.name, n);
  return infix(value);
}

const timesGenerator = (p: Poly, name: string, n: number): Poly => multiply(p, generator(p.ring, name, n));

const withMonomial = (text: string): string => (text.startsWith('1/') ? `/${text.slice(2)}` : `*${text}`);

/** Whether the text is one term, so that it needs no brackets in a product. */
const isTerm = (p: Poly): boolean => p.size <= 1;

/** A product kept in factors, numerator only. */
export function productText(factors: Factors): string {
  const texts = factors.map(({ base, power: n }) => {
    const text = infix(base);
    const simple = isTerm(base) && termsOf(base)[0]?.exponents.length === 1 && !text.includes('/');
    const bracketed = simple ? text : `(${text})`;
    return n === 1 ? bracketed : `${bracketed}^${n}`;
  });
  return texts.length === 0 ? '1' : texts.join('*');
}

/** top/(Π base^power). */
export function quotientText(top: Poly, bottom: Factors): string {
  const above = groupedText(top);
  if (bottom.length === 0) return above;
  const below = productText(bottom);
  const bare = bottom.length === 1 && bottom[0]!.power === 1;
  return `${isTerm(top) ? above : `(${above})`}/${bare ? below : `(${below})`}`;
}

/** top/bottom for couplings. */
export function ratioText(top: Poly, bottom: Poly): string {
  if (bottom.size === 1 && !isZero(top)) return infix(multiply(top, power(bottom, -1)));
  return equals(top, bottom) ? '1' : `(${infix(top)})/(${infix(bottom)})`;
}
