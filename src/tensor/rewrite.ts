/**
 * Rewriting of sums by rules. In one round every term is rewritten by the first rule that applies to it, rules in their
 * order, matches in theirs; then the sum is put in canonical form. Every run is bounded and says why it stopped; its steps
 * can be replayed: each takes one term away and adds what the rule makes of it.
 */
import { isZero, scale } from '../algebra/poly.js';
import { negateRational } from '../algebra/rational.js';
import type { IndexSlot } from '../notation/theory.js';
import { ask } from './conditions.js';
import { canonicalSum, factorsKey, type TensorSum, type TensorSymbol, type TensorTerm } from './expression.js';
import type { KindTable } from './kinds.js';
import { type Match, matches } from './match.js';
import type { Fact, Rule } from './rule.js';

export interface RewriteLimits {
  /** Applications of rules. */
  readonly steps: number;
  /** Terms of the sum. */
  readonly size: number;
  readonly milliseconds: number;
}

export const DEFAULT_LIMITS: RewriteLimits = { steps: 20_000, size: 20_000, milliseconds: 60_000 };

/** `fixpoint`: no rule applies any more. `cycle`: a sum came back. The others name the limit that was reached. */
export type Stop = 'fixpoint' | 'cycle' | 'steps' | 'size' | 'time';

export interface Step {
  readonly ruleId: string;
  /** What was replaced; one term when a rule did it. */
  readonly before: TensorSum;
  readonly after: TensorSum;
  readonly why: string;
}

export interface Rewriting {
  readonly value: TensorSum;
  readonly stop: Stop;
  readonly steps: readonly Step[];
}

export interface RewriteOptions {
  readonly kinds: KindTable;
  readonly given?: ReadonlySet<Fact>;
  readonly limits?: Partial<RewriteLimits>;
  /** Milliseconds since some fixed time. */
  readonly now?: () => number;
}

const NOTHING: ReadonlySet<Fact> = new Set();

/** What the first applicable match of a rule makes of a term, in canonical form; undefined when there is none. */
export function applyRule(
  rule: Rule,
  term: TensorTerm,
  kinds: KindTable,
  given: ReadonlySet<Fact> = NOTHING,
): TensorSum | undefined {
  for (const match of matches(rule.left, term.factors, kinds)) {
    if (ask(rule.when, { term, match, given }) !== 'yes') continue;
    return canonicalSum(replaced(rule, term, match), kinds);
  }
  return undefined;
}

function replaced(rule: Rule, term: TensorTerm, match: Match): TensorTerm[] {
  const rest = term.factors.filter((_, i) => !match.taken.includes(i));
  return rule.right.map(({ coefficient, factors }) => ({
    coefficient: scale(term.coefficient, match.sign > 0 ? coefficient : negateRational(coefficient)),
    factors: [...rest, ...factors.map((f) => instance(f, match))],
  }));
}

/** Variables become their indices; what the rule contracts itself gets names that no index has. */
const instance = (factor: TensorSymbol, { bound }: Match): TensorSymbol => ({
  ...factor,
  slots: factor.slots.map((s): IndexSlot => bound.get(s.name) ?? { name: `!${s.name}`, up: s.up }),
});

const keyOf = (sum: TensorSum): string =>
  sum
    .map(
      (t) =>
        `${t.coefficient.keys.join()}:${t.coefficient.numerators.join()}/${t.coefficient.denominator} ${factorsKey(t.factors)}`,
    )
    .join('\n');

/** Applies rules, earlier ones first, until none applies or a limit is reached. */
export function rewrite(sum: TensorSum, rules: readonly Rule[], options: RewriteOptions): Rewriting {
  const { kinds, given = NOTHING, now = () => performance.now() } = options;
  const limits = { ...DEFAULT_LIMITS, ...options.limits };
  const start = now();
  const steps: Step[] = [];
  let value = canonicalSum(sum, kinds);
  const seen = new Set([keyOf(value)]);
  for (;;) {
    const next: TensorTerm[] = [];
    const before = steps.length;
    for (const [at, term] of value.entries()) {
      let after: TensorSum | undefined;
      for (const rule of rules) {
        after = applyRule(rule, term, kinds, given);
        if (!after) continue;
        steps.push({ ruleId: rule.id, before: [term], after, why: rule.why });
        break;
      }
      next.push(...(after ?? [term]));
      const reached: Stop | undefined =
        steps.length >= limits.steps
          ? 'steps'
          : next.length > 10 * limits.size
            ? 'size'
            : now() - start > limits.milliseconds
              ? 'time'
              : undefined;
      if (reached) return { value: canonicalSum([...next, ...value.slice(at + 1)], kinds), stop: reached, steps };
    }
    if (steps.length === before) return { value, stop: 'fixpoint', steps };
    value = canonicalSum(next, kinds);
    if (value.length > limits.size) return { value, stop: 'size', steps };
    const key = keyOf(value);
    if (seen.has(key)) return { value, stop: 'cycle', steps };
    seen.add(key);
  }
}

/** Rules that no step used, in their order. */
export function neverFired(rules: readonly Rule[], steps: readonly Step[]): readonly Rule[] {
  const fired = new Set(steps.map((s) => s.ruleId));
  return rules.filter((r) => !fired.has(r.id));
}

/** Whether two canonical sums over one ring are equal. */
export const equalSums = (a: TensorSum, b: TensorSum, kinds: KindTable): boolean =>
  canonicalSum([...a, ...b.map((t) => ({ ...t, coefficient: scale(t.coefficient, -1) }))], kinds).every((t) =>
    isZero(t.coefficient),
  );
