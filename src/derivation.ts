/**
 * Everything that a derivation finds, as one frozen value: what the emitters read. Polynomials live in `ring` unless said
 * otherwise; expressions keep the lapse N and are exact.
 */
import type { Fraction } from './algebra/fraction.js';
import type { Poly } from './algebra/poly.js';
import type { Ring } from './algebra/ring.js';
import type { Knowledge } from './algebra/signs.js';
import type { Geometry, GeometrySymbol } from './geometry/geometry.js';
import type { Branch } from './mechanics/branches.js';
import type { SolvedConditions } from './mechanics/linear-conditions.js';
import type { ConstrainedTensor } from './multipliers.js';
import type { LagrangianTerm, TensorFactor, Theory, TheorySymbol } from './notation/theory.js';
import type { ScalarFields } from './scalar-fields.js';
import type { EliminationBranch } from './scalartensor/auxiliary.js';
import type { ConstraintVectorForm } from './scalartensor/constraint-vector.js';
import type { CurrentResult } from './scalartensor/current-zeros.js';
import type { MetricForm } from './scalartensor/metric-form.js';
import type { VectorForm } from './scalartensor/vector-form.js';
import type { SpinTensor } from './spin.js';
import type { TensorSum } from './tensor/expression.js';
import type { Step } from './tensor/rewrite.js';
import type { CovariantEquations, Momenta } from './tensor/variation.js';

/** A statement that was tested exactly during the derivation. A check that fails stops the derivation with an error. */
export interface Check {
  readonly name: string;
  readonly holds: boolean;
  /** What was compared, for the report. */
  readonly detail: string;
}

/** Value of one product of tensors on the geometry. */
export interface InvariantValue {
  readonly factors: readonly TensorFactor[];
  /** In `geometry.tensors.ring`, the ring of component symbols. */
  readonly value: Poly;
}

/** What `impose` and `--set` came to. */
export interface ImposedRelations {
  /** Symbol → its value in the remaining symbols, in order of elimination. */
  readonly eliminated: ReadonlyMap<string, Poly>;
  /** Relations that could not be solved: polynomial = 0, never used for rewriting. */
  readonly conditions: readonly { readonly text: string; readonly value: Poly }[];
}

/** Fluids as they enter: density symbol, equation of state, and whether the symbol is a function of time. */
export interface FluidValue {
  readonly name: string;
  readonly density: string;
  /** ρ in the ring, for instance rho_dust/a^3. */
  readonly rho: Poly;
  /** p = wρ in the ring. */
  readonly pressure: Poly;
  /** Whether `density` is ρ itself rather than its value at a = 1. */
  readonly isSource: boolean;
}

/** 3M²(H² + k/a²) = ρ + rho_T and −M²(2Ḣ + 3H² + k/a²) = p + p_T on the equations of the lapse and of the scale factor. */
export interface FriedmannForm {
  readonly rhoT: Poly;
  readonly pT: Poly;
  /** p_T/rho_T; undefined when rho_T vanishes identically. */
  readonly wT: Fraction | undefined;
}

/** √−g [G4 R + Σ K_AB X^AB + J·∂ − V] on the metric geometry; X^AB = −½ ∂A·∂B once per unordered pair. Lapse 1. */
export interface BiScalarForm {
  readonly form: 'bi-scalar';
  readonly validFor: 'every k' | 'k = 0';
  readonly g4: Poly;
  /** Keys `phi,phi`, `phi,psi`, `psi,psi` for scalars [phi, psi]; every unordered pair is present. */
  readonly kinetic: ReadonlyMap<string, Poly>;
  /** J_A by scalar: +J_A Ȧ in the reduced Lagrangian; covariantly √|J_μ J^μ| with J_μ = Σ J_A ∂_μ A. */
  readonly current: ReadonlyMap<string, Poly>;
  readonly potential: Poly;
  /** Torsion theory minus this form per a³N at k ≠ 0, up to total derivatives; D(q,1) stands for D(q,1)/N. */
  readonly obstruction: Poly;
}

export interface NoScalarTensorForm {
  readonly form: 'none';
  readonly reason: string;
  /** Terms of the reduced Lagrangian (lapse 1, per a³) that no bi-scalar form produces; empty when the reason is another. */
  readonly offending: Poly | undefined;
}

