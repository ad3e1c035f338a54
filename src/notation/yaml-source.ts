/**
 * Strict YAML with positions, for theory and geometry files: one document of mappings, lists and texts. Every scalar stays
 * the text that was typed (no numbers, booleans or null, so nothing is rounded), keys are unique texts, anchors, aliases
 * and tags are refused. Every node knows its place in the file, every character of a scalar too (yaml-text.ts).
 */
import { isMap, isScalar, isSeq, Lexer, type ParsedNode, parseAllDocuments, Scalar } from 'yaml';
import { type Diagnostic, errorAt, InputError } from './diagnostics.js';
import { MAX_TEXT, MAX_YAML_DEPTH } from './limits.js';
import type { Origin } from './theory.js';

export interface YamlText {
  readonly kind: 'text';
  /** The text with indentation, folds, quotes and escapes resolved. */
  readonly text: string;
  readonly style: 'plain' | 'single' | 'double' | 'literal' | 'folded';
  /** The scalar as it stands in the file, quotes or block header included. */
  readonly origin: Origin;
}

export interface YamlList {
  readonly kind: 'list';
  readonly items: readonly YamlNode[];
  readonly origin: Origin;
}

export interface YamlEntry {
  readonly key: YamlText;
  readonly value: YamlNode;
}

export interface YamlMap {
  readonly kind: 'map';
  /** In the order of the file; keyed by the text of the key. */
  readonly entries: ReadonlyMap<string, YamlEntry>;
  readonly origin: Origin;
}

export type YamlNode = YamlText | YamlList | YamlMap;

const STYLES = {
  [Scalar.PLAIN]: 'plain',
  [Scalar.QUOTE_SINGLE]: 'single',
  [Scalar.QUOTE_DOUBLE]: 'double',
  [Scalar.BLOCK_LITERAL]: 'literal',
  [Scalar.BLOCK_FOLDED]: 'folded',
} as const;

/**
 * The content of a YAML text.
 * @throws InputError `size-limit`, `yaml-depth`, `yaml-empty`, `yaml-syntax`, `yaml-duplicate-key`, `yaml-anchor`,
 * `yaml-tag`, `yaml-key`, `yaml-escape`, `yaml-documents`: all that are found, except that the first two stop the reading.
 */
export function readYaml(source: string, file: string): YamlNode {
  const place = (start: number, end: number): Origin => ({ file, source, start, end });
  if (source.length > MAX_TEXT) {
    const message = `the file has ${source.length} characters, the limit is ${MAX_TEXT}`;
    throw new InputError([{ code: 'size-limit', severity: 'error', message, file, hint: 'split the file' }]);
  }
  const deep = firstTooDeep(source);
  if (deep !== undefined) {
    const message = `YAML collections are nested more than ${MAX_YAML_DEPTH} deep`;
    throw new InputError([errorAt(place(deep, deep + 1), 'yaml-depth', message, 'the file needs only a few levels')]);
  }
  // Keys are compared in `convert`: the library's own check takes quadratic time.
  const documents = parseAllDocuments(source, {
    schema: 'failsafe',
    prettyErrors: false,
    keepSourceTokens: true,
    uniqueKeys: false,
    logLevel: 'silent',
  });
  const problems: Diagnostic[] = [];
  const document = Array.isArray(documents) ? documents[0] : undefined;
  if (document === undefined || (document.contents === null && document.errors.length === 0)) {
    throw new InputError([errorAt(place(0, 0), 'yaml-empty', 'the file is empty', 'see docs/notation.md')]);
  }
  const syntax = document.errors[0];
  if (syntax !== undefined) {
    const [start, end] = syntax.pos;
    const said = `not YAML: ${lowerFirst(syntax.message)}`;
    throw new InputError([errorAt(place(start, end), 'yaml-syntax', said, syntaxHint(syntax.code, source, start))]);
  }
  const second = documents[1];
  if (second !== undefined) {
    const [start] = second.range;
    problems.push(
      errorAt(place(start, start + 1), 'yaml-documents', 'a second YAML document begins here', 'one file holds one'),
    );
  }
  const node = document.contents === null ? undefined : convert(document.contents, place, problems);
  if (problems.length > 0 || node === undefined) throw new InputError(problems);
  return node;
}

