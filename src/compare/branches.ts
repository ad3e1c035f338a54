/**
 * All solutions of a system of differential equations in one function of time, as branches: each a chain (elimination.ts)
 * together with the factors that were taken to vanish or not to. The classical elimination by characteristic sets for
 * ordinary differential polynomials over generic couplings: a polynomial with a factor splits the branch, a polynomial in
 * couplings alone ends it. Invariant: in a chain every link is reduced by the others; the equations, and the derivative of a
 * link whose leader is no jet, are reduced to zero. Imports eliminations.
 */
import { infix } from '../algebra/infix.js';
import { constant, equals, generator, isZero, multiply, type Poly } from '../algebra/poly.js';
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
  /** Factors with variables that were divided by and not chosen: what follows holds where they do not vanish. */
  readonly risks: readonly Poly[];
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
  const open: State[] = [{ links: [], queue: given, zero: [], nonzero, pivots: [], risks: [] }];
  for (let rounds = 0; open.length > 0; rounds++) {
    if (rounds > MAX_ROUNDS) throw new BoundError(`more than ${MAX_ROUNDS} steps of elimination`);
    if (open.length + branches.length > MAX_BRANCHES) throw new BoundError(`more than ${MAX_BRANCHES} branches`);
    const state = open.pop()!;
    if (state.queue.length === 0) {
      const lost = lostIn(arena, given, state);
      if (lost.length > 0) {
        open.push({ ...state, queue: lost });
        continue;
      }
      const { zero, nonzero: chosen, pivots } = state;
      const vanishing = vanishingAmong(arena, state, state.risks);
      if (vanishingAmong(arena, state, chosen))
        deadEnds.push({ zero, nonzero: chosen, needs: constant(arena.space.ring, 1) });
      else if (vanishing) open.push(restarted(given, state, vanishing));
      else branches.push({ links: orderedLinks(arena, state.links), zero, nonzero: chosen, pivots });
      continue;
    }
    const next = advance({ ...arena, pivots: [...state.pivots] }, state, trial);
    open.push(...next.states);
    if (!next.deadEnd) continue;
    // Nothing was proved for the zeros of what was divided by: they are branches of their own.
    open.push(...next.risks.map((base) => restarted(given, { ...state, ...next.deadEnd }, base)));
    if (next.risks.length === 0) deadEnds.push(next.deadEnd);
  }
  return { branches, deadEnds };
}

/**
 * Equations that the chain does not reduce to zero. A pivot that vanishes by what was found later may have lost them on the
 * way: they are taken up again.
 */
function lostIn(arena: Arena, given: readonly Known[], state: State): readonly Known[] {
  const here: Arena = { ...arena, pivots: [...state.pivots] };
  const chosen = state.zero.map((poly): Known => ({ kind: 'given', poly, name: `${infix(poly)} = 0` }));
  return [...given, ...chosen].filter((known) => !isZero(reduce(here, known.poly, state.links).rest));
}

/** One of the polynomials that vanishes by what was found; what was divided by must not, or the branch is empty. */
function vanishingAmong(arena: Arena, state: State, polys: readonly Poly[]): Poly | undefined {
  const here: Arena = { ...arena, pivots: [...state.pivots] };
  return polys.find((p) => isZero(reduce(here, p, state.links).rest));
}

/** The equations from the beginning, with one more factor that vanishes. */
function restarted(given: readonly Known[], state: State, base: Poly): State {
  const zero = [...state.zero, base];
  const queue = [...given, ...zero.map((poly): Known => ({ kind: 'given', poly, name: `${infix(poly)} = 0` }))];
  return { links: [], queue, zero, nonzero: state.nonzero, pivots: [], risks: [] };
}

interface Advance {
  readonly states: readonly State[];
  readonly deadEnd?: DeadEnd;
  /** Of the dead end. */
  readonly risks: readonly Poly[];
}

/** Takes the simplest polynomial of the queue into the chain. Where it splits, the generic branch comes last. */
function advance(arena: Arena, before: State, trial: readonly Poly[]): Advance {
  const { space } = arena;
  const chosen = simplest(arena, before.queue);
  const queue = before.queue.filter((known) => known !== chosen);
  const { rest, steps } = reduce(arena, chosen.poly, before.links);
  const { pivots } = arena;
  if (isZero(rest)) return { states: [{ ...before, queue, pivots }], risks: [] };

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
  const known = [...before.risks, ...before.nonzero, ...choices];
  const risks = [...before.risks];
  for (const { base } of [...divided, ...steps.flatMap((step) => [...step.d, ...step.u])])
    if (involvesVariable(arena, base) && ![...known, ...risks].some((p) => equals(p, base))) risks.push(base);
  const state = { ...before, queue, pivots, risks };
  const alone = tail.rest.size === 1;
  const link = (poly: Poly, among: Factors, nonzero: readonly Poly[]): State => {
    const all = multiply(unit, tail.unit);
    const made: Known = { kind: 'combined', poly, base: chosen, steps, unit: all, divided: among };
    return withLink(arena, { ...state, nonzero }, made, leaderOf(arena, poly)!);
  };
  // A single factor is no choice: it vanishes.
  const [only] = choices;
  if (alone && choices.length === 1 && divided.find((f) => equals(f.base, only!))!.power === 1) {
    const others = divided.filter((f) => !equals(f.base, only!));
    return { states: [link(only!, others, state.nonzero)], risks: [] };
  }

  // One branch for each factor that may vanish, those before it taken not to; the last one has none of them.
  const states = choices.map((base, i): State => {
    const split: Known = { kind: 'given', poly: base, name: `${infix(base)} = 0` };
    const nonzero = [...state.nonzero, ...choices.slice(0, i)];
    return { ...state, queue: [...queue, split], zero: [...state.zero, base], nonzero };
  });
  const nonzero = [...state.nonzero, ...choices];
  if (!alone && leaderOf(arena, tail.rest) !== undefined)
    return { states: [...states, link(tail.rest, divided, nonzero)], risks: [] };
  return { states, deadEnd: { zero: state.zero, nonzero, needs: tail.rest }, risks };
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
