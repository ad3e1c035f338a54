/**
 * The conformal frames of a derivation as functions of an emitted module, whatever the language: names, documentation and
 * exact outputs, rational in the scalars. Ω = √Ω² is left to the caller where it occurs.
 */
import type { Factor, Fraction } from '../algebra/fraction.js';
import type { Poly } from '../algebra/poly.js';
import type { Derivation } from '../derivation.js';
import type { ConformalFrame } from '../scalartensor/frames.js';

export interface FrameOutput {
  readonly key: string;
  readonly meaning: string;
  readonly numerator: Poly;
  readonly denominator: readonly Factor[];
}

export interface FrameFunction {
  readonly name: string;
  readonly doc: readonly string[];
  readonly result:
    | { readonly kind: 'number' }
    | { readonly kind: 'record'; readonly type: string; readonly about: string };
  readonly outputs: readonly FrameOutput[];
}

/** The functions of every frame that was found. */
export const frameFunctions = (d: Derivation): FrameFunction[] =>
  (d.scalarFields?.frames ?? []).flatMap((outcome) => (outcome.found ? functionsOf(outcome.frame) : []));

function functionsOf({ kind, side, omega2, functions }: ConformalFrame): FrameFunction[] {
  const isEinstein = kind === 'einstein';
  const prefix = isEinstein ? 'einstein' : 'frame';
  const sign = side === 1 ? '' : '−';
  const action = isEinstein
    ? `Part of √−g̃ [ ${sign}½ M² R̃ + Σ K̃_AB X̃^AB + √|J_μ J^μ|/Ω³ − V/Ω⁴ ] with g̃ = Ω² g, Ω² = ${sign}2 G4/M².`
    : 'Part of √−g̃ [ F R̃ + Σ K̃_AB X̃^AB + √|J_μ J^μ|/Ω³ − V/Ω⁴ ] with g̃ = Ω² g and the Ω² that was chosen.';
  const doc = [action, 'Equivalent on the homogeneous, isotropic background, where Ω² > 0; matter couples to Ω⁻² g̃.'];
  const one = (name: string, text: string, { numerator, denominator }: Fraction): FrameFunction => ({
    name: `${prefix}${name}`,
    doc: [`${text}.`, ...doc],
    result: { kind: 'number' },
    outputs: [{ key: 'value', meaning: text, numerator, denominator }],
  });
  const record = (
    name: string,
    text: string,
    values: ReadonlyMap<string, Fraction>,
    meaning: (key: string) => string,
  ): FrameFunction => ({
    name: `${prefix}${name}`,
    doc: [`${text}.`, ...doc],
    result: { kind: 'record', type: `${prefix[0]!.toUpperCase()}${prefix.slice(1)}${name}`, about: `${text}.` },
    outputs: [...values].map(([key, { numerator, denominator }]) => ({
      key,
      meaning: meaning(key),
      numerator,
      denominator,
    })),
  });
  return [
    one('Omega2', 'Conformal factor Ω²', omega2),
    ...(isEinstein ? [] : [one('Coupling', 'Coefficient F of the curvature scalar', functions.coupling)]),
    record(
      'Kinetic',
      'Kinetic coefficients K̃_AB, by unordered pair of scalars',
      functions.kinetic,
      (key) => `multiplies X̃^(${key})`,
    ),
    record(
      'Current',
      'Components J_A/Ω⁴: times Ω they are those of the current in this frame',
      functions.current,
      (key) => `multiplies Ω ∂_μ ${key}`,
    ),
    one('Potential', 'Potential V/Ω⁴', functions.potential),
  ];
}

/** Names that these functions and their records may have. */
export const FRAME_NAMES: readonly string[] = ['einstein', 'frame'].flatMap((p) =>
  ['Omega2', 'Coupling', 'Kinetic', 'Current', 'Potential'].flatMap((n) => [
    `${p}${n}`,
    `${p[0]!.toUpperCase()}${p.slice(1)}${n}`,
  ]),
);

/** What these functions are made of, for lists of symbols. */
export const frameExpressions = (d: Derivation): Poly[] =>
  frameFunctions(d).flatMap((f) => f.outputs.flatMap((o) => [o.numerator, ...o.denominator.map((x) => x.base)]));
