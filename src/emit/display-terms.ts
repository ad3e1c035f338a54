/** What a sum for display is made of. Types only. */
import type { Rational } from '../algebra/rational.js';
import type { DisplaySymbol } from './display-symbols.js';

/** One symbol to an integer power other than zero. */
export interface Factor {
  readonly symbol: DisplaySymbol;
  readonly exponent: number;
}

/** coefficient · Π factors, of couplings alone. */
export interface BracketTerm {
  readonly coefficient: Rational;
  readonly factors: readonly Factor[];
}

/** content · common · (Σ bracket) · monomial; the bracket is empty or has at least two terms, the first
 * one positive, with integer coefficients unless their common denominator would be large. */
export interface DisplayTerm {
  readonly content: Rational;
  /** Constants and scales that divide every term of the coefficient. */
  readonly common: readonly Factor[];
  readonly bracket: readonly BracketTerm[];
  /** Rates, fields, densities, scale factors and parameters of the geometry. */
  readonly monomial: readonly Factor[];
}

export interface DisplaySum {
  /** Powers of scale factors that multiply the sum of the terms. */
  readonly divided: readonly Factor[];
  readonly terms: readonly DisplayTerm[];
}
