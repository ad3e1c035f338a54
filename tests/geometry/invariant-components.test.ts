import { describe, expect, it } from 'vitest';
import { type Rational, rational, toNumber } from '../../src/algebra/rational.js';
import { geometryNames, loadGeometry } from '../../src/geometry/build.js';
import {
  type InvariantTensor,
  invariantComponents,
  isInvariant,
  MAX_INVARIANT_SLOTS,
} from '../../src/geometry/invariant-components.js';
import { packIndices, unpackIndices } from '../../src/tensor/components.js';
import { closeGroup, exchange, type SignedPermutation, SymmetryError } from '../../src/tensor/symmetry.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const METRIC = [-1, 1, 1, 1] as const;
const flrw = loadGeometry('flrw', '-+++');
const bianchi = loadGeometry('bianchi-i', '-+++');
const count = (slots: number, generators: readonly SignedPermutation[] = [], geometry = flrw): [number, number] => {
  const found = invariantComponents(geometry.isotropy, geometry.tensors.metric, slots, generators);
  return [found.basis.length, found.independent];
};
const CURVATURE = [exchange(4, 0, 1, -1), exchange(4, 2, 3, -1)];

describe('published counts — Phys. Lett. A 75 (1979) 27 (memory)', () => {
  it('isotropic torsion has 2 of 24 components, curvature 4 of 36', () => {
    expect(count(3, [exchange(3, 1, 2, -1)])).toEqual([2, 24]);
    expect(count(4, CURVATURE)).toEqual([4, 36]);
  });

  it('the same in the other signature', () => {
    const other = loadGeometry('flrw', '+---');
    expect(count(3, [exchange(3, 1, 2, -1)], other)).toEqual([2, 24]);
    expect(count(4, CURVATURE, other)).toEqual([4, 36]);
  });

  it('torsion of diagonal Bianchi I has six', () => {
    expect(count(3, [exchange(3, 1, 2, -1)], bianchi)).toEqual([6, 24]);
  });
});

/** Invariants under rotations of the last three axes by characters: the average of χ over slot permutations and angles. */
function byCharacters(group: readonly SignedPermutation[]): number {
  const SAMPLES = 64;
  let total = 0;
  for (const { places, sign } of group) {
    const lengths = cycles(places);
    for (let n = 0; n < SAMPLES; n++) {
      const angle = (2 * Math.PI * n) / SAMPLES;
      // The density of rotation angles is (1 − cos θ)/2π; the trace on a cycle of m slots is that of the m-th power.
      total +=
        (sign * (1 - Math.cos(angle)) * lengths.reduce((p, m) => p * (2 + 2 * Math.cos(m * angle)), 1)) / SAMPLES;
    }
  }
  return total / group.length;
}

function cycles(places: readonly number[]): number[] {
  const seen = new Set<number>();
  return places.flatMap((_, start) => {
    let length = 0;
    for (let at = start; !seen.has(at); at = places[at]!) {
      seen.add(at);
      length++;
    }
    return length === 0 ? [] : [length];
  });
}

/** Signed permutations that leave something of a tensor. */
function randomSymmetry(random: Random, slots: number): SignedPermutation[] {
  for (;;) {
    const generators = Array.from({ length: random.below(3) }, (): SignedPermutation => {
      const order = Array.from({ length: slots }, (_, i) => i);
      const kind = random.below(3);
      const sign = random.chance(50) ? 1 : -1;
      if (kind === 0 || slots < 2) return { places: random.shuffled(order), sign };
      const i = random.below(slots - 1);
      return exchange(slots, i, i + 1, sign);
    });
    try {
      closeGroup(slots, generators);
      return generators;
    } catch (error) {
      if (!(error instanceof SymmetryError)) throw error;
    }
  }
}

/** A random rotation of the last three axes, from a quaternion. */
function randomRotation(random: Random): number[][] {
  const raw = [0, 1, 2, 3].map(() => random.below(2001) - 1000 + 0.5);
  const norm = Math.hypot(...raw);
  const [w, x, y, z] = raw.map((q) => q / norm) as [number, number, number, number];
  return [
    [1, 0, 0, 0],
    [0, 1 - 2 * (y * y + z * z), 2 * (x * y - w * z), 2 * (x * z + w * y)],
    [0, 2 * (x * y + w * z), 1 - 2 * (x * x + z * z), 2 * (y * z - w * x)],
    [0, 2 * (x * z - w * y), 2 * (y * z + w * x), 1 - 2 * (x * x + y * y)],
  ];
}

function turned(dense: readonly number[], slots: number, by: readonly (readonly number[])[]): number[] {
  let values = [...dense];
  for (let slot = 0; slot < slots; slot++) {
    const step = 4 ** (slots - 1 - slot);
    values = values.map((_, packed) => {
      const index = Math.floor(packed / step) % 4;
      return [0, 1, 2, 3].reduce((sum, j) => sum + by[index]![j]! * values[packed + (j - index) * step]!, 0);
    });
  }
  return values;
}

const dense = (tensor: InvariantTensor, slots: number): number[] =>
  Array.from({ length: 4 ** slots }, (_, packed) => toNumber(tensor.get(packed) ?? rational(0)));

