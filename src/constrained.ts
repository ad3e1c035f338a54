/**
 * What constraints leave of a theory: their solutions as branches, and on each branch the Lagrangian in the fields that
 * are left, its equations, and the equations that fix the multipliers. Second route: the equations of a branch must follow
 * from those of the theory with its multipliers by the chain rule.
 */
import { eulerLagrange, partial, timeDerivative } from './algebra/calculus.js';
import { involves, moveTo, substitute, symbolsOf } from './algebra/collect.js';
import { add, equals, generator, isZero, multiply, type Poly, subtract, sum, zero } from './algebra/poly.js';
import { jetName, jetsOf, makeRing, type Ring } from './algebra/ring.js';
import { ANY, type Knowledge, NEGATIVE, POSITIVE, signOf, VANISHING } from './algebra/signs.js';
import type { BiScalarForm, Constrained, ConstrainedBranch, ScalarTensorForm } from './derivation.js';
import { type Branch, branchesOf, branchName, type Condition, onBranch } from './mechanics/branches.js';
import { friedmannForm } from './mechanics/friedmann.js';
import { reduceRoots } from './mechanics/substitution.js';
import { dropTotalDerivatives } from './mechanics/total-derivatives.js';
import type { Multiplier } from './multipliers.js';
import { biScalarForm, pairsOf } from './scalartensor/biscalar.js';
import { PLANCK_MASS, type Setting } from './setting.js';

/** Solutions bring derivatives of their own, and a Lagrangian with accelerations has equations of the fourth order. */
const BRANCH_JETS = 6;

type Checker = (name: string, detail: string, holds: boolean) => void;

/** @param equations Euler–Lagrange expressions of the whole Lagrangian, relations of parameters not yet put in. */
export function constrainedTheory(
  setting: Setting,
  equations: ReadonlyMap<string, Poly>,
  knowledge: Knowledge | undefined,
  check: Checker,
): { readonly constrained: Constrained; readonly scalarTensor: ScalarTensorForm } {
  const { geometry, theory, constrained: tensors, fix } = setting;
  const multipliers = tensors.flatMap((t) => t.multipliers);
  const ring = branchRing(setting);
  const solvable = geometry.fields.map((f) => f.name).filter((q) => q !== geometry.lapse && !geometry.rates.has(q));
  const { branches: all, complete } = branchesOf(
    multipliers.map((m) => moveTo(fix(moveTo(m.value, setting.ring)), ring)),
    {
      unknowns: solvable,
      positive: [geometry.lapse, ...geometry.rates.keys()],
      parameters: geometry.parameters.map((p) => p.name),
      scales: theory.symbols.filter((s) => s.role === 'scale').map((s) => s.name),
    },
  );
  const judged = all.map((branch) => judge(branch, knowledge));
  const excluded = judged.flatMap(({ branch, used, isPossible }) =>
    isPossible ? [] : [{ name: branchName(branch), used }],
  );
  const found = judged
    .filter((j) => j.isPossible)
    .map(({ branch, used }) => constrainedBranch(setting, multipliers, equations, branch, used, check));
  if (found.length > 0)
    check('branches of the constraints', 'every solution was put into the constraints that it solves', true);
  return {
    constrained: { tensors, branches: found, complete, excluded },
    scalarTensor: complete
      ? commonForm(setting, found, knowledge)
      : none('the constraints have too many branches to follow'),
  };
}

/** Conditions of a branch under what is assumed: those that hold are dropped, one that cannot hold rules the branch out. */
function judge(
  branch: Branch,
  knowledge: Knowledge | undefined,
): { readonly branch: Branch; readonly used: readonly string[]; readonly isPossible: boolean } {
  if (!knowledge) return { branch, used: [], isPossible: true };
  const used: string[] = [];
  const open: Condition[] = [];
  for (const condition of branch.conditions) {
    const { value, relation } = condition;
    const known = symbolsOf(value).every((name) => knowledge.ring.position.has(name));
    const verdict = known ? signOf(moveTo(value, knowledge.ring), knowledge) : { signs: ANY, used: [] };
    const allowed = relation === '>' ? POSITIVE : relation === '=' ? VANISHING : POSITIVE | NEGATIVE;
    if ((verdict.signs & allowed) === 0) return { branch, used: verdict.used, isPossible: false };
    if ((verdict.signs & ~allowed) === 0 && relation !== '=') used.push(...verdict.used);
    else open.push(condition);
  }
  return { branch: { ...branch, conditions: open }, used: [...new Set(used)], isPossible: true };
}

function branchRing({ ring, fields }: Setting): Ring {
  const others = ring.generators.filter((g) => g.kind !== 'jet');
  return makeRing([...fields.flatMap((f) => jetsOf(f.name, BRANCH_JETS)), ...others]);
}

