import { describe, expect, it } from 'vitest';
import { fraction } from '../../src/algebra/fraction.js';
import { add, generator, power } from '../../src/algebra/poly.js';
import { inlineTex, sumTex } from '../../src/emit/latex-math.js';
import { fractionLines, functionLines, functionRows, scalarTex, vectorViewer } from '../../src/emit/vector-view.js';
import { squared } from './every-k-fixtures.js';

const { start } = squared.auxiliary!;
const { ring } = start.value.numerator;
const viewer = vectorViewer(squared, start);
const tex = (name: string, n = 1): string => inlineTex(sumTex(viewer.sum(power(generator(ring, name), n))));

describe('vectorViewer', () => {
  it('sets what belongs to the vector so that powers and products stay readable', () => {
    expect(tex('div(n)', 2)).toBe('\\theta_{n}^{2}');
    expect(tex('R3(n)', 2)).toBe('{{}^{3}\\!R}^{2}');
    expect(tex('D(phi,n)', 2)).toBe('{(\\partial_{n} \\phi)}^{2}');
    expect(tex('D(chi,n)')).toBe('{(\\partial_{n} \\chi)}');
    expect([tex('R(g)'), tex('X(chi,chi)'), tex('chi')]).toEqual(['\\mathring{R}', 'X^{\\chi \\chi}', '\\chi']);
  });

  it('knows the scalars of the connection and those that were added', () => {
    expect([scalarTex(squared, 'phi'), scalarTex(squared, 'chi'), scalarTex(squared, 'x')]).toEqual([
      '\\phi',
      '\\chi',
      'x',
    ]);
  });
});

describe('fractionLines', () => {
  it('puts a denominator on the left', () => {
    const f = fraction(generator(ring, 'chi'), [{ base: add(generator(ring, 'chi'), generator(ring, 'M')), power: 1 }]);
    expect(fractionLines(viewer, 'V', f)).toEqual([['\\bigl( M + \\chi \\bigr) V = \\chi']]);
  });
});

describe('functionRows, functionLines', () => {
  it('leave out what vanishes, but not everything', () => {
    const { functions } = squared.auxiliary!.branches[0]!.metric!.reached!;
    const rows = functionRows(functions, (kind, scalars) => `${kind}${scalars.join('')}`);
    expect(rows.map(([name]) => name)).toEqual(['G4', 'Kchichi', 'V']);
    expect(functionLines(squared, viewer, functions)).toHaveLength(3);
    const none = functionRows(
      {
        ...functions,
        g4: fraction(add(generator(ring, 'M'), generator(ring, 'M'))),
        kinetic: new Map(),
        current: new Map(),
        potential: functions.potential,
      },
      (kind) => kind,
    );
    expect(none.map(([name]) => name)).toEqual(['G4', 'V']);
  });
});
