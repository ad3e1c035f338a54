import { describe, expect, it } from 'vitest';
import { evaluate, symbolsOf } from '../../src/algebra/collect.js';
import { equals } from '../../src/algebra/poly.js';
import { rational, subtractRational } from '../../src/algebra/rational.js';
import { jetName } from '../../src/algebra/ring.js';
import { inputsOf, polynomialsOf } from '../../src/emit/code-description.js';
import { codeModel, dimensionText } from '../../src/emit/code-model.js';
import { derivationObject } from '../../src/emit/json.js';
import { EIGHTEEN, THEORIES } from './code-fixtures.js';
import { deriveText, integers, samplePoint } from './emitted-module.js';

const d = deriveText(EIGHTEEN);
const m = codeModel(d, { jacobian: true });
const named = (name: string) => m.functions.find((f) => f.name === name)!;

describe('codeModel', () => {
  it('describes what the derivation has', () => {
    expect(m.functions.map((f) => f.name)).toEqual(
      expect.arrayContaining(
        (
          'lagrangian equations jacobian expansionRate densities pressures rhoT pT wT g4 kinetic current potential ' +
          'curvatureObstruction'
        ).split(' '),
      ),
    );
    const { equations } = derivationObject(d) as { equations: Record<string, string> };
    expect(named('equations').outputs.map((o) => o.key)).toEqual(Object.keys(equations));
    expect(named('densities').outputs.map((o) => o.key)).toEqual(['dust', 'radiation', 'Lambda', 'chi']);
    const bianchi = codeModel(deriveText(THEORIES['Bianchi I']!), { jacobian: false });
    expect(bianchi.functions.map((f) => f.name)).toEqual([
      'lagrangian',
      'equations',
      'expansionRates',
      'densities',
      'pressures',
    ]);
  });

  it('has jets as far as its functions read them, and parameters for everything else', () => {
    const [input] = inputsOf(m);
    expect(inputsOf(m)).toHaveLength(1);
    if (input!.kind !== 'jets') throw new Error('jets expected');
    expect(input!.fields.map((f) => [f.name, f.order])).toEqual([
      ['N', 1],
      ['a', 2],
      ['phi', 2],
      ['psi', 2],
    ]);
    const jets = input!.fields.flatMap((f) => Array.from({ length: f.order + 1 }, (_, n) => jetName(f.name, n)));
    const known = new Set([...m.parameters.map((p) => p.name), ...jets]);
    for (const p of m.functions.flatMap((f) => f.outputs).flatMap(polynomialsOf))
      for (const name of symbolsOf(p)) expect(known, name).toContain(name);
  });

  it('has derivatives of the residuals that agree with differences', () => {
    const { result, outputs } = named('jacobian');
    if (result.kind !== 'matrix') throw new Error('a matrix expected');
    expect(result.rows).toEqual(['N', 'a', 'phi', 'psi']);
    expect(result.columns.slice(0, 5)).toEqual(['N', 'D(N,1)', 'a', 'D(a,1)', 'D(a,2)']);
    const { exact } = samplePoint(d, integers(4));
    const h = rational(1n, 10n ** 12n);
    const relative = (x: { num: bigint; den: bigint }) => Number(x.num) / Number(x.den);
    result.rows.forEach((row, i) => {
      result.columns.forEach((column, j) => {
        const e = d.equations.get(row)!;
        const at = exact.get(column)!;
        const moved = new Map([...exact, [column, rational(at.num * h.den + h.num * at.den, at.den * h.den)] as const]);
        const slope = relative(subtractRational(evaluate(e, moved), evaluate(e, exact))) / relative(h);
        const value = relative(evaluate(outputs[i * result.columns.length + j]!.numerator, exact));
        expect(Math.abs(slope - value)).toBeLessThanOrEqual(1e-5 * Math.max(1, Math.abs(value)));
      });
    });
  });

  it('has the expansion rate and pressures from densities', () => {
    const rate = named('expansionRate').outputs[0]!.numerator;
    const point = new Map([...samplePoint(d, integers(4)).exact, ['a', rational(2)], ['N', rational(3)]] as const);
    point.set('D(a,1)', rational(12));
    expect(evaluate(rate, point)).toEqual(rational(2));
    const pressures = named('pressures').outputs;
    expect(d.fluids.every((f, i) => equals(pressures[i]!.numerator, f.pressure))).toBe(true);
  });

  it('has no Jacobian without derivatives', () => {
    const none = codeModel(deriveText(THEORIES['total derivatives only']!), { jacobian: true });
    expect(none.functions.map((f) => f.name)).not.toContain('jacobian');
    expect(none.conditions).toHaveLength(1);
  });
});

describe('dimensionText', () => {
  it('says what the terms have', () => {
    expect(dimensionText([])).toBe('identically zero');
    expect(dimensionText([0])).toBe('dimensionless');
    expect(dimensionText([2, 4])).toContain('mass dimension 2 and 4');
  });
});
