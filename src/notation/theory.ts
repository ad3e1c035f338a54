/**
 * What a theory file says, checked and freed of its notation: plain data, no positions needed downstream.
 * The Lagrangian is a sum of monomials, each a rational times powers of declared symbols times tensor factors whose
 * indices obey Einstein's rule. Imports only exact rationals and diagnostics.
 */
import type { Rational } from '../algebra/rational.js';
import type { Conventions } from './convention-choices.js';
import type { Diagnostic } from './diagnostics.js';

/** A Laurent monomial in named symbols: coefficient · Π name^exponent (exponents are non-zero integers). */
export interface ScalarTerm {
  readonly coefficient: Rational;
  /** Sorted by name, no zero exponents. */
  readonly powers: readonly (readonly [name: string, exponent: number])[];
}

/** A sum of Laurent monomials in declared symbols; like terms collected, zero is the empty list. */
export type ScalarSum = readonly ScalarTerm[];

/** One slot of a tensor as typed: an index name (`a`, `\mu`) and its height. */
export interface IndexSlot {
  readonly name: string;
  readonly up: boolean;
}

/** Tensor heads that every Lagrangian may use, with their numbers of slots in docs/notation.md. */
export type TensorHead = 'R' | 'T' | 'A' | 'epsilon' | 'eta' | 'delta';

export interface TensorFactor {
  /** A `TensorHead`, or the name of a declared tensor. */
  readonly head: string;
  /** An irreducible part, one of `PARTS` (parts.ts); absent for the whole tensor. */
  readonly part?: string;
  readonly slots: readonly IndexSlot[];
}

/** A signed permutation of slots under which a tensor is unchanged: S(i) = sign · S(j) with j[n] = i[places[n]]. */
export interface SlotSymmetry {
  readonly places: readonly number[];
  readonly sign: 1 | -1;
}

/** A tensor of the user. Only its symmetry is known; no geometry gives it components. */
export interface DeclaredTensor {
  readonly name: string;
  /** Number of indices, at least 1. */
  readonly slots: number;
  /** They generate the symmetry group, which never makes the tensor vanish; without the identity. */
  readonly generators: readonly SlotSymmetry[];
  readonly latex: string;
  /** Mass dimension. */
  readonly dimension: number;
  /** Where it is declared. */
  readonly origin?: Origin;
}

/** One monomial: every index occurs twice, once up and once down, or once where an expression may have free indices. */
export interface LagrangianTerm {
  readonly scalar: ScalarTerm;
  readonly factors: readonly TensorFactor[];
}

/** What a symbol stands for: declared constant, declared scale, energy density of a vacuum fluid, density of spin. */
export type SymbolRole = 'constant' | 'scale' | 'vacuum' | 'spin';

export interface TheorySymbol {
  readonly name: string;
  readonly role: SymbolRole;
  /** Mass dimension in units c = ħ = 1: 0 for a dimensionless constant, 1 for a mass, 4 for an energy density. */
  readonly dimension: number;
  /** LaTeX of the user (`symbols:`) or derived from the name. */
  readonly latex: string;
}

/** A fluid that enters the reduced Lagrangian as −(volume) ρ. w = p/ρ. */
export interface MatterComponent {
  readonly kind: 'dust' | 'radiation' | 'vacuum' | 'fluid';
  /** `dust`, `radiation`, the fluid's own name, or the vacuum's symbol. */
  readonly name: string;
  /** Symbol of its density in every output: `rho_<name>`, or the vacuum's symbol itself. */
  readonly density: string;
  /** LaTeX of the density: the user's (`symbols:`) or derived from the name. */
  readonly latex: string;
  readonly w: Rational;
}

/** left = right, as typed in `impose` or `--set`, before it is solved. */
export interface Relation {
  readonly left: ScalarSum;
  readonly right: ScalarSum;
  /** The name when the left side is one symbol alone with coefficient 1. */
  readonly subject: string | undefined;
  /** The relation as the user typed it, white space folded. */
  readonly text: string;
  /** For diagnostics: where it was typed. */
  readonly origin: Origin;
}

/** left > right and the like, as typed in `assume`: used to decide signs, never for rewriting. */
export interface AssumedInequality {
  readonly left: ScalarSum;
  readonly right: ScalarSum;
  readonly relation: '>' | '<' | '>=' | '<=' | '!=';
  /** As the user typed it, white space folded. */
  readonly text: string;
  readonly origin: Origin;
}

/** A tensor expression that a multiplier sets to zero. */
export interface TensorConstraint {
  /** As the user typed it, white space folded. */
  readonly text: string;
  readonly terms: readonly LagrangianTerm[];
  /** Free indices in the order of the first term's slots. */
  readonly free: readonly IndexSlot[];
  readonly origin: Origin;
}

/**
 * Matter that couples to the connection. Its density dilutes with the spatial volume; `name` is its value at unit volume,
 * or the tensor whose components are such densities.
 */
export type SpinSource =
  /** Adds coupling · density · (the axial torsion along the matter's rest frame), which is psi on an isotropic geometry. */
  | { readonly kind: 'axial'; readonly name: string; readonly coupling: ScalarSum; readonly origin: Origin }
  /** Adds a scalar that is linear in the tensor. */
  | {
      readonly kind: 'tensor';
      readonly name: string;
      readonly tensor: DeclaredTensor;
      readonly coupling: readonly LagrangianTerm[];
      readonly origin: Origin;
    }
  /** Randomly oriented spins of density s, averaged into an effective fluid. */
  | { readonly kind: 'weyssenhoff'; readonly name: string; readonly origin: Origin };

/** A place in a text the user wrote; offsets count UTF-16 units from its start. */
export interface Origin {
  readonly file: string;
  readonly source: string;
  readonly start: number;
  readonly end: number;
}

export interface Theory {
  readonly name: string;
  /** Lower case, words joined by hyphens, safe as a file name: `harbour-light`. */
  readonly slug: string;
  /** As the file declares them. */
  readonly conventions: Conventions;
  /** That of the conventions; everything else below is in the internal conventions. */
  readonly signature: '-+++' | '+---';
  /** In order of declaration: constants, then scales, then vacuum symbols that were not declared. */
  readonly symbols: readonly TheorySymbol[];
  /** Symbols of the text that the units replaced by M: κ, or G. */
  readonly unitSymbols: readonly TheorySymbol[];
  /** In order of declaration. */
  readonly tensors: readonly DeclaredTensor[];
  readonly lagrangian: readonly LagrangianTerm[];
  /** In order: those of the file, then those of --set. */
  readonly relations: readonly Relation[];
  /** In order: those of the file, then those of --assume; absent when there are none. */
  readonly assumptions?: readonly AssumedInequality[];
  readonly matter: readonly MatterComponent[];
  /** In order; absent when there are none. */
  readonly constraints?: readonly TensorConstraint[];
  /** In order; absent when there are none. */
  readonly spins?: readonly SpinSource[];
  /** Name of a file in rules/geometry, without its ending. */
  readonly geometry: string;
  /** Where the geometry is named; undefined when the theory file leaves it to the default. */
  readonly geometryOrigin?: Origin;
  readonly warnings: readonly Diagnostic[];
}
