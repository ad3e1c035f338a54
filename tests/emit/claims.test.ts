import { describe, expect, it } from 'vitest';
import { decideClaims } from '../../src/compare/decide.js';
import { claimsObject, claimsText } from '../../src/emit/claims.js';
import { derivationOf, EINSTEIN_CARTAN } from '../compare/derivations.js';

const d = derivationOf({ ...EINSTEIN_CARTAN, name: 'Mole head', matter: ['dust'] });
const decide = (...claims: string[]) => decideClaims(d, { claims });

describe('texts about claims', () => {
  it('say what holds, with the certificate when it is short', () => {
    expect(claimsText(d, decide('phi = H'), false)).toBe(
      [
        'Mole head  at lapse 1, on the geometry flrw',
        '',
        'phi = H',
        '  holds, for matter of any pressure',
        '  where M != 0',
        '  left − right = (1/(6*M^2*a^3)) E_phi',
        '',
      ].join('\n'),
    );
  });

  it('say what does not hold, with residual and repairs', () => {
    const text = claimsText(d, decide('3 M^2 (H^2 - k/a^2) = rho'), false);
    expect(text).toContain('\n  does not hold\n  left − right comes to -6*k*M^2/a^2\n');
    expect(text).toContain('\n  it would hold with -3 M^2 k/a^2 for 3 M^2 k/a^2\n');
  });

  it('name branches when there are several, and the definitions', () => {
    const square = derivationOf({ lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] });
    const report = decideClaims(square, { claims: ['x = 0'], where: ['x = psi H'], anyMatter: true });
    const text = claimsText(square, report, false);
    expect(text).toContain('where x = psi H');
    expect(text).toContain('\n  psi != 0: does not hold\n');
    expect(text).toContain('\n  psi = 0: holds\n');
  });

  it('say what is undecided, and colour only when asked', () => {
    const report = decideClaims(d, { claims: ['psi H = 0'], bounds: [{ products: 1, terms: 1 }] });
    expect(claimsText(d, report, false)).toContain('\n  undecided\n  no answer within the bound: ');
    expect(claimsText(d, report, true)).toContain('\u001b[');
  });
});

describe('JSON of claims', () => {
  it('has verdicts, certificates, residuals and repairs', () => {
    const object = claimsObject(d, decide('psi = 0', 'phi = -H')) as { claims: Record<string, unknown>[] };
    expect(Object.keys(object)).toEqual(['untwist', 'theory', 'geometry', 'branch', 'where', 'claims', 'impossible']);
    expect(object.claims[0]).toEqual({
      claim: 'psi = 0',
      verdict: 'holds',
      anyMatter: true,
      expression: 'psi',
      divisors: [],
      repairs: [],
      branches: [
        {
          branch: [],
          verdict: 'holds',
          conditions: ['M != 0'],
          certificate: { denominator: [], terms: [{ equation: 'psi', derivative: 0, cofactor: '-1/(6*M^2*a^3)' }] },
        },
      ],
    });
    expect(object.claims[1]).toMatchObject({ verdict: 'fails', residual: { numerator: '2*H', denominator: [] } });
    expect(object.claims[1]!.repairs).toContainEqual({ kind: 'sign', term: 'H', factor: '-1', corrected: '-H' });
  });
});
