/**
 * The pipeline: theory → contractions → reduced Lagrangian → equations → scalar-tensor form. One direction; each stage a
 * pure function, each result checked by a second route before it is returned.
 */

import { eulerLagrange, timeDerivative } from './algebra/calculus.js';
import { moveTo, symbolsOf } from './algebra/collect.js';
import { fraction } from './algebra/fraction.js';
import { add, equals, generator, isZero, multiply, type Poly } from './algebra/poly.js';
import type { Ring } from './algebra/ring.js';
import { knowledgeFor } from './assumptions.js';
import { constrainedTheory } from './constrained.js';
import type { Check, Derivation, FluidValue, FriedmannForm, ScalarTensorForm } from './derivation.js';
import type { Geometry } from './geometry/geometry.js';
import { symbolicValue } from './geometry/reduction.js';
import { couplingCombinations, screeningConditions } from './mechanics/couplings.js';
import { conservationResidual, friedmannForm } from './mechanics/friedmann.js';
import { noetherResidual } from './mechanics/identities.js';
import { dropTotalDerivatives } from './mechanics/total-derivatives.js';
import { InputError } from './notation/diagnostics.js';
import type { Theory } from './notation/theory.js';
import { biScalarForm, type Gravity } from './scalartensor/biscalar.js';
import { PLANCK_MASS, settingOf } from './setting.js';
import { spinResult } from './spin-elimination.js';

/**
 * Derives everything about a theory.
 * @param onStep is told what is about to be done, for a progress line.
 * @throws InputError when the theory is at fault (unknown geometry, contradictory relations, a limit exceeded);
 * Error when a check fails, which means that this program is wrong.
 */
export function derive(given: Theory, onStep: (what: string) => void = () => {}): Derivation {
  const setting = settingOf(given, onStep);
  const { theory, geometry, ring, relations, terms, gravity, spin, matter, fluids, lagrangian, couple, fix } = setting;
  if (!geometry.traceless) throw classB(geometry);
  const knowledge = theory.assumptions && knowledgeFor(theory, ring, relations, (p) => fix(couple(p)));

  onStep('varying the Lagrangian');
  const fields = setting.fields.map((f) => f.name);
  const variation = (of: Poly) => new Map(fields.map((q) => [q, eulerLagrange(of, q)] as const));
  const gravityEquations = variation(gravity);
  const matterEquations = variation(matter);
  // What couples to the connection acts on it like a part of gravity; the metric analogue is that of gravity alone.
  const coupledEquations = isZero(spin) ? gravityEquations : variation(add(gravity, spin));
  const equations = new Map(fields.map((q) => [q, add(coupledEquations.get(q)!, matterEquations.get(q)!)] as const));

  const checks: Check[] = geometry.checks.map((c) => ({ ...c, detail: `geometry ${geometry.id}` }));
  const check = (name: string, detail: string, holds: boolean): void => {
    if (!holds) throw new Error(`check failed: ${name} (${detail})`);
    checks.push({ name, holds, detail });
  };
  check(
    'Noether identity of time reparametrisation',
    `the velocities times their equations add up to ${geometry.lapse} times the rate of the equation of ${geometry.lapse}`,
    isZero(noetherResidual(equations, geometry.lapse)),
  );
  for (const fluid of fluids)
    check('continuity of matter', `${fluid.name}: dρ/dt from its law of dilution`, continuity(fluid, geometry));

  const movable = fields.filter((q) => q !== geometry.lapse);
  const { reduced, primitive } = dropTotalDerivatives(gravity, movable, geometry.lapse);
  const boundary = timeDerivative(primitive);
  check(
    'total derivatives',
    'what was dropped is the time derivative of the stated expression',
    equals(gravity, add(reduced, boundary)),
  );
  check(
    'equations without total derivatives',
    'the time derivative that was dropped contributes to no Euler–Lagrange expression',
    fields.every((q) => isZero(eulerLagrange(boundary, q))),
  );

  const friedmann = friedmannOf(geometry, ring, coupledEquations, couple, check);
  onStep('looking for the scalar-tensor form');
  const branches = setting.constrained.length > 0 ? constrainedTheory(setting, equations, knowledge, check) : undefined;
  const scalarTensor =
    branches?.scalarTensor ?? scalarTensorOf(geometry, ring, { reduced, equations: gravityEquations }, check);
  const parameters = geometry.parameters.map((p) => p.name);
  const scales = theory.symbols.filter((s) => s.role === 'scale').map((s) => s.name);
  const curvature = geometry.isotropic?.curvature;
  return Object.freeze({
    theory,
    geometry,
    fields: setting.fields,
    ring,
    relations,
    terms,
    ...(setting.rewriting.length > 0 ? { rewriting: setting.rewriting } : {}),
    invariants: terms
      .filter((t) => t.factors.length > 0)
      .map(({ factors }) => ({ factors, value: symbolicValue(geometry, factors) })),
    gravity: fix(gravity),
    fluids,
    lagrangian: fix(lagrangian),
    reducedGravity: fix(reduced),
    dropped: fix(primitive),
    equations: new Map([...equations].map(([q, e]) => [q, fix(e)])),
    combinations: couplingCombinations(fix(reduced), parameters, scales).filter((p) => symbolsOf(p).length > 0),
    // With constraints k acts through their solutions, which the coefficients do not show.
    screening:
      curvature === undefined || branches ? undefined : screeningConditions(reduced, curvature, parameters, scales),
    friedmann: friedmann && fixFriedmann(friedmann, fix),
    // The form speaks about other values of k too, so a value imposed on k is not put into its obstruction.
    scalarTensor,
    ...(branches ? { constrained: branches.constrained } : {}),
    ...(theory.spins ? { spin: spinResult(setting, friedmann, check) } : {}),
    ...(knowledge ? { knowledge } : {}),
    checks,
  });
}

