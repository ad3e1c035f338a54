/**
 * Tokens → syntax tree, by recursive descent: sums of products of powers; `*`, `/` and juxtaposition have one precedence
 * and bind to the left. Recursion is bounded by the nesting limit; long sums, products and runs of signs are loops.
 * Names are looked up here, so that an unknown one is reported where it stands.
 */
import { Cursor } from './cursor.js';
import { type Diagnostic, InputError } from './diagnostics.js';
import { parseJet } from './jet-syntax.js';
import { MAX_DIGITS, MAX_EXPONENT } from './limits.js';
import { checkPart, partAt } from './parts.js';
import type { Passage } from './passage.js';
import type { Expression, Factor, Summand } from './syntax.js';
import { indicesFollow, parseTensor, typedHead } from './tensor-syntax.js';
import { isGreek, type Token, tokenize } from './tokens.js';
import { headAt, isHeadAt, joinName, macroName, reportUnknown, type Vocabulary } from './vocabulary.js';

const CLOSING: ReadonlyMap<string, string> = new Map([
  ['(', ')'],
  ['[', ']'],
  ['{', '}'],
  ['\\{', '\\}'],
]);
const CLOSERS: ReadonlySet<string> = new Set(CLOSING.values());
const FRACTIONS: ReadonlySet<string> = new Set(['frac', 'tfrac', 'dfrac']);
const KNOWN_MACROS: readonly string[] = ['frac', 'tfrac', 'dfrac', 'cdot', 'times', 'left', 'right', 'quad'];

/**
 * The tree of an expression, or undefined when it has errors, which are added to `problems`: one syntax error at most,
 * and every unknown name and wrong number of indices before it.
 */
export function parseExpression(
  passage: Passage,
  vocabulary: Vocabulary,
  problems: Diagnostic[],
): Expression | undefined {
  return attempt(passage, vocabulary, problems, (cursor) => {
    const value = parseSum(cursor, vocabulary);
    expectEnd(cursor);
    return value;
  });
}

/** Both sides of `left = right`; like `parseExpression` otherwise. */
export function parseEquation(
  passage: Passage,
  vocabulary: Vocabulary,
  problems: Diagnostic[],
): { readonly left: Expression; readonly right: Expression } | undefined {
  return attempt(passage, vocabulary, problems, (cursor) => {
    const left = parseSum(cursor, vocabulary);
    if (!cursor.isMark('=')) {
      if (cursor.token.kind !== 'end') expectEnd(cursor);
      cursor.fail(
        'missing-equals',
        { start: 0, end: cursor.lastEnd },
        'a relation needs an equals sign',
        'for example b1 = -2 b3',
      );
    }
    const sign = cursor.next();
    if (cursor.isMark('=')) {
      const span = { start: sign.start, end: cursor.token.end };
      cursor.fail('double-equals', span, 'a relation has one equals sign, not ==', 'write =');
    }
    const right = parseSum(cursor, vocabulary);
    if (cursor.isMark('=')) cursor.fail('double-equals', cursor.token, 'a second equals sign', 'write two relations');
    expectEnd(cursor);
    return { left, right };
  });
}

function attempt<T>(
  passage: Passage,
  vocabulary: Vocabulary,
  problems: Diagnostic[],
  parse: (cursor: Cursor) => T,
): T | undefined {
  const found: Diagnostic[] = [];
  const tokens = tokenize(passage, found, vocabulary.patterns === true);
  let value: T | undefined;
  // A decimal point leaves a number in place, so the rest can still be looked at.
  if (found.every((problem) => problem.code === 'decimal-point')) {
    try {
      value = parse(new Cursor(passage, tokens, found));
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      found.push(...error.diagnostics);
    }
  }
  problems.push(...found);
  return found.length === 0 ? value : undefined;
}

function expectEnd(cursor: Cursor): void {
  const { token } = cursor;
  if (token.kind === 'end') return;
  if (CLOSERS.has(token.text)) {
    cursor.fail('unbalanced-bracket', token, `${token.text} closes no bracket`, 'remove it or add the opening one');
  }
  if (token.text === '=')
    cursor.fail('unexpected-token', token, 'an expression has no equals sign', 'relations stand under impose');
  cursor.fail('unexpected-token', token, `unexpected ${cursor.describe(token)}`, 'expected +, -, *, / or a factor');
}

