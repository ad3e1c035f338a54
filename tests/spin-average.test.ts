import { describe, expect, it } from 'vitest';
import { infix } from '../src/algebra/infix.js';
import { readTheory } from '../src/notation/read-theory.js';
import { spinAverage } from '../src/spin-average.js';
import { ringOfNames, tensorTerms } from '../src/tensor/lagrangian-sum.js';
import { errorText } from './notation/rendered.js';
import { theoryText } from './oracle/pipeline.js';

function average(lagrangian: string, signature: '-+++' | '+---' = '-+++'): string {
  const theory = readTheory(theoryText({ lagrangian, signature, constants: ['c', 'b', 'gamma'] }), 'fetch.yaml');
  const ring = ringOfNames(['M', 'c', 'b', 'gamma']);
  const metric = signature === '-+++' ? ([-1, 1, 1, 1] as const) : ([1, -1, -1, -1] as const);
  const origin = { file: 'fetch.yaml', source: '', start: 0, end: 0 };
  return infix(spinAverage(tensorTerms(ring, theory.lagrangian), metric, ring, origin));
}

const TELEPARALLEL = '1/4 T_{abc} T^{abc} + 1/2 T_{abc} T^{bac} - T_a T^a';

describe('spinAverage', () => {
  it('is 1/(4M²) in Einstein–Cartan theory, in both signatures', () => {
    expect(average('1/2 M^2 R')).toBe('1/(4*M^2)');
    expect(average('-1/2 M^2 R', '+---')).toBe('1/(4*M^2)');
  });

  it('depends on the torsion-squared terms alone: R and the teleparallel combination differ by metric terms', () => {
    expect(average(`1/2 M^2 (${TELEPARALLEL})`)).toBe('1/(4*M^2)');
    expect(average(`1/2 M^2 R + M^2 c (${TELEPARALLEL}) - M^2 c R`)).toBe('1/(4*M^2)');
  });

  it('does not see the trace of torsion, which one spin does not make', () => {
    expect(average('1/2 M^2 R + c M^2 T_a T^a')).toBe('1/(4*M^2)');
  });

  it('scales with the coefficient of R', () => {
    expect(average('1/2 c M^2 R')).toBe('1/(4*M^2*c)');
  });

  it('of T_abc T^abc alone: T_012, T_120 and T_201 are made alike', () => {
    // L = −2c (x² + y² + z²) + ½ s (x − y − z) has the extremum 3 s²/(32c).
    expect(average('c T_{abc} T^{abc}')).toBe('3/(32*c)');
  });

  it('refuses propagating, undetermined and fractional cases', () => {
    expect(errorText(() => average('1/2 M^2 R + R^2'))).toContain('linear in curvature and quadratic in torsion');
    expect(errorText(() => average('1/2 M^2 R + R T_a T^a'))).toContain('linear in curvature');
    expect(errorText(() => average('T_a T^a'))).toContain('does not determine');
    expect(errorText(() => average('1/2 M^2 R + c M^2 T_{abc} T^{abc}'))).toContain('divides by a sum');
  });
});