function constrainedBranch(
  setting: Setting,
  multipliers: readonly Multiplier[],
  equations: ReadonlyMap<string, Poly>,
  branch: Branch,
  used: readonly string[],
  check: Checker,
): ConstrainedBranch {
  const { geometry, fix, fields } = setting;
  const name = branchName(branch);
  const put = (p: Poly): Poly => onBranch(fix(p), branch);
  const kept = multipliers.filter((_, i) => branch.remaining.includes(i)).map((m) => m.name);
  const gone = multipliers.map((m) => m.name).filter((n) => !kept.includes(n));
  const left = fields.map((f) => f.name).filter((q) => !branch.solution.has(q) && !gone.includes(q));
  const solved = [...branch.solution.keys()];

  const lagrangian = put(setting.lagrangian);
  const ownEquations = new Map(left.map((q) => [q, reduceRoots(eulerLagrange(lagrangian, q), branch.roots)] as const));
  const ofSolved = new Map(solved.map((q) => [q, put(equations.get(q)!)] as const));
  check(
    'equations of a branch',
    `on the branch ${name} they follow from those of the fields and multipliers by the chain rule`,
    !gone.some((n) => involves(lagrangian, n)) &&
      left.every((q) => isZero(chainRule(branch, q, put(equations.get(q)!), ofSolved, ownEquations.get(q)!))),
  );

  const gravity = put(setting.gravity);
  const withSpin = put(add(setting.gravity, setting.spin));
  const movable = left.filter((q) => q !== geometry.lapse);
  const { reduced } = dropTotalDerivatives(gravity, movable, geometry.lapse);
  const isNew = ([, e]: readonly [string, Poly]): boolean => !isZero(e) && !gone.some((n) => mentions(e, n));
  const fixing = [...ofSolved].filter(([, e]) => gone.some((n) => mentions(e, n)));
  return {
    ...branch,
    name,
    lagrangian,
    reduced,
    equations: ownEquations,
    multiplierEquations: new Map(fixing),
    undetermined: unmatched(
      fixing.map(([, e]) => gone.filter((n) => mentions(e, n))),
      gone,
    ),
    further: new Map([...ofSolved].filter(isNew)),
    friedmann: branchFriedmann(setting, branch, withSpin),
    scalarTensor: branchForm(setting, branch, kept, movable, gravity, reduced),
    used,
  };
}

/** Whether a field occurs with any of its derivatives. */
const mentions = (p: Poly, field: string): boolean =>
  Array.from({ length: BRANCH_JETS + 1 }, (_, n) => jetName(field, n)).some((jet) => involves(p, jet));

/** E_q + Σ_f Σ_n (−d/dt)^n (∂f/∂D(q,n) E_f) − (the equation of q on the branch): zero for f the solution of the constraints. */
function chainRule(
  { solution, roots }: Branch,
  q: string,
  direct: Poly,
  ofSolved: ReadonlyMap<string, Poly>,
  expected: Poly,
): Poly {
  const { ring } = direct;
  let total = direct;
  for (const [f, value] of solution)
    for (let n = 0; n < BRANCH_JETS; n++) {
      const slope = partial(value, jetName(q, n));
      if (isZero(slope)) continue;
      let moved = multiply(slope, ofSolved.get(f)!);
      for (let i = 0; i < n; i++) moved = timeDerivative(moved);
      total = n % 2 === 0 ? add(total, moved) : subtract(total, moved);
    }
  return reduceRoots(sum(ring, [total, subtract(zero(ring), expected)]), roots);
}

/** Multipliers that are left when each equation takes one of those that it contains: a largest matching. */
function unmatched(wanted: readonly (readonly string[])[], all: readonly string[]): readonly string[] {
  const taker = new Map<string, number>();
  const place = (equation: number, tried: Set<string>): boolean =>
    wanted[equation]!.some((name) => {
      if (tried.has(name)) return false;
      tried.add(name);
      const holder = taker.get(name);
      if (holder !== undefined && !place(holder, tried)) return false;
      taker.set(name, equation);
      return true;
    });
  wanted.forEach((_, equation) => {
    place(equation, new Set());
  });
  return all.filter((name) => !taker.has(name));
}

function branchFriedmann(setting: Setting, branch: Branch, gravity: Poly): ConstrainedBranch['friedmann'] {
  const { isotropic, lapse } = setting.geometry;
  if (!isotropic) return undefined;
  const planckMassSquared = onBranch(setting.couple(generator(setting.ring, PLANCK_MASS, 2)), branch);
  const roles = { lapse, scale: isotropic.scale, curvature: isotropic.curvature, planckMassSquared };
  const equations = new Map([lapse, isotropic.scale].map((q) => [q, eulerLagrange(gravity, q)] as const));
  const { rhoT, pT } = friedmannForm(equations, roles);
  // The definition names k itself, which a relation may have fixed.
  const k = isotropic.curvature;
  const fixed = new Map([[k, moveTo(setting.fix(generator(setting.ring, k)), branch.ring)]]);
  const put = (p: Poly): Poly => onBranch(substitute(p, fixed), branch);
  return { rhoT: put(rhoT), pT: put(pT) };
}

const none = (reason: string): ScalarTensorForm => ({ form: 'none', reason, offending: undefined });

