import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import type { SquaredIntegrand } from '../../src/algebra/squared-integrand.js';
import { antiderivativesOf, integralCalls, integrandText, isAntiderivative } from '../../src/cas/antiderivative.js';
import { FUNCTIONS } from '../../src/cas/elementary.js';
import { readReply } from '../../src/cas/reply.js';

const square = (power: number, ...factors: readonly (readonly [readonly number[], number])[]): SquaredIntegrand => ({
  power,
  factors: factors.map(([c, exponent]) => ({ coefficients: c.map((n) => rational(n)), exponent })),
});
const ATANH = square(0, [[0, -1], -2]);
const saying = (reply: string | undefined) => ({ timeLimitMs: 1, propose: async () => [reply] });
const antiderivativeOf = async (of: SquaredIntegrand, options: Parameters<typeof antiderivativesOf>[1]) =>
  (await antiderivativesOf([of], options))[0];

describe('an antiderivative', () => {
  it('is believed only when its derivative squares to the integrand', async () => {
    expect(await antiderivativeOf(ATANH, saying('arctanh(v1)'))).toBeDefined();
    expect(await antiderivativeOf(ATANH, saying('-1/2*log(1-v1)+1/2*log(1+v1)'))).toBeDefined();
    for (const wrong of [
      'arctan(v1)',
      '2*arctanh(v1)',
      'v1',
      'arctanh(v1)+v1',
      'nonsense(',
      'Stop: sorry',
      '1.5',
      undefined,
    ])
      expect(await antiderivativeOf(ATANH, saying(wrong)), String(wrong)).toBeUndefined();
  });

  it('may have roots', () => {
    const root = square(0, [[0, 1], 1]);
    const tree = (text: string) => readReply(text, FUNCTIONS);
    expect(isAntiderivative(tree('1/2*log(v1+(v1^2+1)^(1/2))+1/2*v1*(v1^2+1)^(1/2)'), root)).toBe(true);
    expect(isAntiderivative(tree('1/2*log(v1+(v1^2+1)^(1/2))-1/2*v1*(v1^2+1)^(1/2)'), root)).toBe(false);
    expect(isAntiderivative(tree('2/3*(v1^3+3*v1^2+3*v1+1)^(1/2)'), square(0, [[1], 1]))).toBe(true);
  });

  it('is asked for in integers and one name', () => {
    expect(integrandText(ATANH)).toBe('(-v1^2 + 1)^(-1)');
    expect(integrandText(square(-2, [[0, 1], -1]))).toBe('v1^(-1)*(v1^2 + 1)^(-1/2)');
    expect(integrandText(square(0))).toBe('1');
  });

  it('comes from algebrite once in a process', async () => {
    const before = integralCalls();
    const limit = { timeLimitMs: 60_000 };
    const [first, second] = await Promise.all([antiderivativeOf(ATANH, limit), antiderivativeOf(ATANH, limit)]);
    expect(first).toBeDefined();
    expect(second).toBe(first);
    expect(integralCalls()).toBe(before + 1);
    expect(await antiderivativeOf(square(0, [[0, 2], 1], [[0, 1], -2]), limit)).toBeUndefined();
  }, 120_000);
});
