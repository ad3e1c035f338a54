import { describe, expect, it } from 'vitest';
import { INTERNAL } from '../../src/notation/conventions.js';
import { printLagrangian } from '../../src/notation/print.js';
import { conventionPresets, presetConventions, readConventionsFile } from '../../src/notation/read-conventions.js';
import { errorText, theory, theoryErrors, theoryFile } from './rendered.js';

const declared = (conventions: string) =>
  theory(theoryFile(`conventions: ${conventions}`, 'lagrangian: R^2')).conventions;
const file = (...lines: string[]) =>
  readConventionsFile(['untwist-conventions: 1', 'title: t', 'why: w', ...lines, ''].join('\n'), 'c.yaml');

describe('conventions of a theory file', () => {
  it('are internal where nothing is said', () => {
    expect(declared('{}')).toEqual(INTERNAL);
    expect(theory(theoryFile('lagrangian: R^2')).conventions).toEqual(INTERNAL);
  });

  it.each([
    ['{ signature: "(+, -, -, -)" }', { signature: '+---' }],
    ['{ signature: "+−−−" }', { signature: '+---' }],
    ['{ torsion: half, torsion-index: last }', { torsion: 'half', 'torsion-index': 'last' }],
    ['{ curvature-sign: -1, epsilon: "−1", action: "-" }', { 'curvature-sign': '-1', epsilon: '-1', action: '-1' }],
    ['{ torsion-sign: 1, epsilon: "+" }', {}],
    ['{ units: 8 \\pi G }', { units: '8piG' }],
    ['{ units: 8piG }', { units: '8piG' }],
    ['{ ricci: "R^c_{abc}" }', { ricci: 'R^c_{abc}' }],
    ['{ ricci: "-R^c_{acb}" }', { ricci: 'R^c_{abc}' }],
    ['{ ricci: "R^\\\\lambda_{\\\\mu\\\\lambda\\\\nu}" }', {}],
    ['{ ricci: "R_{cb}{}^c{}_a", curvature-indices: form-first }', { 'curvature-indices': 'form-first' }],
    [
      '{ curvature-indices: form-first, ricci: "R_{ca}{}^c{}_b" }',
      { 'curvature-indices': 'form-first', ricci: 'R^c_{bca}' },
    ],
    ['{ torsion-trace: "T^b_{ba}" }', { 'torsion-trace': 'T^b_{ba}' }],
    ['{ torsion-trace: "T_{ab}{}^b", torsion-index: last }', { 'torsion-index': 'last' }],
    ['{ preset: mostly-minus-kappa, units: mass }', { signature: '+---' }],
    ['mostly-minus-kappa', { signature: '+---', units: 'kappa' }],
  ])('%s', (conventions, expected) => {
    expect(declared(conventions)).toEqual({ ...INTERNAL, ...expected });
  });

  it.each([
    ['{ signature: "++--" }', '"++--" is not a signature', 'write "-+++" or "+---"'],
    ['{ torsion: third }', '"third" is not a choice for torsion', 'the choices are full, half'],
    ['{ epsilon: 2 }', '"2" is not a choice for epsilon', 'the choices are +1, -1'],
    ['{ units: eV }', '"eV" is not a choice for units', 'the choices are mass, kappa, 8piG'],
    ['{ ricci: "R^c_{cab}" }', '"R^c_{cab}" is not a choice for ricci', 'write the trace'],
    ['{ ricci: "R_{ab}" }', '"R_{ab}" is not a choice for ricci', 'write the trace'],
    ['{ ricci: "2 R^c_{acb}" }', '"2 R^c_{acb}" is not a choice for ricci', 'write the trace'],
    ['{ ricci: "R^c_{acb} + R^c_{bca}" }', '"R^c_{acb} + R^c_{bca}" is not a choice for ricci', 'write the trace'],
    ['{ ricci: "R^{(weyl)}_{acb}{}^c" }', '"R^{(weyl)}_{acb}{}^c" is not a choice for ricci', 'write the trace'],
    ['{ ricci: "R^c_{acb" }', '{ is never closed', 'add the closing }'],
    ['{ torsion-trace: "T_a{}^b{}_b" }', '"T_a{}^b{}_b" is not a choice for torsion-trace', 'write the trace'],
    ['{ torsion-trace: "T^b_{ab}", torsion-index: last, torsion: 2 }', '"2" is not a choice for torsion', 'full, half'],
    ['{ sign: -1 }', 'conventions has no key sign', 'the keys are preset, signature, torsion'],
    [
      'mostly-minus-kapa',
      '"mostly-minus-kapa" is not the name of a set of conventions',
      'did you mean mostly-minus-kappa?',
    ],
    ['{ preset: nothing }', '"nothing" is not the name of a set of conventions', 'the presets are form-indices-first'],
    ['[half]', 'conventions must be a mapping but is a list', 'write key: value'],
  ])('%s: %s', (conventions, message, hint) => {
    const shown = theoryErrors(theoryFile(`conventions: ${conventions}`, 'lagrangian: R^2'));
    expect(shown).toMatch(/^test.yaml:3:\d+: error: /);
    expect(shown).toContain(`error: ${message}\n`);
    expect(shown).toContain(hint);
    expect(shown.match(/error:/g)).toHaveLength(1);
  });
});

