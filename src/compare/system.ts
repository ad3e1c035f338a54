/**
 * The equations of a theory, solved: branches under the first ranking that stays within the bound. Imports eliminations.
 */
import { splitUnit } from '../algebra/division.js';
import { isZero, type Poly } from '../algebra/poly.js';
import type { Derivation } from '../derivation.js';
import { type Branch, type Solutions, solutionsOf } from './branches.js';
import { Budget } from './budget.js';
import type { Arena } from './elimination.js';
import { equationsIn, type JetSpace } from './jet-space.js';
import type { Known } from './known.js';
import { type RankingName, rankingOf } from './ranking.js';

/** How far an elimination may go: products of terms, and terms of one polynomial. A short try under each ranking comes first. */
export const BOUNDS = [
  { products: 1_500_000, terms: 1_500 },
  { products: 15_000_000, terms: 4_000 },
] as const satisfies readonly Bound[];
export interface Bound {
  readonly products: number;
  readonly terms: number;
}

export const budgetOf = ({ products, terms }: Bound): Budget => new Budget(products, terms);

export interface Equations {
  readonly space: JetSpace;
  readonly given: readonly Known[];
  /** What is taken not to vanish. */
  readonly nonzero: readonly Poly[];
  /** Polynomials that are tried as factors. */
  readonly trial: readonly Poly[];
}

export interface Solved extends Equations {
  readonly ranking: RankingName;
  readonly bound: Bound;
  readonly arena: Arena;
  readonly solutions: Solutions;
}

/** An arena on one branch, with a fresh bound and the pivots of that branch. */
export const arenaOf = ({ arena, bound }: Solved, branch: Branch): Arena => ({
  ...arena,
  budget: budgetOf(bound),
  pivots: [...branch.pivots],
});

/** Equations of a derivation in a space; `extra` are further equations and what must not vanish. */
export function equationsOf(
  space: JetSpace,
  d: Derivation,
  anyMatter: boolean,
  extra: {
    readonly zero?: readonly { readonly name: string; readonly poly: Poly }[];
    readonly nonzero?: readonly Poly[];
  } = {},
): Equations {
  const given: Known[] = [];
  for (const [name, poly] of equationsIn(space, d, anyMatter))
    if (!isZero(poly)) given.push({ kind: 'given', poly, name });
  for (const { name, poly } of extra.zero ?? []) if (!isZero(poly)) given.push({ kind: 'given', poly, name });
  const components = d.geometry.components.map((c) => splitUnit(space.translate(c.value)).reduced);
  return { space, given, nonzero: extra.nonzero ?? [], trial: components.filter((p) => p.size > 1) };
}

/** @throws BoundError when the bound is exceeded. */
export function solve(
  equations: Equations,
  ranking: RankingName,
  bound: Bound,
  gone: ReadonlySet<string> = new Set(),
): Solved {
  const { space, given, nonzero, trial } = equations;
  const arena: Arena = { space, ranking: rankingOf(space, ranking, gone), budget: budgetOf(bound), pivots: [] };
  const solutions = solutionsOf(arena, given, nonzero, trial);
  return { ...equations, ranking, bound, arena, solutions };
}
