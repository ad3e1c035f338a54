import { describe, expect, it } from 'vitest';
import { scalarFieldSections } from '../../src/emit/scalar-fields-summary.js';
import { BARE, DECOUPLED, TEN, withFields } from './scalar-fields-theories.js';

async function text(file: string, omega2?: string): Promise<string> {
  const sections = scalarFieldSections(await withFields(file, omega2));
  return sections
    .flatMap(({ title, lines }) => [`# ${title}`, ...lines.map(([l, t]) => `${l}${t.join(' ')}`)])
    .join('\n');
}

describe('the summary of scalar fields', () => {
  it('prints frame, classes and canonical fields case by case', async () => {
    const out = await text(DECOUPLED, '1 + psi^2/M^2');
    expect(out).toContain('# Einstein frame');
    expect(out).toContain('# Chosen conformal frame');
    expect(out).toContain('φ: quadratic cuscuton');
    expect(out).toContain('if s b3 < 0:');
    expect(out).toContain('z = s artanh(ψ/λ), ψ = λ tanh(z/s) for ψ² < λ²');
    expect(out).toContain('Ω² = −3 b3 sinh⁻²(z/s)');
    expect(out).toContain('φ = ζ |g|^(1/2) with g = ');
  });

  it('prints assumptions with those that were used, and the cases that are left', async () => {
    const out = await text(TEN);
    expect(out).toMatch(/# Assumptions\na4 > 0/);
    expect(out).toContain('det K̃ has the sign of');
  });

  it('says why there is no frame', async () => {
    expect(await text(BARE)).toContain('there is no Einstein frame: G4 vanishes');
  });
});
