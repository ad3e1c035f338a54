/** The task in this program's own kernel, from the compiled files. */
import * as E from '../oracle/exact.js';
import { CONSTANTS, FIELDS, type Operations, ORDERS, reducedLagrangian, type Subject } from './task.js';

type Poly = import('../../src/algebra/poly.js').Poly;

/** A compiled module, to be typed by its source, so that types can be checked before anything is built. */
const compiled = (name: string): Promise<unknown> =>
  import(new URL(`../../dist/algebra/${name}.js`, import.meta.url).href);

export async function kernel(version: string): Promise<Subject> {
  const poly = (await compiled('poly')) as typeof import('../../src/algebra/poly.js');
  const { constantsOf, jetName, jetsOf, makeRing } = (await compiled(
    'ring',
  )) as typeof import('../../src/algebra/ring.js');
  const { eulerLagrange } = (await compiled('calculus')) as typeof import('../../src/algebra/calculus.js');
  const { evaluate } = (await compiled('collect')) as typeof import('../../src/algebra/collect.js');
  const { rational } = (await compiled('rational')) as typeof import('../../src/algebra/rational.js');
  const { add, constant, generator, multiply, power, subtract, sum } = poly;

  const run = (): Poly[] => {
    const ring = makeRing([...FIELDS.flatMap((q) => jetsOf(q, ORDERS[q])), ...constantsOf(CONSTANTS)]);
    const operations: Operations<Poly> = {
      symbol: (name, derivative = 0) => generator(ring, jetName(name, derivative)),
      integer: (n) => constant(ring, n),
      add: (...terms) => (terms.length === 2 ? add(terms[0]!, terms[1]!) : sum(ring, terms)),
      subtract,
      multiply: (...factors) => factors.reduce(multiply),
      power,
    };
    const lagrangian = reducedLagrangian(operations);
    return FIELDS.map((q) => eulerLagrange(lagrangian, q));
  };
  return {
    name: 'untwist',
    version,
    reset: () => {},
    run,
    termCounts: (result) => (result as Poly[]).map((p) => p.size),
    values: (result, point) => {
      const at = new Map([...point].map(([name, x]) => [name, rational(x.n, x.d)]));
      return (result as Poly[]).map((p) => {
        const x = evaluate(p, at);
        return E.q(x.num, x.den);
      });
    },
  };
}
