/**
 * Auxiliary fields against the literature: quadratic cuscutons, Einstein–Cartan theory at every spatial curvature, the scalar
 * mode of R². Phys. Rev. D 75 (2007) 083513 and 123509, 78 (2008) 023522 (memory).
 */
import { describe, expect, it } from 'vitest';
import { withAuxiliaryRoute } from '../../src/auxiliary-route.js';
import type { Derivation, RouteBranch } from '../../src/derivation.js';
import { fractionText } from '../../src/emit/scalar-fields-json.js';
import { withEveryK } from '../../src/every-k.js';
import { derive, readTheory } from '../../src/index.js';
import { integrateDirectly } from '../../src/scalartensor/auxiliary.js';
import { fieldRules } from '../../src/scalartensor/auxiliary-file.js';
import { metricForm } from '../../src/scalartensor/metric-form.js';
import { theoryText } from '../oracle/pipeline.js';
import { exampleRing, formOf } from '../scalartensor/auxiliary-examples.js';

const derivation = (lagrangian: string, constants: string[] = []): Derivation =>
  withEveryK(derive(readTheory(theoryText({ lagrangian, constants }), 'outer-mole.yaml')));

describe('quadratic cuscuton: ½M²R + μ² n·∂q − ½m²q² only shifts M² to M² − 3μ⁴/(2m²) — PRD 75 (2007) 123509 (memory)', () => {
  it('in the coefficient of R, and in the Friedmann equation at k = 0', () => {
    const names = { constants: ['M', 'mu', 'm'], scalars: ['q'] };
    const text = '1/2 M^2 R3 - 1/3 M^2 theta^2 + mu^2 D(q,1) - 1/2 m^2 q^2';
    const branch = integrateDirectly(formOf(text, names, exampleRing(names)), ['q'], fieldRules())!;
    const { reached } = metricForm(branch.form);
    expect(fractionText(reached!.functions.g4)).toBe('M^2/2 - 3*mu^4/(4*m^2)');
    // The curvature of space is not multiplied by the shifted mass, so the shift is seen at k = 0 only.
    expect(fractionText(reached!.remainder)).toBe('3*R3(n)*mu^4/(4*m^2)');
  });
});

describe('Einstein–Cartan theory is general relativity at every k — any textbook (memory)', () => {
  it('its metric analogue is a quadratic cuscuton with a gradient current; integrated out it is ½M²R', () => {
    const { everyK } = derivation('1/2 M^2 R');
    expect(fractionText(everyK!.current!.potential!)).toBe('2*phi*M^2');
    expect(everyK!.conditions!.impossible).toBe(true);
    const { branch, metric } = everyK!.integrated!;
    expect(
      branch.steps.flatMap((s) => (s.solved ? [`${s.solved.field} = ${fractionText(s.solved.value)}`] : [])),
    ).toEqual(['phi = div(n)/3', 'psi = 0']);
    expect(fractionText(metric.reached!.form.value)).toBe('R(g)*M^2/2');
  });

  it('whatever squares of torsion are added', () => {
    const { everyK } = derivation('1/2 M^2 R + b3 M^2 T_a T^a + b1 M^2 T_{abc} T^{abc} + g M^2 T_a A^a', [
      'b1',
      'b3',
      'g',
    ]);
    expect(fractionText(everyK!.integrated!.metric.reached!.form.value)).toBe('R(g)*M^2/2');
  });
});

describe('scalar mode: (a0/2) R + (b/24) R² + 3 a1 (u² − v²) — PRD 78 (2008) 023522 (memory)', () => {
  it('has one scalar χ = R at every k, singular at R = −6 (a0 + a1)/b', async () => {
    // 3 (u² − v²) = −½ [¼ T_abc T^abc + ½ T_abc T^bac − T_a T^a] · (−2) of the teleparallel combination.
    const torsion = '-1/2 a1 M^2 (1/4 T_{abc} T^{abc} + 1/2 T_{abc} T^{bac} - T_a T^a)';
    const d = derivation(`1/2 a0 M^2 R + 1/24 b R^2 - ${torsion.slice(1)}`, ['a0', 'a1', 'b']);
    const { auxiliary } = await withAuxiliaryRoute(d, { linearise: ['R'], integrate: undefined });
    const [{ metric, isCompared }] = auxiliary!.branches as [RouteBranch];
    const { functions, remainder } = metric!.reached!;
    expect([isCompared, fractionText(remainder)]).toEqual([true, '0']);
    expect(fractionText(functions.g4)).toBe('chi*b/12 + a0*M^2/2');
    expect(fractionText(functions.potential)).toBe('chi^2*b/24');
    // −(b²/24) X/(μ + bχ/6) with μ = a0 − a1 M² in the sign of a1 used here.
    expect(fractionText(functions.kinetic.get('chi,chi')!)).toMatch(
      /^\(-b\^2\/4\)\/\(chi\*b \+ 6\*a0\*M\^2 [+-] 6\*a1\*M\^2\)$/,
    );
    expect(d.terms.length).toBeGreaterThan(3);
  });
});
