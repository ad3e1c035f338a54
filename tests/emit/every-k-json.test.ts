import { describe, expect, it } from 'vitest';
import { vectorObjects, vectorSymbols } from '../../src/emit/every-k-json.js';
import { derivationObject } from '../../src/emit/json.js';
import { evaluate } from '../oracle/infix.js';
import { ALL, branched, cubic, einsteinCartan, quadratic, squared } from './every-k-fixtures.js';

/** Every text that is an expression, by its path. */
function expressionsIn(value: unknown, path = ''): [string, string][] {
  if (typeof value === 'string') return [[path, value]];
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value).flatMap(([key, v]) => expressionsIn(v, `${path}.${key}`));
}

const WORDS =
  /\.(rule|reason|reasons|field|name|what|branch|timelike|validFor|scalar|scalars|vanishing|integrated)(\.\d+)?$/;
const plain = (text: string): string =>
  text
    .replace(/ = 0$/, '')
    .replaceAll(/D\(([A-Za-z0-9_]+),n\)/g, 'along_$1')
    .replaceAll(/X\(([A-Za-z0-9_]+),([A-Za-z0-9_]+)\)/g, 'X_$1_$2')
    .replaceAll(/(div|R3|R|root)\((n|g|J|1)\)/g, '$1_$2');

describe('vectorObjects', () => {
  it('has expressions that the grammar reads, once its own names are spelled otherwise', () => {
    for (const [name, d] of Object.entries(ALL)) {
      const found = expressionsIn(vectorObjects(d)).filter(([path]) => !WORDS.test(path));
      expect(found.length, name).toBeGreaterThan(5);
      for (const [path, text] of found)
        expect(
          () =>
            evaluate<number>(plain(text), {
              integer: Number,
              name: () => 1,
              add: (x, y) => x + y,
              sub: (x, y) => x - y,
              mul: (x, y) => x * y,
              div: (x, y) => x / y,
              pow: (x, n) => x ** n,
            }),
          `${name}${path}: ${text}`,
        ).not.toThrow();
    }
  });

  it('is part of derivation.json, whose parameters are the constants that occur', () => {
    const json = derivationObject(squared) as { parameters: string[]; everyK: object; auxiliary: object };
    expect(Object.keys(json.everyK)).toEqual([
      'components',
      'lagrangian',
      'constraint',
      'toMetric',
      'current',
      'conditions',
      'screening',
    ]);
    expect(json.parameters).toEqual(expect.arrayContaining(['M', 'c', 'b3']));
    expect(vectorSymbols(squared)).not.toContain('chi');
  });

  it('states stop, conditions, zeros and the integrated form', () => {
    const { everyK } = vectorObjects(einsteinCartan) as never as { everyK: Record<string, never> };
    expect(everyK.toMetric).toMatchObject({ stop: { rule: 'spatial-curvature' }, validFor: 'k = 0', G4: '0' });
    expect(everyK.integrated).toMatchObject({ toMetric: { G4: 'M^2/2', validFor: 'every k' } });
    expect(everyK.current).toMatchObject({ zeros: [], potential: '2*phi*M^2' });
    const other = vectorObjects(quadratic) as never as { everyK: { current: { zeros: object[] } } };
    expect(other.everyK.current.zeros).toMatchObject([{ vanishing: ['phi'] }]);
  });

  it('gives roots by their equations, and the reasons of a refusal', () => {
    const { auxiliary } = vectorObjects(cubic) as never as { auxiliary: { branches: object[] } };
    expect(auxiliary.branches).toMatchObject([
      { roots: [{ name: 'root(1)' }], refused: [{ field: 'phi' }], equationsCompared: false },
    ]);
    const two = vectorObjects(branched) as never as { auxiliary: { branches: { steps: object[] }[] } };
    expect(two.auxiliary.branches[1]!.steps[0]).toHaveProperty('realWhereNotNegative');
  });
});
