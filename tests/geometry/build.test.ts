import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { timeDerivative } from '../../src/algebra/calculus.js';
import { coefficientOf, involves, substitute, symbolsOf } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { add, equals, generator, multiply, negate, type Poly, power, product, scale } from '../../src/algebra/poly.js';
import { buildGeometry, geometryNames, loadGeometry } from '../../src/geometry/build.js';
import type { Geometry } from '../../src/geometry/geometry.js';
import { GEOMETRY_FOLDER, readGeometryText } from '../../src/geometry/read-geometry.js';
import { InputError, renderDiagnostic } from '../../src/notation/diagnostics.js';
import type { FrameMetric } from '../../src/tensor/contraction.js';

const METRIC: FrameMetric = [-1, 1, 1, 1];
const textOf = (id: string): string => readFileSync(new URL(`${id}.yaml`, GEOMETRY_FOLDER), 'utf8');
const FLRW = textOf('flrw');
const BIANCHI = textOf('bianchi-i');

function built(text: string, metric = METRIC): Geometry {
  return buildGeometry('test', readGeometryText(text, 'test.yaml'), metric);
}

function refusal(work: () => unknown): string {
  try {
    work();
  } catch (error) {
    if (error instanceof InputError) return error.diagnostics.map((d) => renderDiagnostic(d)).join('\n');
    throw error;
  }
  return 'accepted';
}

/** bianchi-i.yaml on another Lie algebra; a number is written as a fraction of constants by the grammar itself. */
const onAlgebra = (structure: string): string =>
  BIANCHI.replace('structure: {}', `structure: { ${structure} }`).replace(/^isotropy: .*$/m, '');

describe('loadGeometry', () => {
  it('builds a bundled geometry once for each signature', () => {
    expect(loadGeometry('flrw', '-+++')).toBe(loadGeometry('flrw', '-+++'));
    expect(loadGeometry('flrw', '+---')).not.toBe(loadGeometry('flrw', '-+++'));
  });

  it('lists the bundled files', () => {
    expect(geometryNames()).toEqual(expect.arrayContaining(['bianchi-i', 'flrw']));
    expect(geometryNames()).toEqual([...geometryNames()].sort());
  });

  it('suggests the name that was meant', () => {
    expect(refusal(() => loadGeometry('flwr', '-+++'))).toBe(
      'error: there is no geometry flwr\nhint: did you mean flrw?',
    );
    expect(refusal(() => loadGeometry('bianchi-1', '-+++'))).toContain('hint: did you mean bianchi-i?');
  });

  it('lists all names when none is near', () => {
    const names = geometryNames().join(', ');
    expect(refusal(() => loadGeometry('wormhole', '-+++'))).toBe(
      `error: there is no geometry wormhole\nhint: there are ${names}`,
    );
    expect(refusal(() => loadGeometry('constructor', '-+++'))).toContain(`there are ${names}`);
  });
});

describe('the isotropic geometry', () => {
  const { components, tensors, ring, metricCurvature, volume, spatialVolume, checks } = loadGeometry('flrw', '-+++');
  const at = (packed: string): string => {
    const value = [...packed].reduce((n, c) => 4 * n + Number(c), 0);
    const tensor = packed.length === 3 ? tensors.torsion : tensors.curvature;
    const found = tensor.entries.get(value);
    return found ? infix(found) : '0';
  };

  it('has the six components that the file names, in its order', () => {
    expect(components.map((c) => c.name)).toEqual(['A1', 'A2', 'A3', 'A4', 'u', 'v']);
  });

  it('has torsion T^i = u e^0∧e^i + v ε_ijk e^j∧e^k', () => {
    expect([at('101'), at('110'), at('123'), at('132'), at('231')]).toEqual(['u', '-u', '2*v', '-2*v', '2*v']);
    expect(tensors.torsion.entries.size).toBe(3 * 2 + 6);
    expect([at('001'), at('012'), at('112')]).toEqual(['0', '0', '0']);
  });

  it('has curvature R^i_0 = A1 e^0∧e^i + ½ A2 ε_ijk e^j∧e^k, R^i_j = A4 e^i∧e^j − A3 ε_ijk e^0∧e^k', () => {
    expect([at('1001'), at('1023'), at('1212'), at('1203'), at('0101')]).toEqual(['A1', 'A2', 'A4', '-A3', '-A1']);
    expect([at('1002'), at('1213'), at('1013')]).toEqual(['0', '0', '0']);
    expect(tensors.curvature.entries.size).toBe(2 * (2 * 3 + 2 * 3) + 2 * (2 * 3 + 2 * 3));
  });

  it('uses κ² = k: the only place of k is A4, once', () => {
    const a4 = components.find((c) => c.name === 'A4')!.value;
    expect(infix(coefficientOf(a4, 'k', 1))).toBe('1/a^2');
    expect(components.filter((c) => involves(c.value, 'k')).map((c) => c.name)).toEqual(['A4']);
    expect(components.some((c) => involves(c.value, 'sqrt(k)'))).toBe(false);
  });

  it('has the metric curvature 6 (Ḣ + 2H² + k/a²)', () => {
    const a = generator(ring, 'a');
    const hubble = product(ring, [timeDerivative(a), power(a, -1), generator(ring, 'N', -1)]);
    const rate = multiply(timeDerivative(hubble), generator(ring, 'N', -1));
    const curvature = multiply(generator(ring, 'k'), power(a, -2));
    const expected = scale(add(add(rate, scale(power(hubble, 2), 2)), curvature), 6);
    expect(equals(metricCurvature, expected)).toBe(true);
  });

  it('has the volume a³N', () => {
    expect([infix(volume), infix(spatialVolume)]).toEqual(['N*a^3', 'a^3']);
    expect(checks.every((c) => c.holds)).toBe(true);
    expect(checks.map((c) => c.name)).toEqual(
      expect.arrayContaining([
        'dd = 0 on the cobasis',
        'structure constants have zero trace',
        'the metric connection has no torsion',
      ]),
    );
  });

  it('differs between signatures only by the sign of lowered components', () => {
    const other = loadGeometry('flrw', '+---');
    expect(other.components.map((c) => infix(c.value))).toEqual(components.map((c) => infix(c.value)));
    for (const which of ['torsion', 'curvature'] as const)
      for (const [packed, value] of tensors[which].entries) {
        const twin = other.tensors[which].entries.get(packed)!;
        expect(infix(twin)).toBe(infix(negate(value)));
      }
    expect(infix(other.metricCurvature)).toBe(infix(metricCurvature));
  });
});

