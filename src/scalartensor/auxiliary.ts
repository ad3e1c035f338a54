/**
 * Integrating fields out of a vector form by the rules of rules/auxiliary/fields.yaml, in their order. Every application is
 * verified by substitution before it counts; branches are followed one by one; what cannot be integrated out stays, with the
 * reason of every rule that looked at it.
 */
import { coefficientOf, moveTo } from '../algebra/collect.js';
import {
  divideFraction,
  equalFraction,
  type Fraction,
  fraction,
  multiplyFraction,
  negateFraction,
  partialOfFraction,
} from '../algebra/fraction.js';
import { generator, type Poly } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import type { Ring } from '../algebra/ring.js';
import { LETTER_PREDICATES } from './auxiliary-conditions.js';
import { type AuxiliaryRule, FIELD, LETTERS, letterName, PATTERN_RING, RATE } from './auxiliary-rule.js';
import { movingNames } from './form-rules.js';
import { reduced, rootName, rootsOf, type Splitter, type StationaryRoot } from './stationary-roots.js';
import {
  asPoly,
  EXPANSION,
  insert,
  insertInto,
  integralOver,
  isZeroFraction,
  occurs,
  rateAlong,
  ringOf,
  SPATIAL_CURVATURE,
  scaleFraction,
  subtractFraction,
  sumFractions,
  termsIn,
  type VectorForm,
  zeroFraction,
} from './vector-form.js';

/** What an application gives up, with the expression that must not vanish. */
export interface StepLoss {
  readonly what: string;
  readonly where: Fraction | undefined;
}

/** One application of a rule to a field. */
export interface EliminationStep {
  readonly rule: string;
  readonly field: string;
  /** The form before and after. */
  readonly before: VectorForm;
  readonly after: VectorForm;
  /** The field, or another one that a constraint determines, in the ring of `after`. */
  readonly solved: { readonly field: string; readonly value: Fraction } | undefined;
  /** zero: an expression that vanishes. conserved: b in ∇_μ(b n^μ) = 0. */
  readonly constraint: { readonly kind: 'zero' | 'conserved'; readonly value: Fraction } | undefined;
  /** Where a root of an equation was inserted. */
  readonly root: StationaryRoot | undefined;
  readonly loses: readonly StepLoss[];
}

/** Why no rule integrates a field out. */
export interface Refusal {
  readonly field: string;
  readonly reasons: readonly { readonly rule: string; readonly reason: string }[];
}

/** One way through the rules. */
export interface EliminationBranch {
  readonly form: VectorForm;
  readonly steps: readonly EliminationStep[];
  /** Fields that were to be integrated out and stay. */
  readonly refused: readonly Refusal[];
}

/** Letters as they are bound, or why the pattern does not match. */
type Binding = ReadonlyMap<string, Fraction> | string;

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
const filled = (template: Poly, images: ReadonlyMap<string, Fraction>, ring: Ring): Fraction =>
  insertInto(template, images, ring);

const without = (form: VectorForm, field: string): readonly string[] => form.scalars.filter((q) => q !== field);

function step(
  rule: AuxiliaryRule,
  field: string,
  before: VectorForm,
  after: VectorForm,
  bound: ReadonlyMap<string, Fraction>,
  more: Partial<EliminationStep> = {},
): EliminationStep {
  const loses = rule.loses.map(({ what, where }) => ({
    what,
    where: where === undefined ? undefined : bound.get(where),
  }));
  return {
    rule: rule.id,
    field,
    before,
    after,
    solved: undefined,
    constraint: undefined,
    root: undefined,
    loses,
    ...more,
  };
}

/** What a rule makes of a form; a reason when it does not apply. One step for each branch. */
export async function applyRule(
  rule: AuxiliaryRule,
  form: VectorForm,
  field: string,
  split?: Splitter,
): Promise<readonly EliminationStep[] | string> {
  if (rule.does !== 'branches') return applyDirectly(rule, form, field);
  const ready = prepared(rule, form, field);
  return typeof ready === 'string' ? ready : byRoots(rule, form, field, ready, split);
}

/** Pairs of terms that inserting a solution may multiply. */
const MAX_PAIRS = 100_000;

/** How many pairs of terms inserting a solution multiplies, roughly; 0 for rules that insert none. */
function pairsIn(rule: AuxiliaryRule, form: VectorForm, field: string): number {
  if (rule.does !== 'replace' && rule.does !== 'branches') return 0;
  const all = form.value.numerator.size;
  const own = all - coefficientOf(form.value.numerator, field, 0).size;
  return own * all;
}

function prepared(rule: AuxiliaryRule, form: VectorForm, field: string): Binding {
  if (!occurs(form.value, field) && !occurs(form.value, rateAlong(field))) return 'the field does not occur';
  if ((form.roots?.length ?? 0) > 0) return 'a root of another field is left';
  const bound = bind(rule, form, field);
  if (typeof bound === 'string') return bound;
  const reason = unmet(rule, bound, form, field);
  if (reason !== undefined) return reason;
  const pairs = pairsIn(rule, form, field);
  return pairs <= MAX_PAIRS ? bound : `the result would be too long: ${pairs} pairs of terms to multiply`;
}

