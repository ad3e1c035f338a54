/**
 * Solutions of constraints between functions of time, as branches: products are split into their factors, linear and
 * quadratic equations without derivatives of their unknown are solved, roots of constants become symbols, and the cases of
 * a parameter are kept apart. Invariant: put into the constraints, a solution makes zero of all but those it lists as
 * remaining. What is not found is never guessed: a constraint that no step solves remains. Imports the algebra.
 */
import { coefficientOf, involves, moveTo, substitute, symbolsOf } from '../algebra/collect.js';
import { splitUnit } from '../algebra/division.js';
import { infix } from '../algebra/infix.js';
import { primitive } from '../algebra/linear.js';
import {
  constant,
  equals,
  generator,
  isZero,
  multiply,
  negate,
  type Poly,
  power,
  scale,
  subtract,
  termsOf,
  zero,
} from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { exponentRange, type Generator, makeRing, type Ring } from '../algebra/ring.js';
import { squareRoot } from '../algebra/square-root.js';
import { type Root, reduceRoots, substituteFields } from './substitution.js';

export interface BranchRoles {
  /** Fields to solve for; all others stay. */
  readonly unknowns: readonly string[];
  /** Fields without zeros: the lapse and the scale factors. */
  readonly positive: readonly string[];
  /** Constants whose zeros and signs are told apart: the parameters of the geometry. */
  readonly parameters: readonly string[];
  /** Constants that are never zero, such as mass scales. */
  readonly scales: readonly string[];
}

/** A statement about constants, or about a factor that was divided out. */
export interface Condition {
  readonly value: Poly;
  readonly relation: '>' | '=' | '!=';
}

export interface Branch {
  readonly ring: Ring;
  /** Solved field → its value, free of solved fields. */
  readonly solution: ReadonlyMap<string, Poly>;
  /** Constants of the ring that are roots of others; either sign of a root solves the constraints. */
  readonly roots: readonly Root[];
  /** Parameters that have a value on this branch. */
  readonly values: ReadonlyMap<string, Poly>;
  readonly conditions: readonly Condition[];
  /** Numbers of the constraints that are not solved. */
  readonly remaining: readonly number[];
}

export interface Branches {
  readonly branches: readonly Branch[];
  /** Whether the search ended by itself. */
  readonly complete: boolean;
}

/** Cases looked at before the search is given up. */
const MAX_CASES = 400;

interface Case extends Branch {
  readonly left: readonly { readonly value: Poly; readonly constraint: number }[];
  /** Generators that are not zero here. */
  readonly nonzero: readonly string[];
}

/** All branches of the system: each constraint vanishes. The ring needs the jets that the solutions will ask for. */
export function branchesOf(constraints: readonly Poly[], roles: BranchRoles): Branches {
  const [first] = constraints;
  if (!first) return { branches: [], complete: true };
  const start: Case = {
    ring: first.ring,
    solution: new Map(),
    roots: [],
    values: new Map(),
    conditions: [],
    remaining: [],
    left: constraints.flatMap((value, constraint) => (isZero(value) ? [] : [{ value, constraint }])),
    nonzero: [...roles.positive, ...roles.scales],
  };
  const found: Branch[] = [];
  const queue: Case[] = [start];
  let cases = 0;
  for (let next = queue.shift(); next; next = queue.shift()) {
    if (++cases > MAX_CASES) return { branches: found, complete: false };
    const further = step(next, roles);
    if (further) queue.unshift(...further);
    else found.push(verified(next, constraints));
  }
  return { branches: found.filter((b, i) => !found.slice(0, i).some((other) => sameBranch(b, other))), complete: true };
}

const sameBranch = (a: Branch, b: Branch): boolean => branchName(a) === branchName(b);

/** The value of an expression in the constraints' ring on a branch. */
export function onBranch(p: Poly, { ring, solution, roots, values }: Branch): Poly {
  const there = substitute(moveTo(p, ring), values);
  return reduceRoots(substituteFields(there, solution), roots);
}

