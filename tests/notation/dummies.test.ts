import { describe, expect, it } from 'vitest';
import { renamedApart } from '../../src/notation/dummies.js';
import type { TensorFactor } from '../../src/notation/theory.js';

const factor = (head: TensorFactor['head'], text: string): TensorFactor => ({
  head,
  slots: [...text].flatMap((c, i) => (c === '^' || c === '_' ? [{ name: text[i + 1]!, up: c === '^' }] : [])),
});
const show = (factors: readonly TensorFactor[]): string =>
  factors.map(({ head, slots }) => head + slots.map((s) => (s.up ? '^' : '_') + s.name).join('')).join(' ');

describe('renamedApart', () => {
  const square = [factor('T', '_a'), factor('T', '^a')];
  it('gives a dummy that meets another the first free letter', () => {
    expect(show(renamedApart(square, square))).toBe('T_a T^a T_b T^b');
    expect(show(renamedApart(renamedApart(square, square), square))).toBe('T_a T^a T_b T^b T_c T^c');
  });
  it('leaves alone what contracts or does not meet', () => {
    expect(show(renamedApart([factor('T', '_a')], [factor('T', '^a')]))).toBe('T_a T^a');
    expect(show(renamedApart(square, [factor('R', '_c_d'), factor('R', '^c^d')]))).toBe('T_a T^a R_c_d R^c^d');
  });
  it('renames a dummy of the left that meets a free index of the right', () => {
    expect(show(renamedApart([...square, factor('A', '_b')], [factor('T', '^a')]))).toBe('T_c T^c A_b T^a');
  });
  it('goes on with capitals and Greek letters', () => {
    let product: readonly TensorFactor[] = square;
    for (let i = 0; i < 55; i++) product = renamedApart(product, square);
    const names = new Set(product.flatMap((f) => f.slots.map((s) => s.name)));
    expect(names.size).toBe(56);
    expect(names.has('\\alpha')).toBe(true);
  });
});
