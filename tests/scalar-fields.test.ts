import { describe, expect, it } from 'vitest';
import { derive } from '../src/derive.js';
import { readTheory } from '../src/notation/read-theory.js';
import { type ScalarFieldOptions, withScalarFields } from '../src/scalar-fields.js';
import { errorText } from './notation/rendered.js';

const theory = (lagrangian: string, more = ''): string =>
  `untwist: 1\nname: Test\nconstants: [c, d, e]\nscales: { M: mass }\nlagrangian: ${lagrangian}\n${more}`;
const fields = async (text: string, options: Partial<ScalarFieldOptions> = {}) => {
  const all = { einstein: true, canonical: true, order: 4, ...options };
  return withScalarFields(derive(readTheory(text, 'test.yaml')), all);
};

describe('scalar fields of a derivation', () => {
  it('are added without touching the rest, and their checks are listed', async () => {
    const plain = derive(readTheory(theory('c R_{abcd} R^{abcd} + M^2 T_a T^a'), 'test.yaml'));
    const d = await withScalarFields(plain, { einstein: true, canonical: true, order: 4 });
    expect(d.scalarTensor).toBe(plain.scalarTensor);
    const names = d.checks.map((c) => c.name);
    expect(names.slice(0, plain.checks.length)).toEqual(plain.checks.map((c) => c.name));
    expect(names).toContain('Einstein frame');
    expect(names).toContain('canonical fields');
    expect(Object.isFrozen(d)).toBe(true);
  });

  it('give a reason where there is no form', async () => {
    const { scalarFields } = await fields(theory('c R^3/M^2 + M^2 R'));
    expect(scalarFields!.frames).toEqual([{ found: false, reason: expect.stringContaining('no form') }]);
    expect(scalarFields!.classification).toBeUndefined();
  });

  it('ask a package at most once for an integrand, and nothing for powers', async () => {
    const linear = await fields(theory('c R_{abcd} R^{abcd} + M^2 R'));
    expect(linear.scalarFields!.canonical.every((r) => r.isClosed)).toBe(true);
    expect(linear.scalarFields!.calls).toBe(0);
  });

  it('take relations into Ω² and refuse what cannot be read', async () => {
    const text = theory('c R_{abcd} R^{abcd} + M^2 R', 'impose: ["d = 0"]\n');
    const { scalarFields } = await fields(text, { einstein: false, omega2: '1 + d phi' });
    const [outcome] = scalarFields!.frames;
    expect(outcome!.found && outcome!.frame.omega2.numerator.size).toBe(1);
    for (const [omega2, message] of [
      ['1 + q', /--omega:1:5: error: unknown symbol q/],
      ['d', /the conformal factor is zero/],
      ['1 +', /--omega/],
    ] as const) {
      const error = await fields(text, { omega2 }).catch((e: unknown) => e);
      expect(
        errorText(() => {
          throw error;
        }),
      ).toMatch(message);
    }
  });

  it('list the assumptions that decided anything', async () => {
    const text = theory('c R_{abcd} R^{abcd} + d M^2 T_a T^a', 'assume: ["c > 0", "e > 0"]\n');
    expect((await fields(text)).scalarFields!.used).toEqual(['c > 0']);
  });
});
