/**
 * Strict loader of rules/auxiliary: every key known and right for what the rule does, every letter bound, every condition a
 * predicate, every rule with a reason, a source and examples of both kinds. Faults are collected, each with its place.
 */
import { readdirSync, readFileSync } from 'node:fs';
import { symbolsOf } from '../algebra/collect.js';
import { type Poly, termsOf } from '../algebra/poly.js';
import { type Diagnostic, errorAt, InputError } from '../notation/diagnostics.js';
import { parseScalar } from '../notation/scalar.js';
import { polyOfScalar } from '../notation/scalar-poly.js';
import { nearest } from '../notation/suggest.js';
import { asList, asRecord, asText } from '../notation/yaml-shape.js';
import { readYaml, type YamlNode, type YamlText } from '../notation/yaml-source.js';
import { passageOf } from '../notation/yaml-text.js';
import { LETTER_PREDICATES } from './auxiliary-conditions.js';
import {
  type AuxiliaryExample,
  type AuxiliaryRule,
  type AuxiliaryRuleFile,
  EXECUTORS,
  type Executor,
  FIELD,
  LETTERS,
  type LetterCondition,
  type Loss,
  letterName,
  PATTERN_RING,
  RATE,
} from './auxiliary-rule.js';

const FILE_KEYS = { required: ['untwist-auxiliary', 'title', 'constants', 'scalars', 'rules'] };
const COMMON = ['id', 'does', 'loses', 'why', 'source', 'yes', 'no'];
/** Keys whose values are results in letters. */
const RESULTS = ['field', 'becomes', 'constraint', 'charge', 'stationary'];
const OWN_KEYS: Record<Executor, readonly string[]> = {
  replace: ['enters', 'when', 'field', 'becomes'],
  branches: ['enters', 'when', 'stationary'],
  constrain: ['enters', 'when', 'constraint', 'becomes'],
  conserve: ['enters', 'when', 'charge', 'becomes'],
  'move-rate': ['enters', 'when'],
  form: ['statement'],
  linearise: ['statement'],
};

/**
 * The rules of a file.
 * @param taken ids that exist already, with the file that has them.
 * @throws InputError with every fault found.
 */
export function readAuxiliaryFile(
  text: string,
  file: string,
  taken: ReadonlyMap<string, string> = new Map(),
): AuxiliaryRuleFile {
  const problems: Diagnostic[] = [];
  const values = asRecord(readYaml(text, file), 'a file of auxiliary rules', FILE_KEYS, problems);
  const version = values.get('untwist-auxiliary');
  if (version && asText(version, 'untwist-auxiliary', problems)?.text.trim() !== '1')
    problems.push(
      errorAt(version.origin, 'bad-version', 'this is not a version of such files', 'write untwist-auxiliary: 1'),
    );
  const names = (key: string): string[] =>
    itemsOf(values.get(key), key, problems).flatMap(
      (n) => asText(n, `a name under ${key}`, problems)?.text.trim() ?? [],
    );
  const title = values.get('title');
  const ids = new Map(taken);
  const rules = itemsOf(values.get('rules'), 'rules', problems).flatMap(
    (node) => readRule(node, ids, file, problems) ?? [],
  );
  const read = {
    title: (title && asText(title, 'title', problems)?.text.trim()) ?? '',
    constants: names('constants'),
    scalars: names('scalars'),
    rules,
  };
  if (problems.length > 0) throw new InputError(problems);
  return read;
}

function itemsOf(node: YamlNode | undefined, what: string, problems: Diagnostic[]): readonly YamlNode[] {
  return (node && asList(node, what, problems)?.items) ?? [];
}

function readRule(
  node: YamlNode,
  ids: Map<string, string>,
  file: string,
  problems: Diagnostic[],
): AuxiliaryRule | undefined {
  const before = problems.length;
  const all = [...COMMON, ...new Set(Object.values(OWN_KEYS).flat())];
  const loose = asRecord(node, 'a rule', { required: COMMON, optional: all }, problems);
  const textOf = (key: string): YamlText | undefined => {
    const value = loose.get(key);
    return value && asText(value, key, problems);
  };
  const does = readExecutor(textOf('does'), problems);
  if (!does || problems.length > before) return undefined;
  const values = asRecord(node, `a rule that does ${does}`, { required: [...COMMON, ...OWN_KEYS[does]] }, problems);
  const id = readId(textOf('id'), ids, file, problems);
  const enters = values.has('enters') ? readPattern(textOf('enters')!, problems) : undefined;
  const bound = enters ? symbolsOf(enters) : [];
  const results = new Map<string, Poly>();
  for (const key of RESULTS) {
    const typed = values.has(key) ? textOf(key) : undefined;
    const value = typed && readTemplate(typed, problems);
    if (!value) continue;
    const allowed = key === 'stationary' ? [...bound, FIELD] : bound.filter((n) => n !== FIELD && n !== RATE);
    for (const name of symbolsOf(value).filter((n) => !allowed.includes(n)))
      problems.push(
        errorAt(typed.origin, 'rule-unbound', `${name} is not bound by the pattern`, 'bind it in `enters`'),
      );
    results.set(key, value);
  }
  const when = itemsOf(values.get('when'), 'when', problems).flatMap((n) => readCondition(n, bound, problems) ?? []);
  const loses = itemsOf(values.get('loses'), 'loses', problems).flatMap((n) => readLoss(n, bound, problems) ?? []);
  const examples = (key: 'yes' | 'no'): AuxiliaryExample[] => readExamples(values.get(key), key, problems);
  const [yes, no] = [examples('yes'), examples('no')];
  const [why, source] = [textOf('why'), textOf('source')];
  if (problems.length > before) return undefined;
  return {
    id: id!,
    does,
    enters,
    statement: textOf('statement')?.text.trim() ?? '',
    results,
    when,
    loses,
    why: why!.text.trim(),
    source: source!.text.trim(),
    yes,
    no,
    origin: node.origin,
  };
}

