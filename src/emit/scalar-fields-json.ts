/**
 * Conformal frames, classes of scalars and canonical fields as plain data for derivation.json, documented in
 * docs/formats.md. Fractions are infix texts with their denominators in factors.
 */
import { symbolsOf } from '../algebra/collect.js';
import type { Fraction } from '../algebra/fraction.js';
import { infix } from '../algebra/infix.js';
import { fractionInFactors, type ProductForm } from '../algebra/known-factors.js';
import type { Poly } from '../algebra/poly.js';
import { printRational, type Rational } from '../algebra/rational.js';
import { NEGATIVE, POSITIVE, VANISHING } from '../algebra/signs.js';
import type { Derivation } from '../derivation.js';
import type { BranchFunctions, CanonicalResult, ScalarFields, SolvedCase } from '../scalar-fields.js';
import type { FieldTerm } from '../scalartensor/canonical-terms.js';
import { weightPowers } from '../scalartensor/current-weight.js';
import { type ConformalFrame, candidatesOf, type FrameOutcome, type SignStatement } from '../scalartensor/frames.js';
import type { KineticShape } from '../scalartensor/kinetic-shape.js';
import { elementaryText } from './elementary-text.js';

const bracketed = (p: Poly): string => (p.size > 1 ? `(${infix(p)})` : infix(p));

/** numerator/Π base^power. */
export function fractionText({ numerator, denominator }: Fraction): string {
  if (denominator.length === 0) return infix(numerator);
  const below = denominator.map(({ base, power }) => `(${infix(base)})${power === 1 ? '' : `^${power}`}`);
  return `(${infix(numerator)})/${below.length === 1 ? below[0] : `(${below.join('*')})`}`;
}

/** number · Π base^power. */
export function productText({ number, factors }: ProductForm): string {
  const side = (sign: 1 | -1): string[] =>
    factors
      .filter(({ power }) => power * sign > 0)
      .map(({ base, power }) => `${bracketed(base)}${power * sign === 1 ? '' : `^${power * sign}`}`);
  const top = side(1);
  const size = { num: number.num < 0n ? -number.num : number.num, den: 1n };
  if (size.num !== 1n || top.length === 0) top.unshift(printRational(size));
  const bottom = [...(number.den === 1n ? [] : [`${number.den}`]), ...side(-1)];
  const text =
    bottom.length === 0
      ? top.join('*')
      : `${top.join('*')}/${bottom.length === 1 ? bottom[0] : `(${bottom.join('*')})`}`;
  return number.num < 0n ? `-${text}` : text;
}

const fractions = (map: ReadonlyMap<string, Fraction>): Record<string, string> =>
  Object.fromEntries([...map].map(([key, f]) => [key, fractionText(f)]));

const SIGN_NAMES: ReadonlyMap<number, string> = new Map([
  [POSITIVE, 'positive'],
  [NEGATIVE, 'negative'],
  [VANISHING, 'zero'],
  [POSITIVE | VANISHING, 'not negative'],
  [NEGATIVE | VANISHING, 'not positive'],
  [POSITIVE | NEGATIVE, 'not zero'],
]);

/** What is known of a sign; otherwise the product that has it. */
const signObject = ({ value, sign }: SignStatement): Record<string, unknown> => ({
  value: productText(value),
  sign: SIGN_NAMES.get(sign.signs) ?? 'undecided',
  ...(SIGN_NAMES.has(sign.signs) ? { used: sign.used } : { signOf: productText(sign.open) }),
});

function frameObject(frame: ConformalFrame): Record<string, unknown> {
  const { functions, signature, domain } = frame;
  return {
    frame: frame.kind,
    Omega2: fractionText(frame.omega2),
    ...(frame.side === -1 ? { side: 'G4 < 0' } : {}),
    domain: { condition: 'Omega2 > 0', sign: SIGN_NAMES.get(domain.signs) ?? 'undecided', used: domain.used },
    coupling: fractionText(functions.coupling),
    kinetic: fractions(functions.kinetic),
    current: fractions(functions.current),
    currentRoot: fractionText(functions.root),
    potential: fractionText(functions.potential),
    matterMetric: '1/Omega2',
    determinant: fractionText(frame.determinant),
    signature: {
      verdict: signature.verdict,
      determinant: signObject(signature.determinant),
      diagonal: Object.fromEntries([...signature.diagonal].map(([q, s]) => [q, signObject(s)])),
      used: signature.used,
    },
  };
}

const frameEntry = (outcome: FrameOutcome): Record<string, unknown> =>
  outcome.found ? frameObject(outcome.frame) : { frame: 'none', reason: outcome.reason };

const termObject = (t: FieldTerm, candidates: readonly Poly[]): Record<string, unknown> => ({
  coefficient: productText(fractionInFactors(t.coefficient, candidates)),
  zeta: t.zeta,
  w: t.root,
  eta: t.eta,
  lambda: t.lambda,
  C: t.c,
  S: t.s,
});

