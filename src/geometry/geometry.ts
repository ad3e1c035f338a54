/**
 * A geometry as the rest of the program sees it: fields of time, the components of torsion and curvature that its
 * symmetry leaves, and the roles of its symbols. Values only; made by build.ts from a file in rules/geometry.
 */
import type { Poly } from '../algebra/poly.js';
import type { Ring } from '../algebra/ring.js';
import type { GeometricTensors } from '../tensor/invariants.js';
import type { Connection, FrameData } from './cartan.js';
import type { Isotropy } from './invariant-components.js';

/** A function of time (a field), or a constant of the geometry (a parameter, for instance k). */
export interface GeometrySymbol {
  readonly name: string;
  readonly latex: string;
  readonly meaning: string;
  /** Mass dimension. */
  readonly dimension: number;
}

/** An independent component of torsion or curvature, up to a rational factor. */
export interface ComponentSymbol {
  readonly name: string;
  readonly latex: string;
  /** Its expression in the jets of the fields, in `Geometry.ring`. */
  readonly value: Poly;
}

/** What an isotropic geometry can say besides: which field scales lengths, which parameter is the spatial curvature. */
export interface IsotropicRoles {
  readonly scale: string;
  readonly curvature: string;
  /** Fields that become the scalars of the metric analogue. */
  readonly scalars: readonly string[];
}

/** Another set of variables for printing: old fields as expressions in the new ones. */
export interface AlternativeVariables {
  /** `u,v` */
  readonly key: string;
  readonly fields: readonly GeometrySymbol[];
  /** Old field → its expression in `ring`. */
  readonly images: ReadonlyMap<string, Poly>;
  readonly ring: Ring;
}

export interface Geometry {
  readonly id: string;
  readonly title: string;
  readonly source: string;
  readonly why: string;
  readonly fields: readonly GeometrySymbol[];
  readonly parameters: readonly GeometrySymbol[];
  /** Jets of the fields, parameters and radicals. */
  readonly ring: Ring;
  readonly lapse: string;
  /** Field → name of its logarithmic rate, a → H. */
  readonly rates: ReadonlyMap<string, string>;
  readonly isotropic: IsotropicRoles | undefined;
  /** What leaves the geometry at one point unchanged; further tensors get the components that it allows. */
  readonly isotropy: Isotropy;
  readonly variables: readonly AlternativeVariables[];
  /** Independent components; generators of `tensors.ring` in the same order. */
  readonly components: readonly ComponentSymbol[];
  /** Torsion and curvature over the ring of component symbols. */
  readonly tensors: GeometricTensors;
  /** Cobasis, coframe and connection themselves, in `ring`. */
  readonly frame: FrameData;
  readonly connection: Connection;
  /** Whether the structure constants have zero trace, which makes varying after symmetry reduction legitimate. */
  readonly traceless: boolean;
  /** Determinant of the coframe, in `ring`: a³N on an isotropic geometry. */
  readonly volume: Poly;
  /** The same without the lapse. */
  readonly spatialVolume: Poly;
  /** Curvature scalar of the metric connection (signature −+++), in `ring`. */
  readonly metricCurvature: Poly;
  /** Checks made while building: dd = 0, Jacobi, traceless structure constants, vanishing metric torsion. */
  readonly checks: readonly { readonly name: string; readonly holds: boolean }[];
}
