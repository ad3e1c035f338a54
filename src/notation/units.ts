/**
 * The coupling of gravity under its different names, in units c = ħ = 1: the reduced Planck mass M, κ = M⁻², or Newton's
 * constant with 8πG = M⁻². The names are exchanged as Laurent monomials, π included, so nothing is rounded.
 */
import { type Rational, rational } from '../algebra/rational.js';
import { multiplyScalarTerms, powerScalarTerm } from './scalar-term.js';
import type { ScalarTerm, TheorySymbol } from './theory.js';

/** Symbol of the reduced Planck mass. */
export const PLANCK_MASS = 'M';

export interface UnitSymbol extends TheorySymbol {
  /** In terms of M; undefined for the number π, which stays. */
  readonly value: ScalarTerm | undefined;
}

const constant = (name: string, latex: string, dimension: number, value?: ScalarTerm): UnitSymbol => ({
  name,
  role: dimension === 0 ? 'constant' : 'scale',
  dimension,
  latex,
  value,
});

const monomial = (coefficient: Rational, ...powers: ScalarTerm['powers']): ScalarTerm => ({ coefficient, powers });

/** The symbols that each choice of units brings with it. */
export const UNIT_SYMBOLS = {
  mass: [],
  kappa: [constant('kappa', '\\kappa', -2, monomial(rational(1), [PLANCK_MASS, -2]))],
  '8piG': [constant('G', 'G', -2, monomial(rational(1, 8), [PLANCK_MASS, -2], ['pi', -1])), constant('pi', '\\pi', 0)],
} as const satisfies Record<string, readonly UnitSymbol[]>;

export type Units = keyof typeof UNIT_SYMBOLS;

/** M^-2 in the symbols of the units. */
const INVERSE_SQUARE: Readonly<Record<Units, ScalarTerm | undefined>> = {
  mass: undefined,
  kappa: monomial(rational(1), ['kappa', 1]),
  '8piG': monomial(rational(8), ['G', 1], ['pi', 1]),
};

/** The monomial with κ or G replaced by M. */
export function toMass(scalar: ScalarTerm, units: Units): ScalarTerm {
  const symbols: readonly UnitSymbol[] = UNIT_SYMBOLS[units];
  let result = scalar;
  for (const { name, value } of symbols) {
    const power = scalar.powers.find(([other]) => other === name)?.[1];
    if (value === undefined || power === undefined) continue;
    const rest = { coefficient: result.coefficient, powers: result.powers.filter(([other]) => other !== name) };
    result = multiplyScalarTerms(rest, powerScalarTerm(value, power));
  }
  return result;
}

/** The monomial with even powers of M replaced by κ or G; of an odd power one M, or 1/M, remains. */
export function fromMass(scalar: ScalarTerm, units: Units): ScalarTerm {
  const inverseSquare = INVERSE_SQUARE[units];
  const power = scalar.powers.find(([name]) => name === PLANCK_MASS)?.[1];
  if (inverseSquare === undefined || power === undefined) return scalar;
  const squares = Math.trunc(power / 2);
  const rest = scalar.powers
    .map(([name, n]) => [name, name === PLANCK_MASS ? n - 2 * squares : n] as const)
    .filter(([, n]) => n !== 0);
  return multiplyScalarTerms({ ...scalar, powers: rest }, powerScalarTerm(inverseSquare, -squares));
}
