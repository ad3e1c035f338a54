/**
 * Mass dimensions as a user writes them, in units c = ħ = 1: `mass`, `mass^2`, `mass^-1`, `mass^{-1}`, `1`,
 * `dimensionless`. Imports only the limits.
 */
import { MAX_EXPONENT } from './limits.js';

/** What a wrong dimension should have been, for a hint. */
export const DIMENSION_HINT = 'a dimension is mass, mass^2, mass^-1, … or 1';

/** The power of mass; undefined when the text is no dimension. */
export function parseDimension(text: string): number | undefined {
  const typed = text.trim();
  if (typed === '1' || typed === 'dimensionless' || typed === 'mass^0') return 0;
  const match = /^mass(?:\s*\^\s*(?:\{\s*([-−]?[0-9]{1,2})\s*\}|([-−]?[0-9]{1,2})))?$/.exec(typed);
  if (match === null) return undefined;
  const power = Number((match[1] ?? match[2] ?? '1').replace('−', '-'));
  return Math.abs(power) <= MAX_EXPONENT ? power : undefined;
}
