import { describe, expect, it } from 'vitest';
import { typescriptModule } from '../../src/emit/code.js';
import { currentFunctions } from '../../src/emit/code-current.js';
import { complaints, load } from './emitted-module.js';
import { einsteinCartan, quadratic, steep } from './every-k-fixtures.js';

const couplings = { c0: 1.5, a1: 0, a2: 0.25, a4: 0.5, a5: 2, b1: 0.1, b2: -0.3, b3: -0.7, M: 1.25, k: 0 };
const jets = { N: [2, 0], a: [1.5, 0.5, 0], phi: [0.75, 0.5, 0], psi: [-0.5, 0.25, 0] };

describe('currentFunctions', () => {
  it('are there with a current only', () => {
    expect(currentFunctions(quadratic).map((f) => f.name)).toEqual(['currentRate', 'currentSquare', 'currentZeros']);
    expect(currentFunctions(einsteinCartan).map((f) => f.name)).toEqual(['currentRate', 'currentSquare']);
    expect(currentFunctions(steep)).toEqual([]);
  });

  it('run: the rate is J_A dA/dt over the lapse, its square negative, and on a singular surface all components vanish', async () => {
    const text = typescriptModule(quadratic);
    expect(await complaints({ 'module.mts': text })).toBe('');
    const module = await load(text);
    const current = module.current(couplings, jets);
    const rate = (current.phi * 0.5 + current.psi * 0.25) / 2;
    expect(module.currentRate(couplings, jets)).toBeCloseTo(rate, 12);
    expect(module.currentSquare(couplings, jets)).toBeCloseTo(-rate * rate, 12);
    // φ = 0 and 4 (a2 + a5) ψ² = (c0 − b2 + b3) M² up to the number that the theory gives.
    const at = (psi: number) => ({ ...jets, phi: [0, 0.5, 0], psi: [psi, 0.25, 0] });
    const slope = module.current(couplings, at(1)).phi - module.current(couplings, at(0)).phi;
    const psi = Math.sqrt(-module.current(couplings, at(0)).phi / slope);
    const zeros = Object.values(module.currentZeros(couplings, at(psi))) as number[];
    expect(zeros).toHaveLength(2);
    for (const z of [...zeros, ...(Object.values(module.current(couplings, at(psi))) as number[])])
      expect(z).toBeCloseTo(0, 10);
    expect(Object.values(module.currentZeros(couplings, at(psi + 1))).some((z) => Math.abs(z as number) > 0.1)).toBe(
      true,
    );
  }, 60_000);
});
