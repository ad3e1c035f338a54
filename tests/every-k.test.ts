import { describe, expect, it } from 'vitest';
import { infix } from '../src/algebra/infix.js';
import type { Derivation } from '../src/derivation.js';
import { derive } from '../src/derive.js';
import { withEveryK } from '../src/every-k.js';
import { readTheory } from '../src/notation/read-theory.js';
import { theoryText, type Wanted } from './oracle/pipeline.js';

const NAMES = ['c0', 'a1', 'a2', 'a3', 'a4', 'a5', 'a6', 'b1', 'b2', 'b3', 's'];
const of = (wanted: Partial<Wanted> & { readonly lagrangian: string; readonly tensors?: string[] }): Derivation =>
  withEveryK(derive(readTheory(theoryText({ constants: NAMES, ...wanted }), 'weir.yaml')));
const TEN = `1/2 c0 M^2 R + a1 R^2 + a2 R_{ab} R^{ab} + a3 R_{ab} R^{ba} + a4 R_{abcd} R^{abcd}
  + a5 R_{abcd} R^{acbd} + a6 R_{abcd} R^{cdab} + M^2 ( b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a )`;

describe('withEveryK', () => {
  it('adds its checks, and nothing a second time or on another geometry', () => {
    const d = of({ lagrangian: '1/2 M^2 R' });
    expect(d.checks.slice(-4).map((c) => [c.name, c.holds])).toEqual([
      ['constraint-vector form', true],
      ['two routes to the scalar-tensor form', true],
      ['scalar-tensor form with its obstruction', true],
      ['connection integrated out', true],
    ]);
    expect(withEveryK(d)).toBe(d);
    expect(of({ lagrangian: '1/2 M^2 R', geometry: 'bianchi-i' }).everyK).toBeUndefined();
  });

  it('solves the conditions for the analogue to hold for every k: P = 0, S − 2P = 0, 6 c0 + t_u = 0', () => {
    const { conditions, metric } = of({ lagrangian: TEN }).everyK!;
    expect(metric!.stop!.rule).toBe('spatial-curvature');
    expect(conditions!.impossible).toBe(false);
    const solved = Object.fromEntries([...conditions!.solved].map(([n, p]) => [n, infix(p)]));
    expect(Object.keys(solved)).toHaveLength(3);
    // With these values imposed, the analogue holds for every k.
    const impose = Object.entries(solved).map(([n, text]) => `${n} = ${text.replaceAll('*', ' ')}`);
    const fixed = of({ lagrangian: TEN, impose });
    expect(fixed.scalarTensor).toMatchObject({ validFor: 'every k' });
    expect(fixed.everyK!.metric!.stop).toBeUndefined();
  });

  it('solves the conditions of k-screening: P = 0 and c0 = 0, with the coefficient of A1 A3 + A2 A4 for odd parity', () => {
    const { screening } = of({ lagrangian: `${TEN} + s \\epsilon^{abcd} R_{abef} R_{cd}{}^{ef}` }).everyK!;
    const solved = Object.fromEntries([...screening!.solved].map(([n, p]) => [n, infix(p)]));
    expect(solved.c0).toBe('0');
    expect(solved.s).toBe('0');
    expect(Object.keys(solved)).toHaveLength(3);
    const impose = Object.entries(solved).map(([n, text]) => `${n} = ${text.replaceAll('*', ' ')}`);
    expect(of({ lagrangian: TEN, impose: impose.filter((r) => !r.startsWith('s ')) }).screening).toEqual([]);
  });

  it('keeps k as a symbol where a value is imposed on it', () => {
    const { everyK } = of({ lagrangian: '1/2 M^2 R', impose: ['k = 0'] });
    expect(infix(everyK!.vector.form.value.numerator)).toContain('R3(n)');
  });

  it('has the vector form of a theory with constraints, its multipliers as scalars, and no way to a metric analogue', () => {
    const text = `${theoryText({ lagrangian: '1/2 M^2 R' })}constrain: ["T_a"]\n`;
    const { everyK } = withEveryK(derive(readTheory(text, 'weir.yaml')));
    expect(everyK!.vector.form.scalars).toHaveLength(3);
    expect([everyK!.metric, everyK!.vector.inComponents]).toEqual([undefined, undefined]);
  });

  it('takes matter with spin along', () => {
    const S = 'S: { indices: 3, symmetry: "S_{abc} = -S_{acb}", dimension: mass^3 }';
    const d = of({
      lagrangian: '1/2 M^2 R',
      tensors: [S],
      matter: ['dust', '{ spin: S, coupling: "S_{abc} T^{abc}" }'],
    } as never);
    expect(infix(d.everyK!.integrated!.metric.reached!.form.value.numerator)).toBe('R(g)*M^2/2');
  });

  it('goes beyond second degree: the vector form exists where there is no metric analogue', () => {
    const { everyK } = of({ lagrangian: '1/2 M^2 R + s/M^2 R R_{ab} R^{ab} + a1 (T_a T^a)^2' });
    expect(everyK!.metric!.reached).toBeUndefined();
    expect(everyK!.metric!.stop!.reason).toContain('second degree');
    expect([everyK!.current, everyK!.conditions]).toEqual([undefined, undefined]);
  });
});
