/**
 * Strict loader of rule files: every key known, every variable bound, every condition a predicate with its arguments, every
 * rule with a reason, a source and examples of both kinds. Faults are collected, each with its place.
 */
import { termsOf } from '../algebra/poly.js';
import { divideRational, type Rational } from '../algebra/rational.js';
import { type Diagnostic, errorAt, InputError } from '../notation/diagnostics.js';
import { readConstants } from '../notation/read-symbols.js';
import { readTensors } from '../notation/read-tensors.js';
import { nearest } from '../notation/suggest.js';
import { freeSlots, parseTensorExpression } from '../notation/tensor-expression.js';
import type { DeclaredTensor, LagrangianTerm } from '../notation/theory.js';
import { asList, asRecord, asText } from '../notation/yaml-shape.js';
import { readYaml, type YamlNode, type YamlText } from '../notation/yaml-source.js';
import { passageOf } from '../notation/yaml-text.js';
import { isFact, PREDICATES } from './conditions.js';
import type { TensorSymbol } from './expression.js';
import type { KindTable } from './kinds.js';
import { kindsWith, ringOfNames, sumOf } from './lagrangian-sum.js';
import { type Condition, type Example, isVariable, type Rule, type RuleFile, type RuleTerm } from './rule.js';
import { SymmetryError } from './symmetry.js';

const FILE_KEYS = { required: ['untwist-rules', 'title', 'rules'], optional: ['constants', 'tensors'] };
const RULE_KEYS = { required: ['id', 'lhs', 'rhs', 'why', 'source', 'yes', 'no'], optional: ['when'] };
const RULE_FORM = 'R_{?a?b} is any Ricci tensor; variables are marked, what a side contracts itself has plain letters';

interface Context {
  readonly constants: readonly string[];
  readonly tensors: readonly DeclaredTensor[];
  readonly kinds: KindTable;
  readonly problems: Diagnostic[];
}

/**
 * The rules of a file.
 * @param taken ids that exist already, with the file that has them.
 * @throws InputError with every fault found.
 */
export function readRuleFile(text: string, file: string, taken: ReadonlyMap<string, string> = new Map()): RuleFile {
  const problems: Diagnostic[] = [];
  const values = asRecord(readYaml(text, file), 'a rule file', FILE_KEYS, problems);
  const version = values.get('untwist-rules');
  if (version && asText(version, 'untwist-rules', problems)?.text.trim() !== '1')
    problems.push(
      errorAt(version.origin, 'bad-version', 'this is not a version of rule files', 'write untwist-rules: 1'),
    );
  const title = values.get('title');
  const declarations = new Map();
  if (values.has('constants')) readConstants(values.get('constants')!, declarations, problems);
  const tensors = values.has('tensors') ? readTensors(values.get('tensors')!, declarations, problems) : [];
  const constants = [...declarations.keys()] as string[];
  const context: Context = {
    constants,
    tensors,
    kinds: kindsOfFile(values.get('tensors'), tensors, problems),
    problems,
  };
  const rules: Rule[] = [];
  const ids = new Map(taken);
  const list = values.get('rules');
  for (const node of (list && asList(list, 'rules', problems)?.items) ?? []) {
    const rule = readRule(node, context, ids, file);
    if (rule) rules.push(rule);
  }
  if (problems.length > 0) throw new InputError(problems);
  return { title: (title && asText(title, 'title', problems)?.text.trim()) ?? '', constants, tensors, rules };
}

function kindsOfFile(
  node: YamlNode | undefined,
  tensors: readonly DeclaredTensor[],
  problems: Diagnostic[],
): KindTable {
  try {
    return kindsWith(tensors);
  } catch (error) {
    if (!(error instanceof SymmetryError) || !node) throw error;
    problems.push(errorAt(node.origin, 'bad-symmetry', error.message, 'declare fewer symmetries'));
    return kindsWith([]);
  }
}

