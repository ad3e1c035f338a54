import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import {
  GEOMETRY_FOLDER,
  MAX_JET_ORDER,
  readGeometryFile,
  readGeometryText,
} from '../../src/geometry/read-geometry.js';
import { InputError, renderDiagnostic } from '../../src/notation/diagnostics.js';

const FLRW = readFileSync(new URL('flrw.yaml', GEOMETRY_FOLDER), 'utf8');

/** The text of flrw.yaml with one passage replaced. */
function changed(from: string, to: string): string {
  if (!FLRW.includes(from)) throw new Error(`flrw.yaml has no passage ${from}`);
  return FLRW.replace(from, to);
}

/** Everything that is wrong with a text, as a user sees it. */
function complaints(text: string): string[] {
  try {
    readGeometryText(text, 'round.yaml');
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return error.diagnostics.map((d) => renderDiagnostic(d));
  }
  return [];
}

describe('readGeometryText', () => {
  it('reads the isotropic geometry', () => {
    const file = readGeometryText(FLRW, 'flrw.yaml');
    expect(file.fields.map((f) => f.name)).toEqual(['N', 'a', 'phi', 'psi']);
    expect(file.parameters).toEqual([{ name: 'k', latex: 'k', meaning: 'spatial curvature', dimension: 2 }]);
    expect(file.coframe.map(infix)).toEqual(['N', 'a', 'a', 'a']);
    expect(file.lapse).toBe('N');
    expect([...file.rates]).toEqual([['a', 'H']]);
    expect(file.isotropic).toEqual({ scale: 'a', curvature: 'k', scalars: ['phi', 'psi'] });
    expect(file.structure.size).toBe(3);
    expect(file.connection).toHaveLength(6);
    expect(file.components.map((c) => `${c.name} = ${infix(c.value)}`)).toContain('A4 = phi^2 - psi^2 + k/a^2');
    expect(file.variables.map((v) => v.key)).toEqual(['u,v', 'h,f']);
    expect(file.ring.position.has(`D(phi,${MAX_JET_ORDER})`)).toBe(true);
    expect(file.ring.position.has(`D(phi,${MAX_JET_ORDER + 1})`)).toBe(false);
  });

  it('keeps the root of a parameter apart from every name a user can spell', () => {
    const { ring, structure } = readGeometryText(FLRW, 'flrw.yaml');
    expect(ring.position.has('kappa')).toBe(false);
    expect(infix(structure.get(1)![0]!.value)).toBe('-2*sqrt(k)');
  });

  it('gives alternative variables one more derivative than the fields, since an image may contain a velocity', () => {
    const [uv] = readGeometryText(FLRW, 'flrw.yaml').variables;
    expect(infix(uv!.images.get('phi')!)).toBe('-u + D(a,1)/(N*a)');
    expect(uv!.ring.position.has(`D(a,${MAX_JET_ORDER + 1})`)).toBe(true);
    expect(uv!.fields.map((f) => f.name)).toEqual(['N', 'a', 'u', 'v']);
  });

  it('reads every bundled file', () => {
    const names = readdirSync(GEOMETRY_FOLDER).filter((name) => name.endsWith('.yaml'));
    expect(names.length).toBeGreaterThanOrEqual(2);
    for (const name of names) expect(readGeometryFile(name.replace('.yaml', ''))?.title, name).toBeTruthy();
  });

  it('knows no other file', () => {
    expect(readGeometryFile('no-such-geometry')).toBeUndefined();
  });
});

describe('a faulty geometry file', () => {
  it('is answered with the place, the line and what to do', () => {
    expect(complaints(changed('1 0: { x: a phi }', '1 0: { x: a phy }'))).toEqual([
      [
        'round.yaml:33:15: error: unknown symbol phy',
        '      1 0: { x: a phy }',
        '                  ^^^',
        'hint: did you mean phi?',
      ].join('\n'),
    ]);
  });

  const rows: readonly (readonly [what: string, from: string, to: string, message: string])[] = [
    ['an unknown key', 'lapse: N', 'lapse: N\nlaps: N', 'a geometry file has no key laps'],
    ['a missing key', 'lapse: N\n', '', 'a geometry file lacks the key lapse'],
    ['another version', 'untwist-geometry: 1', 'untwist-geometry: 2', 'this program reads version 1 of geometry files'],
    ['a wrong dimension', 'dimension: mass^2', 'dimension: meter', 'k has no valid dimension'],
    ['a root of nothing', 'kappa: k', 'kappa: q', 'kappa is the root of q, which is no parameter'],
    ['three basis forms', '[dt, x, y, z]', '[dt, x, y]', 'a cobasis has four different one-forms'],
    ['a basis form twice', '[dt, x, y, z]', '[dt, x, y, y]', 'a cobasis has four different one-forms'],
    ['an unknown basis form', 'x: { y z: -2', 'x: { y w: -2', 'w is no one-form of the cobasis'],
    ['a one-form for a two-form', 'x: { y z: -2', 'x: { y: -2', 'y is no 2-form'],
    ['a square of a one-form', 'x: { y z: -2', 'x: { y y: -2', 'y y is no 2-form'],
    ['d of a two-form', 'x: { y z: -2', 'x y: { y z: -2', 'x y is no one-form'],
    ['a sum in the coframe', 'dt: N, x: a,', 'dt: N, x: a + N,', 'a coframe entry is one term'],
    ['a diagonal connection entry', '1 0: { x', '1 1: { x', '"1 1" is no pair of different frame indices'],
    ['a connection entry out of range', '1 0: { x', '1 4: { x', '"1 4" is no pair of different frame indices'],
    ['a lapse that is no field', 'lapse: N', 'lapse: M', 'M is no field'],
    ['a rate of no field', 'rates: { a: H }', 'rates: { b: H }', 'b is no field'],
    ['a scalar that is no field', 'scalars: [phi, psi]', 'scalars: [phi, chi]', 'chi is no field'],
    ['a curvature that is no parameter', 'curvature: k', 'curvature: a', 'a is no parameter'],
    ['variables that are not declared', '  u,v:\n', '  u,w:\n', 'u,w names a symbol that variable-fields lacks'],
    [
      'a derivative that nothing needs',
      'A2: { value: 2 phi psi,',
      'A2: { value: "2 D(a,9)",',
      'D(a,9) is a derivative beyond',
    ],
    ['a decimal number', '-2 kappa }\n  y', '-2.5 kappa }\n  y', 'decimal'],
  ];
  for (const [what, from, to, message] of rows)
    it(`is refused for ${what}`, () => {
      const found = complaints(changed(from, to));
      expect(found.join('\n')).toContain(message);
      for (const text of found) expect(text).toMatch(/^round\.yaml:\d+:\d+: error: .*\n(?:.*\n)*hint: /);
    });

  it('reports several faults at once', () => {
    const twice = changed('1 0: { x: a phi }', '1 0: { x: a phy }').replace('2 0: { y: a phi }', '2 0: { w: a phi }');
    expect(complaints(twice).map((t) => /error: (.*)/.exec(t)![1])).toEqual([
      'unknown symbol phy',
      'w is no one-form of the cobasis',
    ]);
  });
});