/** As `applyRule` for the rules that have no branches. */
export function applyDirectly(
  rule: AuxiliaryRule,
  form: VectorForm,
  field: string,
): readonly EliminationStep[] | string {
  const bound = prepared(rule, form, field);
  if (typeof bound === 'string') return bound;
  const ring = ringOf(form.value);
  const result = (key: string): Fraction => filled(rule.results.get(key)!, bound, ring);
  switch (rule.does) {
    case 'replace': {
      verifyTemplate(rule);
      verifyBinding(rule, form, field, bound);
      const [value, solution] = [result('becomes'), result('field')];
      const after = { ...form, value, scalars: without(form, field) };
      return [step(rule, field, form, after, bound, { solved: { field, value: solution } })];
    }
    case 'move-rate':
      return [step(rule, field, form, movedRate(form, field, bound.get(letterName('b'))!), bound)];
    case 'conserve': {
      const after = { ...form, value: result('becomes'), scalars: without(form, field) };
      return [step(rule, field, form, after, bound, { constraint: { kind: 'conserved', value: result('charge') } })];
    }
    case 'constrain':
      return [constrained(rule, field, form, result('constraint'), result('becomes'), bound)];
    default:
      return 'the rule has branches';
  }
}

/** Rules whose templates were tested. */
const sound = new Set<AuxiliaryRule>();

/**
 * The solution makes the derivative zero and the Lagrangian what the rule says: as an identity in the letters, tested once for a
 * rule, which holds for everything that is bound to them.
 */