function readExecutor(node: YamlText | undefined, problems: Diagnostic[]): Executor | undefined {
  if (!node) return undefined;
  const typed = node.text.trim();
  const found = EXECUTORS.find((e) => e === typed);
  if (found) return found;
  const near = nearest(typed, EXECUTORS);
  const hint = near === undefined ? `there are ${EXECUTORS.join(', ')}` : `did you mean ${near}?`;
  problems.push(errorAt(node.origin, 'unknown-executor', `nothing does ${typed.slice(0, 40)}`, hint));
  return undefined;
}

function readId(
  node: YamlText | undefined,
  ids: Map<string, string>,
  file: string,
  problems: Diagnostic[],
): string | undefined {
  if (!node) return undefined;
  const id = node.text.trim();
  if (!/^[a-z][a-z0-9]*(?:-[a-z0-9]+)*$/.test(id))
    problems.push(
      errorAt(
        node.origin,
        'bad-rule-id',
        `${JSON.stringify(id.slice(0, 40))} is not an id`,
        'small letters and hyphens',
      ),
    );
  const other = ids.get(id);
  if (other !== undefined)
    problems.push(
      errorAt(node.origin, 'duplicate-rule', `there is a rule ${id} in ${other} already`, 'choose another id'),
    );
  ids.set(id, file);
  return id;
}

