/**
 * Infix text of a polynomial: + − * / ^ ( ), integers, names and D(q,n), as documented in docs/formats.md.
 * Reading it back is the business of src/notation; parse(print(p)) equals p.
 */
import { type Poly, type Term, termsOf } from './poly.js';
import type { Ring } from './ring.js';

/** Canonical infix text; `0` for zero. */
export function infix(p: Poly): string {
  const terms = termsOf(p).map((t) => infixTerm(p.ring, t));
  if (terms.length === 0) return '0';
  return terms
    .map(({ negative, text }, i) => (i === 0 ? `${negative ? '-' : ''}${text}` : `${negative ? ' - ' : ' + '}${text}`))
    .join('');
}

function infixTerm(ring: Ring, { coefficient, exponents }: Term): { negative: boolean; text: string } {
  const negative = coefficient.num < 0n;
  const above: string[] = [];
  const below: string[] = [];
  const num = negative ? -coefficient.num : coefficient.num;
  if (coefficient.den !== 1n) below.push(`${coefficient.den}`);
  for (const [g, e] of exponents) {
    const name = ring.generators[g]!.name;
    const n = Math.abs(e);
    (e > 0 ? above : below).push(n === 1 ? name : `${name}^${n}`);
  }
  // Constants and scales read best in front; the ring lists jets first.
  const rank = (text: string): number => {
    const g = ring.generators[ring.position.get(text.replace(/\^\d+$/, '')) ?? -1];
    return g === undefined ? 0 : g.kind === 'jet' ? (g.order === 0 ? 2 : 3) : 1;
  };
  above.sort((a, b) => rank(a) - rank(b));
  below.sort((a, b) => rank(a) - rank(b));
  if (num !== 1n || above.length === 0) above.unshift(`${num}`);
  const divisor = below.length === 0 ? '' : below.length === 1 ? `/${below[0]}` : `/(${below.join('*')})`;
  return { negative, text: above.join('*') + divisor };
}
