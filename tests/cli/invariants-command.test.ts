import { describe, expect, it } from 'vitest';
import { run } from './world.js';

describe('untwist invariants', () => {
  it('lists both parities', async () => {
    const { code, out, err } = await run(['invariants', '--torsion', '2']);
    expect([code, err]).toEqual([0, '']);
    expect(out).toBe(
      [
        'even parity: 3',
        '  T_{abc} T^{abc}',
        '  T_{abc} T^{bac}',
        '  T_a T^a',
        '',
        'odd parity: 2; 2 more are combinations of them',
        '  ε_{abcd} T^a T^{bcd}',
        '  ε_{abcd} T_e{}^{ab} T^{ecd}',
        '',
      ].join('\n'),
    );
  });

  it('counts as published: 6 + 4 of curvature², 1 + 1 of curvature — arXiv:1105.3504 (memory)', async () => {
    const counts = async (...args: string[]): Promise<number[]> =>
      JSON.parse((await run(['invariants', ...args, '--json'])).out).map((p: { count: number }) => p.count);
    expect(await counts('--curvature', '2')).toEqual([6, 4]);
    expect(await counts('--curvature', '1')).toEqual([1, 1]);
    expect(await counts('--torsion', '2', '--curvature', '1', '--parity', 'even')).toEqual([21]);
  });

  it('shows the relations of the others', async () => {
    const { out } = await run(['invariants', '--torsion', '2', '--parity', 'odd', '--relations']);
    expect(out.split('\n').filter((line) => line.includes(' = '))).toHaveLength(2);
  });

  it('of odd rank has none', async () => {
    expect((await run(['invariants', '--torsion', '1'])).out).toBe('even parity: 0\n\nodd parity: 0\n');
  });

  it.each([
    [[], /no content was asked for/],
    [['--torsion', 'two'], /--torsion takes a number, not "two"/],
    [['--torsion', '2', '--parity', 'left'], /"left" is not a parity/],
    [['--curvature', '9'], /have more than 12 indices/],
  ])('refuses %j', async (args, message) => {
    const { code, out, err } = await run(['invariants', ...args]);
    expect([code, out]).toEqual([1, '']);
    expect(err).toMatch(message);
  });
});
