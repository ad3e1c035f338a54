/**
 * Conditions of rules: predicates with three answers. Only `yes` lets a rule fire; what nothing is known about is
 * `unknown`. They are asked for each match, so that a failing one makes the matcher try the next.
 */
import { symbolsOf } from '../algebra/collect.js';
import type { TensorTerm } from './expression.js';
import type { Match } from './match.js';
import type { Condition, Fact } from './rule.js';

export type Answer = 'yes' | 'no' | 'unknown';

/** What a predicate may look at. */
export interface Circumstances {
  /** The whole term. */
  readonly term: TensorTerm;
  readonly match: Match;
  readonly given: ReadonlySet<Fact>;
}

interface Predicate {
  /** Number of index variables. */
  readonly arity: number;
  /** For docs/rules.md. */
  readonly meaning: string;
  readonly ask: (circumstances: Circumstances, variables: readonly string[]) => Answer;
}

const answer = (holds: boolean): Answer => (holds ? 'yes' : 'no');
const known = (given: ReadonlySet<Fact>, fact: Fact): Answer =>
  given.has(fact) ? 'yes' : given.has(`not ${fact}`) ? 'no' : 'unknown';

const boundName = ({ match }: Circumstances, variable: string): string => match.bound.get(variable)!.name;
const isContracted = (circumstances: Circumstances, [a, b]: readonly string[]): boolean =>
  boundName(circumstances, a!) === boundName(circumstances, b!);

export const PREDICATES: ReadonlyMap<string, Predicate> = new Map<string, Predicate>([
  [
    'modulo-boundary',
    {
      arity: 0,
      meaning: 'total derivatives may be dropped; a fact',
      ask: ({ given }) => known(given, 'modulo-boundary'),
    },
  ],
  [
    'torsion-free',
    { arity: 0, meaning: 'the torsion vanishes; a fact', ask: ({ given }) => known(given, 'torsion-free') },
  ],
  [
    'constant-coefficient',
    {
      arity: 0,
      meaning: 'every symbol in the coefficient of the term is a constant, by the facts `constant x`',
      ask: ({ term, given }) => {
        const answers = symbolsOf(term.coefficient).map((name) => known(given, `constant ${name}`));
        return answers.includes('no') ? 'no' : answers.includes('unknown') ? 'unknown' : 'yes';
      },
    },
  ],
  [
    'alone',
    {
      arity: 0,
      meaning: 'the left side is the whole product',
      ask: ({ term, match }) => answer(match.taken.length === term.factors.length),
    },
  ],
  [
    'contracted',
    {
      arity: 2,
      meaning: 'the two variables stand for one contracted pair',
      ask: (circumstances, variables) => answer(isContracted(circumstances, variables)),
    },
  ],
  [
    'apart',
    {
      arity: 2,
      meaning: 'the two variables do not stand for one contracted pair',
      ask: (circumstances, variables) => answer(!isContracted(circumstances, variables)),
    },
  ],
  [
    'free',
    {
      arity: 1,
      meaning: 'the variable stands for a free index of the term',
      ask: (circumstances, [a]) => {
        const name = boundName(circumstances, a!);
        const slots = circumstances.term.factors.flatMap((f) => f.slots);
        return answer(slots.filter((s) => s.name === name).length === 1);
      },
    },
  ],
]);

/** Whether a text is a fact that `given` may state. */
export const isFact = (text: string): boolean =>
  /^(?:not )?(?:modulo-boundary|torsion-free|constant [A-Za-z][A-Za-z0-9_]*)$/.test(text);

/** The answers together: `yes` only when all are. */
export function ask(conditions: readonly Condition[], circumstances: Circumstances): Answer {
  let all: Answer = 'yes';
  for (const { predicate, variables } of conditions) {
    const one = PREDICATES.get(predicate)!.ask(circumstances, variables);
    if (one === 'no') return 'no';
    if (one === 'unknown') all = 'unknown';
  }
  return all;
}
