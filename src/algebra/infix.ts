/**
 * Infix text of a polynomial: + − * / ^ ( ), integers, names and D(q,n), as documented in docs/formats.md.
 * Reading it back is the business of src/notation; parse(print(p)) equals p. Imports polynomials.
 */
import { type Poly, type Term, termsOf } from './poly.js';
import type { Generator, Ring } from './ring.js';

/** Canonical infix text; `0` for zero. */
export function infix(p: Poly): string {
  const terms = termsOf(p).map((t) => infixTerm(p.ring, t));
  if (terms.length === 0) return '0';
  return terms
    .map(({ negative, text }, i) => (i === 0 ? `${negative ? '-' : ''}${text}` : `${negative ? ' - ' : ' + '}${text}`))
    .join('');
}

/** Constants and scales read best in front, then fields, then their derivatives; the ring lists jets first. */
const rank = (g: Generator): number => (g.kind !== 'jet' ? 1 : g.order === 0 ? 2 : 3);

function infixTerm(ring: Ring, { coefficient, exponents }: Term): { negative: boolean; text: string } {
  const negative = coefficient.num < 0n;
  const num = negative ? -coefficient.num : coefficient.num;
  const side = (sign: 1 | -1): string[] =>
    exponents
      .filter(([, e]) => e * sign > 0)
      .map(([g, e]) => ({ generator: ring.generators[g]!, n: e * sign }))
      .sort((a, b) => rank(a.generator) - rank(b.generator))
      .map(({ generator: { name }, n }) => (n === 1 ? name : `${name}^${n}`));
  const above = side(1);
  const below = side(-1);
  if (num !== 1n || above.length === 0) above.unshift(`${num}`);
  if (coefficient.den !== 1n) below.unshift(`${coefficient.den}`);
  const divisor = below.length === 0 ? '' : below.length === 1 ? `/${below[0]}` : `/(${below.join('*')})`;
  return { negative, text: above.join('*') + divisor };
}
