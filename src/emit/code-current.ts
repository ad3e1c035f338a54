/**
 * The current of a scalar-tensor form as functions of an emitted module, whatever the language: its value on the branch that
 * reproduces the theory, its square, and what vanishes on its singular surfaces.
 */
import { moveTo } from '../algebra/collect.js';
import { generator, multiply, negate, type Poly, sum } from '../algebra/poly.js';
import { jetName } from '../algebra/ring.js';
import type { Derivation } from '../derivation.js';
import type { FrameFunction } from './code-frames.js';

/** Nothing for a form without a current. */
export function currentFunctions({ everyK, scalarTensor, ring, geometry }: Derivation): FrameFunction[] {
  const current = everyK?.current;
  if (!current || scalarTensor.form === 'none') return [];
  const perLapse = (q: string): Poly => multiply(generator(ring, jetName(q, 1)), generator(ring, geometry.lapse, -1));
  const rate = sum(
    ring,
    [...scalarTensor.current].map(([q, j]) => multiply(j, perLapse(q))),
  );
  const number = (name: string, doc: readonly string[], numerator: Poly): FrameFunction => ({
    name,
    doc,
    result: { kind: 'number' },
    outputs: [{ key: 'value', meaning: doc[0]!, numerator, denominator: [] }],
  });
  const surfaces = current.zeros.flatMap(({ vanishing, conditions }, i) =>
    [...vanishing.map((q) => generator(ring, q)), ...conditions.map((c) => moveTo(c, ring))].map((numerator, j) => ({
      key: `surface${i + 1}part${j + 1}`,
      meaning: `vanishes on singular surface ${i + 1}`,
      numerator,
      denominator: [],
    })),
  );
  return [
    number(
      'currentRate',
      [
        'J_A dA/dt divided by the lapse: what the root √|J_μ J^μ| stands for on the branch that reproduces the torsion theory.',
        'The root itself is its absolute value, so its sign is the sign of the branch; where it is 0 the form is singular.',
      ],
      rate,
    ),
    number(
      'currentSquare',
      ['J_μ J^μ on the background; the current is timelike where this is negative.'],
      negate(multiply(rate, rate)),
    ),
    ...(surfaces.length > 0
      ? [
          {
            name: 'currentZeros',
            doc: [
              'Expressions that vanish where all components of the current do: the form is singular where every part of one',
              'surface is 0, whatever the velocities are.',
            ],
            result: {
              kind: 'record',
              type: 'CurrentZeros',
              about: 'Parts of the singular surfaces of the current.',
            } as const,
            outputs: surfaces,
          },
        ]
      : []),
  ];
}
