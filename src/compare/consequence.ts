/**
 * Whether a polynomial follows from solved equations: yes with a certificate that is multiplied out, no with a solution on
 * which it does not vanish, or undecided. Never a guess: a "yes" also needs solutions modulo two primes on which the
 * polynomial vanishes and no condition fails, so that the certificate is about something.
 */

import { infix } from '../algebra/infix.js';
import { PRIMES } from '../algebra/modular.js';
import { isZero, type Poly } from '../algebra/poly.js';
import { exponentRange } from '../algebra/ring.js';
import type { Branch } from './branches.js';
import { type Budget, boundIn } from './budget.js';
import { type Certificate, Certifier, certifies } from './certificate.js';
import { type Arena, reduce } from './elimination.js';
import {
  divideOut,
  expandFactors,
  type Factor,
  type Factors,
  lackingFactors,
  mergeFactors,
  splitFactors,
} from './factors.js';
import type { JetSpace } from './jet-space.js';
import { pointOn, randomResidues } from './points.js';
import { arenaOf, budgetOf, type Solved } from './system.js';

/** What is left of a polynomial: p = top/bottom on the equations, where no generator of top can be replaced. */
export interface Residual {
  readonly top: Poly;
  readonly bottom: Factors;
}

export type Verdict =
  | { readonly verdict: 'follows'; readonly certificate: Certificate; readonly conditions: readonly string[] }
  | { readonly verdict: 'fails'; readonly residual: Residual }
  | { readonly verdict: 'undecided'; readonly reason: string; readonly residual: Residual | undefined };

/** Points at which each answer is tested. */
const POINTS = 3;

export function consequence(solved: Solved, branch: Branch, p: Poly): Verdict {
  const arena = arenaOf(solved, branch);
  try {
    return decided(solved, arena, branch, p);
  } catch (error) {
    if (!boundIn(error)) throw error;
    return { verdict: 'undecided', reason: boundIn(error)!.message, residual: undefined };
  }
}

function decided(solved: Solved, arena: Arena, branch: Branch, p: Poly): Verdict {
  const { space } = solved;
  const { rest, steps } = reduce(arena, p, branch.links);
  if (!isZero(rest)) {
    const residual = residualOf(space, steps, rest, arena.budget);
    const values = valuesAt(solved, arena, branch, p);
    if (values.some((v) => v !== 0)) return { verdict: 'fails', residual };
    const reason = values.length === 0 ? NO_POINT : 'it vanishes on all solutions tried, but no certificate was found';
    return { verdict: 'undecided', reason, residual };
  }
  const certificate = new Certifier(space, budgetOf(solved.bound)).ofZero(steps);
  if (!certifies(space, certificate, p)) throw new Error('a certificate does not multiply out');
  const bases = certificate.denominator.map((f) => f.base);
  const values = valuesAt(solved, arena, branch, p, bases);
  if (values.length === 0) return { verdict: 'undecided', reason: NO_POINT, residual: undefined };
  if (values.some((v) => v !== 0)) throw new Error('a certified equation does not hold on a solution');
  return { verdict: 'follows', certificate, conditions: conditionsOf(space, certificate, p) };
}

const NO_POINT = 'no solution of the equations was found modulo a prime';

/** Residues of p at random solutions on which `nonzero` does not vanish. */
function valuesAt(solved: Solved, arena: Arena, branch: Branch, p: Poly, nonzero: readonly Poly[] = []): number[] {
  const { space, given } = solved;
  const equations = [...given.map((g) => g.poly), ...branch.zero];
  const zero = [...equations, ...equations.map((e) => space.rate(e))];
  const restricted = { ...branch, nonzero: [...branch.nonzero, ...nonzero] };
  const out: number[] = [];
  for (const prime of PRIMES)
    for (let n = 0; n < POINTS; n++) {
      const point = pointOn(arena, restricted, zero, prime, randomResidues(1009 * n + prime));
      if (point) out.push(point.at(p));
    }
  return out;
}

/** From S p = Δ rest (modulo the equations): p = Δ rest / S, common factors cancelled. */
export function residualOf(
  space: JetSpace,
  steps: readonly { readonly u: Factors; readonly d: Factors }[],
  rest: Poly,
  budget: Budget,
): Residual {
  let above: Factors = [];
  let below: Factors = [];
  for (const { u, d } of steps) {
    below = mergeFactors(below, u);
    above = mergeFactors(above, d);
  }
  let top = expandFactors(space, [...lackingFactors(below, above), { base: rest, power: 1 }]);
  const bottom: Factor[] = [];
  for (const { base, power } of lackingFactors(above, below)) {
    const out = divideOut(space, budget, top, base, power);
    top = out.rest;
    if (out.power < power) bottom.push({ base, power: power - out.power });
  }
  return { top, bottom };
}

/** What a certificate takes not to vanish: its denominator, and couplings that it divides by. */
export function conditionsOf(space: JetSpace, { denominator, cofactors }: Certificate, p: Poly): string[] {
  const divided = new Set<string>();
  const own = exponentRange(space.ring, p.keys).low;
  for (const { value } of cofactors)
    exponentRange(space.ring, value.keys).low.forEach((n, g) => {
      if (n < Math.min(0, own[g]!) && space.places[g]!.kind === 'coupling') divided.add(space.ring.generators[g]!.name);
    });
  const sums = denominator.map(({ base }) =>
    infix(splitFactors(space, base).rest.size > 1 ? splitFactors(space, base).rest : base),
  );
  return [...divided, ...sums].map((text) => `${text} != 0`);
}
