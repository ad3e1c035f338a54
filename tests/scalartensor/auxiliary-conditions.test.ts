import { describe, expect, it } from 'vitest';
import { fraction } from '../../src/algebra/fraction.js';
import { LETTER_PREDICATES } from '../../src/scalartensor/auxiliary-conditions.js';
import { exampleRing, formOf } from './auxiliary-examples.js';

const NAMES = { constants: ['m'], scalars: ['q', 'r'] };
const ring = exampleRing(NAMES);
const value = (text: string) => formOf(text, NAMES, ring).value;
const ask = (predicate: string, text: string) => LETTER_PREDICATES.get(predicate)!.ask(value(text), 'q', NAMES.scalars);

describe('predicates about letters', () => {
  it('nonzero: as an expression', () => {
    expect([ask('nonzero', 'm r'), ask('nonzero', 'm - m')]).toEqual(['yes', 'no']);
  });

  it('still: neither a velocity nor the expansion; ³R may be there', () => {
    expect(['m r R3', 'm theta', 'D(r,1)'].map((t) => ask('still', t))).toEqual(['yes', 'no', 'no']);
  });

  it('integrable: no for a logarithm, unknown for a denominator with the field', () => {
    const under = fraction(value('m').numerator, [{ base: value('q + r').numerator, power: 1 }]);
    const integrable = LETTER_PREDICATES.get('integrable')!;
    expect([ask('integrable', 'm q^2'), ask('integrable', 'm/q'), integrable.ask(under, 'q', NAMES.scalars)]).toEqual([
      'yes',
      'no',
      'unknown',
    ]);
  });
});
