/**
 * Scalar expressions: relations between constants, values in geometry files, and the expression texts of docs/formats.md.
 * The same grammar as a Lagrangian without tensors: integers, names, + - * / ^ ( ), juxtaposition, \frac, Greek macros,
 * and jets D(q,n) where they are asked for. Divisors are numbers or monomials.
 */
import { type Diagnostic, InputError } from './diagnostics.js';
import { expand } from './expand.js';
import { parseEquation, parseExpression } from './parser.js';
import type { Passage } from './passage.js';
import { collectScalars } from './scalar-term.js';
import type { Expression } from './syntax.js';
import type { Relation, ScalarSum } from './theory.js';
import { toMass, type Units } from './units.js';

export interface ScalarOptions {
  readonly isSymbol: (name: string) => boolean;
  /** Names to suggest for an unknown one. */
  readonly names?: Iterable<string>;
  /** Whether D(q,n) is the n-th time derivative of q; its power is then named `D(q,n)`, and `q` for n = 0. */
  readonly allowJets?: boolean;
  /** Why a name that is no symbol here cannot be used. */
  readonly explain?: (name: string) => string | undefined;
}

const vocabularyOf = (options: ScalarOptions) => ({
  tensors: false,
  jets: options.allowJets ?? false,
  isSymbol: options.isSymbol,
  names: options.names ?? [],
  explain: options.explain,
});

function evaluate(expression: Expression, passage: Passage): ScalarSum {
  return collectScalars(expand(expression, passage).map((term) => term.scalar));
}

/**
 * The expression as a canonical sum of monomials (`isCanonicalScalar`).
 * @throws InputError with every fault found: unknown symbols, syntax, a divisor that is a sum, a limit exceeded.
 */
export function parseScalar(passage: Passage, options: ScalarOptions): ScalarSum {
  const problems: Diagnostic[] = [];
  const expression = parseExpression(passage, vocabularyOf(options), problems);
  if (expression === undefined) throw new InputError(problems);
  return evaluate(expression, passage);
}

/**
 * A relation `left = right`.
 * @throws InputError as `parseScalar`, and `missing-equals`, `double-equals`.
 */
export function parseRelation(passage: Passage, options: ScalarOptions): Relation {
  const problems: Diagnostic[] = [];
  const sides = parseEquation(passage, vocabularyOf(options), problems);
  if (sides === undefined) throw new InputError(problems);
  const left = evaluate(sides.left, passage);
  const right = evaluate(sides.right, passage);
  const text = passage.text.trim().replace(/\s+/g, ' ');
  return { left, right, subject: subjectOf(left), text, origin: passage.locate(0, passage.text.length) };
}

/** The relation with κ or G replaced by M; its text stays as typed. */
export function relationToMass(relation: Relation, units: Units): Relation {
  const translated = (sum: ScalarSum): ScalarSum => collectScalars(sum.map((term) => toMass(term, units)));
  const left = translated(relation.left);
  return { ...relation, left, right: translated(relation.right), subject: subjectOf(left) };
}

/** The symbol that stands alone. */
function subjectOf(left: ScalarSum): string | undefined {
  const [term] = left;
  if (term === undefined || left.length !== 1) return undefined;
  const { coefficient, powers } = term;
  const [power] = powers;
  const alone = coefficient.num === 1n && coefficient.den === 1n && powers.length === 1 && power?.[1] === 1;
  return alone ? power[0] : undefined;
}
