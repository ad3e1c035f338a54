/**
 * Laurent monomials in named symbols, and sums of them. Invariant (`isCanonicalScalar`): powers sorted by name without zero
 * exponents, coefficients non-zero and in lowest terms, no two terms with equal powers, terms sorted by `comparePowers`.
 */
import {
  addRational,
  isCanonicalRational,
  multiplyRational,
  ONE,
  powerRational,
  type Rational,
} from '../algebra/rational.js';
import type { ScalarSum, ScalarTerm } from './theory.js';

type Powers = ScalarTerm['powers'];

/** The monomial 1. */
export const UNIT: ScalarTerm = Object.freeze({ coefficient: ONE, powers: Object.freeze([]) });

const compareNames = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);

/** One total order: by the names from the first on, then by exponent, shorter first. */
export function comparePowers(a: Powers, b: Powers): number {
  for (let i = 0; i < a.length && i < b.length; i++) {
    const [nameA, exponentA] = a[i]!;
    const [nameB, exponentB] = b[i]!;
    const order = compareNames(nameA, nameB) || exponentB - exponentA;
    if (order !== 0) return order;
  }
  return a.length - b.length;
}

/** Text that is equal exactly for equal powers. */
export const powersKey = (powers: Powers): string => powers.map(([name, exponent]) => `${name}^${exponent}`).join(' ');

export const constantTerm = (coefficient: Rational): ScalarTerm => ({ coefficient, powers: [] });
export const symbolTerm = (name: string): ScalarTerm => ({ coefficient: ONE, powers: [[name, 1]] });

export function multiplyScalarTerms(a: ScalarTerm, b: ScalarTerm): ScalarTerm {
  const coefficient = multiplyRational(a.coefficient, b.coefficient);
  if (a.powers.length === 0) return { coefficient, powers: b.powers };
  if (b.powers.length === 0) return { coefficient, powers: a.powers };
  const powers: (readonly [string, number])[] = [];
  let j = 0;
  for (const power of a.powers) {
    while (j < b.powers.length && b.powers[j]![0] < power[0]) powers.push(b.powers[j++]!);
    const other = b.powers[j];
    if (other?.[0] !== power[0]) powers.push(power);
    else {
      j++;
      if (power[1] + other[1] !== 0) powers.push([power[0], power[1] + other[1]]);
    }
  }
  for (; j < b.powers.length; j++) powers.push(b.powers[j]!);
  return { coefficient, powers };
}

/**
 * term^n for an integer n.
 * @throws RangeError when the coefficient is 0 and n negative.
 */
export function powerScalarTerm(term: ScalarTerm, n: number): ScalarTerm {
  if (n === 0) return UNIT;
  const powers = term.powers.map(([name, exponent]) => [name, exponent * n] as const);
  return { coefficient: powerRational(term.coefficient, n), powers };
}

/** Like terms collected, in canonical order. */
export function collectScalars(terms: readonly ScalarTerm[]): ScalarSum {
  const byPowers = new Map<string, ScalarTerm>();
  for (const term of terms) {
    const key = powersKey(term.powers);
    const before = byPowers.get(key);
    const coefficient = before === undefined ? term.coefficient : addRational(before.coefficient, term.coefficient);
    byPowers.set(key, { coefficient, powers: term.powers });
  }
  return [...byPowers.values()]
    .filter((term) => term.coefficient.num !== 0n)
    .sort((a, b) => comparePowers(a.powers, b.powers));
}

/** Whether a sum keeps the invariant of this module. */
export function isCanonicalScalar(sum: ScalarSum): boolean {
  return sum.every(({ coefficient, powers }, i) => {
    const sorted = powers.every(([name, n], j) => n !== 0 && (j === 0 || compareNames(powers[j - 1]![0], name) < 0));
    const ordered = i === 0 || comparePowers(sum[i - 1]!.powers, powers) < 0;
    return sorted && ordered && coefficient.num !== 0n && isCanonicalRational(coefficient);
  });
}
