/**
 * Random theories: structured data for the oracle and the text of the file for the program, in both geometries and both
 * signatures, with matter.
 */
import type { Signature } from '../oracle/contraction.js';
import * as E from '../oracle/exact.js';
import type { GeometryName } from '../oracle/geometry.js';
import { CONSTANTS, type Liberty, randomTerm, write } from '../oracle/lagrangian.js';
import type { Wanted } from '../oracle/pipeline.js';
import type { Random } from '../oracle/random.js';
import type { Fluid, OracleTheory } from '../oracle/variation.js';

const SCALES: ReadonlySet<string> = new Set(['M', 'mu']);

const FLUIDS: readonly (readonly [text: string, fluid: Fluid])[] = [
  ['dust', { density: 'rho_dust', w: E.ZERO }],
  ['radiation', { density: 'rho_radiation', w: E.q(1, 3) }],
  ['{ vacuum: Lambda }', { density: 'Lambda', w: E.q(-1) }],
  ['{ fluid: chi, w: "1/5" }', { density: 'rho_chi', w: E.q(1, 5) }],
  ['{ fluid: stiff, w: 1 }', { density: 'rho_stiff', w: E.ONE }],
  ['{ fluid: wall, w: "-2/3" }', { density: 'rho_wall', w: E.q(-2, 3) }],
];

/** Every symbol a random theory may use, for the points. */
export const SYMBOLS: readonly string[] = [...CONSTANTS, ...FLUIDS.map(([, { density }]) => density)];

/** The symbols of a random theory, declared. */
export const NAMED = {
  constants: CONSTANTS.filter((name) => !SCALES.has(name)),
  scales: CONSTANTS.filter((name) => SCALES.has(name)),
} as const;

export interface RandomTheory {
  readonly wanted: Wanted;
  readonly oracle: OracleTheory;
}

export interface Shape {
  readonly geometry: GeometryName;
  readonly degree: readonly [least: number, most: number];
  readonly terms: number;
  /** Chance in percent of each fluid. */
  readonly matter: number;
  readonly liberty?: Liberty;
}

export function randomTheory(
  random: Random,
  { geometry, degree, terms, matter, liberty = 'squares' }: Shape,
): RandomTheory {
  const signature: Signature = random.pick(['-+++', '+---'] as const);
  const wishes = { degree, epsilon: 35, metric: 10, constants: CONSTANTS };
  const drawn = Array.from({ length: 1 + random.below(terms) }, () => randomTerm(random, wishes));
  const { terms: lagrangian, text } = write(random, drawn, liberty);
  const fluids = FLUIDS.filter(() => random.chance(matter));
  const wanted: Wanted = {
    lagrangian: text,
    ...NAMED,
    signature,
    geometry,
    ...(fluids.length > 0 ? { matter: fluids.map(([line]) => line) } : {}),
  };
  return { wanted, oracle: { geometry, signature, lagrangian, matter: fluids.map(([, fluid]) => fluid) } };
}
