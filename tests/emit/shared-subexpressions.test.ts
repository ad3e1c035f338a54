import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { eulerLagrange } from '../../src/algebra/calculus.js';
import { evaluate } from '../../src/algebra/collect.js';
import { add, generator, monomial, multiply, type Poly, power, sum, zero } from '../../src/algebra/poly.js';
import {
  addRational,
  equalRational,
  multiplyRational,
  ONE,
  powerRational,
  type Rational,
  rational,
  ZERO,
} from '../../src/algebra/rational.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import {
  generatorsOf,
  type Operand,
  type Plan,
  type Product,
  planShared,
  planSize,
} from '../../src/emit/shared-subexpressions.js';

const COUPLINGS = ['P', 'S', 'W', 'c0'];
const ring = makeRing([...['N', 'a', 'phi', 'psi'].flatMap((q) => jetsOf(q, 2)), ...constantsOf([...COUPLINGS, 'k'])]);
const isCoupling = (g: number): boolean => COUPLINGS.includes(ring.generators[g]!.name);
const x = (name: string, exponent = 1): Poly => generator(ring, name, exponent);
const names = ring.generators.map((g) => g.name);

/** Carries out a plan in exact arithmetic. */
function run(plan: Plan, point: ReadonlyMap<string, Rational>): Rational[] {
  const made: Rational[] = [];
  const value = (o: Operand): Rational => {
    const found = o.kind === 'generator' ? point.get(names[o.position]!) : made[o.index];
    if (found === undefined) throw new Error('an operand is used before it is made');
    return found;
  };
  const total = (terms: readonly Product[]): Rational =>
    terms.reduce(
      (s, t) =>
        addRational(
          s,
          t.operands.reduce((p, o) => multiplyRational(p, value(o)), t.factor),
        ),
      ZERO,
    );
  for (const step of plan.steps) {
    if (step.op === 'sum') made.push(total(step.terms));
    else if (step.op === 'reciprocal') made.push(powerRational(value(step.operand), -1));
    else {
      const result = multiplyRational(value(step.left), value(step.right));
      if (step.op === 'power') expect(equalRational(result, powerRational(value(step.base), step.exponent))).toBe(true);
      made.push(result);
    }
  }
  return plan.outputs.map(total);
}

function operandsIn(plan: Plan): Operand[] {
  const inside = plan.steps.flatMap((s) =>
    s.op === 'sum' ? s.terms.flatMap((t) => t.operands) : s.op === 'reciprocal' ? [s.operand] : [s.left, s.right],
  );
  return [...inside, ...plan.outputs.flat().flatMap((t) => t.operands)];
}

/** Multiplications that a plan costs, numeric factors counted. */
function multiplications(plan: Plan): number {
  const cost = (terms: readonly Product[]) =>
    terms.reduce((n, t) => n + Math.max(0, t.operands.length - (equalRational(t.factor, ONE) ? 1 : 0)), 0);
  return (
    plan.steps.reduce((n, s) => n + (s.op === 'sum' ? cost(s.terms) : 1), 0) +
    plan.outputs.reduce((n, o) => n + cost(o), 0)
  );
}

const point = new Map(names.map((name, i) => [name, rational(2 * i + 3, i % 4 === 0 ? 7 : 5)]));

const polys: fc.Arbitrary<Poly> = fc
  .array(
    fc.tuple(
      fc.bigInt({ min: -(10n ** 18n), max: 10n ** 18n }),
      fc.constantFrom(1n, 2n, 6n, 35n, 3n ** 40n),
      fc.array(fc.tuple(fc.constantFrom(...names), fc.integer({ min: -5, max: 9 })), { maxLength: 5 }),
    ),
    { maxLength: 12 },
  )
  .map((terms) =>
    sum(
      ring,
      terms.map(([n, d, powers]) => monomial(ring, rational(n, d), powers)),
    ),
  );

