/**
 * The connection eliminated in favour of spin: where the reduced Lagrangian contains connection and multipliers without
 * derivatives and to second degree, their equations are linear. The solution is put back into them, and what spin adds to
 * the energy density is compared with the change of the Friedmann form.
 */
import { partial } from './algebra/calculus.js';
import { coefficientOf, collect, involves, moveTo } from './algebra/collect.js';
import {
  addFraction,
  equalFraction,
  type Fraction,
  fraction,
  multiplyFraction,
  negateFraction,
} from './algebra/fraction.js';
import { solveLinear } from './algebra/linear-system.js';
import {
  add,
  constant,
  generator,
  isZero,
  multiply,
  negate,
  type Poly,
  power,
  scale,
  sum,
  zero,
} from './algebra/poly.js';
import { rational } from './algebra/rational.js';
import type { FriedmannForm, SpinElimination, SpinResult } from './derivation.js';
import { dropTotalDerivatives } from './mechanics/total-derivatives.js';
import type { Setting } from './setting.js';

type Checker = (name: string, detail: string, holds: boolean) => void;

export function spinResult(
  setting: Setting,
  friedmann: Pick<FriedmannForm, 'rhoT' | 'pT'> | undefined,
  check: Checker,
): SpinResult {
  const { spins: tensors, averages, spin, fix } = setting;
  const elimination = isZero(spin) ? undefined : eliminated(setting, friedmann, check);
  return { tensors, averages, interaction: fix(spin), elimination };
}

/** Names of what stands for densities of spin in the ring. */
const spinNames = ({ theory }: Setting): string[] => theory.symbols.filter((s) => s.role === 'spin').map((s) => s.name);

function eliminated(
  setting: Setting,
  friedmann: Pick<FriedmannForm, 'rhoT' | 'pT'> | undefined,
  check: Checker,
): SpinElimination | string {
  const { geometry, fields, fix, ring, gravity, spin } = setting;
  const unknowns = fields.map((f) => f.name).filter((q) => q !== geometry.lapse && !geometry.rates.has(q));
  // Velocities of the connection go first, at the price of velocities of the scale factors.
  const order = [...unknowns, ...geometry.rates.keys()];
  const lagrangian = dropTotalDerivatives(fix(add(gravity, spin)), order, geometry.lapse).reduced;
  const moving = ring.generators.find(
    (g) => g.kind === 'jet' && g.order > 0 && unknowns.includes(g.field) && involves(lagrangian, g.name),
  );
  if (moving !== undefined)
    return 'the connection is not algebraic: derivatives of it remain in the Lagrangian, so torsion propagates';
  const present = unknowns.filter((q) => involves(lagrangian, q));
  const places = new Set(present.map((q) => ring.position.get(q)!));
  const degrees = collect(lagrangian, (g) => places.has(g)).map(({ monomial }) => monomial.map(([, e]) => e));
  if (degrees.some((d) => d.some((e) => e < 0) || d.reduce((n, e) => n + e, 0) > 2))
    return 'the equations of the connection are not linear in it';
  const matrix = present.map((a) => present.map((b) => partial(partial(lagrangian, a), b)));
  const still = (p: Poly): Poly => present.reduce((value, q) => coefficientOf(value, q, 0), p);
  const right = present.map((q) => negate(still(partial(lagrangian, q))));
  const solved = present.length > 0 ? solveLinear(matrix, right) : undefined;
  if (!solved) return 'the equations of the connection do not determine it';
  const { numerators, determinant } = solved;
  const over = (p: Poly): Fraction => fraction(p, [{ base: determinant, power: 1 }]);
  const solution = new Map(present.map((q, i) => [q, over(numerators[i]!)] as const));
  check(
    'elimination of the connection',
    'the solution was put into the equations of the connection',
    present.every((q) => isZero(putIn(partial(lagrangian, q), solution, ring).numerator)),
  );
  // At the extremum the quadratic form is half of what is linear: L = L_0 + ½ b·x.
  const linear = sum(
    ring,
    numerators.map((x, i) => multiply(negate(right[i]!), x)),
  );
  const value = addFraction(fraction(still(lagrangian)), over(scale(linear, rational(1, 2))));
  const names = spinNames(setting);
  const free = (f: Fraction): Fraction =>
    fraction(
      names.reduce((p, n) => coefficientOf(p, n, 0), f.numerator),
      f.denominator,
    );
  const perVolume = fraction(power(moveTo(geometry.volume, ring), -1));
  const rho = negateFraction(multiplyFraction(addFraction(value, negateFraction(free(value))), perVolume));
  if (friedmann && geometry.isotropic && dependsOnScale(rho, setting)) {
    const change = putIn(fix(friedmann.rhoT), solution, ring);
    check(
      'energy density of spin',
      'what spin adds to the Lagrangian is what it adds to ρ_T on the equations of the connection',
      equalFraction(addFraction(change, negateFraction(free(change))), rho),
    );
  }
  return { solution, rho, p: pressureOf(rho, setting) };
}

/** A polynomial with fractions put in for fields that occur in it without derivatives. */
function putIn(p: Poly, values: ReadonlyMap<string, Fraction>, ring: Poly['ring']): Fraction {
  const names = [...values.keys()];
  const places = new Map(names.map((q) => [ring.position.get(q)!, values.get(q)!]));
  return collect(p, (g) => places.has(g)).reduce<Fraction>(
    (total, { monomial, coefficient }) => {
      const term = monomial.reduce<Fraction>((f, [g, e]) => {
        let out = f;
        for (let i = 0; i < e; i++) out = multiplyFraction(out, places.get(g)!);
        return out;
      }, fraction(coefficient));
      return addFraction(total, term);
    },
    fraction(zero(ring)),
  );
}

/** Whether the scale factor is the only function of time in it. */
function dependsOnScale({ numerator, denominator }: Fraction, { geometry }: Setting): boolean {
  const scaleFactor = geometry.isotropic?.scale;
  const { ring } = numerator;
  const others = ring.generators.filter((g) => g.kind === 'jet' && g.name !== scaleFactor);
  return [numerator, ...denominator.map((d) => d.base)].every((p) => others.every((g) => !involves(p, g.name)));
}

/** p = −ρ − (a/3) dρ/da of a density that depends on the scale factor alone. */
function pressureOf(rho: Fraction, setting: Setting): Fraction | undefined {
  const a = setting.geometry.isotropic?.scale;
  if (a === undefined || !dependsOnScale(rho, setting)) return undefined;
  if (rho.denominator.some((d) => involves(d.base, a))) return undefined;
  const { ring } = rho.numerator;
  const work = multiply(partial(rho.numerator, a), scale(generator(ring, a), rational(-1, 3)));
  return addFraction(negateFraction(rho), fraction(multiply(work, constant(ring, 1)), rho.denominator));
}
