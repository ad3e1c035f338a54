/** The options of `untwist derive` on every spatial curvature and on auxiliary fields. */
import { describe, expect, it } from 'vitest';
import { run } from './world.js';

const THEORY = `untwist: 1
name: Lock
constants: [c]
scales: { M: mass }
lagrangian: 1/2 M^2 R + c R^2
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

describe('auxiliary fields on the command line', () => {
  it('are absent unless asked for', async () => {
    const keys = Object.keys(await json());
    for (const key of ['everyK', 'auxiliary']) expect(keys).not.toContain(key);
    expect(Object.keys(await json('--every-k'))).toContain('everyK');
  });

  it('--linearise integrates the connection out, --integrate other fields', async () => {
    const { auxiliary, checks } = await json('--linearise', 'R');
    expect(auxiliary.branches[0].toMetric).toMatchObject({ G4: '2*chi*c + M^2/2', validFor: 'every k' });
    expect(checks.map((c: { name: string }) => c.name)).toEqual(
      expect.arrayContaining(['linearised Lagrangian', 'fields integrated out']),
    );
    const back = await json('--linearise', 'R', '--integrate', 'chi');
    expect(back.auxiliary.branches[0].lagrangian).toBe(back.everyK.lagrangian);
  });

  it('faults name the option', async () => {
    expect(await failure('--linearise', 'R_{ab}')).toContain('--linearise:1:4: error: indices a, b are free');
    expect(await failure('--linearise', 'T_a T^a')).toContain('--linearise: error: no power of T_a T^a');
    expect(await failure('--integrate', 'ph')).toContain('hint: did you mean phi?');
  });
});
