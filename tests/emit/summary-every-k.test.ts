import { describe, expect, it } from 'vitest';
import { auxiliaryLines, everyKLines } from '../../src/emit/summary-every-k.js';
import { branched, components, cubic, einsteinCartan, quadratic, squared, steep } from './every-k-fixtures.js';

const wrap = (left: string, terms: readonly string[]): string[] => [left + terms.join(' ')];

describe('everyKLines', () => {
  it('shows the mapping, where the rules stop, and what is left of Einstein–Cartan theory', () => {
    expect(everyKLines(einsteinCartan, wrap).slice(1)).toEqual([
      'A1 → ∂ₙφ + 1/3 θ φ; A2 → 2 φ ψ; A3 → ∂ₙψ + 1/3 θ ψ; A4 → 1/6 ³R + φ² − ψ²; u → 1/3 θ − φ; v → ψ',
      'the rule spatial-curvature stops: curvature obstruction: ³R is left with a constant coefficient that is not the one in front of R; at ³R = 0 the rules go on',
      'the terms: 1/2 M² ³R',
      'no couplings make the metric analogue hold for every k',
      'the current is the gradient of 2 M² φ',
      'the connection integrated out: φ = 1/3 θ, ψ = 0; what is left holds for every k',
      'L/√−g = 1/2 M² R',
    ]);
  });

  it('lists conditions and zeros', () => {
    const lines = everyKLines(quadratic, wrap);
    expect(lines.find((l) => l.startsWith('the metric analogue holds for every k when '))).toContain('b3 = ');
    expect(lines.find((l) => l.startsWith('the current vanishes where '))).toContain('φ = 0 and ');
    expect(everyKLines(steep, wrap).join('\n')).toContain('second degree');
  });
});

describe('auxiliaryLines', () => {
  it('are empty unless asked for', () => {
    expect(auxiliaryLines(einsteinCartan, wrap)).toEqual([]);
  });

  it('show solutions, functions, domain and comparison', () => {
    const lines = auxiliaryLines(squared, wrap);
    expect(lines).toContain('G4 = 1/2 M² + 2 c χ');
    expect(lines).toContain('√−g [ G4 R + Σ K_AB X^AB + √|J_μ J^μ| − V ], for every k');
    expect(lines.at(-1)).toBe('its equations are those of the theory after the same fields are eliminated there');
  });

  it('number branches, and say what stays and where the rules stop', () => {
    expect(auxiliaryLines(branched, wrap).filter((l) => l.startsWith('branch'))).toEqual(['branch 1', 'branch 2']);
    expect(auxiliaryLines(cubic, wrap)).toContain('φ stays: no rule integrates it out');
    expect(auxiliaryLines(components, wrap).some((l) => l.startsWith('the rule expansion-for-curvature stops'))).toBe(
      true,
    );
  });
});
