/**
 * Whether two theories have the same solutions for the fields that they share: each equation of the one must follow from
 * those of the other, on every branch. Fields that are not shared are eliminated first: what is left of a chain in the shared
 * ones are all their consequences. Every step is a consequence in the sense of consequence.ts, with its certificate.
 */

import { equals, generator, type Poly } from '../algebra/poly.js';
import { exponentRange } from '../algebra/ring.js';
import type { Derivation } from '../derivation.js';
import { type Branch, relationsOf } from './branches.js';
import { boundIn } from './budget.js';
import { consequence, type Residual } from './consequence.js';
import type { JetSpace } from './jet-space.js';
import { ELIMINATIONS, RANKINGS, type RankingName } from './ranking.js';
import { BOUNDS, type Bound, equationsOf, type Solved, solve } from './system.js';

/** An equation of one theory that does not follow from the other. */
export interface Missing {
  /** 1 or 2: the theory whose equation it is. */
  readonly of: 1 | 2;
  readonly equation: string;
  readonly poly: Poly;
  /** Branch of the other theory on which it fails. */
  readonly branch: readonly string[];
  readonly residual: Residual;
  /** The other theory's equation for the same quantity, where one was found. */
  readonly counterpart: Poly | undefined;
}

export type Equivalence =
  | {
      readonly result: 'same';
      readonly anyMatter: boolean;
      readonly eliminated: readonly [readonly string[], readonly string[]];
      /** Equations of the shared fields that were compared, by theory. */
      readonly compared: readonly [number, number];
      readonly conditions: readonly string[];
    }
  | { readonly result: 'different'; readonly missing: Missing }
  | { readonly result: 'undecided'; readonly reason: string };

/** One theory for the purpose: its own fields that the other lacks, and whether all equations are compared as they stand. */
interface Side {
  readonly d: Derivation;
  readonly eliminated: readonly string[];
}

/**
 * @param shared fields (without the lapse) for which the theories are compared; scale factors are always among them.
 */
export function equivalence(
  space: JetSpace,
  [a, b]: readonly [Derivation, Derivation],
  shared: ReadonlySet<string>,
  anyMatter: boolean,
  bound: Bound,
): Equivalence {
  const side = (d: Derivation): Side => ({
    d,
    eliminated: [...d.equations.keys()].filter((q) => q !== space.lapse && !space.rates.has(q) && !shared.has(q)),
  });
  const sides = [side(a), side(b)] as const;
  try {
    const forth = follows(space, sides[0], sides[1], 1, anyMatter, bound);
    if (forth.result !== 'same') return withCounterpart(space, forth, sides[1], anyMatter);
    const back = follows(space, sides[1], sides[0], 2, anyMatter, bound);
    if (back.result !== 'same') return withCounterpart(space, back, sides[0], anyMatter);
    return {
      result: 'same',
      anyMatter,
      eliminated: [sides[0].eliminated, sides[1].eliminated],
      compared: [forth.compared, back.compared],
      conditions: [...new Set([...forth.conditions, ...back.conditions])],
    };
  } catch (error) {
    if (!boundIn(error)) throw error;
    return { result: 'undecided', reason: `the elimination needs ${boundIn(error)!.message}` };
  }
}

/** A difference is read best beside what the other theory says about the same quantity; a short try is made for it. */
function withCounterpart(
  space: JetSpace,
  found: Exclude<Half, { result: 'same' }>,
  other: Side,
  anyMatter: boolean,
): Equivalence {
  if (found.result !== 'different') return found;
  const { missing } = found;
  try {
    const systems = consequencesOf(space, other, anyMatter, BOUNDS[0]);
    const counterpart = systems.flat().find((e) => e.name === missing.equation)?.poly;
    return { result: 'different', missing: { ...missing, counterpart } };
  } catch (error) {
    if (!boundIn(error)) throw error;
    return found;
  }
}

type Half =
  | { readonly result: 'same'; readonly compared: number; readonly conditions: readonly string[] }
  | Exclude<Equivalence, { readonly result: 'same' }>;

