/**
 * Derivatives of elementary functions of one variable, exactly, in the field of numbers u + v√r with rational functions u, v
 * of the variable and one fixed polynomial r that is no square. Whatever does not stay in that field is refused, not guessed.
 * Roots are the positive ones, so that a derivative found here holds wherever r > 0 and the arguments are in their domains.
 * Imports the algebra only.
 */
import {
  addFraction,
  equalFraction,
  type Fraction,
  fraction,
  multiplyFraction,
  negateFraction,
  partialOfFraction,
} from '../algebra/fraction.js';
import { constant, generator, isZero, type Poly, termsOf } from '../algebra/poly.js';
import { rational, squareRootOf } from '../algebra/rational.js';
import { constantsOf, makeRing } from '../algebra/ring.js';
import type { Expression } from './reply.js';

/** The variable of the questions. */
export const VARIABLE = 'v1';
export const FIELD_RING = makeRing(constantsOf([VARIABLE]));

/** Functions that a reply may contain. */
export const FUNCTIONS: ReadonlySet<string> = new Set([
  'log',
  'arctan',
  'arctanh',
  'arcsin',
  'arcsinh',
  'arccosh',
  'sqrt',
]);

/** u + v√r. */
interface Element {
  readonly u: Fraction;
  readonly v: Fraction;
}

/** What is not in the field. */
class NotInField extends Error {}

const number = (n: bigint | number): Fraction => fraction(constant(FIELD_RING, rational(n)));
const NOTHING = number(0);
const UNIT = number(1);
const vanishes = (f: Fraction): boolean => isZero(f.numerator);
const plain = (u: Fraction): Element => ({ u, v: NOTHING });

const invertFraction = (f: Fraction): Fraction =>
  f.denominator.reduce(
    (acc, { base, power }) =>
      Array.from({ length: power }).reduce<Fraction>((g) => multiplyFraction(g, fraction(base)), acc),
    fraction(constant(FIELD_RING, 1), [{ base: f.numerator, power: 1 }]),
  );

/** The positive rational root of a constant; undefined for anything else. */
function rationalRoot({ numerator, denominator }: Fraction): Fraction | undefined {
  const [term] = termsOf(numerator);
  if (!term || numerator.size > 1 || denominator.length > 0 || term.exponents.length > 0) return undefined;
  const root = squareRootOf(term.coefficient);
  return root && fraction(constant(FIELD_RING, root));
}

/** The derivative of an expression, and its value where that is in the field. */
interface Jet {
  readonly value: Element | undefined;
  readonly slope: Element;
}

/** The derivative of a tree with respect to the variable as u + v√r; undefined when it is not in the field. */
export function derivativeIn(tree: Expression, r: Poly): { readonly u: Fraction; readonly v: Fraction } | undefined {
  try {
    return jetOf(tree, fraction(r)).slope;
  } catch (error) {
    if (error instanceof NotInField || error instanceof RangeError) return undefined;
    throw error;
  }
}

