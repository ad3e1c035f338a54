import { describe, expect, it } from 'vitest';
import { generator, multiply } from '../../src/algebra/poly.js';
import { dimensionsIn, dimensionsOf, expressionsOf, modelParameters } from '../../src/emit/parameters.js';
import { deriveText } from './emitted-module.js';

const d = deriveText(`untwist: 1
name: Harbour light
constants: [unused, b1, c1]
scales: { m: mass }
lagrangian: "m^2 R + b1 R^2 + c1 T_a T^a R"
matter: [ dust, { vacuum: Lambda }, { fluid: chi, w: "1/5" } ]
`);

describe('modelParameters', () => {
  it('lists what occurs, with meaning and dimension, sources marked', () => {
    expect(modelParameters(d).map((p) => [p.name, p.meaning, p.dimension, p.isSource])).toEqual([
      ['b1', 'coupling constant', 0, false],
      ['c1', 'coupling constant', 0, false],
      ['m', 'scale', 1, false],
      ['Lambda', 'energy density of the vacuum', 4, false],
      ['M', 'reduced Planck mass', 1, false],
      ['k', 'spatial curvature', 2, false],
      ['rho_dust', 'energy density of dust at a = 1', 4, false],
      ['rho_chi', 'energy density of chi now, a function of time', 4, true],
    ]);
  });

  it('counts the symbols of every expression', () => {
    expect(expressionsOf(d)).toContain(d.equations.get('psi'));
    expect(expressionsOf(d)).toContain(d.friedmann?.pT);
  });
});

describe('dimensionsIn', () => {
  it('adds one for a time derivative', () => {
    const dims = dimensionsOf(d);
    const g = (name: string, n = 1) => generator(d.ring, name, n);
    expect(dimensionsIn(multiply(g('D(phi,2)'), g('m', -1)), dims)).toEqual([2]);
    expect(dimensionsIn(g('rho_chi'), dims)).toEqual([4]);
  });

  it('says when a dimensionless constant multiplies terms of different dimension', () => {
    expect(dimensionsIn(d.equations.get('N')!, dimensionsOf(d))).toEqual([4]);
    const odd = deriveText('untwist: 1\nname: x\nconstants: [c]\nlagrangian: "c R + R^2"\n');
    expect(dimensionsIn(odd.equations.get('N')!, dimensionsOf(odd))).toEqual([2, 4]);
  });
});
