import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { type Classification, classify } from '../../src/scalartensor/classification.js';
import { einsteinFrame } from '../../src/scalartensor/frames.js';
import { type FormTexts, formOf, knowing, poly, roles } from './forms.js';

function classes(texts: FormTexts, ...assumed: readonly string[]): Classification {
  const form = formOf(texts);
  const known = knowing(...assumed);
  const outcome = einsteinFrame(form, roles, poly('M^2'), known);
  return classify(form, outcome.found ? outcome.frame : undefined, ['phi', 'psi'], known);
}
const kinds = (c: Classification): string[] => c.scalars.map((s) => s.kind);

describe('the kind of a scalar', () => {
  it('is canonical, wrong-sign or depends on a sign', () => {
    const texts = { g4: 'M^2', kinetic: ['c', '0', 'd'] } as const;
    expect(kinds(classes(texts, 'c > 0', '0 > d'))).toEqual(['canonical', 'wrong-sign']);
    const open = classes(texts);
    expect(kinds(open)).toEqual(['kinetic', 'kinetic']);
    expect(open.scalars[0]!.sign!.sign.open.factors.map((f) => infix(f.base))).toEqual(['c']);
  });

  it('takes the kinetic term that curvature gives', () => {
    expect(kinds(classes({ g4: 'M^2 + psi^2', potential: 'c psi^2' }))).toEqual(['absent', 'canonical']);
  });

  it('is a cuscuton, auxiliary or absent without one', () => {
    const cuscuton = { g4: 'M^2', current: ['M^2', '0'] } as const;
    expect(kinds(classes({ ...cuscuton, potential: 'c phi^2 + psi^2' }))).toEqual(['quadratic-cuscuton', 'auxiliary']);
    expect(kinds(classes({ ...cuscuton, potential: 'c phi^3' }))).toEqual(['cuscuton', 'absent']);
    expect(kinds(classes({ g4: '0', current: ['2 M^2', '0'], potential: '3 M^2 psi^2 - 3 M^2 phi^2' }))).toEqual([
      'quadratic-cuscuton',
      'auxiliary',
    ]);
  });

  it('is mixed when another scalar shares its kinetic term', () => {
    expect(kinds(classes({ g4: 'M^2', kinetic: ['c', 'd', '0'] }))).toEqual(['mixed', 'mixed']);
  });
});

describe('the terms of a potential', () => {
  it('are named by degree', () => {
    const { potential } = classes({
      g4: 'M^2',
      potential: 'c M^4 + d phi psi + e phi^2 psi^2 + psi + psi^3 + c psi^6',
    });
    expect(potential.map((t) => [t.name, infix(t.coefficient)])).toEqual([
      ['constant', 'c*M^4'],
      ['linear', '1'],
      ['mass', 'd'],
      ['cubic', '1'],
      ['quartic', 'e'],
      ['higher', 'c'],
    ]);
  });
});
