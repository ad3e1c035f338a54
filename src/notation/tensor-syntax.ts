/**
 * A tensor with its indices, slots in the order typed. Indices are single Latin letters or Greek macros, in patterns with
 * a `?` in front; a wrong number of them is reported and parsing goes on, everything else stops it.
 */
import type { Cursor } from './cursor.js';
import { checkPart, looksLikeIndices, partAt, partsOf, type TypedPart } from './parts.js';
import type { SlotNode, Span, TensorNode } from './syntax.js';
import type { TensorHead } from './theory.js';
import { isGreek, type Token } from './tokens.js';
import { isHeadAt, isPowerAt, type Vocabulary } from './vocabulary.js';

/** How many indices each built-in head may carry. */
export const SLOT_COUNTS: Readonly<Record<TensorHead, readonly number[]>> = {
  R: [0, 2, 4],
  T: [1, 3],
  A: [1],
  epsilon: [4],
  eta: [2],
  delta: [2],
};

/** Whether a head needs no declaration. */
export const isBuiltIn = (head: string): head is TensorHead => Object.hasOwn(SLOT_COUNTS, head);
/** The head as a user types it. */
export const typedHead = (head: string): string => (isBuiltIn(head) && head.length > 1 ? `\\${head}` : head);

/** Whether the token `ahead` places further on begins a group of indices or a spacer {}. */
export function indicesFollow(cursor: Cursor, ahead: number): boolean {
  if (cursor.isMark('^', ahead)) return !isPowerAt(cursor, ahead);
  const inner = ahead + 1;
  const braced = cursor.isMark('}', inner) || cursor.isMark('^', inner) || cursor.isMark('_', inner);
  return cursor.isMark('_', ahead) || (cursor.isMark('{', ahead) && braced);
}

interface Begun extends Span {
  readonly slots: readonly SlotNode[];
  readonly part?: string;
}

/** Reads the indices behind a head; the cursor stands behind the head, or behind what `begun` has of the tensor. */
export function parseTensor(cursor: Cursor, vocabulary: Vocabulary, head: string, begun: Begun): TensorNode {
  const slots: SlotNode[] = [...begun.slots];
  let { part } = begun;
  const takePart = (found: TypedPart): void => {
    checkPart(cursor, head, typedHead(head), found);
    if (part !== undefined) {
      cursor.fail('part-twice', found, `a second irreducible part of ${typedHead(head)}`, 'keep one of them');
    }
    part = found.name;
    cursor.skip(found.tokens);
  };
  for (;;) {
    if (cursor.isMark('^') || cursor.isMark('_')) {
      const found = partAt(cursor, 0);
      if (found !== undefined && !looksLikeIndices(found.name)) {
        takePart(found);
        continue;
      }
      if (cursor.isMark('^') && isPowerAt(cursor, 0)) {
        if (!takesNoIndices(head) || slots.length > 0) refusePower(cursor, head, begun);
        if (powerThenIndices(cursor)) refuseIndicesAfterPower(cursor, begun);
        break;
      }
      parseGroup(cursor, slots, begun);
    } else if (cursor.isMark('{') && cursor.isMark('}', 1)) {
      // In `T_a {}^{(axial)}T_{bcd}` the part belongs to the tensor behind it.
      const ahead = partAt(cursor, 2);
      if (ahead !== undefined && (slots.length > 0 || isHeadAt(cursor, 2 + ahead.tokens, vocabulary))) break;
      cursor.skip(2);
    } else if (cursor.isMark('{') && (cursor.isMark('^', 1) || cursor.isMark('_', 1))) {
      // T{^a}{_{bc}}: braces around each group of indices, as some styles write it.
      const opening = cursor.next();
      while (cursor.isMark('^') || cursor.isMark('_')) parseGroup(cursor, slots, begun);
      if (!cursor.accept('}')) cursor.fail('unbalanced-bracket', opening, '{ is never closed', 'add the closing }');
    } else break;
  }
  const span = { start: begun.start, end: Math.max(begun.end, cursor.lastEnd) };
  // In `{R^a}_{bcd}` the rest of the indices stands behind the brace.
  const node: TensorNode = { kind: 'tensor', head, ...(part === undefined ? {} : { part }), slots, ...span };
  if (!cursor.isMark('}') || !indicesFollow(cursor, 1)) checkCount(cursor, vocabulary, node);
  return node;
}

const takesNoIndices = (head: string): boolean => isBuiltIn(head) && SLOT_COUNTS[head].includes(0);

/** What the head is, for a hint. */
const FORMS: Readonly<Record<TensorHead, string>> = {
  R: 'R_{abcd} is the curvature, R_{ab} its trace, R the scalar',
  T: 'T_{abc} is the torsion, T_a its trace',
  A: 'A_a is the axial vector of the torsion',
  epsilon: 'as in \\epsilon^{abcd}',
  eta: 'as in \\eta_{ab}',
  delta: 'as in \\delta^a_b',
};

function checkCount(cursor: Cursor, vocabulary: Vocabulary, { head, part, slots, ...span }: TensorNode): void {
  const parts = part === undefined ? undefined : partsOf(head);
  const declared = vocabulary.declared?.get(head)?.slots ?? 0;
  const allowed = parts !== undefined ? [parts.slots] : isBuiltIn(head) ? SLOT_COUNTS[head] : [declared];
  const count = slots.length;
  if (!allowed.includes(count)) {
    const has = count === 0 ? 'no indices here' : count === 1 ? '1 index' : `${count} indices`;
    const list = allowed.length === 3 ? '0, 2 or 4' : allowed.join(' or ');
    const name = parts === undefined ? typedHead(head) : `a part of ${head}`;
    const hint = isBuiltIn(head) ? FORMS[head] : `it is declared with ${declared} under tensors`;
    cursor.report('index-count', span, `${cursor.typed(span)} has ${has}, ${name} has ${list}`, hint);
  } else if (head === 'delta' && slots[0]!.up === slots[1]!.up) {
    const message = '\\delta has one index up and one down';
    cursor.report('delta-heights', span, message, 'write \\eta for two indices at one height');
  }
}

