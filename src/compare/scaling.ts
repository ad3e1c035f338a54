/**
 * Whether two sets of equations agree up to a constant overall factor and a rescaling of M²: terms with M^n of the one are
 * c s^(n/2) times those of the other, with c and s quotients of polynomials in constants. Imports algebra.
 */
import { collect, monomialOf } from '../algebra/collect.js';
import { divideExactly, splitUnit } from '../algebra/division.js';
import { constant, equals, isZero, multiply, type Poly, power } from '../algebra/poly.js';

export interface Ratio {
  readonly top: Poly;
  readonly bottom: Poly;
}

export interface Scaling {
  /** The second theory is this times the first, after M² was replaced. */
  readonly factor: Ratio;
  /** M² of the first theory has to be replaced by this times M². */
  readonly massSquared: Ratio;
}

const isOne = ({ top, bottom }: Ratio): boolean => equals(top, bottom);
const sameRatio = (a: Ratio, b: Ratio): boolean => equals(multiply(a.top, b.bottom), multiply(b.top, a.bottom));
const timesRatio = (a: Ratio, b: Ratio): Ratio =>
  lowest({ top: multiply(a.top, b.top), bottom: multiply(a.bottom, b.bottom) });
const overRatio = (a: Ratio, b: Ratio): Ratio => timesRatio(a, { top: b.bottom, bottom: b.top });

function powerOfRatio(a: Ratio, n: number): Ratio {
  const { top, bottom } = n < 0 ? { top: a.bottom, bottom: a.top } : a;
  return lowest({ top: power(top, Math.abs(n)), bottom: power(bottom, Math.abs(n)) });
}

/** Cancels what obviously divides. */
export function lowest({ top, bottom }: Ratio): Ratio {
  const one = constant(top.ring, 1);
  const whole = divideExactly(top, bottom);
  if (whole) return { top: whole, bottom: one };
  const inverse = divideExactly(bottom, top);
  if (inverse) return { top: one, bottom: inverse };
  const { unit, reduced } = splitUnit(bottom);
  return { top: divideExactly(top, unit)!, bottom: reduced };
}

/** The scaling that makes the second equations out of the first ones, or undefined when there is none. */
export function scalingBetween(first: readonly Poly[], second: readonly Poly[], mass: string): Scaling | undefined {
  const { ring } = first[0]!;
  const [a, b] = [byMass(first, mass), byMass(second, mass)];
  const powers = [...new Set([...a.keys(), ...b.keys()])].sort((m, n) => m - n);
  const ratios = new Map<number, Ratio>();
  for (const n of powers) {
    const ratio = ratioOf(a.get(n) ?? [], b.get(n) ?? []);
    if (!ratio) return undefined;
    ratios.set(n, ratio);
  }
  const one: Ratio = { top: constant(ring, 1), bottom: constant(ring, 1) };
  const [low] = powers;
  if (low === undefined) return undefined;
  const next = powers.find((n) => n === low + 2);
  const base = ratios.get(low)!;
  const massSquared = next === undefined ? one : overRatio(ratios.get(next)!, base);
  if (low % 2 !== 0 && !isOne(massSquared)) return undefined;
  const factor = isOne(massSquared) ? base : overRatio(base, powerOfRatio(massSquared, low / 2));
  const expected = (n: number): Ratio => timesRatio(factor, powerOfRatio(massSquared, Math.floor(n / 2)));
  const agree = powers.every((n) => (n % 2 === 0 || isOne(massSquared)) && sameRatio(ratios.get(n)!, expected(n)));
  return agree ? { factor, massSquared } : undefined;
}

/** Each equation split by powers of M: for each power the list of parts, in the order of the equations. */
function byMass(equations: readonly Poly[], mass: string): Map<number, Poly[]> {
  const out = new Map<number, Poly[]>();
  equations.forEach((e, i) => {
    const place = e.ring.position.get(mass);
    for (const { monomial, coefficient } of collect(e, (g) => g === place)) {
      const n = monomial[0]?.[1] ?? 0;
      const parts = out.get(n) ?? equations.map((q) => constant(q.ring, 0));
      parts[i] = coefficient;
      out.set(n, parts);
    }
  });
  return out;
}

/** r with b = r a for every pair; r is a quotient of polynomials in constants. */
function ratioOf(a: readonly Poly[], b: readonly Poly[]): Ratio | undefined {
  const at = a.findIndex((p) => !isZero(p));
  if (at < 0 || a.length !== b.length) return undefined;
  const { ring } = a[at]!;
  const isField = (g: number): boolean => ['jet', 'source'].includes(ring.generators[g]!.kind);
  const first = collect(a[at]!, isField)[0]!;
  const key = monomialOf(ring, first.monomial);
  const twin = collect(b[at]!, isField).find((c) => equals(monomialOf(ring, c.monomial), key));
  if (!twin) return undefined;
  const ratio = lowest({ top: twin.coefficient, bottom: first.coefficient });
  const holds = a.every((p, i) => equals(multiply(p, ratio.top), multiply(b[i]!, ratio.bottom)));
  return holds ? ratio : undefined;
}
