import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { certifies } from '../../src/compare/certificate.js';
import { type ClaimOptions, type ClaimReport, decideClaims } from '../../src/compare/decide.js';
import { vocabularyOf } from '../../src/compare/vocabulary.js';
import { InputError } from '../../src/notation/diagnostics.js';
import { derivationOf, EINSTEIN_CARTAN, TORSION_SCALAR, type Wanted } from './derivations.js';

function decide(
  wanted: Wanted,
  claims: readonly string[],
  options: Omit<ClaimOptions, 'claims'> = {},
): readonly ClaimReport[] {
  return decideClaims(derivationOf(wanted), { claims, ...options }).claims;
}

const verdict = (wanted: Wanted, claim: string, options: Omit<ClaimOptions, 'claims'> = {}): string =>
  decide(wanted, [claim], options)[0]!.verdict;

describe('claims about general relativity with torsion', () => {
  it.each([
    ['3 M^2 (H^2 + k/a^2) = rho', 'holds'],
    ['-M^2 (2 \\dot{H} + 3 H^2 + k/a^2) = p', 'holds'],
    ['\\phi = H', 'holds'],
    ['psi = 0', 'holds'],
    ['u = 0', 'holds'],
    ['dot(rho) + 3 H (rho + p) = 0', 'holds'],
    ['\\ddot a/a = -(rho + 3 p)/(6 M^2)', 'holds'],
    ['rho_T = 0', 'holds'],
    ['3 M^2 H^2 = rho', 'fails'],
    ['phi = -H', 'fails'],
    ['2 M^2 \\dot H = -rho - p', 'fails'],
    ['rho = p', 'fails'],
    ['H = 0', 'fails'],
    ['Lambda = 0', 'fails'],
  ])('%s %s', (claim, expected) => {
    expect(verdict(EINSTEIN_CARTAN, claim)).toBe(expected);
  });

  it('the certificate is about the claim and multiplies out', () => {
    const d = derivationOf(EINSTEIN_CARTAN);
    const { claims } = decideClaims(d, { claims: ['3 M^2 (H^2 + k/a^2) = rho'] });
    const [{ claim, branches }] = claims as [ClaimReport];
    const { result } = branches[0]!;
    if (result.verdict !== 'follows') throw new Error('it does not follow');
    // The rings of two vocabularies are different objects, so the texts are compared.
    expect(result.certificate.cofactors.map((c) => c.name)).toEqual(['N', 'psi', 'phi']);
    expect(result.certificate.denominator).toEqual([]);
    const { space } = vocabularyOf(d, []);
    expect(space.ring).not.toBe(claim.poly.ring);
    expect(certifies({ ...space, ring: claim.poly.ring }, result.certificate, claim.poly)).toBe(true);
  });

  it('the residual locates what is missing', () => {
    const [report] = decide(EINSTEIN_CARTAN, ['3 M^2 H^2 = rho']);
    expect(infix(report!.residual!.top)).toBe('-3*k*M^2/a^2');
    expect(report!.residual!.bottom).toEqual([]);
  });

  it('distinguishes any matter from that of the theory', () => {
    const dust: Wanted = { ...EINSTEIN_CARTAN, matter: ['dust'] };
    expect(decide(dust, ['3 M^2 (H^2 + k/a^2) = rho'])[0]).toMatchObject({ verdict: 'holds', anyMatter: true });
    expect(decide(dust, ['2 \\dot H + 3 H^2 = -k/a^2', 'p = 0', 'rho = rho_dust/a^3'])).toMatchObject([
      { verdict: 'holds', anyMatter: false },
      { verdict: 'holds', anyMatter: false },
      { verdict: 'holds', anyMatter: false },
    ]);
    expect(verdict(dust, 'p = 0', { anyMatter: true })).toBe('fails');
    expect(verdict({ ...EINSTEIN_CARTAN, matter: [] }, 'H^2 = -k/a^2')).toBe('holds');
    expect(verdict({ ...EINSTEIN_CARTAN, matter: ['{ fluid: brine, w: "1/5" }'] }, 'p = rho/5')).toBe('holds');
    expect(
      verdict({ ...EINSTEIN_CARTAN, matter: ['{ fluid: brine, w: "1/5" }'] }, 'dot(rho_brine) = -18/5 H rho_brine'),
    ).toBe('holds');
  });

  it('works in the other signature and on other geometries', () => {
    expect(verdict({ lagrangian: '-1/2 M^2 R', signature: '+---' }, '3 M^2 (H^2 + k/a^2) = rho')).toBe('holds');
    const bianchi: Wanted = { ...EINSTEIN_CARTAN, geometry: 'bianchi-i', matter: ['dust'] };
    expect(verdict(bianchi, 'M^2 (H_x H_y + H_y H_z + H_z H_x) = rho')).toBe('holds');
    expect(verdict(bianchi, '\\dot{H_x} + H_x (H_x + H_y + H_z) = rho/(2 M^2)')).toBe('holds');
    expect(verdict(bianchi, 'H_x = H_y')).toBe('fails');
  });
});

