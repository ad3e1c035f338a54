/**
 * Published equations tested as claims: what is printed follows from the Lagrangian, and a misprint put into it does not.
 */
import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { type ClaimOptions, type ClaimReport, decideClaims } from '../../src/compare/decide.js';
import { derivationOf, EINSTEIN_CARTAN, TORSION_SCALAR, type Wanted } from '../compare/derivations.js';

function decide(wanted: Wanted, claim: string, options: Omit<ClaimOptions, 'claims'> = {}): ClaimReport {
  return decideClaims(derivationOf(wanted), { claims: [claim], ...options }).claims[0]!;
}

describe('general relativity from Einstein–Cartan theory — any textbook (memory)', () => {
  it.each(['3 M^2 (H^2 + k/a^2) = rho', '-M^2 (2 \\dot{H} + 3 H^2 + k/a^2) = p', 'dot(rho) + 3 H (rho + p) = 0'])(
    '%s, for every k and any matter',
    (claim) => {
      expect(decide(EINSTEIN_CARTAN, claim)).toMatchObject({ verdict: 'holds', anyMatter: true });
    },
  );

  it('3M²H² = ρ lacks the curvature', () => {
    const { verdict, residual } = decide(EINSTEIN_CARTAN, '3 M^2 H^2 = rho');
    expect([verdict, infix(residual!.top)]).toEqual(['fails', '-3*k*M^2/a^2']);
  });
});

/** Phys. Rev. D 78 (2008) 023522; arXiv:0908.3323, 1009.5112, 1207.0579 (memory). */
describe('scalar-mode quadratic cosmology, every k — Phys. Rev. D 78 (2008) 023522 (memory)', () => {
  const theory: Wanted = {
    lagrangian: `a0/2 R + b/24 R^2 + a1/2 (${TORSION_SCALAR})`,
    constants: ['a0', 'a1', 'b'],
  };
  const where = ['R = 6 (A1 + A4)', 'mu = a0 + a1', 'Phi = 3 u', 'T = 3 p - rho'];
  const options = { where, branch: ['psi = 0'] };

  it.each([
    '\\dot H = (mu R + T)/(6 a1) - 2 H^2 - k/a^2',
    '\\dot\\Phi = (a0 R + T)/(2 a1) - 3 H Phi + 1/3 Phi^2',
    '\\dot R = -2/3 (R + 6 mu/b) Phi',
    'rho = b/18 (R + 6 mu/b)(3 H - Phi)^2 - b/24 R^2 - 3 a1 H^2 + 3 k/a^2 (a0 + b R/6)',
  ])('%s', (claim) => {
    expect(decide(theory, claim, options)).toMatchObject({ verdict: 'holds', anyMatter: true });
  });

  it('branch R = −6μ/b: −3a1(H² + k/a²) = ρ + 3μ²/(2b)', () => {
    const branch = ['psi = 0', 'R = -6 mu/b'];
    expect(decide(theory, '-3 a1 (H^2 + k/a^2) = rho + 3 mu^2/(2 b)', { where, branch }).verdict).toBe('holds');
    expect(decide(theory, '-3 a1 (H^2 + k/a^2) = rho + 3 mu^2/b', { where, branch }).verdict).toBe('fails');
  });

  it('a misprint in any coefficient is found and mended', () => {
    const wrong = decide(theory, '\\dot H = (mu R + T)/(6 a1) - 3 H^2 - k/a^2', options);
    expect(wrong).toMatchObject({ verdict: 'fails', repairs: [{ term: '3 H^2', corrected: '2 H^2' }] });
    const sign = decide(theory, '\\dot\\Phi = (a0 R + T)/(2 a1) - 3 H Phi - 1/3 Phi^2', options);
    expect(sign.repairs).toContainEqual(expect.objectContaining({ kind: 'sign', term: '1/3 Phi^2' }));
    const constraint = 'rho = b/18 (R + 6 mu/b)(3 H - Phi)^2 - b/12 R^2 - 3 a1 H^2 + 3 k/a^2 (a0 + b R/6)';
    expect(decide(theory, constraint, options).repairs).toContainEqual(
      expect.objectContaining({ term: 'b/12 R^2', factor: '1/2' }),
    );
  });
});