/** Reads a run of signs; whether it is negative. */
function parseSigns(cursor: Cursor): boolean {
  let negative = false;
  for (;;) {
    if (cursor.accept('-')) negative = !negative;
    else if (!cursor.accept('+')) return negative;
  }
}

function parseSum(cursor: Cursor, vocabulary: Vocabulary): Expression {
  const { start } = cursor.token;
  const signed = cursor.isMark('+') || cursor.isMark('-');
  const summands: Summand[] = [];
  let negative = parseSigns(cursor);
  for (;;) {
    summands.push({ negative, value: parseProduct(cursor, vocabulary) });
    if (!cursor.isMark('+') && !cursor.isMark('-')) break;
    negative = parseSigns(cursor);
  }
  const first = summands[0]!;
  if (summands.length === 1 && (!signed || !first.negative)) return first.value;
  return { kind: 'sum', summands, start, end: cursor.lastEnd };
}

function parseProduct(cursor: Cursor, vocabulary: Vocabulary): Expression {
  const { start } = cursor.token;
  const factors: Factor[] = [{ divides: false, negative: false, value: parsePower(cursor, vocabulary) }];
  for (;;) {
    const operator = cursor.isMark('*') || cursor.isMark('/') ? cursor.next() : undefined;
    if (operator === undefined && !startsFactor(cursor.token)) break;
    if (operator?.text === '*' && cursor.isMark('*') && cursor.token.start === operator.end) {
      cursor.fail(
        'unexpected-token',
        { start: operator.start, end: cursor.token.end },
        'powers are not written **',
        'write ^',
      );
    }
    const negative = operator !== undefined && parseSigns(cursor);
    const before = factors.at(-1)!.value;
    if (operator === undefined && before.kind === 'integer' && cursor.token.kind === 'integer') {
      const span = { start: before.start, end: cursor.token.end };
      cursor.fail(
        'adjacent-numbers',
        span,
        `two numbers side by side: ${cursor.typed(span)}`,
        'put an operator between them',
      );
    }
    factors.push({ divides: operator?.text === '/', negative, value: parsePower(cursor, vocabulary) });
  }
  return factors.length === 1 ? factors[0]!.value : { kind: 'product', factors, start, end: cursor.lastEnd };
}

const startsFactor = (token: Token): boolean =>
  token.kind === 'mark' ? CLOSING.has(token.text) : token.kind !== 'end';

function parsePower(cursor: Cursor, vocabulary: Vocabulary): Expression {
  let base = parsePrimary(cursor, vocabulary);
  if (cursor.isMark('^')) {
    cursor.next();
    const exponent = parseExponent(cursor, base);
    base = { kind: 'power', base, exponent, start: base.start, end: cursor.lastEnd };
    if (cursor.isMark('^')) {
      cursor.fail(
        'double-exponent',
        cursor.token,
        'two exponents on one factor',
        'put brackets around the first power',
      );
    }
  }
  if (cursor.isMark('_')) {
    if (cursor.isMark('{', 1) && cursor.isOpenForGood(1, '}')) unclosed(cursor, cursor.peek(1));
    const message = `${cursor.typed(base)} cannot carry indices`;
    const hint =
      base.kind === 'power'
        ? 'a power stands behind a complete scalar, as in (T_a T^a)^2'
        : 'indices belong to R, T, A, \\epsilon, \\eta and \\delta; subscripts to names, as in c_1';
    cursor.fail('misplaced-index', { start: base.start, end: cursor.token.end }, message, hint);
  }
  return base;
}