describe('planShared', () => {
  it('has the values of the polynomials, exactly', () => {
    fc.assert(
      fc.property(fc.array(polys, { maxLength: 4 }), (list) => {
        const plan = planShared(list, isCoupling);
        const values = run(plan, point);
        return list.every((p, i) => equalRational(values[i]!, evaluate(p, point)));
      }),
    );
  });

  it('makes no step that is not used, and reads what it says', () => {
    fc.assert(
      fc.property(fc.array(polys, { maxLength: 4 }), (list) => {
        const plan = planShared(list, isCoupling);
        const operands = operandsIn(plan);
        const used = new Set(operands.flatMap((o) => (o.kind === 'step' ? [o.index] : [])));
        const read = new Set(operands.flatMap((o) => (o.kind === 'generator' ? [o.position] : [])));
        return used.size === plan.steps.length && [...read].sort((a, b) => a - b).join() === generatorsOf(plan).join();
      }),
    );
  });

  it('divides by nothing that the polynomials do not divide by', () => {
    const plan = planShared([add(multiply(x('P'), x('a', 3)), multiply(x('P'), x('a', 5)))], isCoupling);
    expect(plan.steps.some((s) => s.op === 'reciprocal')).toBe(false);
  });

  it('finds the square inside equations of motion and shares coefficients between them', () => {
    const rate = add(x('D(phi,1)'), multiply(multiply(x('phi'), x('D(a,1)')), x('a', -1)));
    const other = add(x('phi', 2), multiply(x('k'), x('a', -2)));
    const coefficient = add(x('P'), add(x('S'), multiply(x('W'), x('W'))));
    const lagrangian = multiply(multiply(x('a', 3), coefficient), add(power(rate, 2), power(other, 2)));
    const equations = ['N', 'a', 'phi'].map((q) => eulerLagrange(lagrangian, q));
    const plan = planShared(equations, isCoupling);
    expect(plan.steps.filter((s) => s.op === 'sum' && s.ofCouplings).length).toBe(1);
    const alone = equations.reduce((n, p) => n + multiplications(planShared([p], isCoupling)), 0);
    expect(multiplications(plan)).toBeLessThan(alone);
    expect(run(plan, point).every((v, i) => equalRational(v, evaluate(equations[i]!, point)))).toBe(true);
  });

  it('computes one sum for two that differ by a factor', () => {
    const s = add(multiply(x('a'), x('phi')), x('D(phi,1)'));
    const plan = planShared(
      [multiply(x('P'), s), multiply(monomial(ring, rational(-3, 7), [['S', 1]]), s)],
      isCoupling,
    );
    expect(plan.steps.filter((t) => t.op === 'sum').length).toBe(1);
  });

  it('keeps factors beyond the exact doubles with their terms', () => {
    const huge = 10n ** 30n + 1n;
    const terms = [
      monomial(ring, rational(huge, 10n ** 30n), [['a', 1]]),
      monomial(ring, rational(1, 3), [['phi', 1]]),
    ];
    const plan = planShared([multiply(x('P'), add(terms[0]!, terms[1]!))], isCoupling);
    const inner = plan.steps.find((s) => s.op === 'sum');
    expect(inner?.op === 'sum' && inner.terms.map((t) => t.factor.den)).toContain(3n);
  });

  it('adds up couplings that always occur in one proportion, once', () => {
    const both = add(x('P'), monomial(ring, rational(2), [['S', 1]]));
    const list = [
      add(multiply(both, x('a')), multiply(x('W'), x('phi'))),
      add(multiply(both, x('N')), multiply(add(both, x('c0')), x('psi'))),
    ];
    const plan = planShared(list, isCoupling);
    const isP = (o: Operand) => o.kind === 'generator' && names[o.position] === 'P';
    expect(operandsIn(plan).filter(isP).length).toBe(1);
    expect(planSize(list, isCoupling)).toBeLessThan(list.reduce((n, p) => n + p.size, 0) + 3);
  });

  it('keeps every sum short', () => {
    const wide = makeRing([...jetsOf('a', 0), ...constantsOf(Array.from({ length: 300 }, (_, i) => `g${i}`))]);
    const many = sum(
      wide,
      wide.generators.map(({ name }) => generator(wide, name)),
    );
    const plan = planShared([many, power(generator(wide, 'a'), 2)], (g) => g > 0);
    const lengths = plan.steps.map((s) => (s.op === 'sum' ? s.terms.length : 0));
    expect(Math.max(...lengths)).toBeLessThanOrEqual(100);
    expect(lengths.reduce((a, b) => a + b, 0)).toBeGreaterThanOrEqual(300);
  });

  it('gives nothing for zero', () => {
    expect(planShared([zero(ring)], isCoupling)).toEqual({ steps: [], outputs: [[]] });
  });
});