/** Never undefined without a problem having been reported. */
function convert(
  node: ParsedNode,
  place: (start: number, end: number) => Origin,
  problems: Diagnostic[],
): YamlNode | undefined {
  const [start, end] = node.range;
  const origin = place(start, end);
  if (!isScalar(node) && !isMap(node) && !isSeq(node)) {
    problems.push(errorAt(origin, 'yaml-anchor', 'YAML aliases are not allowed here', 'write the value out'));
    return undefined;
  }
  if ('anchor' in node && node.anchor !== undefined) {
    problems.push(errorAt(origin, 'yaml-anchor', 'YAML anchors are not allowed here', `remove &${node.anchor}`));
  }
  if (node.tag !== undefined && !node.tag.startsWith('tag:yaml.org,2002:')) {
    problems.push(errorAt(origin, 'yaml-tag', `the YAML tag ${node.tag} is not allowed here`, 'remove it'));
  }
  if (isScalar(node)) {
    const style = STYLES[(node.type ?? Scalar.PLAIN) as keyof typeof STYLES];
    if (style === 'double') reportEscapes(origin, problems);
    return { kind: 'text', text: String(node.value ?? ''), style, origin };
  }
  if (isSeq(node)) {
    const items: YamlNode[] = [];
    for (const item of node.items) {
      const made = convert(item as ParsedNode, place, problems);
      if (made !== undefined) items.push(made);
    }
    return { kind: 'list', items, origin };
  }
  const entries = new Map<string, YamlEntry>();
  for (const pair of node.items) {
    const key = convert(pair.key as ParsedNode, place, problems);
    if (key === undefined) continue;
    if (key.kind !== 'text') {
      problems.push(errorAt(key.origin, 'yaml-key', 'a key must be a plain word', 'this is a list or a mapping'));
      continue;
    }
    if (entries.has(key.text)) {
      problems.push(errorAt(key.origin, 'yaml-duplicate-key', `the key ${key.text} occurs twice`, 'keep one of them'));
      continue;
    }
    // `{ dust }` and `? dust` have a key without a value.
    const nothing: YamlText = { kind: 'text', text: '', style: 'plain', origin: key.origin };
    const value = pair.value === null ? nothing : convert(pair.value as ParsedNode, place, problems);
    if (value !== undefined) entries.set(key.text, { key, value });
  }
  return { kind: 'map', entries, origin };
}

const lowerFirst = (text: string): string => text.slice(0, 1).toLowerCase() + text.slice(1);

function syntaxHint(code: string, source: string, start: number): string {
  if (code === 'TAB_AS_INDENT') return 'indent with spaces';
  if (code === 'BAD_DQ_ESCAPE') return DOUBLE_QUOTES;
  const begin = source.lastIndexOf('\n', start - 1) + 1;
  const newline = source.indexOf('\n', start);
  const line = source.slice(begin, Math.min(newline === -1 ? source.length : newline, begin + LONGEST_LINE));
  if (/^\s*[^\s:]+:\s+(?:- |[[{*&@!%`])/.test(line)) {
    return 'a value that begins with this character needs single quotes, or stands in a block below |';
  }
  if (/: .*:(?: |$)/.test(line)) return 'a text that contains a colon and a space must be quoted';
  if (code === 'MULTILINE_IMPLICIT_KEY') return 'a key is followed by a colon and a space';
  if (code === 'MISSING_CHAR') return 'close the quotes; indent the lines of a block below its key';
  return 'check the indentation, the brackets and the quotes around this place';
}

const LONGEST_LINE = 500;
const DOUBLE_QUOTES = 'in double quotes \\ begins an escape; use single quotes for LaTeX, or write \\\\';

/**
 * Reports control escapes that run into a letter: "\\nu" and "\\frac" are legal YAML, but silently a line end and `u`, a form
 * feed and `rac`.
 */
function reportEscapes(origin: Origin, problems: Diagnostic[]): void {
  const { source, start, end } = origin;
  for (let i = source.indexOf('\\', start); i !== -1 && i < end; i = source.indexOf('\\', i + 2)) {
    if (!/^[abefnrtvNLP][A-Za-z]/.test(source.slice(i + 1, i + 3))) continue;
    const macro = /^[A-Za-z]{1,20}/.exec(source.slice(i + 1, end))![0];
    const message = `"\\${macro}" begins with the escape \\${macro[0]}, which is not LaTeX`;
    problems.push(errorAt({ ...origin, start: i, end: i + 1 + macro.length }, 'yaml-escape', message, DOUBLE_QUOTES));
  }
}

/**
 * Offset of the first token below the depth limit. It runs on the token stream because the library composes nodes by
 * recursion and fails on thousands of open brackets.
 */
function firstTooDeep(source: string): number | undefined {
  let offset = 0;
  let flow = 0;
  let indicators = 0;
  let indents: number[] = [];
  let lineStart = true;
  let inScalar = false;
  for (const token of new Lexer().lex(source)) {
    if (token === '\u0002' || token === '\u0018') continue;
    if (token === '\u001f') {
      inScalar = true;
      continue;
    }
    const first = token[0];
    if (inScalar) {
      inScalar = false;
      lineStart = false;
    } else if (first === '\n' || first === '\r') {
      lineStart = true;
      indicators = 0;
    } else if (lineStart && first === ' ' && flow === 0) {
      indents = indents.filter((n) => n < token.length);
      indents.push(token.length);
      lineStart = false;
    } else {
      if (lineStart && flow === 0 && first !== '#') indents = [];
      lineStart = false;
      if (token === '[' || token === '{') flow++;
      else if (token === ']' || token === '}') flow--;
      else if (flow === 0 && (token === '-' || token === '?')) indicators++;
    }
    if (flow + Math.max(0, indicators - 1) + indents.length > MAX_YAML_DEPTH) return offset;
    offset += token.length;
  }
  return undefined;
}