function verified(found: Case, constraints: readonly Poly[]): Branch {
  const { ring, solution, roots, values, left } = found;
  const conditions = essential(found);
  const branch: Branch = { ring, solution, roots, values, conditions, remaining: left.map((l) => l.constraint) };
  constraints.forEach((c, i) => {
    if (!branch.remaining.includes(i) && !isZero(onBranch(c, branch)))
      throw new Error(`a branch of the constraints does not solve number ${i + 1}`);
  });
  return branch;
}

/** The cases that one case splits into; undefined when nothing more can be done; none when it contradicts itself. */
function step(c: Case, roles: BranchRoles): readonly Case[] | undefined {
  const simple = c.left
    .map(({ value, constraint }) => ({ constraint, ...factorsOf(value, c, roles) }))
    .sort((a, b) => a.rest.size - b.rest.size);
  for (const { constraint, zeros, divided, rest } of simple) {
    const isNumber = equals(rest, constant(c.ring, 1));
    if (zeros.length === 0 && isNumber) return [];
    if (zeros.length === 0) continue;
    const cases = zeros.flatMap((name, i) => set(withNonzero(c, zeros.slice(0, i)), name, zero(c.ring), roles));
    if (isNumber) return cases;
    const other = withNonzero(withConditions(c, divided), zeros);
    return [...cases, { ...other, left: replaced(c.left, constraint, rest) }];
  }
  for (const degree of [1, 2])
    for (const { divided, rest } of simple)
      for (const name of roles.unknowns) {
        const cases = solved(withConditions(c, divided), rest, name, degree, roles);
        if (cases) return cases;
      }
  for (const { rest } of simple) {
    const name = roles.parameters.find((k) => involves(rest, k));
    const isConstant = c.ring.generators.every((g) => g.kind === 'constant' || !involves(rest, g.name));
    const cases = name !== undefined && isConstant ? solved(c, rest, name, 1, roles) : undefined;
    if (cases) return cases;
  }
  return undefined;
}

const replaced = (left: Case['left'], constraint: number, value: Poly): Case['left'] =>
  left.map((l) => (l.constraint === constraint ? { value, constraint } : l));

interface Factors {
  /** Unknowns and parameters that divide the constraint and may vanish. */
  readonly zeros: readonly string[];
  /** What was divided out and is assumed not to vanish. */
  readonly divided: readonly string[];
  /** The other factor, 1 when there is none. */
  readonly rest: Poly;
}

function factorsOf(p: Poly, c: Case, roles: BranchRoles): Factors {
  const { unit, reduced } = splitUnit(p);
  const zeros: string[] = [];
  const divided: string[] = [];
  let rest = reduced;
  for (const [g, e] of termsOf(unit)[0]!.exponents) {
    const symbol = c.ring.generators[g]!;
    if (e < 0 || c.nonzero.includes(symbol.name) || c.roots.some((r) => r.name === symbol.name)) continue;
    const isUnknown = symbol.kind === 'jet' && roles.unknowns.includes(symbol.field);
    if (isUnknown && symbol.order > 0) rest = multiply(rest, generator(c.ring, symbol.name, e));
    else if (isUnknown || roles.parameters.includes(symbol.name)) zeros.push(symbol.name);
    else divided.push(symbol.name);
  }
  return { zeros, divided, rest };
}

const withNonzero = (c: Case, names: readonly string[]): Case => ({
  ...c,
  nonzero: [...c.nonzero, ...names],
  conditions: [
    ...c.conditions,
    ...names.map((name): Condition => ({ value: generator(c.ring, name), relation: '!=' })),
  ],
});

const withConditions = (c: Case, names: readonly string[]): Case =>
  withNonzero(
    c,
    names.filter((name) => !c.nonzero.includes(name)),
  );