/** A polynomial in letters, each written with its mark: -?b/(2 ?a). */
function readTemplate(node: YamlText, problems: Diagnostic[]): Poly | undefined {
  const fault = (message: string): undefined => {
    problems.push(
      errorAt(node.origin, 'rule-variable', message, 'letters are ?a to ?e, the field is ?q, its rate D(?q,1)'),
    );
  };
  const bare = /(?<![?A-Za-z])(?!D\()[A-Za-z]/.exec(node.text);
  if (bare) return fault(`${bare[0]} has no mark`);
  const passage = passageOf(node);
  // Blanks in place of the marks keep every position.
  const text = node.text.replaceAll('?', ' ');
  try {
    const known = new Set<string>(['q', ...LETTERS]);
    const parsed = parseScalar({ ...passage, text }, { isSymbol: (n) => known.has(n), names: known, allowJets: true });
    const rename = (name: string): string => (name === 'D(q,1)' ? RATE : letterName(name));
    const foreign = parsed.flatMap((t) => t.powers).find(([name]) => !PATTERN_RING.position.has(rename(name)));
    if (foreign) return fault(`${foreign[0]} cannot occur in a rule`);
    return polyOfScalar(PATTERN_RING, parsed, rename);
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    problems.push(...error.diagnostics);
    return undefined;
  }
}

/** A pattern: distinct monomials in the field and its rate, each times a letter of its own. */
function readPattern(node: YamlText, problems: Diagnostic[]): Poly | undefined {
  const value = readTemplate(node, problems);
  if (!value) return undefined;
  const letters = LETTERS.map(letterName);
  const used: string[] = [];
  const isPattern = termsOf(value).every(({ coefficient, exponents }) => {
    const named = exponents.map(([g, e]) => [PATTERN_RING.generators[g]!.name, e] as const);
    const own = named.filter(([name]) => letters.includes(name));
    used.push(...own.map(([name]) => name));
    return coefficient.num === coefficient.den && own.length === 1 && own[0]![1] === 1 && named.every(([, e]) => e > 0);
  });
  if (isPattern && new Set(used).size === used.length) return value;
  const message = 'a pattern is a sum of different letters times powers of the field and its rate';
  problems.push(errorAt(node.origin, 'rule-pattern', message, 'for example ?a ?q^2 + ?b ?q + ?c'));
  return undefined;
}

function boundLetter(
  typed: string,
  node: YamlText,
  bound: readonly string[],
  problems: Diagnostic[],
): string | undefined {
  if (bound.includes(typed) && typed !== FIELD) return typed;
  problems.push(errorAt(node.origin, 'rule-unbound', `${typed} is not bound by the pattern`, 'letters are ?a to ?e'));
  return undefined;
}

function readCondition(node: YamlNode, bound: readonly string[], problems: Diagnostic[]): LetterCondition | undefined {
  const typed = asText(node, 'a condition', problems);
  if (!typed) return undefined;
  const [predicate, letter, ...more] = typed.text.trim().split(/\s+/) as [string, ...string[]];
  if (!LETTER_PREDICATES.has(predicate)) {
    const near = nearest(predicate, LETTER_PREDICATES.keys());
    const hint = near === undefined ? `there are ${[...LETTER_PREDICATES.keys()].join(', ')}` : `did you mean ${near}?`;
    problems.push(errorAt(typed.origin, 'unknown-condition', `there is no condition ${predicate.slice(0, 40)}`, hint));
    return undefined;
  }
  if (letter === undefined || more.length > 0) {
    const hint = LETTER_PREDICATES.get(predicate)!.meaning;
    problems.push(errorAt(typed.origin, 'condition-arity', `${predicate} takes one letter`, hint));
    return undefined;
  }
  const known = boundLetter(letter, typed, bound, problems);
  return known === undefined ? undefined : { predicate, letter: known };
}

function readLoss(node: YamlNode, bound: readonly string[], problems: Diagnostic[]): Loss | undefined {
  const values = asRecord(node, 'a loss', { required: ['what'], optional: ['where'] }, problems);
  const [whatNode, whereNode] = [values.get('what'), values.get('where')];
  const what = whatNode && asText(whatNode, 'what', problems);
  const where = whereNode && asText(whereNode, 'where', problems);
  const letter = where && boundLetter(where.text.trim(), where, bound, problems);
  return what && { what: what.text.trim(), ...(letter === undefined ? {} : { where: letter }) };
}

function readExamples(node: YamlNode | undefined, key: 'yes' | 'no', problems: Diagnostic[]): AuxiliaryExample[] {
  const items = itemsOf(node, key, problems);
  if (node?.kind === 'list' && items.length === 0)
    problems.push(errorAt(node.origin, 'missing-key', `${key} has no example`, 'give at least one'));
  const keys = {
    required: key === 'yes' ? ['in', 'out'] : ['in'],
    optional: key === 'yes' ? ['field', 'constraint', 'charge'] : ['field'],
  };
  return items.flatMap((item) => {
    const values = asRecord(item, `an example under ${key}`, keys, problems);
    const text = (name: string): string | undefined => {
      const value = values.get(name);
      return value && asText(value, name, problems)?.text;
    };
    const out = values.get('out');
    const output =
      out?.kind === 'list'
        ? out.items.flatMap((n) => asText(n, 'out', problems)?.text ?? [])
        : out && [text('out') ?? ''];
    const input = text('in');
    if (input === undefined) return [];
    return [{ input, field: text('field'), output, constraint: text('constraint'), charge: text('charge') }];
  });
}

const FOLDER = new URL('../../rules/auxiliary/', import.meta.url);
/** In order of priority. */
const FILES = ['fields.yaml', 'normal.yaml'] as const;

let bundled: readonly AuxiliaryRuleFile[] | undefined;

/** The bundled files. @throws Error when a file of the folder is not loaded: no rule may be forgotten. */
export function bundledAuxiliaryFiles(): readonly AuxiliaryRuleFile[] {
  if (bundled) return bundled;
  const orphan = readdirSync(FOLDER).find((name) => !(FILES as readonly string[]).includes(name));
  if (orphan !== undefined) throw new Error(`rules/auxiliary/${orphan} is not loaded`);
  const ids = new Map<string, string>();
  bundled = FILES.map((name) => {
    const read = readAuxiliaryFile(readFileSync(new URL(name, FOLDER), 'utf8'), `rules/auxiliary/${name}`, ids);
    for (const rule of read.rules) ids.set(rule.id, `rules/auxiliary/${name}`);
    return read;
  });
  return bundled;
}

/** The bundled rules about one field, in order of priority. */
export const fieldRules = (): readonly AuxiliaryRule[] =>
  bundledAuxiliaryFiles().flatMap((f) => f.rules.filter((r) => r.enters !== undefined));

/** A bundled rule by its id. */
export function ruleById(id: string): AuxiliaryRule {
  const rule = bundledAuxiliaryFiles()
    .flatMap((f) => f.rules)
    .find((r) => r.id === id);
  if (!rule) throw new Error(`there is no rule ${id}`);
  return rule;
}
