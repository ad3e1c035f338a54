/** Display sums as one-line Unicode mathematics for a terminal: 3 M² (φ² − ψ²) H. */

import type { Poly } from '../algebra/poly.js';
import { bracketed, PRECEDENCE } from '../algebra/precedence.js';
import { type Rational, signOfRational } from '../algebra/rational.js';
import { superscript, unicodeName } from '../notation/print.js';
import type { IndexSlot } from '../notation/theory.js';
import type { TensorSum, TensorSymbol } from '../tensor/expression.js';
import { differentiated, isNabla } from '../tensor/variation.js';
import type { BracketTerm, DisplaySum, DisplayTerm, Factor } from './display.js';

const DOTS = ['', '\u0307', '\u0308', '\u20db'];

/** A symbol with its dots; beyond three dots the order is written out. */
function symbolText({ symbol }: Factor): string {
  const name = unicodeName(symbol.name);
  const dots = DOTS[symbol.order];
  if (dots === undefined) return `D(${name},${symbol.order})`;
  // Dots sit on the first letter, so that phi_x becomes φ̇_x.
  return `${name.slice(0, 1)}${dots}${name.slice(1)}`;
}

const powerText = (factor: Factor): string =>
  symbolText(factor) + (Math.abs(factor.exponent) === 1 ? '' : superscript(Math.abs(factor.exponent)));

const above = (factors: readonly Factor[]): string[] => factors.filter((f) => f.exponent > 0).map(powerText);
const below = (factors: readonly Factor[]): string[] => factors.filter((f) => f.exponent < 0).map(powerText);

/** number · top / bottom without sign. */
function quotient(number: Rational, top: readonly string[], bottom: readonly string[]): string {
  const n = number.num < 0n ? -number.num : number.num;
  const divisors = [...(number.den === 1n ? [] : [`${number.den}`]), ...bottom];
  const factors = n === 1n && top.length > 0 ? [...top] : [`${n}`, ...top];
  const text = factors.join(' ');
  if (divisors.length === 0) return text;
  // A rational number in front reads better than a long quotient: 3/2 c0 φ².
  if (bottom.length === 0 && top.length > 0) return `${n}/${number.den} ${top.join(' ')}`;
  const level = divisors.length === 1 ? PRECEDENCE.atom : PRECEDENCE.product;
  return `${text}/${bracketed(divisors.join(' '), level, PRECEDENCE.power)}`;
}

function joined(parts: readonly { negative: boolean; text: string }[]): string[] {
  return parts.map(({ negative, text }, i) => {
    if (i === 0) return negative ? `−${text}` : text;
    return `${negative ? '−' : '+'} ${text}`;
  });
}

const bracketText = (terms: readonly BracketTerm[]): string =>
  joined(
    terms.map(({ coefficient, factors }) => ({
      negative: signOfRational(coefficient) < 0,
      text: quotient(coefficient, above(factors), below(factors)),
    })),
  ).join(' ');

function termText({ content, common, bracket, monomial }: DisplayTerm): { negative: boolean; text: string } {
  const factors = [...common, ...monomial];
  const sum = bracket.length === 0 ? [] : [bracketed(bracketText(bracket), PRECEDENCE.sum, PRECEDENCE.product)];
  const top = [...above(common), ...sum, ...above(monomial)];
  return { negative: signOfRational(content) < 0, text: quotient(content, top, below(factors)) };
}

/** One text for each term with its sign, ready to be wrapped; `0` alone for the empty sum. */
export function unicodeTerms({ terms }: DisplaySum): string[] {
  const [first] = terms;
  if (!first) return ['0'];
  // A sum of couplings alone needs no brackets around it.
  const bare = terms.length === 1 && first.content.num === first.content.den && first.bracket.length > 0;
  if (bare && first.common.length + first.monomial.length === 0) return [bracketText(first.bracket)];
  return joined(terms.map(termText));
}

const SUBHEADS: ReadonlyMap<string, string> = new Map([
  ['epsilon', 'ε'],
  ['eta', 'η'],
]);

/** One tensor with its indices as typed, derivatives as ∇. */
function tensorText({ head, slots }: TensorSymbol): string {
  const run = (from: readonly IndexSlot[]): string => {
    let out = '';
    let height: boolean | undefined;
    for (const { name, up } of from) {
      if (up !== height) out += `${out === '' ? '' : '}'}${up ? '^' : '_'}{`;
      height = up;
      out += name;
    }
    return out === '' ? '' : `${out}}`;
  };
  if (isNabla(head))
    return `∇${run(slots.slice(0, 1))}${tensorText({ head: differentiated(head), slots: slots.slice(1) })}`;
  return `${SUBHEADS.get(head) ?? head}${run(slots)}`;
}

/** Terms of a sum of tensors with their signs; `coefficient` writes a polynomial in couplings. */
export function unicodeTensorTerms(sum: TensorSum, coefficient: (p: Poly) => DisplaySum): string[] {
  return joined(
    sum.map(({ coefficient: c, factors }) => {
      const tensors = factors.map(tensorText).join(' ');
      const { terms } = coefficient(c);
      const [only] = terms;
      if (terms.length !== 1) return { negative: false, text: `(${joined(terms.map(termText)).join(' ')}) ${tensors}` };
      const { negative, text } = termText(only!);
      return { negative, text: text === '1' && tensors !== '' ? tensors : `${text} ${tensors}`.trim() };
    }),
  );
}

/** Powers that were divided out, as a divisor of what stands on the left: `/a³`. */
export const dividedText = ({ divided }: DisplaySum): string => {
  const top = above(divided);
  const bottom = below(divided);
  const over = top.length === 0 ? '' : `/${top.length > 1 ? `(${top.join(' ')})` : top[0]}`;
  return bottom.length === 0 ? over : ` ${bottom.join(' ')}${over}`;
};
