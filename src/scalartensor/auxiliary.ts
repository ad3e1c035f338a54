/**
 * Integrating fields out of a vector form by the rules of rules/auxiliary/fields.yaml, in their order. Every application is
 * verified by substitution before it counts; branches are followed one by one; what cannot be integrated out stays, with the
 * reason of every rule that looked at it.
 */
import { moveTo } from '../algebra/collect.js';
import {
  divideFraction,
  equalFraction,
  type Fraction,
  fraction,
  multiplyFraction,
  negateFraction,
  partialOfFraction,
} from '../algebra/fraction.js';
import { generator } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import type { Ring } from '../algebra/ring.js';
import { filled, prepared, verifyBinding, verifyTemplate } from './auxiliary-match.js';
import { type AuxiliaryRule, FIELD, letterName } from './auxiliary-rule.js';
import { movingNames } from './form-rules.js';
import { reduced, rootName, rootsOf, type Splitter, type StationaryRoot } from './stationary-roots.js';
import {
  asPoly,
  EXPANSION,
  insert,
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
  // What a constraint multiplies is gone from the form, so the equations of the other fields are not those of the form alone.
  const bound = start.steps.find((s) => s.constraint);
  if (bound) {
    const reason = 'a constraint is left';
    return [{ ...start, refused: [...start.refused, { field, reasons: [{ rule: bound.rule, reason }] }] }];
  }
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