/** The case with a field or a parameter given; none when that contradicts what is not zero. */
function set(c: Case, name: string, given: Poly, roles: BranchRoles): readonly Case[] {
  const value = reduceRoots(given, c.roots);
  if (isZero(value) && c.nonzero.includes(name)) return [];
  const isParameter = roles.parameters.includes(name);
  const one = new Map([[name, value]]);
  const put = (p: Poly): Poly => reduceRoots(isParameter ? substitute(p, one) : substituteFields(p, one), c.roots);
  try {
    const left = c.left.map((l) => ({ ...l, value: put(l.value) })).filter((l) => !isZero(l.value));
    const solution = new Map([...c.solution].map(([n, p]) => [n, put(p)]));
    const conditions = isParameter
      ? [...c.conditions, { value: subtract(generator(c.ring, name), value), relation: '=' as const }]
      : c.conditions;
    const values = isParameter ? new Map([...c.values, [name, value] as const]) : c.values;
    if (!isParameter) solution.set(name, value);
    if ([...solution].some(([n, p]) => isZero(p) && c.nonzero.includes(n))) return [];
    return [{ ...c, left, solution, values, conditions }];
  } catch (error) {
    // A sum would be divided by: this case is one of those that are not solved.
    if (error instanceof RangeError) return [];
    throw error;
  }
}

/** Whether only the field itself occurs, in powers from 0 to the degree, with a single term at the highest. */
function degreeIn(p: Poly, name: string): number | undefined {
  const { ring } = p;
  const derivative = ring.generators.some(
    (g) => g.kind === 'jet' && g.field === name && g.order > 0 && involves(p, g.name),
  );
  if (derivative) return undefined;
  const g = ring.position.get(name)!;
  const { low, high } = exponentRange(ring, p.keys);
  return low[g]! < 0 ? undefined : high[g]!;
}

/** Solves a constraint of the given degree for a field; undefined when that is not possible. */
function solved(c: Case, p: Poly, name: string, degree: number, roles: BranchRoles): readonly Case[] | undefined {
  if (degreeIn(p, name) !== degree) return undefined;
  const leading = coefficientOf(p, name, degree);
  if (leading.size !== 1) return undefined;
  const { zeros, divided, rest } = factorsOf(leading, c, roles);
  if (!equals(rest, constant(c.ring, 1))) return undefined;
  if (zeros.length > 0)
    return [
      ...zeros.flatMap((factor, i) => set(withNonzero(c, zeros.slice(0, i)), factor, zero(c.ring), roles)),
      withNonzero(c, zeros),
    ];
  const ready = withConditions(c, divided);
  const inverse = power(leading, -1);
  const linear = coefficientOf(p, name, degree - 1);
  if (degree === 1) return set(ready, name, negate(multiply(linear, inverse)), roles);
  return quadratic(ready, name, { leading, linear, last: coefficientOf(p, name, 0) }, roles);
}

interface Quadratic {
  readonly leading: Poly;
  readonly linear: Poly;
  readonly last: Poly;
}

/** The roots of leading x² + linear x + last, when the discriminant is a square times a constant. */
function quadratic(c: Case, name: string, q: Quadratic, roles: BranchRoles): readonly Case[] | undefined {
  const discriminant = reduceRoots(
    subtract(multiply(q.linear, q.linear), scale(multiply(q.leading, q.last), 4)),
    c.roots,
  );
  const { root, radicand } = squareRoot(discriminant);
  const half = scale(power(q.leading, -1), rational(1, 2));
  const value = (of: Poly): Poly => multiply(subtract(of, moveTo(q.linear, of.ring)), moveTo(half, of.ring));
  if (isZero(root)) return set(c, name, value(root), roles);
  if (equals(radicand, constant(c.ring, 1)))
    return [...set(c, name, value(root), roles), ...set(c, name, value(negate(root)), roles)];
  const symbols = c.ring.generators.filter((g) => involves(radicand, g.name));
  if (symbols.some((g) => g.kind !== 'constant')) return undefined;
  if (symbols.length === 0 && termsOf(radicand)[0]!.coefficient.num < 0n) return [];
  const wide = withRoot(c, radicand);
  const symbol = generator(wide.ring, rootName(radicand));
  const single = radicand.size === 1;
  const nonzero = single ? symbols.map((g) => g.name).filter((n) => !c.nonzero.includes(n)) : [];
  const conditions: readonly Condition[] =
    symbols.length === 0 ? [] : [{ value: moveTo(radicand, wide.ring), relation: '>' }];
  const open: Case = {
    ...wide,
    nonzero: [...wide.nonzero, ...nonzero],
    conditions: [...wide.conditions, ...conditions],
  };
  const vanishing = roles.parameters.flatMap((k) => {
    if (c.nonzero.includes(k) || !involves(radicand, k)) return [];
    if (single) return set(c, k, zero(c.ring), roles);
    const slope = coefficientOf(radicand, k, 1);
    const isLinear = degreeIn(radicand, k) === 1 && slope.size === 1;
    return isLinear ? set(c, k, negate(multiply(coefficientOf(radicand, k, 0), power(slope, -1))), roles) : [];
  });
  return [...set(open, name, value(multiply(moveTo(root, wide.ring), symbol)), roles), ...vanishing];
}