describe('units', () => {
  const withUnits = (units: string, lagrangian: string, ...more: string[]) =>
    theory(theoryFile(`conventions: { units: ${units} }`, `lagrangian: '${lagrangian}'`, ...more));
  const names = (list: readonly { name: string }[]) => list.map((s) => s.name);

  it('bring their symbols, and M in their place', () => {
    const read = withUnits('kappa', '\\frac{1}{2\\kappa} R + c R^2', 'constants: [c]', "symbols: { kappa: 'K' }");
    expect(printLagrangian(read.lagrangian)).toBe('1/2 M^2 R + c R^2');
    expect(names(read.symbols)).toEqual(['c', 'M']);
    expect(read.unitSymbols).toEqual([{ name: 'kappa', role: 'scale', dimension: -2, latex: 'K' }]);
    expect(read.warnings).toEqual([]);
  });

  it('of Newton leave π only where it does not cancel', () => {
    const newton = withUnits('8piG', '\\frac{1}{16 \\pi G} R');
    expect([names(newton.symbols), names(newton.unitSymbols)]).toEqual([['M'], ['G', 'pi']]);
    const other = withUnits('8piG', '\\frac{1}{16 G} R');
    expect(printLagrangian(other.lagrangian)).toBe('1/2 M^2 pi R');
    expect(names(other.symbols)).toEqual(['M', 'pi']);
  });

  it('hold in relations', () => {
    const { relations } = withUnits('kappa', 'c R', 'constants: [{ c: mass^2 }]', 'impose: "c = 1/(2 kappa)"');
    expect(relations.map((r) => [r.subject, r.right, r.text])).toEqual([
      ['c', [{ coefficient: { num: 1n, den: 2n }, powers: [['M', 2]] }], 'c = 1/(2 kappa)'],
    ]);
  });

  it('may be declared once more, with their dimension', () => {
    expect(names(withUnits('kappa', 'R/kappa', 'scales: { M: mass, kappa: mass^-2 }').symbols)).toEqual(['M']);
  });

  it.each([
    [
      'kappa',
      ['lagrangian: R/kappa', 'constants: [kappa]'],
      'kappa has another meaning in the units kappa, with the dimension mass^-2',
    ],
    [
      'kappa',
      ['lagrangian: R/kappa', 'constants: [M]'],
      'M has another meaning in the units kappa, with the dimension mass^1',
    ],
    ['kappa', ['lagrangian: R/kappa', 'matter: [{ vacuum: kappa }]'], 'kappa is a unit and no energy density'],
    ['kappa', ['lagrangian: R/kappa - M^2 R'], 'the Lagrangian is zero'],
    ['mass', ['lagrangian: R/kappa'], 'unknown symbol kappa'],
  ])('%s, %j: %s', (units, lines, message) => {
    const shown = theoryErrors(theoryFile(`conventions: { units: ${units} }`, ...lines));
    expect(shown).toContain(`error: ${message}\n`);
    expect(shown).toMatch(/^test.yaml:\d+:\d+: error/);
    expect(shown.match(/error:/g)).toHaveLength(1);
  });
});

describe('files of conventions', () => {
  it('presets are read, none is the internal set, no two are equal', () => {
    const presets = conventionPresets();
    expect(presets.length).toBeGreaterThanOrEqual(4);
    const sets = presets.map((name) => JSON.stringify(presetConventions(name)));
    expect(new Set([...sets, JSON.stringify(INTERNAL)]).size).toBe(presets.length + 1);
    for (const name of presets) expect(name).toMatch(/^[a-z0-9-]+$/i);
    expect(presetConventions('../geometry/flrw')).toBeUndefined();
  });

  it('of the user may build on a preset', () => {
    expect(file('conventions: { preset: half-torsion-last, epsilon: -1 }')).toEqual({
      ...INTERNAL,
      torsion: 'half',
      'torsion-index': 'last',
      epsilon: '-1',
    });
  });

  it.each([
    [['conventions: { torsion: third }'], '4:25: error: "third" is not a choice for torsion'],
    [['conventions: {}', 'sources: x'], '5:1: error: a file of conventions has no key sources'],
    [[], '1:1: error: a file of conventions lacks the key conventions'],
  ])('%j: %s', (lines, message) => {
    expect(errorText(() => file(...lines))).toContain(`c.yaml:${message}`);
  });

  it('have a version', () => {
    const text = 'untwist-conventions: 2\ntitle: t\nwhy: w\nconventions: {}\n';
    expect(errorText(() => readConventionsFile(text, 'c.yaml'))).toContain('c.yaml:1:22: error: not a version');
  });
});
