import { describe, expect, it } from 'vitest';
import { couplingTerms } from '../../src/notation/read-spins.js';
import { readTheory } from '../../src/notation/read-theory.js';
import type { SpinSource, Theory } from '../../src/notation/theory.js';
import { errorText } from './rendered.js';

const TENSORS =
  'tensors: { S: { indices: 3, symmetry: "S_{abc} = -S_{acb}", dimension: mass^3 }, U: { indices: 1 } }\n';
const theory = (matter: string, more = TENSORS): Theory =>
  readTheory(
    `untwist: 1\nname: x\nconstants: [q, c]\nscales: { M: mass }\n${more}lagrangian: c R + U_a T^a\nmatter: ${matter}\n`,
    'test.yaml',
  );
const spins = (matter: string, more = TENSORS): readonly SpinSource[] => theory(matter, more).spins!;
const errors = (matter: string): string => errorText(() => theory(matter));

describe('matter with spin', () => {
  it('an axial density is declared where it stands', () => {
    const { symbols, matter, spins: found } = theory('[dust, { spin: sigma, axial: q }]');
    expect(found).toMatchObject([{ kind: 'axial', name: 'sigma' }]);
    expect(symbols.find((s) => s.name === 'sigma')).toMatchObject({ role: 'spin', dimension: 3 });
    expect(matter.map((m) => m.name)).toEqual(['dust']);
  });

  it('couplings are expressions in constants', () => {
    const [source] = spins('[{ spin: sigma, axial: "3/2 q c" }]');
    expect(couplingTerms(source!)).toMatchObject([{ scalar: { coefficient: { num: 3n, den: 2n } }, factors: [] }]);
  });

  it('a spin tensor couples linearly to torsion and curvature', () => {
    const [source] = spins('[{ spin: S, coupling: "q S_{abc} T^{abc} + S^b_{ab} T^a" }]');
    expect(source).toMatchObject({ kind: 'tensor', name: 'S', tensor: { slots: 3 } });
    expect(couplingTerms(source!)).toHaveLength(2);
  });

  it('couplings are translated from the conventions of the file', () => {
    const half = `${TENSORS}conventions: { torsion: half }\n`;
    const [source] = spins('[{ spin: S, coupling: "S_{abc} T^{abc}" }]', half);
    expect(couplingTerms(source!)[0]!.scalar.coefficient).toEqual({ num: 1n, den: 2n });
  });

  it('averages of random directions', () => {
    expect(spins('[{ spin: s, average: weyssenhoff }]')).toMatchObject([{ kind: 'weyssenhoff', name: 's' }]);
    expect(couplingTerms(spins('[{ spin: s, average: weyssenhoff }]')[0]!)).toEqual([]);
  });

  it('refuses every other form', () => {
    expect(errors('[{ spin: sigma }]')).toContain('matter with spin couples in one way');
    expect(errors('[{ spin: sigma, axial: q, average: weyssenhoff }]')).toContain('couples in one way');
    expect(errors('[{ spin: sigma, axal: q }]')).toContain('did you mean axial?');
    expect(errors('[{ spin: s, average: mean }]')).toContain('mean is no average of spins');
    expect(errors('[{ spin: sigma, axial: x }]')).toContain('unknown symbol x');
    expect(errors('[{ spin: sigma, axial: "q - q" }]')).toContain('the coupling is zero');
    expect(errors('[{ spin: q, axial: c }]')).toContain('q is declared twice');
    expect(errors('[{ spin: sigma, axial: q }, { spin: sigma, axial: c }]')).toContain('occurs twice');
    expect(errors('[{ spin: W, coupling: "W_a T^a" }]')).toContain('W is not declared under tensors');
    expect(errors('[{ spin: S, coupling: "S_{abc} S^{abc}" }]')).toContain('the coupling is not linear in S');
    expect(errors('[{ spin: S, coupling: "S_{abc} T^{ab}" }]')).toContain('error');
    expect(errors('[{ spin: S, coupling: "S_{abc} U^a R^{bc}" }]')).toContain('U has no components here');
  });
});