/** What follows `^` when it is not a set of indices. */
function parseExponent(cursor: Cursor, base: Expression): number {
  const opening = cursor.isMark('{') || cursor.isMark('(') ? cursor.next() : undefined;
  const negative = parseSigns(cursor);
  const { token } = cursor;
  const typed = cursor.typed(base);
  if (token.kind !== 'integer') {
    const hint = 'an exponent is an integer, as in M^2 or M^{-2}';
    if (token.kind === 'word' || token.kind === 'macro') {
      const metric = typed === 'g' ? 'g is not known here: indices are frame indices, write \\eta^{ab}' : hint;
      const code = typed === 'g' ? 'unknown-tensor' : 'bad-exponent';
      cursor.fail(code, token, `${typed} is a scalar and takes no index or symbolic exponent`, metric);
    }
    cursor.fail(
      'bad-exponent',
      token.kind === 'end' ? { start: base.start, end: token.end } : token,
      `${typed}^ lacks its exponent`,
      hint,
    );
  }
  cursor.next();
  if (opening !== undefined) {
    const closing = CLOSING.get(opening.text)!;
    if (cursor.isMark('/')) {
      cursor.fail(
        'bad-exponent',
        token,
        'the exponent is not an integer',
        'a Lagrangian is a polynomial: roots are not allowed',
      );
    }
    if (!cursor.accept(closing)) {
      if (cursor.token.kind === 'end') unclosed(cursor, opening);
      cursor.fail('bad-exponent', cursor.token, 'the exponent must be one integer', 'as in M^2 or M^{-2}');
    }
  }
  const size = token.text.length > 9 ? Number.POSITIVE_INFINITY : Number(token.text);
  if (size > MAX_EXPONENT) {
    cursor.fail(
      'exponent-limit',
      token,
      `the exponent is beyond the limit of ${MAX_EXPONENT}`,
      'smaller exponents only',
    );
  }
  return negative && size !== 0 ? -size : size;
}

function unclosed(cursor: Cursor, opening: Token): never {
  cursor.fail(
    'unbalanced-bracket',
    opening,
    `${opening.text} is never closed`,
    `add the closing ${CLOSING.get(opening.text)}`,
  );
}

function parsePrimary(cursor: Cursor, vocabulary: Vocabulary): Expression {
  const { token } = cursor;
  if (token.kind === 'integer') return integer(cursor, cursor.next());
  if (token.kind === 'word') {
    if (vocabulary.jets && token.text === 'D' && cursor.isMark('(', 1)) return parseJet(cursor, vocabulary);
    return parseNamed(cursor, vocabulary, token.text);
  }
  if (token.kind === 'macro') {
    if (FRACTIONS.has(token.text)) return parseFraction(cursor, vocabulary);
    if (isGreek(token.text)) return parseNamed(cursor, vocabulary, macroName(token.text, vocabulary));
    return cursor.fail('unknown-macro', token, `\\${token.text} has no meaning here`, macroHint(token.text));
  }
  if (cursor.isMark('{') && cursor.isMark('}', 1) && vocabulary.tensors && partAt(cursor, 2) !== undefined) {
    return parsePartInFront(cursor, vocabulary);
  }
  if (token.kind === 'mark' && CLOSING.has(token.text)) return parseBracket(cursor, vocabulary);
  const at = token.kind === 'end' ? { start: Math.max(0, cursor.lastEnd - 1), end: cursor.lastEnd } : token;
  if (CLOSERS.has(token.text) && cursor.lastEnd === 0) expectEnd(cursor);
  const message = token.kind === 'end' ? 'the expression ends too early' : `unexpected ${cursor.describe(token)}`;
  const hint = token.text === '_' ? 'a name begins with a letter' : 'expected a number, a name, a tensor or a bracket';
  return cursor.fail('missing-factor', at, message, hint);
}

function macroHint(name: string): string {
  if (name === 'sqrt') return 'a Lagrangian is a polynomial: roots are not allowed';
  if (name === 'nabla' || name === 'partial' || name === 'Box') return 'derivatives are not part of the notation';
  if (name === 'over') return 'write \\frac{p}{q}';
  for (const macro of KNOWN_MACROS) {
    if (name.startsWith(macro)) return `leave a space: \\${macro} ${name.slice(macro.length)}`;
  }
  return 'macros are Greek letters, \\frac, \\tfrac, \\cdot, \\times, spaces and bracket sizes';
}

function integer(cursor: Cursor, token: Token, text = token.text): Expression {
  if (text.length > MAX_DIGITS) {
    cursor.fail('digits-limit', token, `a number of ${text.length} digits; the limit is ${MAX_DIGITS}`, 'use a symbol');
  }
  return { kind: 'integer', value: BigInt(text), start: token.start, end: token.end };
}

