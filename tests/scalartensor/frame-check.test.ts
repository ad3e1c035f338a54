import { describe, expect, it } from 'vitest';
import { addFraction, fraction } from '../../src/algebra/fraction.js';
import { type FrameFunctions, jordanFrame, scaledFraction, transformed } from '../../src/scalartensor/conformal.js';
import { verifyFrame } from '../../src/scalartensor/frame-check.js';
import { formOf, poly, roles } from './forms.js';

const form = formOf({
  g4: 'c phi^2 + M^2',
  kinetic: ['e', 'm', 'd psi'],
  current: ['M^2 + c psi^2', 'c phi psi'],
  potential: 'c phi^4 + M^2 psi^2',
});
const omega2 = fraction(poly('1 + phi psi/M^2'));
const frame = transformed(jordanFrame(form), omega2);
const verify = (changed: Partial<FrameFunctions>) => () => verifyFrame(form, { ...frame, ...changed }, omega2, roles);

describe('reducing a form again in the conformal metric', () => {
  it('accepts what is right, at every k', () => {
    expect(verify({})).not.toThrow();
  });

  it('notices every function that is wrong', () => {
    const wrong = (key: string): ReadonlyMap<string, ReturnType<typeof fraction>> =>
      new Map([...frame.kinetic].map(([k, f]) => [k, k === key ? addFraction(f, fraction(poly('1'))) : f]));
    for (const key of frame.kinetic.keys()) expect(verify({ kinetic: wrong(key) }), key).toThrow(/differs/);
    expect(verify({ coupling: scaledFraction(frame.coupling, 2) })).toThrow(/differs/);
    expect(verify({ potential: addFraction(frame.potential, fraction(poly('c'))) })).toThrow(/differs/);
    expect(verify({ current: new Map([...frame.current].map(([k, f]) => [k, scaledFraction(f, 3)])) })).toThrow(
      /differs/,
    );
    expect(verify({ root: fraction(poly('1')) })).toThrow(/root/);
  });
});
