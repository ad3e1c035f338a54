import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import {
  curvatureRemainder,
  expansionByParts,
  movingNames,
  sameForm,
  tradeExpansion,
  unitVector,
  withoutCurvature,
} from '../../src/scalartensor/form-rules.js';
import { exampleRing, formOf } from './auxiliary-examples.js';

const NAMES = { constants: ['m', 'f'], scalars: ['q', 'r'] };
const ring = exampleRing(NAMES);
const form = (text: string) => formOf(text, NAMES, ring);

describe('rules on a whole form', () => {
  it('have nothing to do where their terms are missing', () => {
    for (const rule of [expansionByParts, tradeExpansion, curvatureRemainder, unitVector])
      expect(rule(form('m q^2')).kind).toBe('nothing');
  });

  it('take exactly what they replace', () => {
    const outcome = expansionByParts(form('f q theta + m q^2'));
    if (outcome.kind !== 'applied') throw new Error(outcome.kind);
    expect([infix(outcome.taken.numerator), infix(outcome.given.numerator)]).toEqual(['div(n)*q*f', '-D(q,n)*f']);
  });

  it('stop where velocities are in a denominator', () => {
    const start = form('m q^2');
    const value = {
      numerator: start.value.numerator,
      denominator: [{ base: form('theta + m').value.numerator, power: 1 }],
    };
    expect(expansionByParts({ ...start, value })).toMatchObject({ kind: 'stopped' });
    expect(withoutCurvature({ ...start, value }).value).toBe(value);
  });

  it('keep the components of the current beside the root', () => {
    const outcome = unitVector(form('m D(q,1) + q D(r,1)'));
    if (outcome.kind !== 'applied') throw new Error(outcome.kind);
    expect([...outcome.after.current!].map(([q, j]) => `${q}: ${infix(j.numerator)}`)).toEqual(['q: m', 'r: q']);
  });
});

describe('movingNames, sameForm', () => {
  it('lists what moves or curves; equality is of values', () => {
    expect(movingNames(['q'])).toEqual(['D(q,n)', 'div(n)', 'R3(n)']);
    expect(sameForm(form('m q + m q'), form('2 m q'))).toBe(true);
    expect(sameForm(form('m q'), form('m r'))).toBe(false);
  });
});