function readRule(node: YamlNode, context: Context, ids: Map<string, string>, file: string): Rule | undefined {
  const { problems } = context;
  const before = problems.length;
  const values = asRecord(node, 'a rule', RULE_KEYS, problems);
  const text = (key: string): YamlText | undefined => {
    const value = values.get(key);
    return value && asText(value, key, problems);
  };
  const id = readId(text('id'), ids, file, problems);
  const [lhs, rhs] = [text('lhs'), text('rhs')];
  const left = lhs && readLeft(lhs, context);
  const right = rhs && left && readRight(rhs, left, context);
  const when = readConditions(values.get('when'), left?.variables, problems);
  const [why, source] = [text('why'), text('source')];
  const examples = (key: 'yes' | 'no'): Example[] => {
    const value = values.get(key);
    return value ? readExamples(value, key, context) : [];
  };
  const [yes, no] = [examples('yes'), examples('no')];
  if (problems.length > before || !left || !right) return undefined;
  return {
    id: id!,
    left: left.factors,
    right,
    when,
    why: why!.text.trim(),
    source: source!.text.trim(),
    yes,
    no,
    origin: node.origin,
  };
}

function readId(
  node: YamlText | undefined,
  ids: Map<string, string>,
  file: string,
  problems: Diagnostic[],
): string | undefined {
  if (!node) return undefined;
  const id = node.text.trim();
  if (!/^[a-z][a-z0-9]*(?:-[a-z0-9]+)*$/.test(id)) {
    const message = `${JSON.stringify(id.slice(0, 40))} is not an id`;
    problems.push(errorAt(node.origin, 'bad-rule-id', message, 'small letters and digits, words joined by hyphens'));
  }
  const other = ids.get(id);
  if (other !== undefined) {
    const where = other === file ? 'in this file' : `in ${other}`;
    problems.push(
      errorAt(node.origin, 'duplicate-rule', `there is a rule ${id} ${where} already`, 'choose another id'),
    );
  }
  ids.set(id, file);
  return id;
}

function parsed(node: YamlText, patterns: boolean, { tensors, constants, problems }: Context) {
  try {
    const symbols = patterns ? [] : constants.map((name) => ({ name }));
    return parseTensorExpression(passageOf(node), { symbols, tensors, patterns, allowFree: true });
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    problems.push(...error.diagnostics);
    return undefined;
  }
}

interface Left {
  readonly factors: readonly TensorSymbol[];
  /** What the left side as typed is of the canonical one. */
  readonly coefficient: Rational;
  /** Variable → whether it is up. */
  readonly variables: ReadonlyMap<string, boolean>;
}

function readLeft(node: YamlText, context: Context): Left | undefined {
  const terms = parsed(node, true, context);
  if (!terms) return undefined;
  const fault = (code: string, message: string, hint: string): undefined => {
    context.problems.push(errorAt(node.origin, code, message, hint));
  };
  const [term] = terms;
  const factors = term?.factors ?? [];
  const bare = term?.scalar.powers.length === 0 && term.scalar.coefficient.num === term.scalar.coefficient.den;
  if (terms.length !== 1 || !bare || factors.length === 0)
    return fault('rule-left', 'the left side of a rule is one product of tensors', 'put numbers on the right side');
  const variables = variablesOf(term!, node, context);
  if (!variables) return undefined;
  const sum = sumOf(ringOfNames([]), terms, context.kinds);
  const [canonical] = sum;
  if (!canonical) return fault('rule-left', 'the left side vanishes by its symmetries', 'check its indices');
  if (sum.length > 1 || canonical.factors.length === 0)
    return fault(
      'rule-left',
      'the left side is a sum once its metrics and ε are contracted',
      'write one rule for each term',
    );
  return { factors: canonical.factors, coefficient: termsOf(canonical.coefficient)[0]!.coefficient, variables };
}

/** The variables of a term with their heights; undefined after a fault. */
function variablesOf(
  term: LagrangianTerm,
  node: YamlText,
  { problems }: Context,
): ReadonlyMap<string, boolean> | undefined {
  const free = freeSlots(term);
  const names = free.map((s) => s.name);
  const contracted = term.factors.flatMap((f) => f.slots).find((s) => isVariable(s.name) && !names.includes(s.name));
  const plain = names.find((name) => !isVariable(name));
  if (contracted) {
    const message = `the variable ${contracted.name} is contracted with itself`;
    problems.push(errorAt(node.origin, 'rule-variable', message, `write a plain letter: ${contracted.name.slice(1)}`));
    return undefined;
  }
  if (plain !== undefined) {
    const message = `the free index ${plain} of a rule is no variable`;
    problems.push(errorAt(node.origin, 'rule-variable', message, `write ?${plain}; ${RULE_FORM}`));
    return undefined;
  }
  return new Map(free.map((s) => [s.name, s.up]));
}