describe('the curvature constant', () => {
  it('comes from the structure constants: with κ replaced by 0 the space is flat', () => {
    const flat = built(FLRW.replaceAll('-2 kappa', '0 kappa').replaceAll('-kappa - a psi', '-a psi'));
    expect(flat.components.some((c) => involves(c.value, 'k'))).toBe(false);
    expect(involves(flat.metricCurvature, 'k')).toBe(false);
  });

  it('grows with their square: with κ doubled it is 4k', () => {
    const tight = built(FLRW.replaceAll('-2 kappa', '-4 kappa').replaceAll('-kappa - a psi', '-2 kappa - a psi'));
    expect(infix(coefficientOf(tight.metricCurvature, 'k', 1))).toBe('24/a^2');
  });

  it('is that of the scale factors on a closed anisotropic geometry', () => {
    const closed = onAlgebra('x: { y z: -2 }, y: { z x: -2 }, z: { x y: -2 }');
    const { metricCurvature, ring, traceless } = built(closed);
    expect(traceless).toBe(true);
    const still = new Map<string, Poly>();
    for (const g of ring.generators)
      if (g.kind === 'jet')
        still.set(g.name, generator(ring, 'a_x', g.order > 0 ? 1 : g.field.startsWith('a_') ? 1 : 0));
    for (const g of ring.generators)
      if (g.kind === 'jet' && g.order > 0) still.set(g.name, generator(ring, 'phi_x', 0));
    // All rates 1 and all scale factors a: 6 (ä/a + H² + k/a²) with k = 1, ȧ = ä = 1, and Ṅ = 1.
    const value = substitute(metricCurvature, still);
    expect(infix(coefficientOf(value, 'a_x', -2))).toBe('12');
  });
});

describe('a cobasis', () => {
  it('that violates the Jacobi identity is refused', () => {
    const text = onAlgebra('x: { y z: 1 }, y: { x y: 1 }');
    expect(refusal(() => built(text))).toBe(
      'rules/geometry/test.yaml: error: d(d θ^1) is not zero\nhint: the structure constants violate the Jacobi identity',
    );
  });

  it('with a non-zero trace is known to be one', () => {
    const { traceless, checks } = built(onAlgebra('y: { x y: 1 }, z: { x z: 1 }'));
    expect(traceless).toBe(false);
    expect(checks.map((c) => c.name)).not.toContain('structure constants have zero trace');
  });

  it('whose traces cancel is of class A', () => {
    // The motions of the Lorentzian plane: dθ^y = θ^x∧θ^y, dθ^z = −θ^x∧θ^z.
    expect(built(onAlgebra('y: { x y: 1 }, z: { x z: -1 }')).traceless).toBe(true);
  });

  it('without the isotropy that the file claims is refused', () => {
    const text = BIANCHI.replace('structure: {}', 'structure: { y: { x y: 1 }, z: { x z: -1 } }');
    expect(refusal(() => built(text))).toBe(
      'rules/geometry/test.yaml: error: torsion or curvature changes under the declared isotropy\nhint: list only what leaves coframe and connection unchanged',
    );
  });

  it('that involves dt is refused', () => {
    expect(refusal(() => built(onAlgebra('x: { dt x: 1 }')))).toContain('the structure equations involve dt');
    expect(refusal(() => built(onAlgebra('dt: { x y: 1 }')))).toContain('the structure equations involve dt');
  });
});

describe('a connection', () => {
  it('that is given twice for a pair is refused', () => {
    const text = BIANCHI.replace('1 0: { x: a_x phi_x }', '1 0: { x: a_x phi_x }\n  0 1: { x: a_x phi_x }');
    expect(refusal(() => built(text))).toContain('the connection is given twice for 0 1');
  });

  it('means the same from either side of a pair', () => {
    // Γ^0_1 = Γ^1_0 and Γ^2_1 = −Γ^1_2 in either signature.
    const other = BIANCHI.replace('1 0: { x: a_x phi_x }', '0 1: { x: a_x phi_x }').replace(
      '1 2: { z: -a_z psi_z }',
      '2 1: { z: a_z psi_z }',
    );
    for (const metric of [METRIC, [1, -1, -1, -1] as const]) {
      const [one, two] = [built(BIANCHI, metric), built(other, metric)];
      for (const which of ['torsion', 'curvature'] as const)
        expect([...two.tensors[which].entries].map(([n, p]) => [n, infix(p)])).toEqual(
          [...one.tensors[which].entries].map(([n, p]) => [n, infix(p)]),
        );
    }
  });

  it('turns the components that the file does not name into symbols of their indices', () => {
    const { components } = loadGeometry('bianchi-i', '-+++');
    expect(components.length).toBeGreaterThan(12);
    expect(components.every((c) => /^[TR][0-3]+$/.test(c.name))).toBe(true);
    expect(new Set(components.map((c) => infix(c.value))).size).toBe(components.length);
    expect(components.every((c) => symbolsOf(c.value).length > 0)).toBe(true);
  });
});
