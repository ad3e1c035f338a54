/**
 * What scalar-tensor theory makes of the bi-scalar form of a derivation: conformal frames, classes of the scalars, canonical
 * fields and the rescaled current. Computer algebra packages are asked for antiderivatives only, and only here.
 */
import { moveTo, substitute } from './algebra/collect.js';
import type { Fraction } from './algebra/fraction.js';
import { generator, isZero, type Poly } from './algebra/poly.js';
import { type Knowledge, knowledgeOf, NEGATIVE, POSITIVE, signOf } from './algebra/signs.js';
import { type Antiderivative, antiderivativesOf, integralCalls } from './cas/antiderivative.js';
import type { BiScalarForm, Check, Derivation } from './derivation.js';
import { InputError } from './notation/diagnostics.js';
import { plainPassage } from './notation/passage.js';
import { parseScalar } from './notation/scalar.js';
import { polyOfScalar } from './notation/scalar-poly.js';
import type { Theory } from './notation/theory.js';
import type { BiScalarFunctions, BiScalarRoles } from './scalartensor/biscalar.js';
import {
  type Branch,
  type CanonicalCase,
  type CanonicalField,
  canonicalField,
} from './scalartensor/canonical-fields.js';
import { type FieldTerm, inNewFields } from './scalartensor/canonical-terms.js';
import { type Classification, classify } from './scalartensor/classification.js';
import { jordanFrame } from './scalartensor/conformal.js';
import { type CurrentWeight, currentWeight } from './scalartensor/current-weight.js';
import {
  type ConformalFrame,
  candidatesOf,
  chosenFrame,
  einsteinFrame,
  type FrameOutcome,
} from './scalartensor/frames.js';
import { PLANCK_MASS } from './setting.js';

export interface ScalarFieldOptions {
  readonly einstein: boolean;
  /** Ω² of a frame of the user, as typed. */
  readonly omega2?: string | undefined;
  readonly canonical: boolean;
  /** Order in the field of the series that are given where no closed form is found. */
  readonly order: number;
}

/** The functions of a frame in the variables of one branch of a canonical field. */
export interface BranchFunctions {
  readonly branch: Branch;
  /**
   * Ω² there as the rational function of the field that it is; where that is negative Ω² is minus it, and the terms with
   * curvature and kinetic terms change sign. Undefined when the frame is that of the form itself.
   */
  readonly omega2: readonly FieldTerm[] | undefined;
  /** The potential of the frame; undefined when it does not simplify. */
  readonly potential: readonly FieldTerm[] | undefined;
}

export interface SolvedCase extends CanonicalCase {
  /** An antiderivative of √square in x, differentiated back; undefined when none was found. */
  readonly antiderivative: Antiderivative | undefined;
  readonly functions: readonly BranchFunctions[];
}

export interface CanonicalResult extends Omit<CanonicalField, 'cases'> {
  readonly frame: 'einstein' | 'chosen' | 'jordan';
  readonly cases: readonly SolvedCase[];
  /** Whether every case has a closed form. */
  readonly isClosed: boolean;
  /** The current with its own field rescaled, when this field alone decides its weight. */
  readonly weight: CurrentWeight | undefined;
  /** Sign of the bracket in the weight, when it is known on the whole domain, and what that rests on. */
  readonly eta: { readonly sign: 1 | -1 | undefined; readonly used: readonly string[] };
  /** Of the series. */
  readonly order: number;
}

export interface ScalarFields {
  readonly frames: readonly FrameOutcome[];
  /** Undefined when there is no bi-scalar form. */
  readonly classification: Classification | undefined;
  readonly canonical: readonly CanonicalResult[];
  readonly wantsCanonical: boolean;
  /** Questions to a computer algebra package. */
  readonly calls: number;
  /** Assumptions that decided anything here. */
  readonly used: readonly string[];
}