/** V dρ/dt + (ρ + p) dV/dt = 0 for the spatial volume V. */
function continuity({ rho, pressure }: FluidValue, geometry: Geometry): boolean {
  const volume = moveTo(geometry.spatialVolume, rho.ring);
  return isZero(add(multiply(volume, timeDerivative(rho)), multiply(add(rho, pressure), timeDerivative(volume))));
}

const classB = ({ id }: Geometry): InputError =>
  new InputError([
    {
      code: 'geometry-class-b',
      severity: 'error',
      message: `the structure constants of the geometry ${id} have a non-zero trace`,
      hint: 'varying a Lagrangian after imposing such a symmetry gives wrong equations; --covariant takes the covariant ones',
    },
  ]);

type Checker = (name: string, detail: string, holds: boolean) => void;

function friedmannOf(
  geometry: Geometry,
  ring: Ring,
  gravityEquations: ReadonlyMap<string, Poly>,
  couple: (p: Poly) => Poly,
  check: Checker,
): Pick<FriedmannForm, 'rhoT' | 'pT'> | undefined {
  if (!geometry.isotropic) return undefined;
  const { lapse, isotropic } = geometry;
  const planckMassSquared = couple(generator(ring, PLANCK_MASS, 2));
  const roles = { lapse, scale: isotropic.scale, curvature: isotropic.curvature, planckMassSquared };
  const form = friedmannForm(gravityEquations, roles);
  check(
    'conservation of the effective fluid',
    'dρ_T/dt + 3H(ρ_T + p_T) vanishes on the equations of the connection',
    isZero(conservationResidual(form, gravityEquations, roles)),
  );
  return form;
}

function fixFriedmann(form: Pick<FriedmannForm, 'rhoT' | 'pT'>, fix: (p: Poly) => Poly): FriedmannForm {
  const rhoT = fix(form.rhoT);
  const pT = fix(form.pT);
  return {
    rhoT,
    pT,
    get wT() {
      return isZero(rhoT) ? undefined : fraction(pT, [{ base: rhoT, power: 1 }]);
    },
  };
}

function scalarTensorOf(geometry: Geometry, ring: Ring, gravity: Gravity, check: Checker): ScalarTensorForm {
  const { isotropic, lapse } = geometry;
  if (!isotropic)
    return {
      form: 'none',
      reason: `a metric analogue is defined on an isotropic background; the geometry ${geometry.id} is none`,
      offending: undefined,
    };
  const outcome = biScalarForm(gravity, {
    lapse,
    ...isotropic,
    metricCurvature: moveTo(geometry.metricCurvature, ring),
    volume: moveTo(geometry.volume, ring),
  });
  if (!outcome.found) return { form: 'none', reason: outcome.reason, offending: outcome.offending };
  check(
    'scalar-tensor form',
    'reduced again from its covariant form on the metric geometry it has the same Euler–Lagrange expressions at k = 0',
    true,
  );
  const everywhere = isZero(outcome.obstruction);
  if (everywhere) check('scalar-tensor form at every k', 'the curvature obstruction vanishes identically', true);
  return {
    form: 'bi-scalar',
    validFor: everywhere ? 'every k' : 'k = 0',
    ...outcome.functions,
    obstruction: outcome.obstruction,
  };
}
