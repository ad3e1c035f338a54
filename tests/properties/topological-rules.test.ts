/**
 * Proof by reduction: what the rules modulo total derivatives drop has Euler–Lagrange expressions that vanish identically,
 * on every bundled geometry on which varying after symmetry reduction is legitimate. A spoiled density does not.
 */
import { describe, expect, it } from 'vitest';
import { isZero } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { derive } from '../../src/derive.js';
import { geometryNames, loadGeometry } from '../../src/geometry/build.js';
import { printLagrangian } from '../../src/notation/print.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { bundledRules } from '../../src/tensor/rule-library.js';
import { densityOf } from '../../src/tensor/simplify.js';

const GEOMETRIES = geometryNames().filter((id) => loadGeometry(id, '-+++').traceless);
const RULES = bundledRules('identities').filter((r) => r.when.some((c) => c.predicate === 'modulo-boundary'));

/** The terms of a density as a theory; `spoil` doubles one coefficient. */
function equationsVanish(id: string, geometry: string, signature: string, spoil?: number): boolean {
  const terms = densityOf(RULES.find((r) => r.id === id)!).sum.map(({ coefficient, factors }, i) => ({
    scalar: {
      coefficient: i === spoil ? rational(2n * coefficient.num, coefficient.den) : coefficient,
      powers: [['c1', 1]] as const,
    },
    factors,
  }));
  const theory = [
    'untwist: 1',
    'name: density',
    `conventions: { signature: "${signature}" }`,
    'constants: [c1]',
    `geometry: ${geometry}`,
    `lagrangian: '${printLagrangian(terms)}'`,
  ].join('\n');
  return [...derive(readTheory(theory, 'density.yaml')).equations.values()].every(isZero);
}

describe('total derivatives', () => {
  it('are those of Gauss–Bonnet, Pontryagin and Nieh–Yan', () => {
    expect(RULES.map((r) => r.id)).toEqual(['gauss-bonnet', 'pontryagin', 'nieh-yan']);
    expect(GEOMETRIES).toEqual(expect.arrayContaining(['flrw', 'bianchi-i']));
    // They also need a constant coefficient and a product that stands alone.
    for (const rule of RULES)
      expect(rule.when.map((c) => c.predicate)).toEqual(['modulo-boundary', 'constant-coefficient', 'alone']);
  });

  for (const { id } of RULES)
    for (const geometry of GEOMETRIES)
      it(`${id} on ${geometry}`, () => {
        for (const signature of ['-+++', '+---'])
          expect(equationsVanish(id, geometry, signature), signature).toBe(true);
      }, 60_000);

  it('a spoiled coefficient is noticed', () => {
    expect(equationsVanish('gauss-bonnet', 'flrw', '-+++', 0)).toBe(false);
    expect(equationsVanish('nieh-yan', 'bianchi-i', '-+++', 0)).toBe(false);
  });
});
