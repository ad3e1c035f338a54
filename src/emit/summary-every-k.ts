/** Lines of the terminal summary on every spatial curvature and on auxiliary fields. */
import type { Fraction } from '../algebra/fraction.js';
import { isZero, type Poly } from '../algebra/poly.js';
import type { Derivation, EveryK, RouteBranch } from '../derivation.js';
import type { SolvedConditions } from '../mechanics/linear-conditions.js';
import { unicodeName } from '../notation/print.js';
import type { EliminationStep } from '../scalartensor/auxiliary.js';
import type { MetricForm } from '../scalartensor/metric-form.js';
import type { VectorForm } from '../scalartensor/vector-form.js';
import type { Viewer } from './display.js';
import { unicodeTerms } from './unicode.js';
import { functionRows, vectorViewer } from './vector-view.js';

type Wrap = (left: string, terms: readonly string[]) => string[];

const termsOf = (viewer: Viewer, p: Poly): string[] => unicodeTerms(viewer.sum(p));

/** A fraction as terms of its numerator, with what they are divided by in front. */
function fractionTerms(viewer: Viewer, { numerator, denominator }: Fraction): string[] {
  const top = termsOf(viewer, numerator);
  if (denominator.length === 0) return top;
  const below = denominator.map(
    ({ base, power }) => `(${termsOf(viewer, base).join(' ')})${power === 1 ? '' : `^${power}`}`,
  );
  const [first, ...rest] = top;
  return rest.length === 0
    ? [`${first}/${below.join(' ')}`]
    : [`(${first}`, ...rest.slice(0, -1), `${rest.at(-1)})/${below.join(' ')}`];
}

/** What holds for every k: the constraint-vector form in components, where the rules stop, conditions, zeros of the current. */
export function everyKLines(d: Derivation, wrap: Wrap): string[] {
  const { everyK } = d;
  if (!everyK) return [];
  const viewer = vectorViewer(d, everyK.vector.form);
  const { vector, metric, conditions, current, integrated } = everyK;
  const mapping = [...vector.components].map(([name, p]) => `${name} → ${termsOf(viewer, p).join(' ')}`);
  return [
    'unit timelike vector n, θ = ∇_μ n^μ, ³R = R + 2 R_μν n^μ n^ν − θ² + ∇_μ n_ν ∇^ν n^μ, constraint λ (n² + 1)',
    ...wrap(
      '',
      mapping.map((m, i) => (i < mapping.length - 1 ? `${m};` : m)),
    ),
    ...(metric ? stopLines(viewer, metric, wrap) : []),
    ...(conditions && metric?.stop ? conditionLines(viewer, conditions, wrap) : []),
    ...(current ? zeroLines(viewer, current, wrap) : []),
    ...(integrated ? integratedLines(viewer, everyK, wrap) : []),
  ];
}

function stopLines(viewer: Viewer, { stop, reached }: MetricForm, wrap: Wrap): string[] {
  if (!stop) return ['the rules lead from it to the metric analogue for every k'];
  const goesOn = reached ? '; at ³R = 0 the rules go on' : '';
  return [
    `the rule ${stop.rule} stops: ${stop.reason}${goesOn}`,
    ...wrap('the terms: ', fractionTerms(viewer, stop.offending)),
  ];
}

function conditionLines(viewer: Viewer, { impossible, solved, open }: SolvedConditions, wrap: Wrap): string[] {
  if (impossible) return ['no couplings make the metric analogue hold for every k'];
  const parts = [
    ...[...solved].map(([name, p]) => `${unicodeName(name)} = ${termsOf(viewer, p).join(' ')}`),
    ...open.map((p) => `${termsOf(viewer, p).join(' ')} = 0`),
  ];
  return wrap(
    'the metric analogue holds for every k when ',
    parts.map((p, i) => (i < parts.length - 1 ? `${p},` : p)),
  );
}

