/** Derivations and jet spaces for the tests of comparisons. */
import { constant, generator, type Poly, power, product, scale, sum } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import type { Arena } from '../../src/compare/elimination.js';
import { type JetSpace, jetSpace } from '../../src/compare/jet-space.js';
import { type RankingName, rankingOf } from '../../src/compare/ranking.js';
import { BOUNDS, type Bound, budgetOf } from '../../src/compare/system.js';
import type { Derivation } from '../../src/derivation.js';
import { derive } from '../../src/derive.js';
import { readTheory } from '../../src/notation/read-theory.js';

export interface Wanted {
  readonly lagrangian: string;
  readonly constants?: readonly string[];
  readonly scales?: readonly string[];
  readonly matter?: readonly string[];
  readonly constrain?: readonly string[];
  readonly signature?: string;
  readonly geometry?: string;
  readonly name?: string;
}

export const MATTER = ['dust', 'radiation', '{ vacuum: Lambda }'] as const;
export const EINSTEIN_CARTAN: Wanted = { lagrangian: '1/2 M^2 R' };
/** The torsion scalar of the teleparallel equivalent. */
export const TORSION_SCALAR = '1/4 T_{abc} T^{abc} + 1/2 T_{abc} T^{bac} - T_a T^a';

export function theoryText(w: Wanted): string {
  return [
    'untwist: 1',
    `name: ${w.name ?? 'Slipway'}`,
    ...(w.signature ? [`conventions: { signature: "${w.signature}" }`] : []),
    `constants: [${(w.constants ?? []).join(', ')}]`,
    `scales: { ${['M', ...(w.scales ?? [])].map((s) => `${s}: mass`).join(', ')} }`,
    'lagrangian: |',
    `  ${w.lagrangian}`,
    ...(w.constrain ? [`constrain: [${w.constrain.map((c) => JSON.stringify(c)).join(', ')}]`] : []),
    `matter: [${(w.matter ?? MATTER).join(', ')}]`,
    `geometry: ${w.geometry ?? 'flrw'}`,
    '',
  ].join('\n');
}

export const derivationOf = (wanted: Wanted): Derivation => derive(readTheory(theoryText(wanted), 'slipway.yaml'));

export const spaceOf = (wanted: Wanted = EINSTEIN_CARTAN): JetSpace => jetSpace([derivationOf(wanted)]);

export const arenaIn = (space: JetSpace, ranking: RankingName = 'connection', bound: Bound = BOUNDS[1]): Arena => ({
  space,
  ranking: rankingOf(space, ranking),
  budget: budgetOf(bound),
  pivots: [],
});

/** A sum of terms [coefficient, factor, …]; a factor is a generator or [generator, exponent]. */
export function poly(
  space: JetSpace,
  ...terms: readonly (readonly [number, ...(string | readonly [string, number])[]])[]
): Poly {
  const { ring } = space;
  return sum(
    ring,
    terms.map(([c, ...factors]) =>
      scale(
        product(
          ring,
          factors.map((f) => (typeof f === 'string' ? generator(ring, f) : power(generator(ring, f[0]), f[1]))),
        ),
        rational(c),
      ),
    ),
  );
}

export const one = (space: JetSpace): Poly => constant(space.ring, 1);