const TIME_LIMIT_MS = 3000;
/** Questions in one derivation. */
const MAX_CALLS = 8;
/** Ω² as typed on the command line. @throws InputError. */
function omega2Of(text: string, { theory, ring, relations, geometry }: Derivation): Poly {
  const scalars = geometry.isotropic?.scalars ?? [];
  const names = [...theory.symbols.map((s) => s.name), ...scalars];
  const passage = plainPassage(text, '--omega');
  const value = polyOfScalar(ring, parseScalar(passage, { isSymbol: (n) => names.includes(n), names }));
  const couplings = new Map([...relations.eliminated]);
  const p = substitute(value, couplings);
  if (isZero(p)) throw refusal('omega', 'the conformal factor is zero', 'Ω² must be positive somewhere');
  return p;
}

const refusal = (code: string, message: string, hint: string): InputError =>
  new InputError([{ code, severity: 'error', message, hint, file: '--omega' }]);

/** M² as the imposed relations leave it. */
const planckMassSquared = ({ ring, relations }: Derivation): Poly =>
  substitute(generator(ring, PLANCK_MASS, 2), relations.eliminated);

const isNamed = (text: string, theory: Theory): boolean => (theory.assumptions ?? []).some((a) => a.text === text);

/** The derivation with frames, classes and canonical fields. @throws InputError for an Ω² that cannot be read. */
export async function withScalarFields(
  d: Derivation,
  options: ScalarFieldOptions,
  onStep: (what: string) => void = () => {},
): Promise<Derivation> {
  const form = d.scalarTensor;
  const isotropic = d.geometry.isotropic;
  const omega2 = options.omega2 === undefined ? undefined : omega2Of(options.omega2, d);
  if (form.form === 'none' || !isotropic) {
    const frames: FrameOutcome[] = [{ found: false, reason: 'there is no form to put into another frame' }];
    const none = { frames, classification: undefined, canonical: [], calls: 0, used: [] };
    return Object.freeze({ ...d, scalarFields: { ...none, wantsCanonical: options.canonical } });
  }
  const { ring } = d;
  const roles: BiScalarRoles = {
    lapse: d.geometry.lapse,
    ...isotropic,
    metricCurvature: moveTo(d.geometry.metricCurvature, ring),
    volume: moveTo(d.geometry.volume, ring),
  };
  const knowledge = d.knowledge ?? scalesPositive(d);
  const functions: BiScalarFunctions = form;
  onStep('changing the conformal frame');
  const einstein = einsteinFrame(functions, roles, planckMassSquared(d), knowledge);
  const frames = [
    ...(options.einstein ? [einstein] : []),
    ...(omega2 ? [chosenFrame(functions, roles, omega2, knowledge)] : []),
  ];
  const classification = classify(functions, einstein.found ? einstein.frame : undefined, roles.scalars, knowledge);
  onStep('looking for canonical fields');
  const before = integralCalls();
  const canonical = options.canonical
    ? await canonicalFields(form, roles, [...frames, einstein], knowledge, options.order)
    : [];
  const checks: Check[] = [...d.checks];
  for (const outcome of new Set(options.canonical ? [...frames, einstein] : frames))
    if (outcome.found)
      checks.push({
        name: outcome.frame.kind === 'einstein' ? 'Einstein frame' : 'conformal frame',
        detail:
          'reduced again with the conformal lapse and scale factor it is the form itself at every k, up to a total derivative',
        holds: true,
      });
  if (canonical.length > 0)
    checks.push({
      name: 'canonical fields',
      detail:
        'the square of the derivative of each is its kinetic coefficient, and rewritten functions go back to themselves',
      holds: true,
    });
  const used = [
    ...frames.flatMap((f) => (f.found ? usedIn(f.frame) : [])),
    ...classification.scalars.flatMap((c) => [...c.used, ...(c.sign?.sign.used ?? [])]),
    ...classification.bound.used,
    ...canonical.flatMap((c) => [
      ...c.eta.used,
      ...c.cases.flatMap((x) => [...x.kinetic.sign.used, ...(x.condition?.of.sign.used ?? [])]),
    ]),
  ];
  return Object.freeze({
    ...d,
    checks,
    scalarFields: {
      frames,
      classification,
      canonical,
      wantsCanonical: options.canonical,
      calls: integralCalls() - before,
      used: [...new Set(used)].filter((text) => isNamed(text, d.theory)),
    },
  });
}

