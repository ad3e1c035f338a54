/**
 * The order in which terms and factors are read: matter last, curvature before it, most time derivatives first, then H
 * before the other fields. Both orders are total on distinct monomials, so that output never depends on a ring's layout.
 */
import { signOfRational, subtractRational } from '../algebra/rational.js';
import type { DisplaySymbol, SymbolRole } from './display-symbols.js';
import type { BracketTerm, Factor } from './display-terms.js';

const ROLE_ORDER: readonly SymbolRole[] = [
  'constant',
  'scale',
  'parameter',
  'density',
  'length',
  'rate',
  'field',
  'component',
];

/** Order of factors in a product: couplings, k, densities, a, then H and fields, fewest dots first. */
function compareSymbols(a: DisplaySymbol, b: DisplaySymbol): number {
  return (
    ROLE_ORDER.indexOf(a.role) - ROLE_ORDER.indexOf(b.role) ||
    a.order - b.order ||
    a.rank - b.rank ||
    (a.generator < b.generator ? -1 : a.generator > b.generator ? 1 : 0)
  );
}

export const inReadingOrder = (factors: readonly Factor[]): Factor[] =>
  [...factors].sort((a, b) => compareSymbols(a.symbol, b.symbol));

const total = (factors: readonly Factor[], weight: (symbol: DisplaySymbol) => number): number =>
  factors.reduce((n, { symbol, exponent }) => n + weight(symbol) * exponent, 0);
const ofRole =
  (...roles: SymbolRole[]): ((s: DisplaySymbol) => number) =>
  (s) =>
    roles.includes(s.role) ? 1 : 0;
/** H counts as one time derivative, Ḣ as two. */
const derivatives = (s: DisplaySymbol): number => s.order + (s.role === 'rate' ? 1 : 0);
const highest = (factors: readonly Factor[]): number => Math.max(0, ...factors.map((f) => derivatives(f.symbol)));
const functions = ofRole('rate', 'field', 'component');

/** Order of two monomials in a sum. */
export function compareMonomials(a: readonly Factor[], b: readonly Factor[]): number {
  const by = (weight: (s: DisplaySymbol) => number): number => total(a, weight) - total(b, weight);
  return (
    by(ofRole('density')) ||
    by(ofRole('parameter')) ||
    -by(derivatives) ||
    highest(b) - highest(a) ||
    by(functions) ||
    compareLeaders(a, b)
  );
}

/** Lexicographic, the symbol with the most dots first, among equals H before fields in their order. */
function compareLeaders(a: readonly Factor[], b: readonly Factor[]): number {
  const symbols = [...new Set([...a, ...b].map((f) => f.symbol))].sort(
    (x, y) => derivatives(y) - derivatives(x) || compareSymbols(x, y),
  );
  for (const symbol of symbols) {
    const of = (factors: readonly Factor[]): number => factors.find((f) => f.symbol === symbol)?.exponent ?? 0;
    if (of(a) !== of(b)) return of(b) - of(a);
  }
  return 0;
}

/** Order of the terms inside a bracket of couplings: as declared, higher powers first. */
export function compareBracketTerms(a: BracketTerm, b: BracketTerm): number {
  const symbols = [...new Set([...a.factors, ...b.factors].map((f) => f.symbol))].sort(compareSymbols);
  for (const symbol of symbols) {
    const of = (term: BracketTerm): number => term.factors.find((f) => f.symbol === symbol)?.exponent ?? 0;
    if (of(a) !== of(b)) return of(b) - of(a);
  }
  return signOfRational(subtractRational(b.coefficient, a.coefficient));
}
