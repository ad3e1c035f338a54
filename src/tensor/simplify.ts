/**
 * A Lagrangian in its simplest form: canonical products, irreducible parts written out, rules applied, linear relations used
 * up. Every change is a step with its rule and reason.
 */
import { symbolsOf } from '../algebra/collect.js';
import { constant } from '../algebra/poly.js';
import { negateRational, ONE, type Rational } from '../algebra/rational.js';
import { makeRing } from '../algebra/ring.js';
import type { Diagnostic } from '../notation/diagnostics.js';
import { canonicalSum, factorsKey, type TensorSum, type TensorTerm } from './expression.js';
import { type Density, reduceByRelations } from './identities.js';
import { type KindTable, kindTable } from './kinds.js';
import { combinationOf } from './lagrangian-sum.js';
import { writeOutParts } from './parts.js';
import { type RewriteLimits, rewrite, type Step, type Stop } from './rewrite.js';
import type { Fact, Rule } from './rule.js';
import { bundledRules } from './rule-library.js';

export const CANONICAL_RULE = 'canonical-form';
const CANONICAL_WHY = 'slot symmetries, names of dummies, contracted metrics, named traces, products of ε';

export interface SimplifyOptions {
  readonly kinds: KindTable;
  readonly given: ReadonlySet<Fact>;
  /** Rules of the user; they come before those of the program. */
  readonly rules?: readonly Rule[];
  readonly limits?: Partial<RewriteLimits>;
}

export interface Simplified {
  readonly value: TensorSum;
  readonly stop: Stop;
  readonly steps: readonly Step[];
  /** Products too large for the search of relations. */
  readonly skipped: readonly TensorSum[];
}

/**
 * Simplifies a scalar sum.
 * @param terms as typed; the steps begin with their canonical forms.
 * @throws InputError `parts-limit`; CanonicalLimitError; RangeError for free indices.
 */
export function simplify(terms: readonly TensorTerm[], options: SimplifyOptions): Simplified {
  const { kinds, given, rules = [], limits } = options;
  const steps: Step[] = terms.flatMap((term): Step[] => {
    const after = canonicalSum([term], kinds);
    const same = after.length === 1 && factorsKey(after[0]!.factors) === factorsKey(term.factors);
    return same ? [] : [{ ruleId: CANONICAL_RULE, before: [term], after, why: CANONICAL_WHY }];
  });
  const parts = writeOutParts(canonicalSum(terms, kinds), kinds);
  steps.push(...parts.steps);
  const rewritten = rewrite(parts.value, [...rules, ...bundledRules('identities')], {
    kinds,
    given,
    ...(limits ? { limits } : {}),
  });
  steps.push(...rewritten.steps);
  if (rewritten.stop !== 'fixpoint') return { value: rewritten.value, stop: rewritten.stop, steps, skipped: [] };
  const densities = densitiesFor(rewritten.value, given);
  const reduced = reduceByRelations(rewritten.value, kinds, densities);
  steps.push(...reduced.steps);
  return { value: reduced.value, stop: 'fixpoint', steps, skipped: reduced.skipped };
}

/**
 * left − right of every rule that holds modulo total derivatives; none unless these may be dropped and all coefficients are
 * known to be constants.
 */
export function densitiesFor(sum: TensorSum, given: ReadonlySet<Fact>): Density[] {
  if (!given.has('modulo-boundary')) return [];
  const symbols = new Set(sum.flatMap((t) => symbolsOf(t.coefficient)));
  if ([...symbols].some((name) => !given.has(`constant ${name}`))) return [];
  return bundledRules('identities')
    .filter((rule) => rule.when.some((c) => c.predicate === 'modulo-boundary'))
    .map((rule) => densityOf(rule));
}

/** The total derivative that a rule modulo total derivatives drops. */
export function densityOf({ id, why, left, right }: Rule, kinds: KindTable = kindTable()): Density {
  const number = (value: Rational) => constant(NUMBERS, value);
  const difference = [
    { coefficient: number(ONE), factors: left },
    ...right.map((t) => ({ coefficient: number(negateRational(t.coefficient)), factors: t.factors })),
  ];
  return { ruleId: id, why, eliminates: left, sum: combinationOf(canonicalSum(difference, kinds)) };
}

const NUMBERS = makeRing([]);

/** A sentence for what did not come to an end, and for what was left out. */
export function simplifyWarnings({ stop, skipped }: Simplified): Diagnostic[] {
  const warnings: Diagnostic[] = [];
  if (skipped.length > 0)
    warnings.push({
      code: 'relations-skipped',
      severity: 'warning',
      message: `${skipped.flat().length} products are too large for the search of linear relations`,
      hint: 'they are in canonical form, but identities special to four dimensions were not used on them',
    });
  if (stop !== 'fixpoint')
    warnings.push({
      code: 'rewriting-stopped',
      severity: 'warning',
      message: stop === 'cycle' ? 'the rules undo each other' : `the rules came to the limit of ${stop}`,
      hint: 'rules must lead to something simpler; --explain shows which were applied',
    });
  return warnings;
}
