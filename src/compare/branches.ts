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
  /** Whether nothing but chosen factors was divided by on the way; otherwise a pivot may vanish on the branch. */
  readonly proved: boolean;
}

export interface Solutions {
  readonly branches: readonly Branch[];
  readonly deadEnds: readonly DeadEnd[];
}

/** The choices that single out a branch, as relations. */
export function relationsOf({ zero, nonzero }: Pick<Branch, 'zero' | 'nonzero'>): string[] {
  return [...zero.map((p) => `${infix(p)} = 0`), ...nonzero.map((p) => `${infix(p)} != 0`)];
}

interface State {
  readonly links: readonly Link[];
  readonly queue: readonly Known[];
  readonly zero: readonly Poly[];
  readonly nonzero: readonly Poly[];
  readonly pivots: readonly Poly[];
  /** Whether no pivot with a variable was divided by. */
  readonly proved: boolean;
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
  const open: State[] = [{ links: [], queue: given, zero: [], nonzero, pivots: [], proved: true }];
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
    open.push(...next.states);
    if (next.deadEnd) deadEnds.push(next.deadEnd);
  }
  return { branches, deadEnds };
}

interface Advance {
  readonly states: readonly State[];
  readonly deadEnd?: DeadEnd;
}

/** Takes the simplest polynomial of the queue into the chain. Where it splits, the generic branch comes last. */
function advance(arena: Arena, before: State, trial: readonly Poly[]): Advance {
  const { space } = arena;
  const chosen = simplest(arena, before.queue);
  const queue = before.queue.filter((known) => known !== chosen);
  const { rest, steps } = reduce(arena, chosen.poly, before.links);
  const { pivots } = arena;
  if (isZero(rest)) return { states: [{ ...before, queue, pivots }] };

  const { unit, variables, rest: reduced } = splitFactors(space, rest);
  let left = reduced;
  let divided: Factors = variables.map(([g, n]) => ({ base: variable(arena, g), power: n }));
  for (const base of [...before.nonzero, ...arena.pivots]) {
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
  const choices = divided.map((f) => f.base).filter((base) => mayVanish(arena, before, base));
  const risky = [...divided, ...steps.flatMap((step) => step.d)].some(
    ({ base }) => involvesVariable(arena, base) && ![...before.nonzero, ...choices].some((p) => equals(p, base)),
  );
  const state = { ...before, queue, pivots, proved: before.proved && !risky };
  const alone = tail.rest.size === 1;
  const link = (poly: Poly, among: Factors, nonzero: readonly Poly[]): State => {
    const all = multiply(unit, tail.unit);
    const known: Known = { kind: 'combined', poly, base: chosen, steps, unit: all, divided: among };
    return withLink(arena, { ...state, nonzero }, known, leaderOf(arena, poly)!);
  };
  // A single factor is no choice: it vanishes.
  const [only] = choices;
  if (alone && choices.length === 1 && divided.find((f) => equals(f.base, only!))!.power === 1) {
    const others = divided.filter((f) => !equals(f.base, only!));
    return { states: [link(only!, others, state.nonzero)] };
  }

  // One branch for each factor that may vanish, those before it taken not to; the last one has none of them.
  const states = choices.map((base, i): State => {
    const split: Known = { kind: 'given', poly: base, name: `${infix(base)} = 0` };
    const nonzero = [...state.nonzero, ...choices.slice(0, i)];
    return { ...state, queue: [...queue, split], zero: [...state.zero, base], nonzero };
  });
  const nonzero = [...state.nonzero, ...choices];
  if (!alone && leaderOf(arena, tail.rest) !== undefined)
    return { states: [...states, link(tail.rest, divided, nonzero)] };
  return { states, deadEnd: { zero: state.zero, nonzero, needs: tail.rest, proved: state.proved } };
}

const variable = ({ space }: Arena, g: number): Poly => generator(space.ring, space.ring.generators[g]!.name);

const involvesVariable = ({ space }: Arena, p: Poly): boolean =>
  space.places.some((_, g) => isVariable(space, g) && degreeIn(p, g) > 0);

/** Whether a factor is no known non-zero quantity: it involves a variable and has not been chosen before. */
function mayVanish(arena: Arena, { nonzero }: State, base: Poly): boolean {
  if (!involvesVariable(arena, base)) return false;
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
