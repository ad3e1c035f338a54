import { describe, expect, it } from 'vitest';
import { infix } from '../src/algebra/infix.js';
import { withAuxiliaryRoute } from '../src/auxiliary-route.js';
import type { AuxiliaryRoute } from '../src/derivation.js';
import { derive } from '../src/derive.js';
import { fractionText } from '../src/emit/scalar-fields-json.js';
import { InputError } from '../src/notation/diagnostics.js';
import { readTheory } from '../src/notation/read-theory.js';
import { theoryText, type Wanted } from './oracle/pipeline.js';

const of = async (
  lagrangian: string,
  linearise: readonly string[],
  integrate?: readonly string[],
  more: Partial<Wanted> = {},
): Promise<AuxiliaryRoute> => {
  const constants = ['c', 'd', 'b3', 'chi1'];
  const d = derive(readTheory(theoryText({ lagrangian, constants, ...more }), 'weir.yaml'));
  return (await withAuxiliaryRoute(d, { linearise, integrate })).auxiliary!;
};
const codes = async (route: Promise<unknown>): Promise<string[]> =>
  route.then(
    () => [],
    (error: unknown) => {
      if (!(error instanceof InputError)) throw error;
      return error.diagnostics.map((x) => `${x.code} ${x.file}: ${x.hint}`);
    },
  );

describe('withAuxiliaryRoute', () => {
  it('R² becomes one scalar at every k, with where it is singular', async () => {
    const { fields, hessian, branches } = await of('1/2 M^2 R + c R^2', ['R']);
    expect(fields.map((f) => [f.name, f.scalar, f.latex])).toEqual([['chi', 'R', '\\chi']]);
    expect(infix(hessian!)).toBe('2*c');
    const [{ metric, isCompared, branch }] = branches as [(typeof branches)[number]];
    const { g4, kinetic, potential } = metric!.reached!.functions;
    expect([g4, kinetic.get('chi,chi')!, potential].map(fractionText)).toEqual([
      '2*chi*c + M^2/2',
      '(-24*c^2)/(4*chi*c + M^2)',
      'chi^2*c',
    ]);
    expect([metric!.stop, isCompared]).toEqual([undefined, true]);
    const losses = branch.steps.flatMap((s) => s.loses.flatMap((l) => (l.where ? [fractionText(l.where)] : [])));
    expect(losses).toEqual(['12*chi*c + 3*M^2', '-12*chi*c - 3*M^2']);
  });

  it('every power of a scalar goes into one function, f(R) = f(χ) + f′(χ)(R − χ), in either signature', async () => {
    const { hessian } = await of('1/2 M^2 R + c R^2 + d/M^2 R^3', ['R'], undefined, { signature: '+---' });
    expect(infix(hessian!)).toBe('6*chi*d/M^2 + 2*c');
  });

  it('makes every component of curvature linear on request, with names that nobody has', async () => {
    const { fields, branches } = await of('c R_{ab} R^{ab} + 1/2 M^2 R + chi1 M^2 T_a T^a', ['curvature']);
    expect(fields.map((f) => [f.name, f.scalar])).toEqual([
      ['chi2', 'A1'],
      ['chi5', 'A4'],
    ]);
    expect(branches[0]!.branch.form.scalars).toEqual(['chi2', 'chi5']);
    expect(branches[0]!.isCompared).toBe(true);
    expect(branches[0]!.metric!.stop!.rule).toBe('expansion-for-curvature');
  });

  it('integrates the fields that are named, following branches', async () => {
    const { branches, fields } = await of('1/2 M^2 R + d (A_a A^a)^2', [], ['psi']);
    expect(fields).toEqual([]);
    expect(branches.map((b) => b.branch.steps.at(-1)!.rule)).toEqual(['algebraic-field', 'algebraic-field']);
    // Where the root is only in the solution, both of its signs are one branch, and nothing but substitution is compared.
    expect(branches.map((b) => b.isCompared)).toEqual([true, false]);
    expect(branches.map((b) => b.metric!.reached !== undefined)).toEqual([true, true]);
  });

  it('lets the user integrate the auxiliary field itself: back to the theory', async () => {
    const { branches } = await of('1/2 M^2 R + c R^2', ['R'], ['chi']);
    const plain = await of('1/2 M^2 R + c R^2', [], []);
    expect(fractionText(branches[0]!.branch.form.value)).toBe(fractionText(plain.start.value));
  });

  it('names what is wrong with a request', async () => {
    expect(await codes(of('1/2 M^2 R + c R^2', ['T_a T^a']))).toEqual([
      'nothing-to-linearise --linearise: R occurs squared: --linearise R',
    ]);
    expect(await codes(of('1/2 M^2 R', ['curvature']))).toHaveLength(1);
    expect(await codes(of('1/2 M^2 R', ['R + T_a T^a']))).toEqual([
      'bad-scalar --linearise: for example R, or curvature for all components',
    ]);
    expect(await codes(of('1/2 M^2 R', [], ['fi']))).toEqual(['unknown-field --integrate: the fields are phi, psi']);
    expect(await codes(of('1/2 M^2 R', ['R'], undefined, { geometry: 'bianchi-i' }))).toEqual([
      'no-auxiliary-route --linearise: leave --linearise and --integrate out',
    ]);
  });
});
