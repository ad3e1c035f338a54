/** How many time derivatives of each field an emitted module reads, and the type of a field's jet. */
import { orderIn } from '../algebra/calculus.js';
import type { Derivation } from '../derivation.js';
import { expressionsOf } from './parameters.js';

/** Field → highest order that any expression contains, at least 0. */
export type JetOrders = ReadonlyMap<string, number>;

export function jetOrders(d: Derivation): JetOrders {
  const expressions = expressionsOf(d);
  return new Map(d.fields.map(({ name }) => [name, Math.max(0, ...expressions.map((p) => orderIn(p, name)))]));
}

const LABELS = ['value', 'first', 'second', 'third'];

/** `readonly [value: number, first: number, ...higher: number[]]`: longer jets are accepted, so that one object serves all. */
export function tupleType(order: number): string {
  const entries = Array.from({ length: order + 1 }, (_, n) => `${LABELS[n] ?? `order${n}`}: number`);
  return `readonly [${entries.join(', ')}, ...higher: number[]]`;
}

/** Local name of a jet: aDot, aDdot, aD3. */
export const jetLocal = (field: string, order: number): string =>
  order === 0 ? field : `${field}${['', 'Dot', 'Ddot'][order] ?? `D${order}`}`;