export type ScalarTensorForm = BiScalarForm | NoScalarTensorForm;

/** Field equations in index notation, in the ring of the derivation; free indices a, b, c(, d) are down. */
export interface CovariantTheory {
  /** The Lagrangian in canonical form, in the ring of the derivation. */
  readonly lagrangian: TensorSum;
  /** P_abc = ∂L/∂T^abc and Q_abcd = ∂L/∂R^abcd, free indices a, b, c(, d). */
  readonly momenta: Momenta;
  /** E_ab and E_abc with the momenta expanded. */
  readonly equations: CovariantEquations;
  /** The same with P and Q kept as symbols. */
  readonly withMomenta: CovariantEquations;
  /** The Lagrangian in terms of the metric connection and torsion. */
  readonly inMetricTerms: TensorSum;
  /** Whether the printed equations keep P and Q. */
  readonly keepMomenta: boolean;
  readonly checks: readonly Check[];
}

/** The Lagrangian written in conventions other than the internal ones. */
export interface LagrangianElsewhere {
  /** What the user calls these conventions: the name of a preset, a file, or `the theory file`. */
  readonly name: string;
  readonly terms: readonly LagrangianTerm[];
  readonly symbols: readonly TheorySymbol[];
}

/** What the constraints leave on one branch of their solutions. Expressions are in the branch's own ring. */
export interface ConstrainedBranch extends Branch {
  /** `psi = 0, phi = sqrt(-k)/a (k < 0)`; either sign of a root is meant. */
  readonly name: string;
  /** Volume times the Lagrangian, matter included, in the fields that are left. */
  readonly lagrangian: Poly;
  /** Its gravitational part without total derivatives. */
  readonly reduced: Poly;
  /** Euler–Lagrange expressions of `lagrangian`, by field; the multipliers are gone unless their constraint remains. */
  readonly equations: ReadonlyMap<string, Poly>;
  /** Equations of the solved fields, which fix the multipliers. */
  readonly multiplierEquations: ReadonlyMap<string, Poly>;
  /** Multipliers that no equation fixes. */
  readonly undetermined: readonly string[];
  /** Equations of the solved fields without any multiplier: further conditions on this branch. */
  readonly further: ReadonlyMap<string, Poly>;
  readonly friedmann: Pick<FriedmannForm, 'rhoT' | 'pT'> | undefined;
  readonly scalarTensor: ScalarTensorForm;
  /** Assumptions that made conditions of this branch true, which are no longer listed. */
  readonly used: readonly string[];
}

/** Constraints by multipliers and what follows from them. */
export interface Constrained {
  readonly tensors: readonly ConstrainedTensor[];
  readonly branches: readonly ConstrainedBranch[];
  /** Whether every branch was found; otherwise the search was given up at its limit. */
  readonly complete: boolean;
  /** Branches that the assumptions rule out, and which of them. */
  readonly excluded: readonly { readonly name: string; readonly used: readonly string[] }[];
}

/** The connection eliminated in favour of spin, where it is algebraic. */
export interface SpinElimination {
  /** Field → its value on the equations of the connection. */
  readonly solution: ReadonlyMap<string, Fraction>;
  /** What spin adds to the energy density and, where it depends on the scale factor alone, to the pressure. */
  readonly rho: Fraction;
  readonly p: Fraction | undefined;
}

export interface SpinResult {
  readonly tensors: readonly SpinTensor[];
  readonly averages: readonly FluidValue[];
  /** Volume times what couples spin to the connection. */
  readonly interaction: Poly;
  /** Undefined when there is nothing to eliminate; a text says why it cannot be done. */
  readonly elimination: SpinElimination | string | undefined;
}

/** A form without the fields of the connection, which holds for every k. */
export interface IntegratedForm {
  readonly branch: EliminationBranch;
  readonly metric: MetricForm;
}