function zeroLines(viewer: Viewer, { zeros, potential }: NonNullable<EveryK['current']>, wrap: Wrap): string[] {
  const surfaces = zeros.map(({ vanishing, conditions }) =>
    [
      ...vanishing.map((q) => `${unicodeName(q)} = 0`),
      ...conditions.map((c) => `${termsOf(viewer, c).join(' ')} = 0`),
    ].join(' and '),
  );
  return [
    ...(surfaces.length === 0
      ? []
      : wrap(
          'the current vanishes where ',
          surfaces.map((s, i) => (i > 0 ? `or ${s}` : s)),
        )),
    ...(potential ? wrap('the current is the gradient of ', fractionTerms(viewer, potential)) : []),
  ];
}

const solutionLine = (d: Derivation, s: EliminationStep, wrap: Wrap): string[] => {
  const viewer = vectorViewer(d, { ...s.before, ...(s.root?.root ? { roots: [s.root.root] } : {}) });
  if (s.solved) return wrap(`${unicodeName(s.solved.field)} = `, fractionTerms(viewer, s.solved.value));
  if (!s.constraint) return [];
  return wrap(s.constraint.kind === 'zero' ? '0 = ' : 'conserved charge ', fractionTerms(viewer, s.constraint.value));
};

function integratedLines(viewer: Viewer, { integrated, vector }: EveryK, wrap: Wrap): string[] {
  const { branch, metric } = integrated!;
  const solutions = branch.steps.flatMap((s) =>
    s.solved ? [`${unicodeName(s.solved.field)} = ${fractionTerms(viewer, s.solved.value).join(' ')}`] : [],
  );
  const form: VectorForm = { ...metric.reached!.form, scalars: vector.form.scalars };
  return [
    `the connection integrated out: ${solutions.join(', ')}; what is left holds for every k`,
    ...wrap('L/√−g = ', fractionTerms(viewer, form.value)),
  ];
}

/** The route by auxiliary fields, when it was asked for. */
export function auxiliaryLines(d: Derivation, wrap: Wrap): string[] {
  const { auxiliary } = d;
  if (!auxiliary) return [];
  const viewer = vectorViewer(d, auxiliary.start);
  const fields = auxiliary.fields.flatMap(({ name, value }) => wrap(`${unicodeName(name)} = `, termsOf(viewer, value)));
  const several = auxiliary.branches.length > 1;
  return [
    ...fields,
    ...auxiliary.branches.flatMap((b, i) => [...(several ? [`branch ${i + 1}`] : []), ...branchLines(d, b, wrap)]),
  ];
}

function branchLines(d: Derivation, { branch, metric, isCompared }: RouteBranch, wrap: Wrap): string[] {
  const viewer = vectorViewer(d, {
    scalars: d.auxiliary!.start.scalars,
    ...(branch.form.roots ? { roots: branch.form.roots } : {}),
  });
  const reached = metric?.reached;
  const everywhere = reached !== undefined && isZero(reached.remainder.numerator);
  const domain = reached ? (everywhere ? ', for every k' : ', for k = 0') : '';
  const refused = branch.refused.map(({ field }) => `${unicodeName(field)} stays: no rule integrates it out`);
  const stop = metric?.stop ? [`the rule ${metric.stop.rule} stops: ${metric.stop.reason}`] : [];
  return [
    ...branch.steps.flatMap((s) => solutionLine(d, s, wrap)),
    ...refused,
    ...stop,
    ...(reached
      ? [
          `√−g [ G4 R + Σ K_AB X^AB + √|J_μ J^μ| − V ]${domain}`,
          ...functionRows(reached.functions, (kind, scalars) =>
            scalars.length === 0 ? kind : `${kind}_${scalars.map(unicodeName).join('')}`,
          ).flatMap(([name, f]) => wrap(`${name} = `, fractionTerms(viewer, f))),
        ]
      : wrap('L/√−g = ', fractionTerms(viewer, branch.form.value))),
    ...(isCompared ? ['its equations are those of the theory after the same fields are eliminated there'] : []),
  ];
}