describe('constant pseudoscalar torsion (computed)', () => {
  // S = −12 a4 and W = 48 a4 with P = 0 give these couplings.
  const theory: Wanted = {
    lagrangian: '-S/12 (R_{abcd} R^{abcd} + 1/6 R^2 - 3/2 R_{abcd} R^{cdab}) + 1/3 mu^2 T_a T^a',
    constants: ['S'],
    scales: ['mu'],
    matter: ['dust', 'radiation', '{ vacuum: Lambda }', '{ fluid: chi, w: "1/5" }'],
  };
  const branch = ['4 S psi^2 = 3 mu^2'];
  const where = ['M_eff^2 = 3/4 mu^2'];

  it('ψ² = 3μ²/(4S): 4φ̇ + 4φ² + 4Hφ − 2H² − Ḣ = 0 and 3 M_eff² H² = ρ, for any matter', () => {
    for (const claim of [
      '4 \\dot\\phi + 4 phi^2 + 4 H phi - 2 H^2 - \\dot H = 0',
      '3 M_eff^2 H^2 = rho',
      '\\dot\\psi = 0',
    ])
      expect(decide(theory, claim, { branch, where })).toMatchObject({ verdict: 'holds', anyMatter: true });
  });

  it('the curvature does not appear, and elsewhere nothing of this holds', () => {
    expect(decide(theory, '3 M_eff^2 (H^2 + k/a^2) = rho', { branch, where }).verdict).toBe('fails');
    const without = { branch: ['psi = 0'], where };
    expect(decide(theory, '3 M_eff^2 H^2 = rho', { ...without, anyMatter: true }).verdict).toBe('fails');
    expect(decide(theory, 'rho = 0', { ...without, anyMatter: true }).verdict).toBe('holds');
    // Fluids of several kinds add up to nothing only while the universe stands still.
    expect(decide(theory, 'rho = 0', without)).toMatchObject({ verdict: 'holds' });
    expect(decide(theory, 'H = 0', without)).toMatchObject({ verdict: 'holds', staticOnly: true });
  });
});

describe('teleparallel equivalent, every k — arXiv:1511.07586, Phys. Rev. D 19 (1979) 3524 (memory)', () => {
  const theory: Wanted = { lagrangian: `-1/2 M^2 (${TORSION_SCALAR})`, constrain: ['R^a_{bcd}'] };

  it('general relativity on both branches of the connection', () => {
    for (const branch of [['phi = 0'], ['psi = 0']])
      for (const claim of ['3 M^2 (H^2 + k/a^2) = rho', '-M^2 (2 \\dot{H} + 3 H^2 + k/a^2) = p'])
        expect(decide(theory, claim, { branch }).verdict).toBe('holds');
    expect(decide(theory, 'psi^2 - phi^2 = k/a^2').verdict).toBe('holds');
  });
});

describe('axial spin density — Nature Phys. Sci. 242 (1973) 7 for the a^-6 law; gr-qc/0505081 for the Holst factor (memory)', () => {
  const spin = ['dust', '{ spin: sigma, axial: q }'];

  it('3M²(H² + k/a²) = ρ − q²σ²/(12M²a⁶), and × γ²/(1 + γ²) with a Holst term', () => {
    const plain: Wanted = { ...EINSTEIN_CARTAN, constants: ['q'], matter: spin };
    expect(decide(plain, '3 M^2 (H^2 + k/a^2) = rho - q^2 sigma^2/(12 M^2 a^6)').verdict).toBe('holds');
    expect(decide(plain, '-M^2 (2 \\dot H + 3 H^2 + k/a^2) = p - q^2 sigma^2/(12 M^2 a^6)').verdict).toBe('holds');
    const holst: Wanted = {
      lagrangian: '1/2 M^2 R + M^2/4/gamma \\epsilon^{abcd} R_{abcd}',
      constants: ['q', 'gamma'],
      matter: spin,
    };
    expect(decide(holst, '3 M^2 (H^2 + k/a^2) = rho - gamma^2/(1 + gamma^2) q^2 sigma^2/(12 M^2 a^6)').verdict).toBe(
      'holds',
    );
    expect(decide(holst, '3 M^2 (H^2 + k/a^2) = rho - q^2 sigma^2/(12 M^2 a^6)').verdict).toBe('fails');
  });
});
