/**
 * Solves imposed relations for symbols, in order. A relation with one symbol alone on the left eliminates it; otherwise the
 * last-declared constant that occurs linearly with a numeric coefficient goes; anything else stays a condition.
 */
import { coefficientOf, collect, involves, substitute } from '../algebra/collect.js';
import { dependsOn } from '../algebra/linear.js';
import { constant, generator, isZero, multiply, negate, type Poly, power, subtract } from '../algebra/poly.js';
import { ExponentLimitError, exponentRange, type Ring } from '../algebra/ring.js';
import { errorAt, InputError } from './diagnostics.js';
import { MAX_DIGITS, MAX_TERMS } from './limits.js';
import { polyOfScalar } from './scalar-poly.js';
import type { Origin, Relation } from './theory.js';

export interface Imposed {
  /** Symbol → its value, free of all eliminated symbols. */
  readonly eliminated: ReadonlyMap<string, Poly>;
  /** Polynomials that vanish but could not be solved. */
  readonly conditions: readonly { readonly text: string; readonly value: Poly }[];
  /** Eliminated symbol → the relation that eliminated it. */
  readonly origins: ReadonlyMap<string, Origin>;
}

/** The relation at fault: one for all symbols, or the one that eliminated each. */
type Blame = Origin | ReadonlyMap<string, Origin>;

function refuse(blame: Blame, name: string | undefined, code: string, message: string, hint: string): InputError {
  const origin = blame instanceof Map ? blame.get(name ?? '') : (blame as Origin);
  return new InputError([origin ? errorAt(origin, code, message, hint) : { code, severity: 'error', message, hint }]);
}

/**
 * p with eliminated symbols replaced.
 * @throws InputError `divisor` when a divisor becomes zero or a sum; `terms-limit`, `digits-limit`, `exponent-limit`.
 */
export function applyImposed(p: Poly, eliminated: ReadonlyMap<string, Poly>, blame: Blame): Poly {
  if (![...eliminated.keys()].some((name) => involves(p, name))) return p;
  refuseDivisors(p, eliminated, blame);
  refuseGrowth(p, eliminated, blame);
  try {
    return substitute(p, eliminated);
  } catch (error) {
    if (!(error instanceof ExponentLimitError)) throw error;
    const name = [...eliminated.keys()].find((n) => involves(p, n));
    throw refuse(
      blame,
      name,
      'exponent-limit',
      `with the imposed relations ${error.message}`,
      'smaller exponents only',
    );
  }
}

/** Names that are divided by must have one-term values. */
function refuseDivisors(p: Poly, eliminated: ReadonlyMap<string, Poly>, blame: Blame): void {
  const { low } = exponentRange(p.ring, p.keys);
  for (const [name, value] of eliminated) {
    const g = p.ring.position.get(name);
    if (g === undefined || low[g]! >= 0 || value.size === 1) continue;
    const message = isZero(value)
      ? `a division by ${name}, which is zero by the imposed relations`
      : `a division by ${name}, which the imposed relations make a sum`;
    throw refuse(blame, name, 'divisor', message, 'a divisor is a number or a product of constants that are not zero');
  }
}

/** The number of n-fold products of k things, order aside: terms of (x1 + … + xk)^n. */
function multisets(k: number, n: number): number {
  let count = 1;
  for (let i = 1; i <= n; i++) count = (count * (k + i - 1)) / i;
  return count;
}

/** How much the largest numerator or the denominator exceeds 1, in bits. */
function heightInBits({ numerators, denominator }: Poly): number {
  let largest = denominator;
  for (const c of numerators) {
    const size = BigInt(c) < 0n ? -BigInt(c) : BigInt(c);
    if (size > largest) largest = size;
  }
  return largest.toString(2).length - 1;
}

const MAX_BITS = MAX_DIGITS * Math.log2(10);

