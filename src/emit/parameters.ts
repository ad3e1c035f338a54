/**
 * The parameters of a derivation: every symbol that its results depend on besides the fields of time, with meaning and
 * mass dimension. Also the dimension of a whole polynomial.
 */
import { symbolsOf } from '../algebra/collect.js';
import { type Poly, termsOf } from '../algebra/poly.js';
import type { Ring } from '../algebra/ring.js';
import type { Derivation } from '../derivation.js';
import { frameExpressions } from './code-frames.js';

export interface Parameter {
  readonly name: string;
  /** What it stands for, as a phrase for documentation. */
  readonly meaning: string;
  /** Mass dimension, c = ħ = 1. */
  readonly dimension: number;
  /** Whether it is a function of time whose current value is meant (a fluid density ρ(a)). */
  readonly isSource: boolean;
}

/** Every expression that output prints: Lagrangian, equations, Friedmann form, scalar-tensor functions. */
export function expressionsOf(d: Derivation): Poly[] {
  const { friedmann: f, scalarTensor: s } = d;
  const covariant =
    s.form === 'none' ? [] : [s.g4, ...s.kinetic.values(), ...s.current.values(), s.potential, s.obstruction];
  const spin = d.spin && typeof d.spin.elimination === 'object' ? d.spin.elimination : undefined;
  const fractions = spin ? [...spin.solution.values(), spin.rho, ...(spin.p ? [spin.p] : [])] : [];
  const ofSpin = fractions.flatMap((x) => [x.numerator, ...x.denominator.map((y) => y.base)]);
  const own = [d.lagrangian, ...d.equations.values(), ...(f ? [f.rhoT, f.pT] : [])];
  return [...own, ...covariant, ...ofSpin, ...frameExpressions(d)];
}

const PLANCK_MASS = 'reduced Planck mass';
const ROLES = {
  constant: 'coupling constant',
  scale: 'scale',
  vacuum: 'energy density of the vacuum',
  spin: 'spin density at unit spatial volume',
} as const;

/** Parameters that occur in any expression: symbols of the theory first, then those of the geometry, then densities. */
export function modelParameters(d: Derivation): Parameter[] {
  const used = new Set(expressionsOf(d).flatMap(symbolsOf));
  for (const g of d.ring.generators) if (g.kind === 'radical' && used.delete(g.name)) used.add(g.square);
  const known = new Map<string, Parameter>();
  const learn = (name: string, meaning: string, dimension: number, isSource = false) => {
    if (!known.has(name)) known.set(name, { name, meaning, dimension, isSource });
  };
  for (const s of d.theory.symbols) learn(s.name, s.name === 'M' ? PLANCK_MASS : ROLES[s.role], s.dimension);
  learn('M', PLANCK_MASS, 1);
  for (const p of d.geometry.parameters) learn(p.name, p.meaning, p.dimension);
  for (const { density, name, isSource } of d.fluids) {
    const { isotropic } = d.geometry;
    const then = isotropic ? `at ${isotropic.scale} = 1` : 'at unit spatial volume';
    const when = isSource ? 'now, a function of time' : then;
    learn(density, `energy density of ${name} ${when}`, 4, isSource);
  }
  for (const g of d.ring.generators) {
    if (g.kind === 'constant') learn(g.name, 'constant', 0);
    if (g.kind === 'source') learn(g.name, 'density now, a function of time', 4, true);
  }
  return [...known.values()].filter((p) => used.has(p.name));
}

/** Mass dimension of every generator of the ring; a time derivative adds one. */
export function dimensionsOf(d: Derivation): ReadonlyMap<string, number> {
  const base = new Map<string, number>([['M', 1]]);
  for (const s of d.theory.symbols) base.set(s.name, s.dimension);
  for (const s of [...d.geometry.parameters, ...d.fields]) base.set(s.name, s.dimension);
  for (const { density } of d.fluids) base.set(density, 4);
  return new Map(
    d.ring.generators.map((g) => {
      if (g.kind === 'jet') return [g.name, (base.get(g.field) ?? 0) + g.order];
      if (g.kind === 'radical') return [g.name, (base.get(g.square) ?? 0) / 2];
      return [g.name, base.get(g.name) ?? (g.kind === 'source' ? 4 : 0)];
    }),
  );
}

/** Mass dimensions that occur among the terms of a polynomial, ascending; one entry when it is homogeneous. */
export function dimensionsIn(p: Poly, dimensions: ReadonlyMap<string, number>): number[] {
  const weight = weightsOf(p.ring, dimensions);
  const found = termsOf(p).map(({ exponents }) => exponents.reduce((n, [g, e]) => n + e * weight[g]!, 0));
  return [...new Set(found)].sort((a, b) => a - b);
}

const weightsOf = (ring: Ring, dimensions: ReadonlyMap<string, number>): number[] =>
  ring.generators.map((g) => dimensions.get(g.name) ?? 0);
