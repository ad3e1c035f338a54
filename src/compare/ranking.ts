/**
 * Orders of the generators of a jet space in which equations are solved: the higher is expressed by the lower.
 * Invariant: a ranking is preserved by time derivatives, so that the derivative of a leader is the leader of the
 * derivative. Couplings have no rank. Imports jet spaces.
 */
import type { JetSpace, Place } from './jet-space.js';

/** Which functions are solved for first. They are tried in this order until one stays within the bound. */
export const RANKINGS = ['connection', 'expansion', 'matter', 'metric'] as const;
/** These put given fields above everything else, and solve the rest for matter or for the metric. */
export const ELIMINATIONS = ['elimination', 'driven elimination'] as const;
export type RankingName = (typeof RANKINGS)[number] | (typeof ELIMINATIONS)[number];

/** Rank by generator; -1 for couplings. */
export type Ranking = readonly number[];

/** Blocks: a function of a higher one is expressed by those of lower ones, whatever the orders of derivatives. */
const BLOCKS: Readonly<Record<RankingName, Readonly<Record<Place['role'], number>>>> = {
  connection: { unknown: 6, matter: 5, multiplier: 4, connection: 2, rate: 2, none: 0 },
  expansion: { unknown: 6, matter: 5, multiplier: 4, connection: 2, rate: 2, none: 0 },
  // Matter as what drives the others.
  matter: { unknown: 6, multiplier: 4, connection: 2, rate: 2, matter: 1, none: 0 },
  // Everything but the metric and its matter goes first.
  metric: { unknown: 6, multiplier: 5, connection: 4, matter: 3, rate: 2, none: 0 },
  elimination: { unknown: 6, multiplier: 4, connection: 2, matter: 3, rate: 2, none: 0 },
  'driven elimination': { unknown: 6, multiplier: 4, connection: 2, rate: 2, matter: 1, none: 0 },
};
/** Rankings in which the densities are known functions of the scale factor. */
const DRIVEN: ReadonlySet<RankingName> = new Set(['matter', 'driven elimination']);

/** Comparison keys: block, order of the derivative. */
function keyOf(name: RankingName, place: Place, gone: ReadonlySet<string>): readonly [number, number] {
  const { kind, role, order } = place;
  if (kind === 'density') return DRIVEN.has(name) ? [0, 1] : [8, 0];
  if (gone.has(place.field)) return [7, order];
  return [BLOCKS[name][role], name === 'expansion' && role === 'rate' ? order + 1 : order];
}

/** @param gone fields that are to be eliminated. */
export function rankingOf(space: JetSpace, name: RankingName, gone: ReadonlySet<string> = new Set()): Ranking {
  const keys = space.places.map((place) => keyOf(name, place, gone));
  const order = space.places.map((_, g) => g).filter((g) => space.places[g]!.kind !== 'coupling');
  // The ring lists matter and connection before rates, each with its highest jet first.
  const within = (g: number): number => {
    const { role } = space.places[g]!;
    const first = name === 'expansion' ? role === 'rate' : role !== 'rate';
    return (first ? 10_000 : 0) - fieldPlace(space, g);
  };
  order.sort((g, h) => keys[g]![0] - keys[h]![0] || keys[g]![1] - keys[h]![1] || within(g) - within(h));
  const ranks = new Array<number>(space.places.length).fill(-1);
  order.forEach((g, i) => {
    ranks[g] = i;
  });
  return ranks;
}

/** Place of the field's first generator in the ring: the same for all its jets. */
const fieldPlace = (space: JetSpace, g: number): number =>
  space.places.findIndex((place) => place.field === space.places[g]!.field);