/** Whether what `from` says about the shared fields follows from `to`: each branch of `to` must lie in one of `from`. */
function follows(space: JetSpace, from: Side, to: Side, of: 1 | 2, anyMatter: boolean, bound: Bound): Half {
  const systems = consequencesOf(space, from, anyMatter, bound);
  const target = firstSolved(space, to, anyMatter, RANKINGS, bound);
  const conditions = new Set<string>();
  let compared = 0;
  for (const branch of target.solutions.branches) {
    let best: Half | undefined;
    for (const equations of systems) {
      const half = onBranch(target, branch, equations, of);
      if (half.result === 'same') {
        best = half;
        break;
      }
      if (!best || (best.result === 'undecided' && half.result === 'different')) best = half;
    }
    if (!best) return { result: 'undecided', reason: 'one of the theories has no solution for general couplings' };
    if (best.result !== 'same') return best;
    compared = Math.max(compared, best.compared);
    for (const c of best.conditions) conditions.add(c);
  }
  if (target.solutions.branches.length === 0)
    return { result: 'undecided', reason: 'one of the theories has no solution for general couplings' };
  return { result: 'same', compared, conditions: [...conditions] };
}

function onBranch(target: Solved, branch: Branch, equations: readonly Named[], of: 1 | 2): Half {
  const conditions: string[] = [];
  for (const { name, poly } of equations) {
    const verdict = consequence(target, branch, poly);
    if (verdict.verdict === 'undecided') return { result: 'undecided', reason: verdict.reason };
    if (verdict.verdict === 'fails') {
      const missing = {
        of,
        equation: name,
        poly,
        branch: relationsOf(withoutRates(target, branch)),
        residual: verdict.residual,
        counterpart: undefined,
      };
      return { result: 'different', missing };
    }
    const chosen = relationsOf(withoutRates(target, branch));
    conditions.push(...verdict.conditions.filter((c) => !chosen.includes(c)));
  }
  return { result: 'same', compared: equations.length, conditions };
}

interface Named {
  readonly name: string;
  readonly poly: Poly;
}

/** Systems of equations in the shared fields, one for each branch of the theory. */
function consequencesOf(space: JetSpace, side: Side, anyMatter: boolean, bound: Bound): readonly (readonly Named[])[] {
  if (side.eliminated.length === 0)
    return [
      equationsOf(space, side.d, anyMatter).given.flatMap((g) =>
        g.kind === 'given' ? [{ name: g.name, poly: g.poly }] : [],
      ),
    ];
  const gone = new Set(side.eliminated);
  const solved = firstSolved(space, side, anyMatter, ELIMINATIONS, bound);
  return solved.solutions.branches.map((b) =>
    b.links
      .filter((l) => isFree(space, l.known.poly, gone))
      .map((l) => ({ name: nameOf(space, l.leader), poly: l.known.poly })),
  );
}

const nameOf = (space: JetSpace, g: number): string => space.ring.generators[g]!.name;

function isFree(space: JetSpace, p: Poly, gone: ReadonlySet<string>): boolean {
  const { low, high } = exponentRange(p.ring, p.keys);
  return space.places.every(({ field }, g) => !gone.has(field) || (low[g] === 0 && high[g] === 0));
}

/** Rates are taken not to vanish, as for claims. */
const rates = (space: JetSpace): Poly[] =>
  [...new Set(space.rates.values())].map((name) => generator(space.ring, name));

function withoutRates({ space }: Solved, branch: Branch): Branch {
  const assumed = rates(space);
  return { ...branch, nonzero: branch.nonzero.filter((p) => !assumed.some((r) => equals(p, r))) };
}

/** The equations solved under the first ranking that stays within the bound. @throws BoundError when none does. */
function firstSolved(
  space: JetSpace,
  side: Side,
  anyMatter: boolean,
  rankings: readonly RankingName[],
  bound: Bound,
): Solved {
  let refusal: unknown;
  for (const ranking of rankings) {
    try {
      const equations = equationsOf(space, side.d, anyMatter, { nonzero: rates(space) });
      return solve(equations, ranking, bound, new Set(side.eliminated));
    } catch (error) {
      if (!boundIn(error)) throw error;
      refusal = error;
    }
  }
  throw refusal;
}
