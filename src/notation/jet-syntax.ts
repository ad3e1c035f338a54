/** D(q,n), the n-th time derivative of q, where an expression may contain jets. */
import type { Cursor } from './cursor.js';
import { MAX_EXPONENT } from './limits.js';
import type { Expression } from './syntax.js';
import { isGreek } from './tokens.js';
import { type JoinedName, joinName, macroName, reportUnknown, type Vocabulary } from './vocabulary.js';

/** The cursor stands at the D. Codes `bad-jet`, `exponent-limit`. */
export function parseJet(cursor: Cursor, vocabulary: Vocabulary): Expression {
  const head = cursor.next();
  cursor.next();
  const word = cursor.token;
  const form = 'write D(q,n) with a variable q and a number n';
  if (word.kind !== 'word' && !(word.kind === 'macro' && isGreek(word.text))) {
    cursor.fail('bad-jet', word.kind === 'end' ? head : word, 'D( lacks its variable', form);
  }
  const name: JoinedName = joinName(cursor, word.kind === 'macro' ? macroName(word.text, vocabulary) : word.text);
  cursor.skip(name.tokens);
  if (!cursor.accept(','))
    cursor.fail('bad-jet', { start: head.start, end: cursor.lastEnd }, 'D( lacks its comma', form);
  const order = cursor.token;
  if (order.kind !== 'integer')
    cursor.fail('bad-jet', { start: head.start, end: cursor.lastEnd }, 'D( lacks its order', form);
  cursor.next();
  if (!cursor.accept(')'))
    cursor.fail('bad-jet', { start: head.start, end: cursor.lastEnd }, 'D( is never closed', form);
  if (order.text.length > 9 || Number(order.text) > MAX_EXPONENT) {
    cursor.fail('exponent-limit', order, `the order is beyond the limit of ${MAX_EXPONENT}`, 'smaller orders only');
  }
  const span = { start: head.start, end: cursor.lastEnd };
  if (!vocabulary.isSymbol(name.text)) reportUnknown(cursor, vocabulary, name, word);
  const n = Number(order.text);
  return { kind: 'symbol', name: n === 0 ? name.text : `D(${name.text},${n})`, ...span };
}