function parseBracket(cursor: Cursor, vocabulary: Vocabulary): Expression {
  const opening = cursor.next();
  const closing = CLOSING.get(opening.text)!;
  const value = cursor.nested(opening, () => parseSum(cursor, vocabulary));
  if (!cursor.accept(closing)) {
    const { token } = cursor;
    if (token.kind === 'end') unclosed(cursor, opening);
    if (CLOSERS.has(token.text)) {
      cursor.fail('unbalanced-bracket', token, `${token.text} does not match ${opening.text}`, `expected ${closing}`);
    }
    expectEnd(cursor);
  }
  if (opening.text === '{' && value.kind === 'sum') {
    cursor.fail(
      'brace-group',
      { start: opening.start, end: cursor.lastEnd },
      'braces do not show in print and group nothing',
      'use ( )',
    );
  }
  // `{R^a}_{bcd}`: a braced tensor may go on collecting indices.
  if (opening.text === '{' && value.kind === 'tensor' && indicesFollow(cursor, 0)) {
    return parseTensor(cursor, vocabulary, value.head, { ...value, start: opening.start });
  }
  return { ...value, start: opening.start, end: cursor.lastEnd };
}

/** \frac{p}{q}, or two single digits as TeX takes them: \frac12. */
function parseFraction(cursor: Cursor, vocabulary: Vocabulary): Expression {
  const macro = cursor.next();
  const { token } = cursor;
  const part = (): Expression => {
    if (cursor.isMark('{')) {
      const opening = cursor.next();
      const value = cursor.nested(opening, () => parseSum(cursor, vocabulary));
      if (cursor.accept('}')) return value;
      if (cursor.token.kind === 'end') unclosed(cursor, opening);
      return expectEndOfGroup(cursor, opening);
    }
    if (cursor.token.kind === 'integer' && cursor.token.text.length === 1) return integer(cursor, cursor.next());
    return cursor.fail(
      'bad-fraction',
      { start: macro.start, end: cursor.token.end },
      'a fraction needs two braced parts',
      'write \\frac{p}{q}',
    );
  };
  let numerator: Expression;
  let denominator: Expression;
  if (token.kind === 'integer' && token.text.length === 2) {
    cursor.next();
    numerator = integer(cursor, { ...token, end: token.start + 1 }, token.text[0]);
    denominator = integer(cursor, { ...token, start: token.start + 1 }, token.text[1]);
  } else {
    numerator = part();
    denominator = part();
  }
  const factors: Factor[] = [
    { divides: false, negative: false, value: numerator },
    { divides: true, negative: false, value: denominator },
  ];
  return { kind: 'product', factors, start: macro.start, end: cursor.lastEnd };
}

function expectEndOfGroup(cursor: Cursor, opening: Token): never {
  const { token } = cursor;
  cursor.fail(
    'unbalanced-bracket',
    token,
    `${cursor.describe(token)} stands where ${opening.text} should be closed`,
    'expected }',
  );
}

/** `{}^{(axial)}T_{abc}`, as parts are often printed. */
function parsePartInFront(cursor: Cursor, vocabulary: Vocabulary): Expression {
  const { start } = cursor.token;
  cursor.skip(2);
  const part = partAt(cursor, 0)!;
  cursor.skip(part.tokens);
  const { token } = cursor;
  const head = isHeadAt(cursor, 0, vocabulary) ? headAt(cursor, joinName(cursor, token.text), vocabulary) : undefined;
  if (head === undefined) {
    const message = `${cursor.typed(part)} stands in front of no tensor`;
    return cursor.fail('misplaced-part', part, message, 'write T^{(axial)}_{abc} or {}^{(axial)}T_{abc}');
  }
  checkPart(cursor, head, typedHead(head), part);
  cursor.next();
  return parseTensor(cursor, vocabulary, head, { slots: [], part: part.name, start, end: token.end });
}

/** A tensor or a declared name; `text` is the first word, without its subscript. */
function parseNamed(cursor: Cursor, vocabulary: Vocabulary, text: string): Expression {
  const first = cursor.token;
  const name = joinName(cursor, text);
  const head = headAt(cursor, name, vocabulary);
  if (head !== undefined) {
    cursor.next();
    return parseTensor(cursor, vocabulary, head, { slots: [], start: first.start, end: first.end });
  }
  cursor.skip(name.tokens);
  const span = { start: first.start, end: cursor.lastEnd };
  if (!vocabulary.isSymbol(name.text)) reportUnknown(cursor, vocabulary, name, span);
  return { kind: 'symbol', name: name.text, ...span };
}
