/**
 * Solves imposed relations for symbols, in order. A relation with one symbol alone on the left eliminates it; otherwise the
 * last-declared constant that occurs linearly with a numeric coefficient goes; anything else stays a condition.
 */
import { coefficientOf, collect, involves, substitute } from '../algebra/collect.js';
import { generator, isZero, multiply, negate, type Poly, power, subtract } from '../algebra/poly.js';
import type { Ring } from '../algebra/ring.js';
import { errorAt, InputError } from './diagnostics.js';
import { polyOfScalar } from './scalar-poly.js';
import type { Origin, Relation } from './theory.js';

export interface Imposed {
  /** Symbol → its value, free of all eliminated symbols. */
  readonly eliminated: ReadonlyMap<string, Poly>;
  /** Polynomials that vanish but could not be solved. */
  readonly conditions: readonly { readonly text: string; readonly value: Poly }[];
}

const refuse = (origin: Origin, code: string, message: string, hint: string): InputError =>
  new InputError([errorAt(origin, code, message, hint)]);

/** p with eliminated symbols replaced. @throws InputError when a divisor becomes zero or a sum. */
export function applyImposed(p: Poly, eliminated: ReadonlyMap<string, Poly>, blame: Origin | undefined): Poly {
  if (eliminated.size === 0) return p;
  try {
    return substitute(p, eliminated);
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    const message = `the imposed relations turn a divisor into something that cannot be divided by: ${error.message}`;
    const hint = 'multiply the divisor out, or impose other relations';
    throw blame
      ? refuse(blame, 'divisor', message, hint)
      : new InputError([{ code: 'divisor', severity: 'error', message, hint }]);
  }
}

/**
 * @param constants names of constants in the order of their declaration.
 * @throws InputError `contradiction` when a relation reduces to a non-zero number, `divisor` as `applyImposed`.
 */
export function solveRelations(ring: Ring, relations: readonly Relation[], constants: readonly string[]): Imposed {
  let eliminated = new Map<string, Poly>();
  let conditions: { text: string; value: Poly; origin: Origin }[] = [];
  const eliminate = (name: string, value: Poly, origin: Origin): void => {
    const one = new Map([[name, value]]);
    eliminated = new Map([...eliminated].map(([n, p]) => [n, applyImposed(p, one, origin)]));
    eliminated.set(name, value);
    conditions = conditions.flatMap((c) => {
      const rest = applyImposed(c.value, one, origin);
      if (isZero(rest)) return [];
      refuseNumber(rest, origin, `together with "${c.text}"`);
      return [{ ...c, value: rest }];
    });
  };
  const refuseNumber = (rest: Poly, origin: Origin, detail: string): void => {
    if (isNumber(rest))
      throw refuse(
        origin,
        'contradiction',
        `the relation contradicts what is already imposed ${detail}`.trim(),
        'drop one of the relations',
      );
  };
  for (const { left, right, subject, text, origin } of relations) {
    const value = applyImposed(subtract(polyOfScalar(ring, left), polyOfScalar(ring, right)), eliminated, origin);
    if (isZero(value)) continue;
    refuseNumber(value, origin, '');
    const alone = subject !== undefined && !eliminated.has(subject) ? aloneOnLeft(value, subject) : undefined;
    if (alone) {
      eliminate(subject!, alone, origin);
      continue;
    }
    const name = constants.findLast((c) => !eliminated.has(c) && solvable(value, c) !== undefined);
    if (name === undefined) conditions.push({ text, value, origin });
    else eliminate(name, solvable(value, name)!, origin);
  }
  return { eliminated, conditions: conditions.map(({ text, value }) => ({ text, value })) };
}

const isNumber = (p: Poly): boolean => collect(p, () => true).every((c) => c.monomial.length === 0);

/** value = subject − rest with a rest free of the subject. */
function aloneOnLeft(value: Poly, subject: string): Poly | undefined {
  const rest = subtract(generator(value.ring, subject), value);
  return involves(rest, subject) ? undefined : rest;
}

/** The root in a constant that occurs only linearly and with a numeric coefficient. */
function solvable(value: Poly, name: string): Poly | undefined {
  const slope = coefficientOf(value, name, 1);
  if (isZero(slope) || !isNumber(slope)) return undefined;
  const rest = subtract(value, multiply(slope, generator(value.ring, name)));
  if (involves(rest, name)) return undefined;
  return multiply(negate(rest), power(slope, -1));
}