function readRight(node: YamlText, left: Left, context: Context): RuleTerm[] | undefined {
  const terms = parsed(node, true, context);
  if (!terms) return undefined;
  for (const term of terms) {
    const variables = variablesOf(term, node, context);
    if (!variables) return undefined;
    const fault = (code: string, message: string, hint: string): undefined => {
      context.problems.push(errorAt(node.origin, code, message, hint));
    };
    for (const [name, up] of variables) {
      const there = left.variables.get(name);
      if (there === undefined)
        return fault('rule-unbound', `the variable ${name} is not bound by the left side`, RULE_FORM);
      if (there !== up)
        return fault('rule-heights', `the variable ${name} changes its height`, 'free indices keep their heights');
    }
    for (const name of left.variables.keys())
      if (!variables.has(name))
        return fault(
          'rule-unbound',
          `a term of the right side lacks the variable ${name}`,
          'every term has all of them',
        );
  }
  return terms.map((t) => ({
    coefficient: divideRational(t.scalar.coefficient, left.coefficient),
    factors: t.factors,
  }));
}

function readConditions(
  node: YamlNode | undefined,
  variables: ReadonlyMap<string, boolean> | undefined,
  problems: Diagnostic[],
): Condition[] {
  const conditions: Condition[] = [];
  for (const item of node === undefined ? [] : node.kind === 'list' ? node.items : [node]) {
    const typed = asText(item, 'a condition', problems);
    if (!typed) continue;
    const [predicate, ...names] = typed.text.trim().split(/\s+/) as [string, ...string[]];
    const fault = (code: string, message: string, hint: string): void => {
      problems.push(errorAt(typed.origin, code, message, hint));
    };
    const known = PREDICATES.get(predicate);
    const unbound = names.find((name) => variables && !variables.has(name));
    if (!known) {
      const near = nearest(predicate, PREDICATES.keys());
      const hint = near === undefined ? `there are ${[...PREDICATES.keys()].join(', ')}` : `did you mean ${near}?`;
      fault('unknown-condition', `there is no condition ${predicate.slice(0, 40)}`, hint);
    } else if (names.length !== known.arity)
      fault('condition-arity', `${predicate} takes ${known.arity} variables, not ${names.length}`, known.meaning);
    else if (unbound !== undefined) fault('rule-unbound', `${unbound} is not bound by the left side`, RULE_FORM);
    else conditions.push({ predicate, variables: names });
  }
  return conditions;
}

function readExamples(node: YamlNode, key: 'yes' | 'no', context: Context): Example[] {
  const { problems } = context;
  const examples: Example[] = [];
  const items = asList(node, key, problems)?.items ?? [];
  if (node.kind === 'list' && items.length === 0)
    problems.push(errorAt(node.origin, 'missing-key', `${key} has no example`, 'give at least one'));
  const keys = { required: key === 'yes' ? ['in', 'out'] : ['in'], optional: ['given'] };
  for (const item of items) {
    const values = asRecord(item, `an example under ${key}`, keys, problems);
    const terms = (name: string): readonly LagrangianTerm[] | undefined => {
      const value = values.get(name);
      const text = value && asText(value, name, problems);
      return text && parsed(text, false, context);
    };
    const input = terms('in');
    const output = terms('out');
    const given = readFacts(values.get('given'), problems);
    if (input && (output || key === 'no')) examples.push({ given, input, output: key === 'yes' ? output : undefined });
  }
  return examples;
}

function readFacts(node: YamlNode | undefined, problems: Diagnostic[]): string[] {
  return (node === undefined ? [] : node.kind === 'list' ? node.items : [node]).flatMap((item) => {
    const fact = asText(item, 'a fact', problems)?.text.trim().replace(/\s+/g, ' ');
    if (fact === undefined || isFact(fact)) return fact ?? [];
    const message = `${JSON.stringify(fact.slice(0, 40))} is not a fact`;
    problems.push(errorAt(item.origin, 'unknown-fact', message, 'for example modulo-boundary, or constant c1'));
    return [];
  });
}
