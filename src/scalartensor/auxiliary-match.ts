/**
 * Matching of rules for auxiliary fields: what their letters are bound to in a form, and whether they apply. Rules are tested as
 * identities in their letters, bindings by putting the form together again.
 */
import { coefficientOf } from '../algebra/collect.js';
import { equalFraction, type Fraction, fraction, partialOfFraction } from '../algebra/fraction.js';
import { generator, type Poly } from '../algebra/poly.js';
import type { Ring } from '../algebra/ring.js';
import { LETTER_PREDICATES } from './auxiliary-conditions.js';
import { type AuxiliaryRule, FIELD, LETTERS, letterName, PATTERN_RING, RATE } from './auxiliary-rule.js';
import {
  insert,
  insertInto,
  isZeroFraction,
  occurs,
  rateAlong,
  ringOf,
  termsIn,
  type VectorForm,
  zeroFraction,
} from './vector-form.js';

/** Letters as they are bound, or why the pattern does not match. */
export type Binding = ReadonlyMap<string, Fraction> | string;

/** How the field enters: the coefficient of each monomial of the pattern. */
function bind(rule: AuxiliaryRule, form: VectorForm, field: string): Binding {
  const rate = rateAlong(field);
  const ring = ringOf(form.value);
  // Integrating by parts, what stands in front of the rate may contain the field.
  const names = rule.does === 'move-rate' ? [rate] : [rate, field];
  const terms = termsIn(form.value, names);
  if (!terms) return 'the field is in a denominator';
  const pattern = new Map<string, string>();
  for (const { powers, coefficient } of termsIn(fraction(rule.enters!), [RATE, FIELD])!)
    pattern.set(
      `${powers.get(FIELD) ?? 0},${powers.get(RATE) ?? 0}`,
      LETTERS.map(letterName).find((l) => occurs(coefficient, l))!,
    );
  const bound = new Map([...pattern.values()].map((letter) => [letter, zeroFraction(ring)]));
  for (const { powers, coefficient } of terms) {
    const letter = pattern.get(`${powers.get(field) ?? 0},${powers.get(rate) ?? 0}`);
    if (letter === undefined)
      return powers.has(rate) ? 'a velocity of the field enters otherwise' : 'the field enters to another power';
    bound.set(letter, coefficient);
  }
  return bound;
}

/** The first condition that is not met, as a reason. */
function unmet(
  rule: AuxiliaryRule,
  bound: ReadonlyMap<string, Fraction>,
  form: VectorForm,
  field: string,
): string | undefined {
  for (const { predicate, letter } of rule.when) {
    const answer = LETTER_PREDICATES.get(predicate)!.ask(bound.get(letter)!, field, form.scalars);
    if (answer !== 'yes') return `${predicate} ${letter}: ${answer}`;
  }
  return undefined;
}

/** A template with letters replaced; the field may be among them. */
export const filled = (template: Poly, images: ReadonlyMap<string, Fraction>, ring: Ring): Fraction =>
  insertInto(template, images, ring);

/** Pairs of terms that inserting a solution may multiply. */
const MAX_PAIRS = 100_000;

/** How many pairs of terms inserting a solution multiplies, roughly; 0 for rules that insert none. */
function pairsIn(rule: AuxiliaryRule, form: VectorForm, field: string): number {
  if (rule.does !== 'replace' && rule.does !== 'branches') return 0;
  const all = form.value.numerator.size;
  const own = all - coefficientOf(form.value.numerator, field, 0).size;
  return own * all;
}

export function prepared(rule: AuxiliaryRule, form: VectorForm, field: string): Binding {
  if (!occurs(form.value, field) && !occurs(form.value, rateAlong(field))) return 'the field does not occur';
  if ((form.roots?.length ?? 0) > 0) return 'a root of another field is left';
  const bound = bind(rule, form, field);
  if (typeof bound === 'string') return bound;
  const reason = unmet(rule, bound, form, field);
  if (reason !== undefined) return reason;
  const pairs = pairsIn(rule, form, field);
  return pairs <= MAX_PAIRS ? bound : `the result would be too long: ${pairs} pairs of terms to multiply`;
}

/** Rules whose templates were tested. */
const sound = new Set<AuxiliaryRule>();

/**
 * The solution makes the derivative zero and the Lagrangian what the rule says: as an identity in the letters, tested once for a
 * rule, which holds for everything that is bound to them.
 */
export function verifyTemplate(rule: AuxiliaryRule): void {
  if (sound.has(rule)) return;
  const enters = fraction(rule.enters!);
  const letters = new Map(LETTERS.map((l) => [letterName(l), fraction(generator(PATTERN_RING, letterName(l)))]));
  const template = (key: string): Fraction => insertInto(rule.results.get(key)!, letters, PATTERN_RING);
  const images = new Map([[FIELD, template('field')]]);
  if (!isZeroFraction(insert(partialOfFraction(enters, FIELD), images)))
    throw new Error(`the solution of the rule ${rule.id} does not solve the equation of the field`);
  if (!equalFraction(insert(enters, images), template('becomes')))
    throw new Error(`the Lagrangian of the rule ${rule.id} is not the one with its solution`);
  sound.add(rule);
}

/** What is bound to the letters makes up the Lagrangian. */
export function verifyBinding(
  rule: AuxiliaryRule,
  form: VectorForm,
  field: string,
  bound: ReadonlyMap<string, Fraction>,
): void {
  const ring = ringOf(form.value);
  const own = new Map([
    [FIELD, fraction(generator(ring, field))],
    [RATE, fraction(generator(ring, rateAlong(field)))],
  ]);
  if (!equalFraction(filled(rule.enters!, new Map([...own, ...bound]), ring), form.value))
    throw new Error(`the rule ${rule.id} does not match what it was applied to`);
}
