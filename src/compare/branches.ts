/**
 * All solutions of a system of differential equations in one function of time, as branches: each a chain (elimination.ts)
 * together with the factors that were taken to vanish or not to. The classical elimination by characteristic sets for
 * ordinary differential polynomials over generic couplings: a polynomial with a factor splits the branch, a polynomial in
 * couplings alone ends it. Invariant: in a chain every link is reduced by the others, and the derivative of a link whose
 * leader is no jet is reduced to zero. Imports eliminations.
 */
import { infix } from '../algebra/infix.js';
import { equals, generator, isZero, multiply, type Poly } from '../algebra/poly.js';
import { BoundError } from './budget.js';
import {
  type Arena,
  derivativeOf,
  type Link,
  leaderOf,
  makeLink,
  orderedLinks,
  reduce,
  reducibleIn,
} from './elimination.js';
import { degreeIn, divideOut, type Factors, isVariable, mergeFactors, splitFactors } from './factors.js';
import type { Known } from './known.js';

const MAX_BRANCHES = 24;
const MAX_ROUNDS = 400;

export interface Branch {
  /** Lowest leader first. */
  readonly links: readonly Link[];
  /** Factors that vanish on this branch by choice, in order of choice. */
  readonly zero: readonly Poly[];
  /** Factors that were chosen not to vanish. */
  readonly nonzero: readonly Poly[];
  /** Sums that were divided by on the way. */
  readonly pivots: readonly Poly[];
}

export interface DeadEnd {
  readonly zero: readonly Poly[];
  readonly nonzero: readonly Poly[];
  /** Polynomial in the couplings that would have to vanish. */
  readonly needs: Poly;
}

export interface Solutions {
  readonly branches: readonly Branch[];
  readonly deadEnds: readonly DeadEnd[];
}

interface State {
  readonly links: readonly Link[];
  readonly queue: readonly Known[];
  readonly zero: readonly Poly[];
  readonly nonzero: readonly Poly[];
  readonly pivots: readonly Poly[];
}

/**
 * @param given the equations.
 * @param nonzero what is taken not to vanish from the beginning.
 * @param trial polynomials that are tried as factors.
 * @throws BoundError when the bound is exceeded.
 */
export function solutionsOf(
  arena: Arena,
  given: readonly Known[],
  nonzero: readonly Poly[],
  trial: readonly Poly[],
): Solutions {
  const branches: Branch[] = [];
  const deadEnds: DeadEnd[] = [];
  const open: State[] = [{ links: [], queue: given, zero: [], nonzero, pivots: [] }];
  for (let rounds = 0; open.length > 0; rounds++) {
    if (rounds > MAX_ROUNDS) throw new BoundError(`more than ${MAX_ROUNDS} steps of elimination`);
    if (open.length + branches.length > MAX_BRANCHES) throw new BoundError(`more than ${MAX_BRANCHES} branches`);
    const state = open.pop()!;
    if (state.queue.length === 0) {
      const { zero, nonzero: chosen, pivots } = state;
      branches.push({ links: orderedLinks(arena, state.links), zero, nonzero: chosen, pivots });
      continue;
    }
    const next = advance({ ...arena, pivots: [...state.pivots] }, state, trial);
    if ('needs' in next) deadEnds.push(next);
    else open.push(...next);
  }
  return { branches, deadEnds };
}