/** The form of a branch; scalars that the constraints solve for are left with zero coefficients. */
function branchForm(
  { geometry, fix, ring: narrow }: Setting,
  branch: Branch,
  kept: readonly string[],
  movable: readonly string[],
  gravity: Poly,
  reduced: Poly,
): ScalarTensorForm {
  const { isotropic, lapse } = geometry;
  if (!isotropic)
    return none(`a metric analogue is defined on an isotropic background; the geometry ${geometry.id} is none`);
  if (kept.length > 0)
    return none(`the constraints of ${kept.join(', ')} are not solved, so that multipliers are left`);
  const { ring } = branch;
  const scalars = isotropic.scalars.filter((q) => movable.includes(q));
  const equations = new Map([lapse, ...movable].map((q) => [q, eulerLagrange(gravity, q)] as const));
  const outcome = biScalarForm(
    { reduced, equations },
    {
      lapse,
      ...isotropic,
      scalars,
      metricCurvature: moveTo(fix(moveTo(geometry.metricCurvature, narrow)), ring),
      volume: moveTo(geometry.volume, ring),
    },
  );
  if (!outcome.found) return { form: 'none', reason: outcome.reason, offending: outcome.offending };
  const { g4, kinetic, current, potential } = outcome.functions;
  const obstruction = onBranch(outcome.obstruction, branch);
  const nothing = zero(ring);
  return {
    form: 'bi-scalar',
    validFor: isZero(obstruction) ? 'every k' : 'k = 0',
    g4,
    kinetic: new Map(pairsOf(isotropic.scalars).map(([a, b]) => [`${a},${b}`, kinetic.get(`${a},${b}`) ?? nothing])),
    current: new Map(isotropic.scalars.map((q) => [q, current.get(q) ?? nothing])),
    potential,
    obstruction,
  };
}

/** The form that all branches share, when together they cover every value of k. */
function commonForm(
  { ring, geometry }: Setting,
  branches: readonly ConstrainedBranch[],
  knowledge: Knowledge | undefined,
): ScalarTensorForm {
  const [first] = branches;
  if (!first) return none('the constraints have no solution');
  const forms = branches.map((b) => b.scalarTensor);
  const without = forms.find((f) => f.form === 'none');
  if (without) return branches.length === 1 ? inRing(without, ring) : none('not every branch has a form of this class');
  const shared = (forms as BiScalarForm[]).map((f) => inRing(f, ring));
  const form = shared[0]!;
  if (shared.some((f) => f.form === 'none' || form.form === 'none' || !sameFunctions(f, form)))
    return none('the branches of the constraints have different forms');
  if (form.form === 'none') return form;
  const everywhere = shared.every((f) => f.form !== 'none' && f.validFor === 'every k');
  return everywhere && coversCurvature(branches, geometry.isotropic!.curvature, knowledge)
    ? form
    : branches.length === 1
      ? form
      : none('the forms of the branches do not join to one');
}

/** Moved to the ring of the theory, which has no roots; those that contain one stay with their branch. */
function inRing(form: ScalarTensorForm, ring: Ring): ScalarTensorForm {
  const move = (p: Poly): Poly => moveTo(p, ring);
  try {
    if (form.form === 'none') return { ...form, offending: form.offending && move(form.offending) };
    return {
      ...form,
      g4: move(form.g4),
      kinetic: new Map([...form.kinetic].map(([key, p]) => [key, move(p)])),
      current: new Map([...form.current].map(([key, p]) => [key, move(p)])),
      potential: move(form.potential),
      obstruction: move(form.obstruction),
    };
  } catch {
    return none('the form contains the root of a constant; see its branch');
  }
}

const sameFunctions = (a: BiScalarForm, b: BiScalarForm): boolean =>
  equals(a.g4, b.g4) &&
  equals(a.potential, b.potential) &&
  [...a.kinetic].every(([key, p]) => equals(p, b.kinetic.get(key)!)) &&
  [...a.current].every(([key, p]) => equals(p, b.current.get(key)!));

const SIGNS = { '-': NEGATIVE, '0': VANISHING, '+': POSITIVE } as const;

/** Whether the branches leave out no sign of k that the assumptions allow. */
function coversCurvature(branches: readonly ConstrainedBranch[], k: string, knowledge: Knowledge | undefined): boolean {
  const possible = knowledge ? signOf(generator(knowledge.ring, k), knowledge).signs : ANY;
  const covered = new Set(
    branches.flatMap(({ conditions, values, name: _ }) => {
      const about = conditions.filter((c) => involves(c.value, k));
      if (about.length === 0 && !values.has(k)) return ['-', '0', '+'];
      if (values.has(k)) return isZero(values.get(k)!) ? ['0'] : [];
      if (about.length > 1 || about[0]!.relation === '=') return [];
      const [condition] = about;
      if (condition!.value.size !== 1) return [];
      if (condition!.relation === '!=') return ['-', '+'];
      // A single term in k alone besides positive numbers: its sign is that of k.
      const positive = equals(condition!.value, generator(condition!.value.ring, k));
      const negative = equals(
        condition!.value,
        subtract(zero(condition!.value.ring), generator(condition!.value.ring, k)),
      );
      return positive ? ['+'] : negative ? ['-'] : [];
    }),
  );
  return (['-', '0', '+'] as const).every((sign) => covered.has(sign) || (possible & SIGNS[sign]) === 0);
}
