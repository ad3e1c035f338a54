/**
 * Randomly oriented spins as an effective fluid. A Weyssenhoff fluid of spin density S_ab = −S_ba, S_ab u^b = 0, adds
 * ½ S^ab K_abc u^c with the contortion K, Rev. Mod. Phys. 48 (1976) 393. Where the Lagrangian is linear in curvature and
 * quadratic in torsion, the torsion that one spin makes is algebraic: it is solved for, put back, and what remains is a
 * density in s² = ½ ⟨S_ab S^ab⟩, whatever the directions of the spins.
 */
import { partial } from './algebra/calculus.js';
import { involves, moveTo, symbolsOf } from './algebra/collect.js';
import { fraction } from './algebra/fraction.js';
import { solveLinear } from './algebra/linear-system.js';
import { constant, generator, multiply, negate, type Poly, scale, subtract, sum } from './algebra/poly.js';
import { rational } from './algebra/rational.js';
import { constantsOf, makeRing, type Ring } from './algebra/ring.js';
import { type InvariantTensor, type Isotropy, invariantComponents } from './geometry/invariant-components.js';
import { type Diagnostic, InputError } from './notation/diagnostics.js';
import type { Origin } from './notation/theory.js';
import { packIndices, type SparseTensor, TensorBuilder } from './tensor/components.js';
import type { FrameMetric } from './tensor/contraction.js';
import { canonicalSum, type TensorSum, type TensorTerm } from './tensor/expression.js';
import { makeEvaluator } from './tensor/invariants.js';
import { inMetricTerms, METRIC_CURVATURE, METRIC_NABLA_TORSION, metricKinds } from './tensor/metric-decomposition.js';
import { exchange } from './tensor/symmetry.js';

/** What leaves one spin along the third axis, in its rest frame, unchanged. */
const ABOUT_THE_SPIN: Isotropy = { rotations: [[1, 2]], reversals: [] };

const fault = (origin: Origin, message: string, hint: string): InputError => {
  const diagnostic: Diagnostic = { code: 'spin-average', severity: 'error', message, hint, ...origin };
  return new InputError([diagnostic]);
};

/**
 * c in ρ = −c s²: ¼M⁻² in Einstein–Cartan theory.
 * @param terms the Lagrangian, coefficients in `ring`.
 * @throws InputError `spin-average` when torsion is not algebraic, is not determined, or c is no single fraction of couplings.
 */
export function spinAverage(terms: readonly TensorTerm[], metric: FrameMetric, ring: Ring, origin: Origin): Poly {
  const quadratic = torsionSquared(terms, origin);
  const torsions = invariantComponents(ABOUT_THE_SPIN, metric, 3, [exchange(3, 1, 2, -1)]).basis;
  // No name of a user can be spelled so.
  const names = torsions.map((_, i) => `torsion ${i}`);
  const wide = makeRing([...ring.generators, ...constantsOf(names)]);
  const torsion = superposed(torsions, names, wide);
  const nothing: SparseTensor = { rank: 4, entries: new Map() };
  const evaluator = makeEvaluator({ ring: wide, metric, torsion, curvature: nothing });
  const value = sum(
    wide,
    quadratic.map((t) => multiply(moveTo(t.coefficient, wide), evaluator.value(t.factors))),
  );
  // S_12 = s = 1: ½ S^ab K_abc u^c = K_120 = ½ (T_012 − T_120 − T_201).
  const at = (...indices: number[]): Poly => torsion.entries.get(packIndices(indices)) ?? constant(wide, 0);
  const source = scale(subtract(at(0, 1, 2), sum(wide, [at(1, 2, 0), at(2, 0, 1)])), rational(1, 2));
  const excited = linked(value, source, names);
  const matrix = excited.map((a) => excited.map((b) => partial(partial(value, a), b)));
  const right = excited.map((a) => negate(partial(source, a)));
  const solution = solveLinear(matrix, right);
  if (!solution)
    throw fault(origin, 'the Lagrangian does not determine the torsion that spin makes', 'add a torsion-squared term');
  // At the extremum ½ t·Q t + b·t = ½ b·t, and L = −ρ.
  const half = sum(
    wide,
    excited.map((a, i) => scale(multiply(partial(source, a), solution.numerators[i]!), rational(1, 2))),
  );
  const result = fraction(half, [{ base: solution.determinant, power: 1 }]);
  const [divisor] = result.denominator;
  if (divisor !== undefined)
    throw fault(
      origin,
      'the averaged density of spin divides by a sum of couplings',
      'impose relations between them, or couple the spin itself: { spin: S, coupling: "…" }',
    );
  return moveTo(result.numerator, ring);
}

/** The part that is quadratic in torsion; curvature of the metric does not matter, derivatives of torsion are boundary terms. */
function torsionSquared(terms: readonly TensorTerm[], origin: Origin): TensorSum {
  const kinds = metricKinds();
  return inMetricTerms(canonicalSum(terms, kinds), kinds).filter(({ factors }) => {
    const curvatures = factors.filter((f) => f.head === METRIC_CURVATURE).length;
    const slopes = factors.filter((f) => f.head === METRIC_NABLA_TORSION).length;
    const torsions = factors.filter((f) => f.head === 'T').length;
    if (torsions === 2 && curvatures + slopes === 0) return true;
    if (torsions + slopes <= 1 && curvatures + slopes <= 1) return false;
    throw fault(
      origin,
      'the average of spins needs a Lagrangian linear in curvature and quadratic in torsion',
      'here torsion propagates or interacts with itself; couple the spin itself: { spin: S, coupling: "…" }',
    );
  });
}

function superposed(torsions: readonly InvariantTensor[], names: readonly string[], ring: Ring): SparseTensor {
  const builder = new TensorBuilder(3);
  torsions.forEach((t, i) => {
    for (const [packed, value] of t) builder.put(packed, scale(generator(ring, names[i]!), value));
  });
  return builder.build();
}

/** The components that the source makes, directly or through the quadratic form. */
function linked(value: Poly, source: Poly, names: readonly string[]): string[] {
  const found = symbolsOf(source).filter((n) => names.includes(n));
  for (let i = 0; i < found.length; i++) {
    const slope = partial(value, found[i]!);
    found.push(...names.filter((n) => !found.includes(n) && involves(slope, n)));
  }
  return found;
}
