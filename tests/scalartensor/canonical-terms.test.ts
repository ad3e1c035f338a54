import { describe, expect, it } from 'vitest';
import { equalFraction, fraction } from '../../src/algebra/fraction.js';
import { canonicalField } from '../../src/scalartensor/canonical-fields.js';
import { type FieldTerm, inNewFields } from '../../src/scalartensor/canonical-terms.js';
import { scaledFraction } from '../../src/scalartensor/conformal.js';
import { currentWeight } from '../../src/scalartensor/current-weight.js';
import { type ConformalFrame, candidatesOf, einsteinFrame } from '../../src/scalartensor/frames.js';
import { conformalScalar, formOf, knowing, poly, roles } from './forms.js';

function frameOf(form: ReturnType<typeof formOf>): ConformalFrame {
  const outcome = einsteinFrame(form, roles, poly('M^2'), knowing());
  if (!outcome.found) throw new Error(outcome.reason);
  return outcome.frame;
}

const shown = (
  terms: readonly FieldTerm[] | undefined,
  wanted: readonly (readonly [string, Partial<FieldTerm>])[],
): void => {
  expect(terms).toHaveLength(wanted.length);
  wanted.forEach(([coefficient, powers], i) => {
    const { coefficient: c, ...rest } = terms![i]!;
    expect(equalFraction(c, fraction(poly(coefficient)))).toBe(true);
    expect(rest).toEqual({ zeta: 0, root: 0, eta: 0, lambda: 0, c: 0, s: 0, ...powers });
  });
};

describe('the potential of a conformally coupled scalar', () => {
  const frame = frameOf(conformalScalar);
  const candidates = candidatesOf(conformalScalar);
  const [only] = canonicalField('psi', frame.functions.kinetic, candidates, frame.knowledge, 2)!.cases;
  const rewritten = (f: typeof frame.omega2, branch: number) =>
    inNewFields(f, 'psi', 'phi', only!, only!.branches[branch]!, undefined, undefined, candidates);

  it('is 36 c M⁴ sinh⁴ + 6 d M⁴ sinh² cosh² of z/√6M, with cosh and sinh exchanged on the other side', () => {
    shown(rewritten(frame.functions.potential, 0), [
      ['36 c M^4', { s: 4 }],
      ['6 d M^4', { c: 2, s: 2 }],
    ]);
    shown(rewritten(frame.functions.potential, 1), [
      ['36 c M^4', { c: 4 }],
      ['6 d M^4', { c: 2, s: 2 }],
    ]);
  });

  it('comes with Ω² = 1/cosh², and −1/sinh² on the other side', () => {
    shown(rewritten(frame.omega2, 0), [['1', { c: -2 }]]);
    shown(rewritten(frame.omega2, 1), [['-1', { s: -2 }]]);
  });
});

describe('a potential with the field of the current', () => {
  const form = formOf({
    g4: '1/2 M^2 - 1/12 psi^2',
    kinetic: ['0', '0', '1'],
    current: ['tau M^2 - c psi^2', 'c phi psi'],
    potential: 'd phi^2 + e M phi + m M psi^3',
  });
  const frame = frameOf(form);
  const candidates = candidatesOf(form);
  const [only] = canonicalField('psi', frame.functions.kinetic, candidates, frame.knowledge, 2)!.cases;
  const weight = currentWeight(form.current, 'phi', 'psi')!;
  const rewritten = (eta: 1 | -1 | undefined, w: typeof weight | undefined) =>
    inNewFields(frame.functions.potential, 'psi', 'phi', only!, only!.branches[0]!, w, eta, candidates);

  it('gets φ² = η g ζ², keeps w for odd powers and λ for odd powers of ψ', () => {
    const terms = rewritten(undefined, weight)!;
    const even = terms.filter((t) => t.zeta === 2);
    expect(even.map(({ eta, c, s }) => [eta, c, s])).toEqual([
      [1, 2, 2],
      [1, 4, 0],
    ]);
    expect(terms.filter((t) => t.zeta === 1).map((t) => t.root)).toEqual([1]);
    expect(terms.filter((t) => t.zeta === 0).map((t) => [t.lambda, t.c, t.s])).toEqual([[1, 1, 3]]);
  });

  it('has the sign of g when it is known', () => {
    const [plus, minus] = [rewritten(1, weight)!, rewritten(-1, weight)!].map((terms) =>
      terms.filter((t) => t.zeta === 2),
    );
    expect(plus!.every((t) => t.eta === 0)).toBe(true);
    plus!.forEach((t, i) => {
      expect(equalFraction(t.coefficient, scaledFraction(minus![i]!.coefficient, -1))).toBe(true);
    });
  });

  it('is not rewritten without a weight', () => {
    expect(rewritten(undefined, undefined)).toBeUndefined();
  });
});
