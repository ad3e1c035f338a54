/**
 * Simple repairs of a claim that does not hold: one typed term with another coefficient. Modulo the equations the claim must
 * be a multiple of the term by a constant; the repaired claim is then tested like any other. Imports consequences.
 */
import { collect, monomialOf } from '../algebra/collect.js';
import { divideExactly, splitUnit } from '../algebra/division.js';
import { infix } from '../algebra/infix.js';
import { inverseMod, multiplyMod, PRIMES } from '../algebra/modular.js';
import { constant, equals, isZero, multiply, type Poly, subtract, termsOf } from '../algebra/poly.js';
import { multiplyRational, printRational, type Rational, rational } from '../algebra/rational.js';
import type { Branch } from './branches.js';
import { boundIn } from './budget.js';
import type { Claim, ClaimTerm } from './claim.js';
import { consequence, residualOf } from './consequence.js';
import { reduce } from './elimination.js';
import { expandFactors, isVariable } from './factors.js';
import type { JetSpace } from './jet-space.js';
import { NoPoint, pointOn, randomResidues } from './points.js';
import { arenaOf, type Solved } from './system.js';

export interface Repair {
  readonly kind: 'sign' | 'coefficient' | 'absent';
  /** The typed term at fault. */
  readonly term: string;
  /** What it has to be multiplied by: 0 when it should not be there. */
  readonly factor: string;
  /** The term as it should read. */
  readonly corrected: string;
}

const MAX_REPAIRS = 6;

/** Repairs that make the claim hold on all branches, simplest first. Each was verified with a certificate. */
export function repairsOf(solved: Solved, branches: readonly Branch[], claim: Claim): Repair[] {
  const found: { readonly repair: Repair; readonly weight: number }[] = [];
  for (const term of [...claim.groups, ...claim.terms]) {
    if (isZero(term.value) || (term.value.size === claim.poly.size && equals(term.value, claim.poly))) continue;
    try {
      const ratio = branches[0] && proportion(solved, branches, claim, term);
      if (!ratio) continue;
      const mended = subtract(multiply(ratio.bottom, claim.poly), multiply(ratio.top, term.value));
      if (!branches.every((b) => consequence(solved, b, mended).verdict === 'follows')) continue;
      found.push(described(term, ratio));
    } catch (error) {
      if (!boundIn(error)) throw error;
    }
  }
  found.sort((a, b) => a.weight - b.weight);
  return found.slice(0, MAX_REPAIRS).map((f) => f.repair);
}

interface Ratio {
  readonly top: Poly;
  readonly bottom: Poly;
}

/** Couplings top/bottom with claim = (top/bottom) · term on the equations. */
function proportion(solved: Solved, branches: readonly Branch[], claim: Claim, term: ClaimTerm): Ratio | undefined {
  const [branch] = branches;
  if (!branch || !looksProportional(solved, branch, claim, term)) return undefined;
  const arena = arenaOf(solved, branch);
  const { space } = solved;
  const left = reduce(arena, claim.poly, branch.links);
  const right = reduce(arena, term.value, branch.links);
  if (isZero(right.rest)) return undefined;
  const a = residualOf(space, left.steps, left.rest, arena.budget);
  const b = residualOf(space, right.steps, right.rest, arena.budget);
  const { budget } = arena;
  const above = budget.multiply(a.top, expandFactors(space, b.bottom));
  const below = budget.multiply(b.top, expandFactors(space, a.bottom));
  const isField = (g: number): boolean => isVariable(space, g) || space.places[g]!.kind === 'scale';
  const first = collect(below, isField)[0]!;
  const key = monomialOf(space.ring, first.monomial);
  const twin = collect(above, isField).find((c) => equals(monomialOf(space.ring, c.monomial), key));
  if (!twin) return undefined;
  const ratio = lowest(space, { top: twin.coefficient, bottom: first.coefficient });
  return equals(budget.multiply(above, ratio.bottom), budget.multiply(below, ratio.top)) ? ratio : undefined;
}

