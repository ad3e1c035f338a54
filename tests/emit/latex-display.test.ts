import { describe, expect, it } from 'vitest';
import {
  conditionRows,
  equationOf,
  fixedRow,
  polyRows,
  tensorsTex,
  typedTerms,
  writerOf,
} from '../../src/emit/latex-display.js';
import { displayBody, rowDisplays } from '../../src/emit/latex-lines.js';
import { fixture } from './latex-fixtures.js';

const writer = writerOf(fixture('with-relations'));

describe('a writer', () => {
  it('knows the LaTeX of every symbol', () => {
    expect(['c0', 'a2', 'k', 'a', 'phi', 'N', 'rho_dust'].map(writer.latex)).toEqual([
      '\\alpha_0',
      'a_{2}',
      'k',
      'a',
      '\\phi',
      'N',
      '\\rho_{\\mathrm{dust}}',
    ]);
    expect(writer.rate('a')).toBe('H');
  });

  it('labels the displays of a passage one after the other', () => {
    const { displays } = writer.passage('equation-a_x', 'Title', {}, [['x = 1'], ['y = 2']]);
    expect(displays.map((d) => d.label)).toEqual([
      'eq:with-relations:equation-a-x',
      'eq:with-relations:equation-a-x:2',
    ]);
    expect(displays[1]).toMatchObject({ tex: 'y = 2' });
    expect(displays[1]!.copyTex).toContain('\\label{eq:with-relations:equation-a-x:2}');
  });

  it('keeps its own variables beside those asked for', () => {
    const other = writerOf(fixture('with-relations'), { variables: 'u,v' });
    expect(other.viewer.variables?.key).toBe('u,v');
    expect(other.plain.variables).toBeUndefined();
  });
});

describe('equations', () => {
  it('divide by the power on their left', () => {
    const [lines = []] = equationOf(writer.viewer, 'E', writer.derivation.equations.get('psi')!, { right: '= 0' });
    expect(lines[0]).toMatch(/^&?\\frac\{E\}\{a\^\{3\}\}/);
    expect(lines.at(-1)).toMatch(/= 0$/);
  });

  it('of relations and conditions are rows', () => {
    const { eliminated, conditions } = writer.derivation.relations;
    expect(displayBody(rowDisplays(polyRows(writer.plain, eliminated))[0]!)).toContain('a1 &= 0');
    const rows = conditionRows(
      writer.plain,
      conditions.map((c) => c.value),
    );
    expect(rows.map((r) => [r.left, r.right])).toEqual(rows.map(() => ['', '= 0']));
  });
});

describe('TeX that is given', () => {
  it('keeps its signs and is split at factors only', () => {
    expect(typedTerms(['\\tfrac{1}{2} M^{2} R', '- \\hat {x} R_{\\mu \\nu} T^{a}{}_{bc}', '+ 1'])).toEqual([
      { negative: false, head: ['\\tfrac{1}{2}', 'M^{2}', 'R'], inner: [], tail: [] },
      { negative: true, head: ['\\hat {x}', 'R_{\\mu \\nu}', 'T^{a}{}_{bc}'], inner: [], tail: [] },
      { negative: false, head: ['1'], inner: [], tail: [] },
    ]);
  });

  it('may be a row', () => {
    expect(rowDisplays([fixedRow('x', 'y', 'z')])).toEqual([['x &= y z']]);
  });

  it('writes tensors with their slots in order', () => {
    const slot = (name: string, up: boolean) => ({ name, up });
    expect(tensorsTex([{ head: 'T', slots: [slot('a', true), slot('b', false), slot('c', false)] }])).toBe(
      'T^a{}_{bc}',
    );
  });
});