/** What holds for every spatial curvature, and where the metric analogue stops to. */
export interface EveryK {
  readonly vector: ConstraintVectorForm;
  /** How the rules lead from there to the metric analogue, or where they stop; absent for a theory with constraints. */
  readonly metric: MetricForm | undefined;
  /** The current whose root the analogue contains, when it has one. */
  readonly current: CurrentResult | undefined;
  /** Conditions on the couplings for the analogue to hold for every k; absent when there is no analogue. */
  readonly conditions: SolvedConditions | undefined;
  /** Conditions on the couplings for k to drop out of the equations, solved as far as they are linear. */
  readonly screening: SolvedConditions | undefined;
  /** Where the analogue does not hold for every k: the fields of the connection integrated out, when that can be done directly. */
  readonly integrated: IntegratedForm | undefined;
}

/** A field χ that makes powers of a scalar X linear. */
export interface LinearisedField {
  readonly name: string;
  readonly latex: string;
  /** X as typed, or the name of a component. */
  readonly scalar: string;
  /** X, in the ring of the route's start. */
  readonly value: Poly;
}

export interface RouteBranch {
  readonly branch: EliminationBranch;
  /** Absent when a root of an equation or a constraint is left. */
  readonly metric: MetricForm | undefined;
  /** Whether its equations were compared with those of the theory; substitution was verified in any case. */
  readonly isCompared: boolean;
  readonly current: CurrentResult | undefined;
}

/** Powers made linear by auxiliary fields, and fields integrated out. */
export interface AuxiliaryRoute {
  readonly fields: readonly LinearisedField[];
  /** Where this vanishes the fields are not determined by their equations; undefined without fields. */
  readonly hessian: Poly | undefined;
  readonly start: VectorForm;
  /** The fields that were to be integrated out, in order. */
  readonly integrated: readonly string[];
  readonly branches: readonly RouteBranch[];
}

export interface Derivation {
  readonly theory: Theory;
  readonly geometry: Geometry;
  /** Functions of time that are varied: those of the geometry, then multipliers. */
  readonly fields: readonly GeometrySymbol[];
  /** Jets of the geometry's fields (orders 0 to 3), its parameters, all symbols of the theory, M, densities. */
  readonly ring: Ring;
  readonly relations: ImposedRelations;
  /** The Lagrangian after the relations were applied; like terms collected. */
  readonly terms: readonly { readonly coefficient: Poly; readonly factors: LagrangianTerm['factors'] }[];
  /** Rules that rewrote the Lagrangian before it was contracted, in the order in which they fired. */
  readonly rewriting?: readonly Step[];
  readonly invariants: readonly InvariantValue[];
  /** Exact a³N·L of the torsion theory with its multipliers, without matter. */
  readonly gravity: Poly;
  readonly fluids: readonly FluidValue[];
  /** gravity − Σ (volume) ρ, with the interaction of spin: what the equations are derived from. */
  readonly lagrangian: Poly;
  /** gravity = reducedGravity + d/dt dropped. */
  readonly reducedGravity: Poly;
  readonly dropped: Poly;
  /** Field → ∂L/∂q − d/dt ∂L/∂q̇ of `lagrangian`, in the order of the geometry's fields. */
  readonly equations: ReadonlyMap<string, Poly>;
  /** Further components of the field equations that no field's equation contains; only where they are known. */
  readonly constraints?: ReadonlyMap<string, Poly>;
  /** Linearly independent combinations of couplings on which the background depends. */
  readonly combinations: readonly Poly[];
  /** Polynomials in the couplings that must all vanish for k to drop out; undefined when the geometry has no k. */
  readonly screening: readonly Poly[] | undefined;
  readonly friedmann: FriedmannForm | undefined;
  readonly scalarTensor: ScalarTensorForm;
  /** On isotropic geometries. */
  readonly everyK?: EveryK;
  /** Present when it was asked for. */
  readonly auxiliary?: AuxiliaryRoute;
  /** Assumptions as knowledge about signs; present when the theory has any. */
  readonly knowledge?: Knowledge;
  /** Conformal frames, classes of the scalars, canonical fields: present when asked for. */
  readonly scalarFields?: ScalarFields;
  /** In the conventions of the theory file when they are not the internal ones, and in those asked for. */
  readonly elsewhere?: readonly LagrangianElsewhere[];
  /** Present when the theory has constraints. */
  readonly constrained?: Constrained;
  /** Present when matter has spin. */
  readonly spin?: SpinResult;
  /** Present when it was asked for. */
  readonly covariant?: CovariantTheory;
  readonly checks: readonly Check[];
}