/** No name of a user can be spelled so. */
export const rootName = (radicand: Poly): string => `sqrt(${infix(radicand)})`;

/** The case in a ring that has the root of a constant. */
function withRoot(c: Case, radicand: Poly): Case {
  const name = rootName(radicand);
  if (c.ring.position.has(name)) return c;
  const root: Generator = { kind: 'constant', name };
  const ring = makeRing([...c.ring.generators, root]);
  const move = (p: Poly): Poly => moveTo(p, ring);
  return {
    ...c,
    ring,
    solution: new Map([...c.solution].map(([n, p]) => [n, move(p)])),
    values: new Map([...c.values].map(([n, p]) => [n, move(p)])),
    conditions: c.conditions.map((k) => ({ ...k, value: move(k.value) })),
    left: c.left.map((l) => ({ ...l, value: move(l.value) })),
    roots: [...c.roots.map((r) => ({ ...r, radicand: move(r.radicand) })), { name, radicand: move(radicand) }],
  };
}

/** What is left to say about what does not vanish: nothing of a solved field whose value is a product of such. */
function essential(c: Case): readonly Condition[] {
  const decided = new Set(c.conditions.filter((k) => k.relation !== '!=').flatMap((k) => symbolsOf(k.value)));
  return c.conditions.flatMap((k): Condition[] => {
    if (k.relation !== '!=') return [k];
    const [name] = symbolsOf(k.value);
    if (decided.has(name!)) return [];
    const value = c.solution.get(name!);
    if (!value) return [k];
    return value.size === 1 ? [] : [{ value: primitive(value), relation: '!=' }];
  });
}

/** `psi = 0, phi = sqrt(-k)/a (k < 0)`: zeros first. Either sign of a root is meant. */
export function branchName({ solution, conditions, values }: Branch): string {
  const entries = [...solution];
  const zeros = entries.filter(([, p]) => isZero(p)).map(([name]) => name);
  const others = entries.filter(([, p]) => !isZero(p)).map(([name, p]) => `${name} = ${infix(p)}`);
  const cases = [...values].map(([name, p]) => `${name} = ${infix(p)}`);
  const signs = conditions.filter((k) => k.relation !== '=').map(conditionText);
  const remarks = [...cases, ...signs];
  const text = [...(zeros.length > 0 ? [`${zeros.join(' = ')} = 0`] : []), ...others].join(', ');
  return `${text === '' ? 'no field is fixed' : text}${remarks.length > 0 ? ` (${remarks.join(', ')})` : ''}`;
}

/** The condition with a positive single term on the left, where there is only one: −k > 0 is k < 0. */
export function simpleCondition({ value, relation }: Condition): {
  readonly value: Poly;
  readonly relation: Condition['relation'] | '<';
} {
  const simple = value.size === 1 ? primitive(value) : value;
  const negative = value.size === 1 && !sameSign(value, simple);
  return { value: simple, relation: negative && relation === '>' ? '<' : relation };
}

/** `k > 0`, `k < 0`, `c1 - k != 0`. */
export function conditionText(condition: Condition): string {
  const { value, relation } = simpleCondition(condition);
  return `${infix(value)} ${relation} 0`;
}

const sameSign = (p: Poly, q: Poly): boolean =>
  termsOf(p)[0]!.coefficient.num > 0n === termsOf(q)[0]!.coefficient.num > 0n;
