/** The options of `untwist derive` on conformal frames, canonical fields and assumptions. */
import { describe, expect, it } from 'vitest';
import { run } from './world.js';

const THEORY = `untwist: 1
name: Slack water
constants: [s, b3, c0]
scales: { M: mass }
lagrangian: 1/2 c0 M^2 R + s ( R_{abcd} R^{abcd} - R_{abcd} R^{cdab} ) + b3 M^2 T_a T^a
`;
const json = async (...options: readonly string[]) => {
  const { code, out, err } = await run(['derive', '-', '--json', ...options], { stdin: THEORY });
  expect([code, err]).toEqual([0, '']);
  return JSON.parse(out);
};
const failure = async (...options: readonly string[]): Promise<string> => {
  const { code, out, err } = await run(['derive', '-', '--json', ...options], { stdin: THEORY });
  expect([code, out]).toEqual([1, '']);
  return err;
};

describe('frames and canonical fields on the command line', () => {
  it('are absent unless asked for', async () => {
    const keys = Object.keys(await json());
    for (const key of ['frames', 'classification', 'canonical', 'assumptions']) expect(keys).not.toContain(key);
  });

  it('--frame einstein and --omega add frames, --canonical fields to an order', async () => {
    const both = await json('--frame', 'einstein', '--omega', '1 + psi^2/M^2', '--canonical', '--order', '3');
    expect(both.frames.map((f: { frame: string }) => f.frame)).toEqual(['einstein', 'chosen']);
    const chosen = both.canonical.find((c: { frame: string }) => c.frame === 'chosen');
    expect(chosen.series.slope).toHaveLength(4);
    expect((await json('--canonical')).frames).toBeUndefined();
  });

  it('--assume decides signs and classes', async () => {
    const assumed = await json('--assume', 's > 0', '--assume', 'b3 < 0');
    expect(assumed.classification.scalars.psi.kind).toBe('canonical');
    expect(assumed.assumptions.every((a: { used: boolean }) => a.used)).toBe(true);
  });

  it('faults name the option and its place', async () => {
    expect(await failure('--assume', 's > 0', '--assume', 's < -1')).toContain('--assume:1:1: error: the assumption');
    expect(await failure('--assume', 's')).toContain('an assumption needs one of the signs');
    expect(await failure('--omega', '1 + q')).toContain('--omega:1:5: error: unknown symbol q');
    expect(await failure('--canonical', '--order', '0')).toContain('a whole number from 1 to 24');
    expect(await failure('--frame', 'string')).toContain('einstein');
  });
});
