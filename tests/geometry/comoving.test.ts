import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { loadGeometry } from '../../src/geometry/build.js';
import { comovingOf } from '../../src/geometry/comoving.js';

describe('comovingOf', () => {
  it('finds θ = 3H and ³R = 6k/a² without shear on the isotropic geometry, in either signature', () => {
    for (const signature of ['-+++', '+---'] as const) {
      const { expansion, spatialCurvature, isShearFree } = comovingOf(loadGeometry('flrw', signature));
      expect([infix(expansion), infix(spatialCurvature), isShearFree]).toEqual(['3*D(a,1)/(N*a)', '6*k/a^2', true]);
    }
  });

  it('sees the shear, the flat space of Bianchi I and the hyperbolic one of Bianchi V', () => {
    const one = comovingOf(loadGeometry('bianchi-i', '-+++'));
    expect([infix(one.spatialCurvature), one.isShearFree]).toEqual(['0', false]);
    // ³R of ds² = e^(2x)-like hyperbolic space with the scale factor a_x across it.
    expect(infix(comovingOf(loadGeometry('bianchi-v', '-+++')).spatialCurvature)).toBe('-6/a_x^2');
  });
});
