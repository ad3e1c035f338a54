/**
 * Reads the text that a computer algebra package replies with: integers, names, + - * / ^ and brackets, and where they
 * are asked for elementary functions and powers with denominator 2, nothing else.
 * A reply is untrusted: it is read into a tree within stated limits and then built up in the kernel; anything that is not
 * of this form (decimal points, functions, unknown names) is an error. Imports the algebra only.
 */
import { add, constant, multiply, negate, type Poly, power, subtract } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import type { Ring } from '../algebra/ring.js';

/** Thrown for a reply that is not of the form described above, or beyond a limit. */
export class ReplyError extends Error {
  constructor(message: string) {
    super(message);
    this.name = 'ReplyError';
  }
}

export type Expression =
  | { readonly kind: 'integer'; readonly value: bigint }
  | { readonly kind: 'name'; readonly name: string }
  | { readonly kind: '+' | '-' | '*' | '/'; readonly left: Expression; readonly right: Expression }
  | { readonly kind: 'negative'; readonly of: Expression }
  | { readonly kind: 'power'; readonly base: Expression; readonly exponent: number }
  | { readonly kind: 'root'; readonly base: Expression; readonly halves: number }
  | { readonly kind: 'call'; readonly name: string; readonly of: Expression };

const MAX_LENGTH = 200_000;
const MAX_DEPTH = 200;
/** Also bounds the depth of the tree, which leans to the left. */
const MAX_OPERATORS = 5_000;
const MAX_DIGITS = 1_000;

/**
 * The tree of a reply.
 * @param functions names of functions that may be called; with any, powers n/2 are read too.
 * @throws ReplyError.
 */
export function readReply(text: string, functions: ReadonlySet<string> = new Set()): Expression {
  if (text.length > MAX_LENGTH) throw new ReplyError(`a reply of ${text.length} characters`);
  const tokens = tokensOf(text);
  let at = 0;
  let depth = 0;
  let operators = 0;

  const fail = (): never => {
    throw new ReplyError(`unexpected ${tokens[at] === undefined ? 'end' : `'${tokens[at]}'`} in a reply`);
  };
  const operator = (): '+' | '-' | '*' | '/' => {
    if (++operators > MAX_OPERATORS) throw new ReplyError(`a reply of more than ${MAX_OPERATORS} operators`);
    return tokens[at++] as '+' | '-' | '*' | '/';
  };
  const expect = (token: string): void => {
    if (tokens[at++] !== token) {
      at--;
      fail();
    }
  };

  function sum(): Expression {
    if (++depth > MAX_DEPTH) throw new ReplyError(`brackets nested more than ${MAX_DEPTH} deep`);
    let left = product();
    while (tokens[at] === '+' || tokens[at] === '-') left = { kind: operator(), left, right: product() };
    depth--;
    return left;
  }
  function product(): Expression {
    let left = signed();
    while (tokens[at] === '*' || tokens[at] === '/') left = { kind: operator(), left, right: signed() };
    return left;
  }
  function signed(): Expression {
    const sign = tokens[at];
    if (sign !== '-' && sign !== '+') return raised();
    operator();
    if (++depth > MAX_DEPTH) throw new ReplyError(`more than ${MAX_DEPTH} signs in a row`);
    const of = signed();
    depth--;
    return sign === '-' ? { kind: 'negative', of } : of;
  }
  function raised(): Expression {
    const base = atom();
    if (tokens[at] !== '^') return base;
    at++;
    const halves = functions.size > 0 ? halfExponent() : undefined;
    if (halves !== undefined) return { kind: 'root', base, halves };
    const exponent = integerExponent();
    // a^b^c is written by neither package; its meaning would be a guess.
    if (tokens[at] === '^') fail();
    return { kind: 'power', base, exponent };
  }
  /** `(n/2)` or `(-n/2)`. */
  function halfExponent(): number | undefined {
    const negative = tokens[at + 1] === '-';
    const [open, top, slash, bottom, close] = tokens.slice(at, at + 6).filter((t) => t !== '-');
    if (open !== '(' || slash !== '/' || bottom !== '2' || close !== ')' || !/^\d{1,3}$/.test(top ?? ''))
      return undefined;
    at += negative ? 6 : 5;
    return negative ? -Number(top) : Number(top);
  }
  function integerExponent(): number {
    const bracket = tokens[at] === '(';
    if (bracket) at++;
    const negative = tokens[at] === '-';
    if (negative) at++;
    if (!/^\d{1,4}$/.test(tokens[at] ?? '')) fail();
    const n = Number(tokens[at++]);
    if (bracket) expect(')');
    return negative ? -n : n;
  }
  function atom(): Expression {
    const token = tokens[at] ?? '';
    if (token === '(') {
      at++;
      const inner = sum();
      expect(')');
      return inner;
    }
    if (/^\d/.test(token)) {
      if (token.length > MAX_DIGITS) throw new ReplyError(`a number of ${token.length} digits in a reply`);
      at++;
      return { kind: 'integer', value: BigInt(token) };
    }
    if (!/^[A-Za-z]/.test(token)) fail();
    at++;
    if (tokens[at] === '(' && functions.has(token)) {
      at++;
      const of = sum();
      expect(')');
      return { kind: 'call', name: token, of };
    }
    return { kind: 'name', name: token };
  }

  const whole = sum();
  if (at < tokens.length) fail();
  return whole;
}