function verifyTemplate(rule: AuxiliaryRule): void {
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
function verifyBinding(
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

/** b n·∂q = −θ Φ − Σ Φ_r n·∂r − Φ_³R n·∂³R up to a divergence, with Φ = ∫ b dq. */
function movedRate(form: VectorForm, field: string, b: Fraction): VectorForm {
  const ring = ringOf(form.value);
  const g = (name: string): Fraction => fraction(generator(ring, name));
  const potential = integralOver(b, field)!;
  const moved = multiplyFraction(b, g(rateAlong(field)));
  const others = without(form, field).map((r) => multiplyFraction(partialOfFraction(potential, r), g(rateAlong(r))));
  const dilution = multiplyFraction(g(EXPANSION), g(SPATIAL_CURVATURE));
  const curvature = scaleFraction(
    multiplyFraction(partialOfFraction(potential, SPATIAL_CURVATURE), dilution),
    rational(2, 3),
  );
  const terms = [form.value, curvature];
  let value = sumFractions(ring, terms);
  for (const term of [moved, multiplyFraction(potential, g(EXPANSION)), ...others])
    value = subtractFraction(value, term);
  return { ...form, value };
}

/** Solves a constraint for the first other field in which it is linear and whose rate does not matter. */
function constrained(
  rule: AuxiliaryRule,
  field: string,
  form: VectorForm,
  constraint: Fraction,
  rest: Fraction,
  bound: ReadonlyMap<string, Fraction>,
): EliminationStep {
  const scalars = without(form, field);
  const moving = movingNames(form.scalars);
  for (const other of scalars) {
    if (occurs(constraint, rateAlong(other))) continue;
    const terms = termsIn(constraint, [other]);
    if (!terms || terms.length > 2 || terms.some((t) => ![0, 1].includes(t.powers.get(other) ?? 0))) continue;
    const slope = terms.find((t) => t.powers.size === 1)?.coefficient;
    if (!slope) continue;
    const free = terms.find((t) => t.powers.size === 0)?.coefficient ?? zeroFraction(ringOf(rest));
    const value = negateFraction(divideFraction(free, slope));
    // The rate of a field that is replaced by something with velocities would be a second derivative.
    if (occurs(rest, rateAlong(other))) continue;
    const images = new Map([[other, value]]);
    if (!isZeroFraction(insert(constraint, images))) throw new Error(`${other} does not solve the constraint`);
    const after = { ...form, value: insert(rest, images), scalars: scalars.filter((q) => q !== other) };
    const made = step(rule, field, form, after, bound, { solved: { field: other, value } });
    const isPlain = moving.every((name) => !occurs(slope, name)) && scalars.every((q) => !occurs(slope, q));
    const what = `the constraint does not determine ${other}`;
    return isPlain ? made : { ...made, loses: [...made.loses, { what, where: slope }] };
  }
  const after = { ...form, value: rest, scalars };
  return step(rule, field, form, after, bound, { constraint: { kind: 'zero', value: constraint } });
}

/** One step for each root of the stationary equation; two that differ by the sign of a root that drops out are one. */
async function byRoots(
  rule: AuxiliaryRule,
  form: VectorForm,
  field: string,
  bound: ReadonlyMap<string, Fraction>,
  split?: Splitter,
): Promise<readonly EliminationStep[] | string> {
  const ring = ringOf(form.value);
  const images = new Map([...bound, [FIELD, fraction(generator(ring, field))] as const]);
  const stationary = filled(rule.results.get('stationary')!, images, ring);
  if (!equalFraction(stationary, partialOfFraction(form.value, field)))
    throw new Error(`the stationary equation of ${rule.id} is not the derivative by ${field}`);
  const terms = termsIn(fraction(stationary.numerator), [field])!;
  const degree = Math.max(0, ...terms.map((t) => t.powers.get(field) ?? 0));
  if (degree === 0) return 'the field has no equation of its own';
  const equation = Array.from({ length: degree + 1 }, (_, i) =>
    terms.filter((t) => (t.powers.get(field) ?? 0) === i).map((t) => asPoly(t.coefficient)!),
  ).map(([c]) => c ?? zeroFraction(ring).numerator);
  const roots = await rootsOf(equation, rootName(1), split);
  const steps: EliminationStep[] = [];
  for (const root of roots) {
    const lifted = liftedTo(form.value, root.ring);
    const raw = insert(lifted, new Map([[field, root.value]]), root.ring);
    const value = root.root ? reduced(raw, root.root) : raw;
    const isFree = root.root === undefined || !occurs(value, root.root.name);
    if (isFree && steps.some((s) => equalFraction(liftedTo(s.after.value, ring), liftedTo(value, ring)))) continue;
    const after: VectorForm = {
      ...form,
      value: isFree ? liftedTo(value, ring) : value,
      scalars: without(form, field),
      ...(isFree ? {} : { roots: [root.root!] }),
    };
    steps.push(step(rule, field, form, after, bound, { solved: { field, value: root.value }, root }));
  }
  return steps;
}

/** The same fraction in a ring with or without further generators. */
function liftedTo(f: Fraction, ring: Ring): Fraction {
  return fraction(
    moveTo(f.numerator, ring),
    f.denominator.map(({ base, power: n }) => ({ base: moveTo(base, ring), power: n })),
  );
}

/** Rules applied to one field until it is gone or none applies. */
async function eliminateField(
  start: EliminationBranch,
  field: string,
  rules: readonly AuxiliaryRule[],
  split: Splitter | undefined,
): Promise<EliminationBranch[]> {
  const reasons: { rule: string; reason: string }[] = [];
  for (const rule of rules) {
    const outcome = await applyRule(rule, start.form, field, split);
    if (typeof outcome === 'string') {
      reasons.push({ rule: rule.id, reason: outcome });
      continue;
    }
    const next = outcome.map((s) => ({ ...start, form: s.after, steps: [...start.steps, s] }));
    const done: EliminationBranch[] = [];
    for (const branch of next)
      done.push(
        ...(branch.form.scalars.includes(field) ? await eliminateField(branch, field, rules, split) : [branch]),
      );
    return done;
  }
  return [{ ...start, refused: [...start.refused, { field, reasons }] }];
}

/** Whether a field is in a form. */
const isThere = ({ value }: VectorForm, field: string): boolean =>
  occurs(value, field) || occurs(value, rateAlong(field));

/**
 * Integrates fields out in the given order.
 * @param split proposes factors of cubic equations.
 */
export async function integrateOut(
  form: VectorForm,
  fields: readonly string[],
  rules: readonly AuxiliaryRule[],
  split?: Splitter,
): Promise<EliminationBranch[]> {
  let branches: EliminationBranch[] = [{ form, steps: [], refused: [] }];
  for (const field of fields) {
    const next: EliminationBranch[] = [];
    for (const branch of branches) {
      if (!branch.form.scalars.includes(field)) next.push(branch);
      else if (!isThere(branch.form, field))
        next.push({ ...branch, form: { ...branch.form, scalars: without(branch.form, field) } });
      else next.push(...(await eliminateField(branch, field, rules, split)));
    }
    branches = next;
  }
  return branches;
}

/** As `integrateOut` by the rules without branches alone; undefined when one of the fields stays. */
export function integrateDirectly(
  form: VectorForm,
  fields: readonly string[],
  rules: readonly AuxiliaryRule[],
): EliminationBranch | undefined {
  let branch: EliminationBranch = { form, steps: [], refused: [] };
  const direct = rules.filter((r) => r.does !== 'branches');
  for (const field of fields)
    while (branch.form.scalars.includes(field)) {
      if (!isThere(branch.form, field)) {
        branch = { ...branch, form: { ...branch.form, scalars: without(branch.form, field) } };
        break;
      }
      const applied = direct.map((r) => applyDirectly(r, branch.form, field)).find((o) => typeof o !== 'string');
      const [made] = (applied ?? []) as readonly EliminationStep[];
      if (!made || made.constraint) return undefined;
      branch = { ...branch, form: made.after, steps: [...branch.steps, made] };
    }
  return branch;
}