function jetOf(tree: Expression, r: Fraction): Jet {
  const sumOf = (a: Element, b: Element): Element => ({ u: addFraction(a.u, b.u), v: addFraction(a.v, b.v) });
  const negative = (a: Element): Element => ({ u: negateFraction(a.u), v: negateFraction(a.v) });
  const product = (a: Element, b: Element): Element => ({
    u: addFraction(multiplyFraction(a.u, b.u), multiplyFraction(multiplyFraction(a.v, b.v), r)),
    v: addFraction(multiplyFraction(a.u, b.v), multiplyFraction(a.v, b.u)),
  });
  const inverse = (a: Element): Element => {
    const norm = addFraction(
      multiplyFraction(a.u, a.u),
      negateFraction(multiplyFraction(multiplyFraction(a.v, a.v), r)),
    );
    const over = invertFraction(norm);
    return { u: multiplyFraction(a.u, over), v: negateFraction(multiplyFraction(a.v, over)) };
  };
  /** The positive root of c² rⁿ, where r > 0: of anything else the sign would have to be guessed. */
  const rootOf = (a: Element): Element => {
    if (!vanishes(a.v)) throw new NotInField();
    for (let rest = a.u, n = 0; n < 6; n++) {
      const c = rationalRoot(rest);
      if (c) {
        const whole = Array.from({ length: n >> 1 }).reduce<Fraction>((g) => multiplyFraction(g, r), c);
        return n % 2 === 0 ? plain(whole) : { u: NOTHING, v: whole };
      }
      rest = multiplyFraction(rest, invertFraction(r));
    }
    return fail();
  };
  const fail = (): never => {
    throw new NotInField();
  };
  /** (u + v√r)' = u' + (v' + v r'/2r)√r. */
  const rateOf = ({ u, v }: Element): Element => {
    const ofRoot = multiplyFraction(partialOfFraction(r, VARIABLE), invertFraction(r));
    return {
      u: partialOfFraction(u, VARIABLE),
      v: addFraction(
        partialOfFraction(v, VARIABLE),
        multiplyFraction(multiplyFraction(v, ofRoot), fraction(constant(FIELD_RING, rational(1, 2)))),
      ),
    };
  };
  const known = (value: Element): Jet => ({ value, slope: rateOf(value) });
  const inField = ({ value }: Jet): Element => value ?? fail();
  const raised = (a: Element, n: number): Element => {
    const base = n < 0 ? inverse(a) : a;
    return Array.from({ length: Math.abs(n) }).reduce<Element>((acc) => product(acc, base), plain(UNIT));
  };
  const timesOf = (a: Jet, b: Jet): Jet => {
    // A function outside the field may be multiplied by a constant.
    if (a.value && b.value) return known(product(a.value, b.value));
    const [still, moving] = a.value ? [a.value, b] : [inField(b), a];
    const rate = rateOf(still);
    if (!vanishes(rate.u) || !vanishes(rate.v)) fail();
    return { value: undefined, slope: product(still, moving.slope) };
  };
  const added = (a: Jet, b: Jet): Jet => ({
    value: a.value && b.value && sumOf(a.value, b.value),
    slope: sumOf(a.slope, b.slope),
  });
  const opposite = (a: Jet): Jet => ({ value: a.value && negative(a.value), slope: negative(a.slope) });
  const visit = (e: Expression): Jet => {
    switch (e.kind) {
      case 'integer':
        return known(plain(number(e.value)));
      case 'name':
        return e.name === VARIABLE ? known(plain(fraction(generator(FIELD_RING, VARIABLE)))) : fail();
      case 'negative':
        return opposite(visit(e.of));
      case '+':
        return added(visit(e.left), visit(e.right));
      case '-':
        return added(visit(e.left), opposite(visit(e.right)));
      case '*':
        return timesOf(visit(e.left), visit(e.right));
      case '/':
        return timesOf(visit(e.left), known(inverse(inField(visit(e.right)))));
      case 'power':
        return Math.abs(e.exponent) > 16 ? fail() : known(raised(inField(visit(e.base)), e.exponent));
      case 'root':
        return Math.abs(e.halves) > 16 ? fail() : known(raised(rootOf(inField(visit(e.base))), e.halves));
      case 'call': {
        const of = visit(e.of);
        if (e.name === 'sqrt') return known(rootOf(inField(of)));
        return { value: undefined, slope: product(of.slope, inverse(divisorOf(e.name, inField(of)))) };
      }
    }
  };
  /** What the derivative of a function is one over, at an argument. */
  const divisorOf = (name: string, x: Element): Element => {
    const square = product(x, x);
    const one = plain(UNIT);
    switch (name) {
      case 'log':
        return x;
      case 'arctan':
        return sumOf(one, square);
      case 'arctanh':
        return sumOf(one, negative(square));
      case 'arcsin':
        return rootOf(sumOf(one, negative(square)));
      case 'arcsinh':
        return rootOf(sumOf(one, square));
      case 'arccosh':
        return rootOf(sumOf(square, negative(one)));
      default:
        return fail();
    }
  };
  return visit(tree);
}

/** Whether (u + v√r)² is the given rational function. */
export function squaresTo({ u, v }: Element, r: Poly, square: Fraction): boolean {
  const mixed = multiplyFraction(u, v);
  const own = addFraction(multiplyFraction(u, u), multiplyFraction(multiplyFraction(v, v), fraction(r)));
  return vanishes(mixed) && equalFraction(own, square);
}