/** Takes the simplest polynomial of the queue into the chain. Where it splits, the generic branch comes last. */
function advance(arena: Arena, state: State, trial: readonly Poly[]): State[] | DeadEnd {
  const { space } = arena;
  const chosen = simplest(arena, state.queue);
  const queue = state.queue.filter((known) => known !== chosen);
  const { rest, steps } = reduce(arena, chosen.poly, state.links);
  const { pivots } = arena;
  if (isZero(rest)) return [{ ...state, queue, pivots }];

  const { unit, variables, rest: reduced } = splitFactors(space, rest);
  let left = reduced;
  let divided: Factors = variables.map(([g, n]) => ({ base: variable(arena, g), power: n }));
  for (const base of [...state.nonzero, ...arena.pivots]) {
    if (left.size === 1) break;
    const out = divideOut(space, arena.budget, left, base);
    left = out.rest;
    if (out.power > 0) divided = mergeFactors(divided, [{ base, power: out.power }]);
  }
  for (const base of trial) {
    if (left.size === 1 || equals(left, base)) break;
    const out = divideOut(space, arena.budget, left, base);
    left = out.rest;
    if (out.power > 0) divided = mergeFactors(divided, [{ base, power: out.power }]);
  }
  const tail = splitFactors(space, left);
  const choices = divided.map((f) => f.base).filter((base) => mayVanish(arena, state, base));
  const alone = tail.rest.size === 1;
  if (alone && choices.length === 0) return { zero: state.zero, nonzero: state.nonzero, needs: tail.rest };
  const deadEnd = !alone && leaderOf(arena, tail.rest) === undefined;
  if (deadEnd && choices.length === 0) return { zero: state.zero, nonzero: state.nonzero, needs: tail.rest };

  const link = (poly: Poly, among: Factors, nonzero: readonly Poly[]): State => {
    const all = multiply(unit, tail.unit);
    const known: Known = { kind: 'combined', poly, base: chosen, steps, unit: all, divided: among };
    return withLink(arena, { ...state, queue, nonzero }, known, leaderOf(arena, poly)!);
  };
  // A single factor is no choice: it vanishes.
  const [only] = choices;
  if (alone && choices.length === 1 && divided.find((f) => equals(f.base, only!))!.power === 1)
    return [
      link(
        only!,
        divided.filter((f) => !equals(f.base, only!)),
        state.nonzero,
      ),
    ];

  // One branch for each factor that may vanish, those before it taken not to; the last one has none of them.
  const out: State[] = [];
  choices.forEach((base, i) => {
    const split: Known = {
      kind: 'given',
      poly: base,
      name: `${infix(base)} = 0`,
    };
    const zero = [...state.zero, base];
    out.push({
      links: state.links,
      queue: [...queue, split],
      zero,
      nonzero: [...state.nonzero, ...choices.slice(0, i)],
      pivots,
    });
  });
  if (!alone && !deadEnd) out.push(link(tail.rest, divided, [...state.nonzero, ...choices]));
  return out;
}

const variable = ({ space }: Arena, g: number): Poly => generator(space.ring, space.ring.generators[g]!.name);

/** Whether a factor is no known non-zero quantity: it involves a variable and has not been chosen before. */
function mayVanish(arena: Arena, { nonzero }: State, base: Poly): boolean {
  if (!arena.space.places.some((_, g) => isVariable(arena.space, g) && degreeIn(base, g) > 0)) return false;
  return ![...nonzero, ...arena.pivots].some((p) => equals(p, base));
}

/** The chain with one more link; links that it reduces, or replaces, go back to the queue. */
function withLink(arena: Arena, state: State, known: Known, leader: number): State {
  const link = makeLink(arena, known, leader);
  const alone = new Map([[link.field, link]]);
  const stays = (other: Link): boolean =>
    other.field !== link.field && reducibleIn(arena, other.known.poly, alone) === undefined;
  const queue = [...state.queue, ...state.links.filter((l) => !stays(l)).map((l) => l.known)];
  // A density or a scale factor has a rate of its own, which must agree with the derivative of the relation.
  if (arena.space.places[leader]!.kind !== 'jet') queue.push(derivativeOf(arena, link, 1));
  return { ...state, links: [...state.links.filter(stays), link], queue, pivots: arena.pivots };
}

function simplest(arena: Arena, queue: readonly Known[]): Known {
  const weight = ({ poly }: Known): readonly [number, number, number] => {
    const g = leaderOf(arena, poly);
    return g === undefined ? [-1, 0, 0] : [arena.ranking[g]!, degreeIn(poly, g), poly.size];
  };
  let best = queue[0]!;
  let least = weight(best);
  for (const known of queue.slice(1)) {
    const w = weight(known);
    const order = w[0] - least[0] || w[1] - least[1] || w[2] - least[2];
    if (order < 0) [best, least] = [known, w];
  }
  return best;
}
