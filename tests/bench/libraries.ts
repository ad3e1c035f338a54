/** The task in general-purpose libraries, each with its own expansion and differentiation. */
import { createRequire } from 'node:module';
import algebrite, { type AlgebriteExpression } from 'algebrite';
import nerdamer, { type NerdamerExpression } from 'nerdamer/nerdamer.core.js';
import 'nerdamer/Algebra.js';
import 'nerdamer/Calculus.js';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import { evaluate } from '../oracle/infix.js';
import { CONSTANTS, FIELDS, type Operations, ORDERS, reducedLagrangian, type Subject } from './task.js';

const versionOf = (name: string): string =>
  (createRequire(import.meta.url)(`${name}/package.json`) as { version: string }).version;

/** Jets and constants renamed to v0, v1, …: both libraries give a meaning to many names. */
const jet = (name: string, derivative: number): string => (derivative === 0 ? name : `D(${name},${derivative})`);
const NAMES = [...FIELDS.flatMap((q) => Array.from({ length: ORDERS[q] + 1 }, (_, n) => jet(q, n))), ...CONSTANTS];
const alias = (name: string): string => `v${NAMES.indexOf(name)}`;
const STEPS = FIELDS.flatMap((q) =>
  Array.from({ length: ORDERS[q] }, (_, n) => [alias(jet(q, n)), alias(jet(q, n + 1))] as const),
);

/** Builds the text that the libraries read. */
const text: Operations<string> = {
  symbol: (name, derivative = 0) => alias(jet(name, derivative)),
  integer: (n) => `${n}`,
  add: (...terms) => `(${terms.join('+')})`,
  subtract: (a, b) => `(${a}-${b})`,
  multiply: (...factors) => `(${factors.join('*')})`,
  power: (x, n) => `(${x})^(${n})`,
};

interface Library<X> {
  readonly name: string;
  reset(): void;
  read(expression: string): X;
  expand(x: X): X;
  differentiate(x: X, symbol: string): X;
  add(a: X, b: X): X;
  subtract(a: X, b: X): X;
  multiply(a: X, b: X): X;
}

function subject<X extends { toString(): string }>(library: Library<X>): Subject {
  const rate = (x: X): X =>
    STEPS.map(([from, to]) => library.multiply(library.differentiate(x, from), library.read(to))).reduce(library.add);
  return {
    name: library.name,
    version: versionOf(library.name),
    reset: library.reset,
    run() {
      const lagrangian = library.expand(library.read(reducedLagrangian(text)));
      return FIELDS.map((q) => {
        const slope = library.differentiate(lagrangian, alias(q));
        if (q === 'N') return library.expand(slope);
        const momentum = library.differentiate(lagrangian, alias(jet(q, 1)));
        return library.expand(library.subtract(slope, rate(momentum)));
      });
    },
    termCounts: (result) => result.map((x) => countTerms(String(x))),
    values: (result, point) => result.map((x) => valueAt(String(x), point)),
  };
}

/** Terms of a sum as it is printed: signs outside brackets that follow no operator. */
function countTerms(printed: string): number {
  let depth = 0;
  let terms = 1;
  let before = '';
  for (const c of printed.replaceAll(' ', '')) {
    if (c === '(') depth++;
    if (c === ')') depth--;
    if ((c === '+' || c === '-') && depth === 0 && before !== '' && !'*/^'.includes(before)) terms++;
    before = c;
  }
  return terms;
}

function valueAt(printed: string, point: ReadonlyMap<string, Q>): Q {
  return evaluate<Q>(printed, {
    integer: (n) => E.q(n),
    name: (name) => point.get(NAMES[Number(name.slice(1))]!)!,
    add: E.add,
    sub: E.sub,
    mul: E.mul,
    div: E.div,
    pow: E.pow,
  });
}

export const algebriteSubject: Subject = subject<AlgebriteExpression>({
  name: 'algebrite',
  reset: () => {},
  read: (expression) => algebrite.eval(expression),
  // Evaluation expands by itself.
  expand: (x) => x,
  differentiate: (x, symbol) => algebrite.derivative(x, symbol),
  add: (a, b) => algebrite.add(a, b),
  subtract: (a, b) => algebrite.add(a, algebrite.multiply('-1', b)),
  multiply: (a, b) => algebrite.multiply(a, b),
});

export const nerdamerSubject: Subject = subject<NerdamerExpression>({
  name: 'nerdamer',
  // Every expression is stored; a run must not pay for those before it.
  reset: () => nerdamer.flush(),
  read: (expression) => nerdamer(expression),
  expand: (x) => x.expand(),
  differentiate: (x, symbol) => nerdamer.diff(x, symbol),
  add: (a, b) => a.add(b),
  subtract: (a, b) => a.subtract(b),
  multiply: (a, b) => a.multiply(b),
});
