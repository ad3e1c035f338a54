import { describe, expect, it } from 'vitest';
import { fraction } from '../../src/algebra/fraction.js';
import { inFactors } from '../../src/algebra/known-factors.js';
import { derivationObject, parametersOf } from '../../src/emit/json.js';
import { fractionText, productText } from '../../src/emit/scalar-fields-json.js';
import { poly } from '../scalartensor/forms.js';
import { BARE, DECOUPLED, TEN, withFields } from './scalar-fields-theories.js';

describe('scalar fields in the JSON', () => {
  it('have the documented keys', async () => {
    // biome-ignore lint/suspicious/noExplicitAny: the JSON as other programs see it
    const json = derivationObject(await withFields(DECOUPLED, '1 + psi^2/M^2')) as any;
    expect(Object.keys(json)).toEqual(
      expect.arrayContaining(['frames', 'classification', 'canonical', 'algebraCalls']),
    );
    const [einstein, chosen] = json.frames;
    const keys =
      'frame Omega2 domain coupling kinetic current currentRoot potential matterMetric determinant signature';
    expect(Object.keys(einstein)).toEqual(keys.split(' '));
    expect(einstein).toMatchObject({ frame: 'einstein', coupling: 'M^2/2', currentRoot: einstein.Omega2 });
    expect(chosen).toMatchObject({ frame: 'chosen', Omega2: 'psi^2/M^2 + 1', domain: { sign: 'positive' } });
    expect(json.classification.frame).toBe('einstein');
    expect(json.canonical[0]).toMatchObject({ frame: 'einstein', field: 'psi' });
    expect(JSON.parse(JSON.stringify(json))).toEqual(json);
  });

  it('list assumptions and the symbols of Ω²', async () => {
    const json = derivationObject(await withFields(TEN)) as Record<string, unknown>;
    expect(json.assumptions).toEqual([
      { text: 'a4 > 0', used: expect.any(Boolean) },
      { text: 'b2 < b3', used: expect.any(Boolean) },
    ]);
    expect(parametersOf(await withFields(BARE, '1 + phi^2/M^2'))).toContain('M');
  });
});

describe('texts', () => {
  it('of fractions and products keep their factors', () => {
    expect(fractionText(fraction(poly('c'), [{ base: poly('d + e'), power: 2 }]))).toBe('(c)/(d + e)^2');
    expect(fractionText(fraction(poly('c - d')))).toBe('c - d');
    expect(productText(inFactors(poly('-3/2 M (c + d)/psi'), []))).toBe('-3*M*(c + d)/(2*psi)');
    expect(productText(inFactors(poly('1/c'), []))).toBe('1/c');
    expect(productText(inFactors(poly('0'), []))).toBe('0');
  });
});