describe('branches', () => {
  const product: Wanted = { lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] };

  it('a claim must hold on all of them', () => {
    const [report] = decide(product, ['psi = 0'], { anyMatter: true });
    expect(report!.verdict).toBe('fails');
    expect(report!.branches.some((b) => b.result.verdict === 'follows' && b.branch.includes('psi = 0'))).toBe(true);
    // With dust the curvature cannot be constant, which the other branch needs.
    expect(verdict({ ...product, matter: ['dust'] }, 'psi = 0')).toBe('holds');
  });

  it('can be named, by equations and by what differs', () => {
    expect(verdict(product, 'psi D(psi,1) = 0', { branch: ['psi = 0'] })).toBe('holds');
    expect(verdict(product, 'A1 + A4 = (rho - 3 p)/(6 M^2)', { branch: ['psi \\neq 0'] })).toBe('holds');
    expect(verdict(product, 'phi = H', { branch: ['psi = 0', 'u = 0'] })).toBe('holds');
  });

  it('without solutions are an error, with the couplings that would be needed', () => {
    const wrong = (branch: readonly string[]): string => {
      try {
        decide(EINSTEIN_CARTAN, ['H = 1'], { branch });
      } catch (error) {
        if (error instanceof InputError) return `${error.diagnostics[0]!.code}: ${error.message}`;
        throw error;
      }
      return '';
    };
    expect(wrong(['psi != 0'])).toBe('no-solution: the equations have no solution with psi != 0 for general couplings');
    expect(wrong(['psi = M'])).toMatch(/^no-solution/);
    expect(wrong(['0 = 0'])).toMatch(/^bad-branch: .* is an identity/);
    expect(wrong(['H != H'])).toMatch(/^bad-branch: .* can never hold/);
    expect(wrong(['q = 0'])).toMatch(/^unknown-symbol/);
  });

  it('static universes are looked at when asked for', () => {
    expect(verdict(EINSTEIN_CARTAN, '3 M^2 k/a^2 = rho', { branch: ['H = 0'] })).toBe('holds');
    expect(verdict(EINSTEIN_CARTAN, 'rho + 3 p = 0', { branch: ['H = 0'] })).toBe('holds');
  });

  it('of constraints are found: teleparallel torsion', () => {
    const tele: Wanted = { lagrangian: `-1/2 M^2 (${TORSION_SCALAR})`, constrain: ['R^a_{bcd}'] };
    expect(verdict(tele, '3 M^2 (H^2 + k/a^2) = rho')).toBe('holds');
    expect(verdict(tele, 'phi psi = 0')).toBe('holds');
    expect(verdict(tele, 'psi^2 = k/a^2', { branch: ['psi != 0'] })).toBe('holds');
    expect(verdict(tele, 'phi = 0')).toBe('fails');
  });
});

describe('definitions and divisors', () => {
  it('are put in, also where they cannot be solved', () => {
    expect(verdict(EINSTEIN_CARTAN, 'x = 1', { where: ['x = phi/H'] })).toBe('holds');
    expect(verdict(EINSTEIN_CARTAN, '\\dot x = 0', { where: ['x = phi/H'] })).toBe('holds');
    expect(verdict(EINSTEIN_CARTAN, '3 M^2 X^2 = rho', { where: ['X^2 = H^2 + k/a^2'] })).toBe('holds');
    expect(verdict(EINSTEIN_CARTAN, 'X \\dot X = H \\dot H - k H/a^2', { where: ['X^2 = H^2 + k/a^2'] })).toBe('holds');
    expect(verdict(EINSTEIN_CARTAN, '3 M^2 X = rho', { where: ['X^2 = H^2 + k/a^2'] })).toBe('fails');
  });

  it('a divisor that vanishes on the equations is an error', () => {
    expect(() => decide(EINSTEIN_CARTAN, ['1/(H - phi) = 2'])).toThrow('the claim divides by phi - H, which vanishes');
  });
});

describe('what is not decided', () => {
  it('is said to be undecided, with the reason', () => {
    const [report] = decide({ lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] }, ['psi D(psi,1) H = 0'], {
      bounds: [{ products: 40, terms: 10 }],
    });
    expect(report).toMatchObject({ verdict: 'undecided', branches: [], repairs: [] });
    expect(report!.reason).toMatch(/solving the equations needs/);
  });
});