/** R^{2}_{ab}: the cursor stands at ^. */
function powerThenIndices(cursor: Cursor): boolean {
  let n = 1;
  while (cursor.peek(n).kind !== 'integer') n++;
  n++;
  if (cursor.isMark('}', n) || cursor.isMark(')', n)) n++;
  return cursor.isMark('_', n) || (cursor.isMark('^', n) && !isPowerAt(cursor, n));
}

function refuseIndicesAfterPower(cursor: Cursor, begun: Begun): never {
  const span = { start: begun.start, end: cursor.peek(3).end };
  return cursor.fail(
    'power-of-tensor',
    span,
    'a power cannot stand between a tensor and its indices',
    'write the product out, as in R_{ab} R^{ab}',
  );
}

function refusePower(cursor: Cursor, head: string, begun: Begun): never {
  const typed = cursor.typed({ start: begun.start, end: cursor.lastEnd });
  const number = cursor.peek(1).kind === 'integer' ? cursor.peek(1) : cursor.peek(2);
  const span = { start: begun.start, end: number.end };
  if (cursor.lastEnd === begun.end && begun.slots.length === 0) {
    const message = `an index of ${typedHead(head)} is a number`;
    return cursor.fail(
      'index-digit',
      { start: number.start, end: number.end },
      message,
      'components are not allowed; use letters',
    );
  }
  return cursor.fail(
    'power-of-tensor',
    span,
    `${typed} has free indices, so its power has no meaning`,
    'powers stand on scalars: R^2, (T_a T^a)^2; a square is written out, R_{ab} R^{ab}',
  );
}

/** One `^…` or `_…`. */
function parseGroup(cursor: Cursor, slots: SlotNode[], begun: Begun): void {
  const sign = cursor.next();
  const up = sign.text === '^';
  const sigil = cursor.accept('?') ? '?' : '';
  const { token } = cursor;
  if (token.kind === 'word') {
    if (token.text.length > 1) refuseWord(cursor, { start: begun.start, end: sign.end }, token);
    cursor.next();
    slots.push({ name: sigil + token.text, up, start: token.start, end: token.end });
    return;
  }
  if (token.kind === 'macro' && isGreek(token.text)) {
    cursor.next();
    slots.push({ name: `${sigil}\\${token.text}`, up, start: token.start, end: token.end });
    return;
  }
  if (!cursor.isMark('{') || sigil !== '') {
    if (token.kind === 'integer') refuseDigit(cursor, token);
    const at = token.kind === 'end' ? sign : token;
    cursor.fail('missing-index', at, `${sign.text} lacks its index`, 'an index is a Latin letter or a Greek macro');
  }
  const opening = cursor.next();
  while (!cursor.isMark('}')) pushIndices(cursor, opening, up, slots);
  cursor.next();
}

/** Two or more letters without braces. */
function refuseWord(cursor: Cursor, begun: Span, token: Token): never {
  const { text } = token;
  const before = cursor.typed(begun);
  const apart = `leave a space: ${before}${text[0]} ${text.slice(1)}`;
  if (/[0-9]/.test(text))
    cursor.fail('index-braces', token, `${text} is not an index`, `an index is one letter; ${apart}`);
  return cursor.fail('index-braces', token, 'several indices need braces', `write ${before}{${text}}, or ${apart}`);
}

function pushIndices(cursor: Cursor, opening: Token, up: boolean, slots: SlotNode[]): void {
  const sigil = cursor.accept('?') ? '?' : '';
  const token = cursor.next();
  if (token.kind === 'word') {
    const digit = token.text.search(/[0-9]/);
    if (digit !== -1) refuseDigit(cursor, { ...token, start: token.start + digit, end: token.start + digit + 1 });
    for (let i = 0; i < token.text.length; i++) {
      // In {?ab} the sigil belongs to the first letter.
      const name = (i === 0 ? sigil : '') + token.text[i]!;
      slots.push({ name, up, start: token.start + i, end: token.start + i + 1 });
    }
    return;
  }
  if (token.kind === 'macro' && isGreek(token.text)) {
    slots.push({ name: `${sigil}\\${token.text}`, up, start: token.start, end: token.end });
    return;
  }
  if (token.kind === 'end') cursor.fail('unbalanced-bracket', opening, '{ is never closed', 'add the closing }');
  if (token.kind === 'integer') refuseDigit(cursor, token);
  if ('[]()'.includes(token.text)) {
    cursor.fail(
      'index-brackets',
      token,
      'brackets around indices are not part of the notation',
      'write the symmetrised sum out',
    );
  }
  if (token.text === ',') {
    cursor.fail(
      'bad-index',
      token,
      'a comma among indices',
      'derivatives are not part of the notation; indices need no comma',
    );
  }
  cursor.fail(
    'bad-index',
    token,
    `${cursor.describe(token)} is not an index`,
    'an index is a Latin letter or a Greek macro',
  );
}

function refuseDigit(cursor: Cursor, span: Span): never {
  return cursor.fail('index-digit', span, 'an index is a number', 'components are not allowed; use letters');
}