/** A quick test: at solutions with the same couplings the quotient of claim and term is the same. */
function looksProportional(solved: Solved, branch: Branch, claim: Claim, term: ClaimTerm): boolean {
  const arena = arenaOf(solved, branch);
  const [p] = PRIMES;
  const random = randomResidues(77);
  const { ring } = solved.space;
  const couplings = ring.generators.map((_, g) =>
    solved.space.places[g]!.kind === 'coupling' ? random(p) : undefined,
  );
  for (const [r, square] of ring.radicals) couplings[square] = multiplyMod(couplings[r]!, couplings[r]!, p);
  const ratios: number[] = [];
  for (let n = 0; n < 3; n++) {
    try {
      const point = pointOn(arena, branch, [], p, random, couplings);
      const by = point?.at(term.value);
      if (!point || !by) continue;
      ratios.push(multiplyMod(point.at(claim.poly), inverseMod(by, p), p));
    } catch (error) {
      if (!(error instanceof NoPoint)) throw error;
    }
  }
  return ratios.length > 0 && ratios.every((r) => r === ratios[0]);
}

/** Cancels what obviously divides. */
function lowest(space: JetSpace, { top, bottom }: Ratio): Ratio {
  const one = constant(space.ring, 1);
  const whole = divideExactly(top, bottom);
  if (whole) return { top: whole, bottom: one };
  const inverse = divideExactly(bottom, top);
  if (inverse) return { top: one, bottom: inverse };
  const { unit, reduced } = splitUnit(bottom);
  return { top: divideExactly(top, unit)!, bottom: reduced };
}

const numberOf = (p: Poly): Rational | undefined => {
  if (isZero(p)) return rational(0);
  const terms = termsOf(p);
  return terms.length === 1 && terms[0]!.exponents.length === 0 ? terms[0]!.coefficient : undefined;
};

function described(term: ClaimTerm, { top, bottom }: Ratio): { readonly repair: Repair; readonly weight: number } {
  const kept = subtract(bottom, top);
  const quotient = divideExactly(kept, bottom);
  const number = quotient && numberOf(quotient);
  const above = kept.size === 1 ? infix(kept) : `(${infix(kept)})`;
  const text = quotient ? infix(quotient) : `${above}/(${infix(bottom)})`;
  const base = { term: term.text, factor: text };
  if (number?.num === 0n) return { repair: { ...base, kind: 'absent', corrected: '0' }, weight: 2 };
  if (number && number.num === -1n && number.den === 1n)
    return { repair: { ...base, kind: 'sign', corrected: times(rational(-1), term.text) }, weight: 0 };
  if (number) return { repair: { ...base, kind: 'coefficient', corrected: times(number, term.text) }, weight: 1 };
  const bracket = quotient && quotient.size === 1 ? text : quotient ? `(${text})` : text;
  return {
    repair: { ...base, kind: 'coefficient', corrected: `${bracket} ${bracketed(term.text)}` },
    weight: 3 + kept.size,
  };
}

const bracketed = (text: string): string => (/^[A-Za-z\\][^/+-]*$/.test(text) ? text : `(${text})`);

/** A rational times a typed term, absorbed into its leading number. */
function times(factor: Rational, text: string): string {
  const match = /^(\d+)(?:\s*\/\s*(\d+))?(?=[\s*(\\A-Za-z]|$)\s*\*?\s*(.*)$/.exec(text);
  const own = match ? rational(BigInt(match[1]!), BigInt(match[2] ?? '1')) : rational(1);
  const rest = match ? match[3]! : bracketed(text);
  const value = multiplyRational(factor, own);
  if (rest === '') return printRational(value);
  const one = value.num === 1n && value.den === 1n;
  if (one) return rest;
  if (value.num === -1n && value.den === 1n) return `-${rest}`;
  return `${printRational(value)} ${rest}`;
}