/** Assumptions that decided a sign of a frame, or a factor of one. */
const usedIn = ({ signature, domain }: ConformalFrame): readonly string[] => [
  ...signature.determinant.sign.used,
  ...[...signature.diagonal.values()].flatMap((s) => s.sign.used),
  ...domain.used,
];

/** Without assumptions only the scales are known to be positive. */
function scalesPositive({ ring, theory, relations }: Derivation): Knowledge {
  const scales = theory.symbols.filter((s) => s.role === 'scale' && !relations.eliminated.has(s.name));
  return knowledgeOf(ring, [], new Map(scales.map(({ name }) => [name, `${name} > 0`])));
}

/** Every scalar in every frame in which its kinetic term decouples, each frame once. */
async function canonicalFields(
  form: BiScalarForm,
  roles: BiScalarRoles,
  outcomes: readonly FrameOutcome[],
  knowledge: Knowledge,
  order: number,
): Promise<CanonicalResult[]> {
  const found = [...new Set(outcomes)].flatMap((o) => (o.found ? [o.frame] : []));
  const jordan = { kind: 'jordan' as const, functions: jordanFrame(form), knowledge, omega2: undefined };
  const candidates = candidatesOf(form);
  const fields = [...found, jordan].flatMap((frame) =>
    roles.scalars.flatMap((scalar) => {
      const field = canonicalField(scalar, frame.functions.kinetic, candidates, frame.knowledge, order);
      return field ? [{ frame, field }] : [];
    }),
  );
  // A power needs no package. The others are asked for together, and meanwhile the functions are rewritten.
  const wanted = fields.flatMap(({ field }) => field.cases.filter((c) => c.unit !== undefined)).slice(0, MAX_CALLS);
  const asked = antiderivativesOf(
    wanted.map((c) => c.square),
    { timeLimitMs: TIME_LIMIT_MS },
  );
  const results = fields.map(({ frame, field }) =>
    solved(form, roles, frame, field, order, candidates, frame.knowledge),
  );
  const answers = await asked;
  return results.map((make) => make((c) => answers[wanted.indexOf(c)]));
}

type AnyFrame = Pick<ConformalFrame, 'functions'> & {
  readonly kind: CanonicalResult['frame'];
  readonly omega2: Fraction | undefined;
};

function solved(
  form: BiScalarForm,
  roles: BiScalarRoles,
  frame: AnyFrame,
  field: CanonicalField,
  order: number,
  candidates: readonly Poly[],
  knowledge: Knowledge,
): (answer: (c: CanonicalCase) => Antiderivative | undefined) => CanonicalResult {
  const other = roles.scalars.find((q) => q !== field.scalar) ?? field.scalar;
  const weight = other === field.scalar ? undefined : currentWeight(form.current, other, field.scalar);
  const verdict = weight ? signOf(weight.g, knowledge) : { signs: POSITIVE, used: [] };
  const sign = verdict.signs === POSITIVE ? 1 : verdict.signs === NEGATIVE ? -1 : undefined;
  const rewritten = (f: Fraction, c: CanonicalCase, b: Branch) =>
    inNewFields(f, field.scalar, other, c, b, weight, sign, candidates);
  const functions = field.cases.map((c) =>
    c.branches.map((b) => ({
      branch: b,
      omega2: frame.omega2 && rewritten(frame.omega2, c, b),
      potential: rewritten(frame.functions.potential, c, b),
    })),
  );
  return (answer) => {
    const cases = field.cases.map(
      (c, i): SolvedCase => ({ ...c, antiderivative: answer(c), functions: functions[i]! }),
    );
    return {
      ...field,
      frame: frame.kind,
      cases,
      isClosed: cases.length > 0 && cases.every((c) => c.branches.length > 0 || c.antiderivative !== undefined),
      weight,
      eta: { sign, used: sign === undefined ? [] : verdict.used },
      order,
    };
  };
}