const branchObject = (
  { branch, omega2, potential }: BranchFunctions,
  candidates: readonly Poly[],
): Record<string, unknown> => ({
  function: branch.named,
  ...(branch.inverse === '' ? {} : { inverse: branch.inverse }),
  ...(branch.exponent ? { exponent: printRational(branch.exponent) } : {}),
  domain: branch.domain,
  ...(branch.relativeSign === -1 ? { kineticSign: 'opposite' } : {}),
  ...(omega2 ? { Omega2: omega2.map((t) => termObject(t, candidates)) } : {}),
  ...(potential ? { potential: potential.map((t) => termObject(t, candidates)) } : {}),
});

const signName = (sign: 1 | -1 | undefined): string =>
  sign === undefined ? 'undecided' : sign === 1 ? 'positive' : 'negative';

const caseObject = (c: SolvedCase, candidates: readonly Poly[]): Record<string, unknown> => ({
  ...(c.condition ? { condition: { ...signObject(c.condition.of), taken: signName(c.condition.sign) } } : {}),
  ...(c.unit ? { lambda: { power: c.unit.degree, value: fractionText(c.unit.value) } } : {}),
  scale: { value: fractionText(c.scale.value), lambda: c.scale.extra },
  kineticSign: c.kineticSign === undefined ? signObject(c.kinetic) : signName(c.kineticSign),
  ...(c.antiderivative ? { antiderivative: elementaryText(c.antiderivative.tree, 'x') } : {}),
  branches: c.functions.map((f) => branchObject(f, candidates)),
});

const shapeObject = ({ constant, power, factors }: KineticShape): Record<string, unknown> => ({
  constant: fractionText(constant),
  power,
  brackets: factors.map(({ coefficients, exponent }) => ({ coefficients: coefficients.map(fractionText), exponent })),
});

const rationalPower = (r: Rational): string => printRational(r);

function canonicalObject(r: CanonicalResult, candidates: readonly Poly[]): Record<string, unknown> {
  const weight = r.weight && weightPowers(r.weight);
  return {
    frame: r.frame,
    field: r.scalar,
    slopeSquared: fractionText(r.slopeSquared),
    shape: shapeObject(r.shape),
    cases: r.cases.map((c) => caseObject(c, candidates)),
    ...(r.isClosed ? {} : { series: { halves: r.series.halves, slope: r.series.slope.map(fractionText) } }),
    ...(r.weight && weight
      ? {
          current: {
            field: r.weight.field,
            bracket: infix(r.weight.g),
            w: { field: rationalPower(r.weight.ofField), bracket: rationalPower(r.weight.ofBracket) },
            weight: {
              factor: infix(weight.factor),
              field: rationalPower(weight.ofField),
              bracket: rationalPower(weight.ofBracket),
            },
            eta: signName(r.eta.sign),
          },
        }
      : {}),
  };
}

function classificationObject({ classification }: ScalarFields): Record<string, unknown> | undefined {
  if (!classification) return undefined;
  const { frame, scalars, potential, bound } = classification;
  return {
    frame,
    scalars: Object.fromEntries(
      scalars.map((s) => [
        s.scalar,
        { kind: s.kind, ...(s.sign ? { kinetic: signObject(s.sign) } : {}), used: s.used },
      ]),
    ),
    potential: potential.map((t) => ({
      name: t.name,
      powers: Object.fromEntries(t.powers),
      coefficient: infix(t.coefficient),
    })),
    bound: { verdict: bound.verdict, used: bound.used, undecided: bound.open.map(infix) },
  };
}

/** The keys that these results add. */
export function scalarFieldsObject(d: Derivation): Record<string, unknown> {
  const fields = d.scalarFields;
  const assumptions = d.theory.assumptions;
  const listed = assumptions
    ? {
        assumptions: assumptions.map((a) => ({
          text: a.text,
          ...(fields ? { used: fields.used.includes(a.text) } : {}),
        })),
      }
    : {};
  if (!fields) return listed;
  const classes = classificationObject(fields);
  const candidates = d.scalarTensor.form === 'none' ? [] : candidatesOf(d.scalarTensor);
  return {
    ...listed,
    ...(fields.frames.length > 0 ? { frames: fields.frames.map(frameEntry) } : {}),
    ...(classes ? { classification: classes } : {}),
    ...(fields.wantsCanonical ? { canonical: fields.canonical.map((c) => canonicalObject(c, candidates)) } : {}),
    algebraCalls: fields.calls,
  };
}

/** Symbols of what these results print. */
export function scalarFieldSymbols(d: Derivation): string[] {
  const polys: Poly[] = [];
  for (const outcome of d.scalarFields?.frames ?? [])
    if (outcome.found) {
      const { functions, omega2 } = outcome.frame;
      for (const f of [omega2, functions.coupling, functions.potential, ...functions.kinetic.values()])
        polys.push(f.numerator, ...f.denominator.map((x) => x.base));
    }
  return [...new Set(polys.flatMap(symbolsOf))];
}
