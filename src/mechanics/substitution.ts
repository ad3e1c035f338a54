/**
 * Functions of time put in for fields: a field with all its jets, and constants whose square is another expression.
 * Imports the algebra.
 */
import { timeDerivative } from '../algebra/calculus.js';
import { collect, involves, moveTo, substitute } from '../algebra/collect.js';
import { generator, multiply, type Poly, power, sum } from '../algebra/poly.js';
import { jetName } from '../algebra/ring.js';

/**
 * p with fields replaced by functions in the same ring, their time derivatives following.
 * @throws Error when the ring ends below a derivative that is needed; RangeError when a sum would be divided by.
 */
export function substituteFields(p: Poly, values: ReadonlyMap<string, Poly>): Poly {
  const images = new Map<string, Poly>();
  for (const [field, value] of values) {
    let image = value;
    let order = 0;
    for (const g of ordersIn(p, field)) {
      for (; order < g; order++) image = timeDerivative(image);
      images.set(jetName(field, g), image);
    }
  }
  return images.size === 0 ? p : substitute(p, images);
}

/** Orders of a field's jets that occur in p, ascending. */
const ordersIn = (p: Poly, field: string): number[] =>
  p.ring.generators
    .flatMap((g) => (g.kind === 'jet' && g.field === field && involves(p, g.name) ? [g.order] : []))
    .sort((a, b) => a - b);

/** A constant s with s² = radicand. */
export interface Root {
  readonly name: string;
  readonly radicand: Poly;
}

/**
 * p with every power of a root beyond the first replaced, the last root first, since its radicand may contain the others.
 * @throws RangeError for a negative power of a root whose radicand is a sum.
 */
export function reduceRoots(p: Poly, roots: readonly Root[]): Poly {
  let value = p;
  for (const { name, radicand } of [...roots].reverse()) {
    if (!involves(value, name)) continue;
    const place = value.ring.position.get(name)!;
    const { ring } = value;
    const square = moveTo(radicand, ring);
    value = sum(
      ring,
      collect(value, (g) => g === place).map(({ monomial, coefficient }) => {
        const exponent = monomial[0]?.[1] ?? 0;
        const halves = Math.floor(exponent / 2);
        const odd = generator(ring, name, exponent - 2 * halves);
        return multiply(multiply(coefficient, odd), power(square, halves));
      }),
    );
  }
  return value;
}
