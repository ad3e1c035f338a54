/**
 * Matter that couples to the connection: what it adds to the Lagrangian of a geometry. Densities of spin dilute like the
 * spatial volume; a spin tensor has the components that the isotropy leaves.
 */
import { moveTo } from './algebra/collect.js';
import { constant, generator, multiply, type Poly, scale, sum, zero } from './algebra/poly.js';
import { type Rational, rational } from './algebra/rational.js';
import type { Ring } from './algebra/ring.js';
import { componentEvaluator, ringWith } from './geometry/covariant-components.js';
import type { Geometry } from './geometry/geometry.js';
import { type InvariantTensor, invariantComponents } from './geometry/invariant-components.js';
import { InputError } from './notation/diagnostics.js';
import { polyOfScalar } from './notation/scalar-poly.js';
import type { SpinSource, Theory, TheorySymbol } from './notation/theory.js';
import type { SparseTensor } from './tensor/components.js';
import { contract, namesOf, type Placed } from './tensor/contraction.js';
import { tensorTerms } from './tensor/lagrangian-sum.js';
import { expandParts } from './tensor/parts.js';

/** A component of a spin tensor at unit spatial volume, a symbol of the theory. */
export interface SpinComponent extends TheorySymbol {
  /** The tensor along this symbol, all indices lowered. */
  readonly tensor: InvariantTensor;
}

export interface SpinTensor {
  readonly source: SpinSource & { readonly kind: 'tensor' };
  /** Independent components by the slot symmetries. */
  readonly independent: number;
  readonly components: readonly SpinComponent[];
}

/** The spin tensors of a theory with the components that the geometry allows. @throws InputError `spin-form`. */
export const spinTensors = ({ spins = [], symbols }: Theory, geometry: Geometry): readonly SpinTensor[] =>
  spins.flatMap((source): SpinTensor[] => {
    if (source.kind !== 'tensor') return [];
    const { tensor, name, origin } = source;
    const { metric } = geometry.tensors;
    const { basis, independent } = invariantComponents(geometry.isotropy, metric, tensor.slots, tensor.generators);
    if (basis.length === 0) {
      const message = `the symmetry of the geometry ${geometry.id} leaves no component of ${name}`;
      const hint = 'such a spin density averages to zero there; leave it out';
      throw new InputError([{ code: 'spin-form', severity: 'error', message, hint, ...origin }]);
    }
    const components = basis.map(
      (t, i): SpinComponent => ({
        name: `${name}_${i + 1}`,
        role: 'spin',
        dimension: tensor.dimension,
        latex: `${tensor.latex}_{${i + 1}}`,
        tensor: t,
      }),
    );
    const taken = components.find((c) => symbols.some((s) => s.name === c.name));
    if (taken !== undefined) {
      const message = `the name ${taken.name} is that of a component of ${name}`;
      throw new InputError([
        { code: 'reserved-name', severity: 'error', message, hint: 'choose another name', ...origin },
      ]);
    }
    return [{ source, independent, components }];
  });

/** The axial torsion along the rest frame is u_a A^a / 12, which is psi on an isotropic geometry. */
const AXIAL: Rational = rational(1, 12);

/**
 * Volume times everything that spin adds to the Lagrangian, averages apart.
 * @param target has the jets of the geometry, the symbols of the theory and the components of spin tensors.
 */
export function spinInteraction(
  { spins = [] }: Theory,
  geometry: Geometry,
  target: Ring,
  tensors: readonly SpinTensor[],
  couple: (p: Poly) => Poly,
): Poly {
  if (spins.length === 0) return zero(target);
  const { metric } = geometry.tensors;
  const ring = ringWith(geometry, target);
  const evaluator = componentEvaluator(geometry, ring);
  const one = constant(ring, 1);
  const parts = spins.flatMap((source): Poly[] => {
    if (source.kind === 'weyssenhoff') return [];
    if (source.kind === 'axial') {
      const slots = [{ name: 'a', up: false }];
      const along = evaluator.components([{ coefficient: one, factors: [{ head: 'A', slots }] }], ['a']).entries.get(0);
      const coupling = moveTo(couple(polyOfScalar(target, source.coupling)), ring);
      return along ? [scale(multiply(multiply(coupling, generator(ring, source.name)), along), AXIAL)] : [];
    }
    const { components } = tensors.find((t) => t.source === source)!;
    const own: SparseTensor = { rank: source.tensor.slots, entries: componentsOf(components, ring) };
    return tensorTerms(target, expandParts(source.coupling).terms).map(({ coefficient, factors }) => {
      const placed = factors.map((f): Placed => {
        if (f.head === source.name) return { tensor: own, names: namesOf(f.slots) };
        // Slots are told apart while the components are taken, and contracted afterwards.
        const names = f.slots.map((_, n) => `slot ${n}`);
        const apart = f.slots.map((s, n) => ({ ...s, name: names[n]! }));
        const tensor = evaluator.components([{ coefficient: one, factors: [{ ...f, slots: apart }] }], names);
        return { tensor, names: namesOf(f.slots) };
      });
      return multiply(moveTo(couple(coefficient), ring), contract(ring, placed, metric));
    });
  });
  // Volume times a density at unit spatial volume, diluted: only the lapse is left.
  return moveTo(multiply(generator(ring, geometry.lapse), sum(ring, parts)), target);
}

function componentsOf(components: readonly SpinComponent[], ring: Ring): ReadonlyMap<number, Poly> {
  const entries = new Map<number, Poly[]>();
  for (const { name, tensor } of components)
    for (const [packed, value] of tensor) {
      const list = entries.get(packed) ?? [];
      entries.set(packed, [...list, scale(generator(ring, name), value)]);
    }
  return new Map([...entries].map(([packed, list]) => [packed, sum(ring, list)]));
}