function tokensOf(text: string): string[] {
  const tokens: string[] = [];
  const pattern = /\s*(?:(\d+|[A-Za-z][A-Za-z0-9_]*|[-+*/^()])|$)/y;
  while (pattern.lastIndex < text.length) {
    const start = pattern.lastIndex;
    const found = pattern.exec(text);
    if (!found) throw new ReplyError(`unexpected '${text.slice(start).trim()[0]}' in a reply`);
    if (found[1] !== undefined) tokens.push(found[1]);
  }
  return tokens;
}

/**
 * The value of a tree in a ring, names by a table. Powers beyond `maxExponent`, nested ones multiplied, are refused before
 * they cost anything.
 * @throws ReplyError; RangeError for a division by zero or by a sum; ExponentLimitError beyond ±511.
 */
export function valueOfReply(
  tree: Expression,
  ring: Ring,
  symbols: ReadonlyMap<string, Poly>,
  maxExponent: number,
): Poly {
  const value = (e: Expression, room: number): Poly => {
    switch (e.kind) {
      case 'integer':
        return constant(ring, rational(e.value));
      case 'name': {
        const symbol = symbols.get(e.name);
        if (!symbol) throw new ReplyError(`unknown name '${e.name}' in a reply`);
        return symbol;
      }
      case 'negative':
        return negate(value(e.of, room));
      case '+':
        return add(value(e.left, room), value(e.right, room));
      case '-':
        return subtract(value(e.left, room), value(e.right, room));
      case '*':
        return multiply(value(e.left, room), value(e.right, room));
      case '/':
        return multiply(value(e.left, room), power(value(e.right, room), -1));
      case 'power':
        if (Math.abs(e.exponent) > room) throw new ReplyError(`the power ${e.exponent} in a reply`);
        return power(value(e.base, room / Math.max(1, Math.abs(e.exponent))), e.exponent);
      default:
        throw new ReplyError('a function where a polynomial was asked for');
    }
  };
  return value(tree, maxExponent);
}

/** A tree as a product of powers, signs and divisors included: the outermost multiplications taken apart. */
export function factorsOfReply(tree: Expression): { base: Expression; power: number }[] {
  const flat = (e: Expression, n: number): { base: Expression; power: number }[] => {
    switch (e.kind) {
      case '*':
        return [...flat(e.left, n), ...flat(e.right, n)];
      case '/':
        return [...flat(e.left, n), ...flat(e.right, -n)];
      case 'negative':
        return [{ base: { kind: 'negative', of: { kind: 'integer', value: 1n } }, power: n }, ...flat(e.of, n)];
      case 'power':
        return flat(e.base, n * e.exponent);
      default:
        return [{ base: e, power: n }];
    }
  };
  return flat(tree, 1);
}
