import { describe, expect, it } from 'vitest';
import { typescriptModule } from '../../src/emit/code.js';
import { FRAME_NAMES, frameExpressions, frameFunctions } from '../../src/emit/code-frames.js';
import { BARE, DECOUPLED, withFields } from './scalar-fields-theories.js';

describe('functions of a conformal frame', () => {
  it('are described for every frame that was found', async () => {
    const names = frameFunctions(await withFields(DECOUPLED, '1 + psi^2/M^2')).map((f) => f.name);
    expect(names).toEqual(
      'einsteinOmega2 einsteinKinetic einsteinCurrent einsteinPotential frameOmega2 frameCoupling frameKinetic frameCurrent framePotential'.split(
        ' ',
      ),
    );
    expect(names.every((n) => FRAME_NAMES.includes(n))).toBe(true);
    expect(frameFunctions(await withFields(BARE))).toEqual([]);
    expect(frameExpressions(await withFields(BARE))).toEqual([]);
  });

  it('are emitted, each record with its interface', async () => {
    const text = typescriptModule(await withFields(DECOUPLED));
    expect(text).toContain('export function einsteinOmega2(');
    expect(text).toMatch(/export interface EinsteinKinetic \{[\s\S]*"psi,psi": number;[\s\S]*\}/);
  });
});