/** Refuses before the work what would have too many terms or digits at its end. */
function refuseGrowth(p: Poly, eliminated: ReadonlyMap<string, Poly>, blame: Blame): void {
  const images = p.ring.generators.map((g) => eliminated.get(g.name));
  const bits = images.map((image) => (image ? heightInBits(image) : 0));
  const most = Math.max(MAX_TERMS, p.size);
  let terms = 0;
  for (const { monomial, coefficient } of collect(p, (g) => images[g] !== undefined)) {
    const name = monomial[0] && p.ring.generators[monomial[0][0]]!.name;
    terms += monomial.reduce((n, [g, e]) => n * multisets(images[g]!.size, Math.max(e, 0)), coefficient.size);
    if (terms > most)
      throw refuse(
        blame,
        name,
        'terms-limit',
        `more than ${MAX_TERMS} terms when the imposed relations are put in`,
        'impose shorter sums, or name them by a constant',
      );
    if (monomial.reduce((n, [g, e]) => n + Math.abs(e) * bits[g]!, 0) > MAX_BITS)
      throw refuse(
        blame,
        name,
        'digits-limit',
        `a number of more than ${MAX_DIGITS} digits arises from the imposed relations`,
        'use a symbol',
      );
  }
}

/**
 * @param constants names of constants in the order of their declaration.
 * @throws InputError `contradiction` when a relation reduces to a non-zero number, alone or as a linear combination with
 * conditions, or sets a density that changes with time equal to anything but zero; `unknown-symbol` for a parameter that
 * the geometry lacks; as `applyImposed`.
 */
export function solveRelations(ring: Ring, relations: readonly Relation[], constants: readonly string[]): Imposed {
  let eliminated = new Map<string, Poly>();
  const origins = new Map<string, Origin>();
  let conditions: { text: string; value: Poly; origin: Origin }[] = [];
  const contradiction = (origin: Origin, message: string, hint: string): InputError =>
    refuse(origin, undefined, 'contradiction', message, hint);
  const refuseNumber = (rest: Poly, origin: Origin, detail: string): void => {
    if (isNumber(rest))
      throw contradiction(
        origin,
        `the relation contradicts what is already imposed ${detail}`.trim(),
        'drop one of the relations',
      );
  };
  const refuseImpossible = (origin: Origin): void => {
    const values = conditions.map((c) => c.value);
    if (dependsOn(constant(ring, 1), values))
      throw contradiction(
        origin,
        'the relation contradicts the conditions that are already imposed',
        'drop one of the relations',
      );
  };
  const eliminate = (name: string, value: Poly, origin: Origin): void => {
    const one = new Map([[name, value]]);
    eliminated = new Map([...eliminated].map(([n, p]) => [n, applyImposed(p, one, origin)]));
    eliminated.set(name, value);
    origins.set(name, origin);
    conditions = conditions.flatMap((c) => {
      const rest = applyImposed(c.value, one, origin);
      if (isZero(rest)) return [];
      refuseNumber(rest, origin, `together with "${c.text}"`);
      return [{ ...c, value: rest }];
    });
    refuseImpossible(origin);
  };
  for (const { left, right, subject, text, origin } of relations) {
    const missing = [...left, ...right].flatMap((t) => t.powers).find(([name]) => !ring.position.has(name));
    if (missing) {
      const message = `the geometry of this theory has no ${missing[0]}`;
      throw refuse(origin, undefined, 'unknown-symbol', message, 'leave the relation out, or choose another geometry');
    }
    const value = applyImposed(subtract(polyOfScalar(ring, left), polyOfScalar(ring, right)), eliminated, origin);
    if (isZero(value)) continue;
    refuseNumber(value, origin, '');
    const changing = ring.generators.find((g) => g.kind === 'source' && involves(value, g.name));
    if (changing && value.size > 1)
      throw contradiction(
        origin,
        `${changing.name} changes with time and cannot be tied to constants`,
        `only ${changing.name} = 0 can be imposed; where 3w is an integer the symbol is the density at a = 1`,
      );
    const alone = subject !== undefined && !eliminated.has(subject) ? aloneOnLeft(value, subject) : undefined;
    if (alone) {
      eliminate(subject!, alone, origin);
      continue;
    }
    const name = constants.findLast((c) => !eliminated.has(c) && solvable(value, c) !== undefined);
    if (name !== undefined) {
      eliminate(name, solvable(value, name)!, origin);
      continue;
    }
    conditions.push({ text, value, origin });
    refuseImpossible(origin);
  }
  return { eliminated, conditions: conditions.map(({ text, value }) => ({ text, value })), origins };
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
