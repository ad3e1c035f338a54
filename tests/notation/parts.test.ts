import { describe, expect, it } from 'vitest';
import { PARTS } from '../../src/notation/parts.js';
import { latexLagrangian, printLagrangian } from '../../src/notation/print.js';
import { lagrangianErrors, terms } from './rendered.js';

const factor = (text: string) => terms(text)[0]!.factors[0]!;

describe('PARTS', () => {
  it('names every part once, in letters and hyphens', () => {
    for (const { names } of PARTS) {
      expect(new Set(names).size).toBe(names.length);
      for (const name of names) expect(name).toMatch(/^[a-z]+(?:-[a-z]+)*$/);
    }
  });

  it.each(PARTS.flatMap(({ head, slots, names }) => names.map((name) => ({ head, slots, name }))))(
    '$head $name is read and printed',
    ({ head, slots, name }) => {
      const indices = 'abcd'.slice(0, slots);
      const read = terms(`${head}^{(${name})}_{${indices}} ${head}^{(${name})}{}^{${indices}}`);
      expect(read[0]!.factors.map((f) => [f.head, f.part, f.slots.length])).toEqual(Array(2).fill([head, name, slots]));
      for (const text of [printLagrangian(read), printLagrangian(read, { unicode: true }), latexLagrangian(read, [])]) {
        expect(terms(text)).toEqual(read);
      }
    },
  );
});

describe('the name of a part', () => {
  it.each([
    ['T^{(axial)}_{abc} T^{abc}', '_a_b_c'],
    ['T^{ ( \\mathrm{axial} ) }_{abc} T^{abc}', '_a_b_c'],
    ['T^{(\\text{axial})}{}^a{}_{bc} T_a{}^{bc}', '^a_b_c'],
    ['T{}^{(axial)}_{abc} T^{abc}', '_a_b_c'],
    ['T_{abc}^{(axial)} T^{abc}', '_a_b_c'],
    ['T_a^{(axial)}{}_{bc} T^{abc}', '_a_b_c'],
    ['{}^{(axial)}T_{abc} T^{abc}', '_a_b_c'],
    ['{T^{(axial)a}}_{bc} T_a^{bc}'.replace('(axial)a', '(axial)}{}^{a'), '^a_b_c'],
    ['{}^{(\\mathrm{axial})} \\! T_{abc} T^{abc}', '_a_b_c'],
  ])('%s', (text, slots) => {
    const { head, part, slots: read } = factor(text);
    expect([head, part, read.map((s) => (s.up ? '^' : '_') + s.name).join('')]).toEqual(['T', 'axial', slots]);
  });

  it('in front belongs to the tensor behind it', () => {
    const parts = (text: string) => terms(text)[0]!.factors.map((f) => f.part);
    expect(parts('T_a {}^{(axial)}T^{a}{}_{bc} A^b A^c')).toEqual([undefined, 'axial', undefined, undefined]);
    expect(parts('R {}^{(weyl)}R_{abcd} R^{abcd}')).toEqual([undefined, 'weyl', undefined]);
    expect(parts('R^2 {}^{(weyl)}R_{abcd} R^{abcd}')).toEqual([undefined, undefined, 'weyl', undefined]);
    expect(parts('c0 {}^{(weyl)}R_{abcd} R^{abcd}')).toEqual(['weyl', undefined]);
  });

  it('survives products, powers and the renaming of dummies, and keeps different parts apart', () => {
    const square = terms('(T^{(axial)}_{abc} T^{(vector)}{}^{abc})^2');
    expect(square[0]!.factors.map((f) => f.part)).toEqual(['axial', 'vector', 'axial', 'vector']);
    const sum = terms(
      'T^{(axial)}_{abc} T^{abc} + T_{abc} T^{abc} + T^{(vector)}_{abc} T^{abc} - T^{abc} T^{(vector)}_{abc}',
    );
    expect(sum.map((t) => t.factors[0]!.part)).toEqual(['axial', undefined]);
  });

  it('is set upright in LaTeX', () => {
    expect(latexLagrangian(terms('T^{(axial)}{}^{a}{}_{bc} R^{(pair-antisymmetric)}_{ad}{}^{bc} T^d'), [])).toBe(
      '{}^{(\\mathrm{axial})}T^a{}_{bc} {}^{(\\textrm{pair-antisymmetric})}R_{ad}{}^{bc} T^d',
    );
  });

  it.each([
    ['T^{(axil)}_{abc} T^{abc}', 'L:1:5: error: (axil) is not an irreducible part of T', 'did you mean axial?'],
    ['T^{(spin)}_{abc} T^{abc}', 'L:1:4: error: brackets around indices are not part of the notation', 'sum out'],
    [
      'T^{(weyl)}_{abc} T^{abc}',
      'L:1:5: error: (weyl) is not an irreducible part of T',
      'they are vector, axial, tensor',
    ],
    ['{}^{(second)}T_{abc} T^{abc}', 'L:1:6: error: (second) is not an irreducible part of T', 'they are vector'],
    ['A^{(vector)}_a A^a', 'L:1:5: error: A has no irreducible parts', 'only T and R have'],
    ['\\epsilon^{(axial)}_{abcd}', 'L:1:12: error: \\epsilon has no irreducible parts', 'only T and R have'],
    ['T^{(axial)}_a A^a', 'L:1:1: error: T^{(axial)}_a has 1 index, a part of T has 3', 'T_{abc} is the torsion'],
    ['R^{(scalar)}', 'L:1:1: error: R^{(scalar)} has no indices here, a part of R has 4', 'R_{abcd}'],
    ['T^{(axial)}^{(axial)}_{abc} T^{abc}', 'L:1:12: error: a second irreducible part of T', 'keep one'],
    ['{}^{(axial)}T^{(axial)}_{abc} T^{abc}', 'L:1:14: error: a second irreducible part of T', 'keep one'],
    ['{}^{(axial)} c0 R', 'L:1:3: error: ^{(axial)} stands in front of no tensor', 'write T^{(axial)}_{abc}'],
    ['T_{abc}{}^{(axial)} + R', 'L:1:10: error: ^{(axial)} stands in front of no tensor', 'write T^{(axial)}_{abc}'],
    ['R^{(ab)} R_{ab}', 'L:1:4: error: brackets around indices are not part of the notation', 'sum out'],
    ['R^{(ab)c}{}_c R_{ab}', 'L:1:4: error: brackets around indices are not part of the notation', 'sum out'],
  ])('%s: %s', (text, message, hint) => {
    const shown = lagrangianErrors(text);
    expect(shown.split('\n')[0]).toBe(message);
    expect(shown).toContain(`hint: `);
    expect(shown).toContain(hint);
    expect(shown.match(/error:/g)).toHaveLength(1);
  });
});
