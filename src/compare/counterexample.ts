/**
 * Counterexamples at particular couplings, for equations that are too large to be solved in general: every coupling is given a
 * number, the equations are solved for these, and the claim must fail on a solution. Nothing positive is concluded.
 */
import { involves, substitute } from '../algebra/collect.js';
import { constant, isZero, type Poly } from '../algebra/poly.js';
import { relationsOf } from './branches.js';
import { boundIn } from './budget.js';
import { consequence } from './consequence.js';
import type { JetSpace } from './jet-space.js';
import { randomResidues } from './points.js';
import type { RankingName } from './ranking.js';
import { type Bound, type Equations, solve } from './system.js';

export interface Counterexample {
  /** `c = 5`, for couplings that occur. */
  readonly couplings: readonly string[];
  readonly branch: readonly string[];
}

/** Numbers are small, so that the coefficients of an elimination stay short. */
const LARGEST = 97;

/** @returns undefined when none was found within the bound. */
export function counterexample(
  equations: Equations,
  p: Poly,
  rankings: readonly RankingName[],
  bound: Bound,
): Counterexample | undefined {
  const { space } = equations;
  const numbers = numbersFor(space);
  const put = (q: Poly): Poly => substitute(q, new Map([...numbers].filter(([name]) => involves(q, name))));
  const special: Equations = {
    space,
    given: equations.given
      .map(
        (known) => ({ kind: 'given', poly: put(known.poly), name: known.kind === 'given' ? known.name : '' }) as const,
      )
      .filter(({ poly }) => !isZero(poly)),
    nonzero: equations.nonzero.map(put),
    trial: equations.trial.map(put).filter((q) => q.size > 1),
  };
  const claim = put(p);
  for (const ranking of rankings)
    try {
      const solved = solve(special, ranking, bound);
      for (const branch of solved.solutions.branches) {
        if (consequence(solved, branch, claim).verdict !== 'fails') continue;
        const occurring = [...equations.given.map((k) => k.poly), p];
        const couplings = [...numbers]
          .filter(([name]) => occurring.some((q) => involves(q, name)))
          .map(([name, value]) => `${name} = ${value.numerators[0]}`);
        return { couplings, branch: relationsOf(branch) };
      }
    } catch (error) {
      if (!boundIn(error)) throw error;
    }
  return undefined;
}

function numbersFor({ ring, places }: JetSpace): ReadonlyMap<string, Poly> {
  const random = randomResidues(2024);
  const out = new Map<string, Poly>();
  ring.generators.forEach(({ name }, g) => {
    if (places[g]!.kind === 'coupling') out.set(name, constant(ring, 1 + random(LARGEST)));
  });
  for (const [r, square] of ring.radicals) {
    const root = 1 + random(LARGEST);
    out.set(ring.generators[r]!.name, constant(ring, root));
    out.set(ring.generators[square]!.name, constant(ring, root * root));
  }
  return out;
}