describe('invariantComponents', () => {
  it('agrees with characters and is unchanged by random rotations, for random slot symmetries', () => {
    for (let run = 0; run < runs(40); run++) {
      const seed = firstSeed(710) + run;
      const random = new Random(seed);
      const slots = random.below(6);
      const generators = randomSymmetry(random, slots);
      const group = closeGroup(slots, generators);
      const { basis, independent } = invariantComponents(flrw.isotropy, METRIC, slots, generators);
      const at = `seed ${seed}: ${slots} slots, ${JSON.stringify(generators)}`;
      expect(basis.length, at).toBe(Math.round(byCharacters(group)));
      expect(Math.abs(byCharacters(group) - basis.length), at).toBeLessThan(1e-6);
      expect(independent, at).toBe(
        Math.round(group.reduce((n, g) => n + g.sign * 4 ** cycles(g.places).length, 0) / group.length),
      );
      const rotation = randomRotation(random);
      for (const tensor of basis) {
        const before = dense(tensor, slots);
        const after = turned(before, slots, rotation);
        for (const [packed, value] of after.entries()) expect(value, at).toBeCloseTo(before[packed]!, 9);
        for (const { places, sign } of generators)
          for (const [packed, value] of tensor) {
            const indices = unpackIndices(packed, slots);
            const image = tensor.get(packIndices(places.map((p) => indices[p]!)));
            expect(image && toNumber(image) * sign, at).toBe(toNumber(value));
          }
      }
    }
  });

  it('averaging over random rotations leaves a random tensor in the span', () => {
    const random = new Random(firstSeed(740));
    const slots = 4;
    const { basis } = invariantComponents(flrw.isotropy, METRIC, slots, CURVATURE);
    const group = closeGroup(slots, CURVATURE);
    const raw = Array.from({ length: 4 ** slots }, () => random.below(21) - 10);
    const symmetric = raw.map((_, packed) => {
      const indices = unpackIndices(packed, slots);
      return group.reduce((sum, g) => sum + g.sign * raw[packIndices(g.places.map((p) => indices[p]!))]!, 0) / 4;
    });
    // The rotations of a cube with one random rotation on either side average second powers of the representation fast.
    let mean = symmetric;
    for (let n = 0; n < 60; n++) {
      const moved = turned(mean, slots, randomRotation(random));
      mean = mean.map((v, i) => (v + moved[i]!) / 2);
    }
    const coefficients = basis.map((b) => mean[[...b.keys()][0]!]!);
    const projected = mean.map((_, i) =>
      basis.reduce((sum, b, n) => sum + coefficients[n]! * toNumber(b.get(i) ?? rational(0)), 0),
    );
    for (const [i, v] of mean.entries()) expect(v).toBeCloseTo(projected[i]!, 5);
    expect(Math.max(...mean.map(Math.abs))).toBeGreaterThan(0.05);
  });

  it('boosts and rotations together leave the metric and the volume', () => {
    const lorentz = {
      rotations: [
        [0, 1],
        [0, 2],
        [0, 3],
        [1, 2],
        [2, 3],
      ],
      reversals: [],
    } as const;
    const metric = invariantComponents(lorentz, METRIC, 2).basis;
    expect(metric.map((t) => [...t].map(([n, v]) => [n, toNumber(v)]))).toEqual([
      [
        [0, 1],
        [5, -1],
        [10, -1],
        [15, -1],
      ],
    ]);
    expect(invariantComponents(lorentz, METRIC, 4).basis).toHaveLength(4);
  });

  it('refuses too many slots and symmetries that leave nothing', () => {
    expect(() => count(MAX_INVARIANT_SLOTS + 1)).toThrow(RangeError);
    expect(() => count(2, [{ places: [0, 1], sign: -1 }])).toThrow(SymmetryError);
  });

  it('the most general connection of a geometry has as many functions as torsion has invariant components', () => {
    for (const id of ['flrw', 'bianchi-i']) {
      const geometry = loadGeometry(id, '-+++');
      const functions = geometry.fields.filter((f) => f.name !== geometry.lapse && !geometry.rates.has(f.name));
      expect(count(3, [exchange(3, 1, 2, -1)], geometry)[0]).toBe(functions.length);
    }
  });
});

describe('isInvariant', () => {
  const none = (terms: readonly (readonly [number, Rational])[]): boolean =>
    terms.reduce((sum, [sign, value]) => sum + sign * toNumber(value), 0) === 0;

  it('holds for invariant tensors and fails when one component is changed', () => {
    for (const id of geometryNames()) {
      const { isotropy } = loadGeometry(id, '-+++');
      for (const tensor of invariantComponents(isotropy, METRIC, 3).basis)
        expect(isInvariant(tensor, 3, isotropy, METRIC, none)).toBe(true);
    }
    const [epsilon] = invariantComponents(flrw.isotropy, METRIC, 3, [
      exchange(3, 0, 1, -1),
      exchange(3, 1, 2, -1),
    ]).basis;
    expect(
      isInvariant(new Map([...epsilon!, [packIndices([1, 2, 3]), rational(2)]]), 3, flrw.isotropy, METRIC, none),
    ).toBe(false);
  });
});
