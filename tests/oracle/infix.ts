/**
 * Reads and evaluates the infix text of derivation.json: + − * / ^ ( ), integers, names, D(q,n). Generic in the
 * numbers, so that one text gives exact values at a point and exact jets along a curve.
 */

import type { Q } from './exact.js';
import * as E from './exact.js';
import type { Point } from './geometry.js';
import { type Algebra, Jet } from './jet.js';

/** Arithmetic on some kind of number. */
export interface Arithmetic<X> {
  readonly integer: (n: bigint) => X;
  readonly name: (name: string, derivative: number) => X;
  readonly add: (x: X, y: X) => X;
  readonly sub: (x: X, y: X) => X;
  readonly mul: (x: X, y: X) => X;
  readonly div: (x: X, y: X) => X;
  readonly pow: (x: X, n: number) => X;
}

/** Value of `text`; throws an Error that quotes the text where it cannot be read. */
export function evaluate<X>(text: string, on: Arithmetic<X>): X {
  const tokens = [...text.matchAll(/\s*(\d+|[A-Za-z][A-Za-z0-9_]*|[-+*/^(),])|\s*$|\s*(.)/gy)];
  const words: string[] = [];
  for (const [, token, bad] of tokens) {
    if (bad !== undefined) throw new Error(`unexpected '${bad}' in ${text}`);
    if (token !== undefined) words.push(token);
  }
  let at = 0;
  const fail = (): never => {
    throw new Error(`unexpected '${words[at] ?? 'end'}' (word ${at}) in ${text}`);
  };
  const take = (word: string): void => {
    if (words[at] !== word) fail();
    at++;
  };
  const integer = (): bigint => (/^\d+$/.test(words[at] ?? '') ? BigInt(words[at++]!) : fail());
  const sum = (): X => {
    let x = term();
    while (words[at] === '+' || words[at] === '-') x = words[at++] === '+' ? on.add(x, term()) : on.sub(x, term());
    return x;
  };
  const term = (): X => {
    let x = signed();
    while (words[at] === '*' || words[at] === '/') x = words[at++] === '*' ? on.mul(x, signed()) : on.div(x, signed());
    return x;
  };
  const signed = (): X => {
    if (words[at] === '-') {
      at++;
      return on.sub(on.integer(0n), signed());
    }
    return power();
  };
  const power = (): X => {
    const x = atom();
    if (words[at] !== '^') return x;
    at++;
    const bracket = words[at] === '(';
    if (bracket) at++;
    const negative = words[at] === '-';
    if (negative) at++;
    const n = Number(integer());
    if (bracket) take(')');
    return on.pow(x, negative ? -n : n);
  };
  const atom = (): X => {
    const word = words[at];
    if (word === undefined) return fail();
    if (word === '(') {
      at++;
      const x = sum();
      take(')');
      return x;
    }
    if (/^\d/.test(word)) return on.integer(integer());
    if (!/^[A-Za-z]/.test(word)) return fail();
    at++;
    if (word !== 'D' || words[at] !== '(') return on.name(word, 0);
    take('(');
    const name = words[at++] ?? fail();
    take(',');
    const order = Number(integer());
    take(')');
    return on.name(name, order);
  };
  const value = sum();
  if (at !== words.length) fail();
  return value;
}

/** Exact value at a point; k, fields with their derivatives, constants. */
export function atPoint(text: string, point: Point): Q {
  return evaluate<Q>(text, {
    integer: (n) => E.q(n),
    name: (name, n) => {
      if (name === 'k' && n === 0) return point.k;
      const field = Object.hasOwn(point.fields, name) ? point.fields[name]![n] : undefined;
      const x = field ?? (n === 0 && Object.hasOwn(point.constants, name) ? point.constants[name] : undefined);
      if (x === undefined) throw new Error(`the point has no value for D(${name},${n}), wanted by ${text}`);
      return x;
    },
    add: E.add,
    sub: E.sub,
    mul: E.mul,
    div: E.div,
    pow: E.pow,
  });
}

/** Exact jet along the curve of `fields`; D(q,n) is its n-th time derivative. */
export function along(
  text: string,
  fields: Readonly<Record<string, Jet>>,
  constants: Readonly<Record<string, Q>>,
  algebra: Algebra,
): Jet {
  const length = Math.max(...Object.values(fields).map((f) => f.length));
  const number = (x: Q): Jet => Jet.number(algebra, x, length);
  return evaluate<Jet>(text, {
    integer: (n) => number(E.q(n)),
    name: (name, n) => {
      if (name === 'k') return number(algebra.kSquared);
      let jet = Object.hasOwn(fields, name) ? fields[name] : undefined;
      if (jet === undefined) {
        const x = Object.hasOwn(constants, name) ? constants[name] : undefined;
        if (x === undefined || n > 0) throw new Error(`no value for D(${name},${n}), wanted by ${text}`);
        return number(x);
      }
      for (let j = 0; j < n; j++) jet = jet.rate();
      return jet;
    },
    add: (x, y) => x.plus(y),
    sub: (x, y) => x.minus(y),
    mul: (x, y) => x.times(y),
    div: (x, y) => x.over(y),
    pow: (x, n) => x.power(n),
  });
}
