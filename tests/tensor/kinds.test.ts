import { describe, expect, it } from 'vitest';
import { PARTS } from '../../src/notation/parts.js';
import { kindName, kindOf, kindTable, makeKind, plainKind } from '../../src/tensor/kinds.js';
import { exchange, SymmetryError } from '../../src/tensor/symmetry.js';
import { PRIME, RandomTensors } from '../oracle/tensors.js';

describe('the table of kinds', () => {
  it('has the built-in tensors with the orders of their groups', () => {
    const orders = [...kindTable()].filter(([, k]) => k.part === undefined).map(([name, k]) => [name, k.group.length]);
    expect(orders).toEqual([
      ['R/0', 1],
      ['R/2', 1],
      ['R/4', 4],
      ['T/1', 1],
      ['T/3', 2],
      ['epsilon/4', 24],
      ['eta/2', 2],
    ]);
  });

  it('has every irreducible part that the notation has', () => {
    const table = kindTable();
    for (const { head, slots, names } of PARTS)
      for (const part of names) {
        const kind = table.get(kindName(head, slots, part));
        expect(kind, part).toMatchObject({ head, part, slots });
        // A part has at least the symmetries of the whole.
        const own = new Set(kind!.group.map((g) => `${g.sign}${g.places}`));
        for (const g of table.get(kindName(head, slots))!.group) expect(own.has(`${g.sign}${g.places}`)).toBe(true);
      }
  });

  it('names traces with the signs that follow from R_ab = R^c_acb and T_a = T^b_ab', () => {
    const tensors = new RandomTensors(5, 4);
    const eta = [-1, 1, 1, 1];
    for (const kind of kindTable().values())
      for (const { pair, to, keep, sign } of kind.traces)
        for (const at of keep.length === 2
          ? [
              [0, 1],
              [3, 2],
            ]
          : keep.length === 1
            ? [[0], [2]]
            : [[]]) {
          let total = 0;
          for (let e = 0; e < 4; e++) {
            const indices = new Array<number>(kind.slots).fill(e);
            keep.forEach((slot, i) => {
              indices[slot] = at[i]!;
            });
            expect(pair.every((slot) => indices[slot] === e)).toBe(true);
            total += eta[e]! * tensors.component(kind.head, indices);
          }
          const named = sign * tensors.component(to, at);
          expect(Math.abs(total - named) % PRIME, `${kind.name} ${pair}`).toBe(0);
        }
  });

  it('takes declared tensors and refuses a name twice', () => {
    const S = makeKind('S', 3, [exchange(3, 0, 2, 1)]);
    expect(kindTable([S]).get('S/3')).toBe(S);
    expect(() => kindTable([S, S])).toThrow(/S\/3 exists/);
    expect(() => kindTable([makeKind('R', 4)])).toThrow(/exists/);
    expect(() => makeKind('Z', 3, [exchange(3, 0, 1, 1), exchange(3, 1, 2, -1)])).toThrow(SymmetryError);
  });

  it('gives a tensor that nobody declared no symmetry', () => {
    expect(kindOf(kindTable(), 'H', 3)).toBe(plainKind('H', 3));
    expect(plainKind('H', 3).group).toHaveLength(1);
    expect(plainKind('H', 3, 'x')).toMatchObject({ head: 'H', part: 'x', name: 'H(x)/3' });
    expect(kindOf(kindTable(), 'R', 4).group).toHaveLength(4);
  });
});
