/** The section on what holds for every spatial curvature: the constraint-vector form and the way from it to the metric analogue. */
import { generator, isZero, multiply, type Poly, sum } from '../algebra/poly.js';
import type { Derivation, EveryK } from '../derivation.js';
import type { SolvedConditions } from '../mechanics/linear-conditions.js';
import type { EliminationStep } from '../scalartensor/auxiliary.js';
import { ruleById } from '../scalartensor/auxiliary-file.js';
import type { CurrentResult } from '../scalartensor/current-zeros.js';
import type { MetricForm } from '../scalartensor/metric-form.js';
import type { Viewer } from './display.js';
import {
  conditionRows,
  fixedRow,
  type Passage,
  polyRows,
  type Section,
  sumDisplays,
  type Writer,
} from './latex-display.js';
import { type Equation, type Lines, rowDisplays } from './latex-lines.js';
import { inlineTex, sumTex, type TexTerm } from './latex-math.js';
import { enumerated, math, type Prose, prose, withFormulas } from './latex-text.js';
import {
  alongTex,
  EXPANSION_TEX,
  fractionLines,
  SPATIAL_CURVATURE_TEX,
  scalarTex,
  vectorViewer,
} from './vector-view.js';

/** The section, on an isotropic geometry. */
export function everyKSection(writer: Writer): Section | undefined {
  const { everyK } = writer.derivation;
  if (!everyK) return undefined;
  const passages = [
    ...vectorPassages(writer, everyK),
    ...(everyK.metric ? wayPassages(writer, everyK, everyK.metric) : []),
    ...(everyK.current ? [currentPassage(writer, everyK, everyK.current)] : []),
    ...(everyK.integrated ? integratedPassages(writer, everyK) : []),
  ];
  return { id: 'every-k', title: 'Every spatial curvature', passages };
}

const k = ({ latex, derivation }: Writer): string => latex(derivation.geometry.isotropic!.curvature);

function vectorPassages(writer: Writer, { vector }: EveryK): Passage[] {
  const { derivation, passage } = writer;
  const viewer = vectorViewer(derivation, vector.form);
  const constraint: TexTerm = {
    negative: false,
    head: ['\\lambda', '(n_{\\mu} n^{\\mu} + 1)'],
    inner: [],
    tail: [],
  };
  const own = vector.inComponents ?? vector.form.value.numerator;
  const action: Equation = {
    left: '\\frac{\\mathcal{L}_{n}}{\\sqrt{-g}}',
    terms: [...sumTex(viewer.sum(own)), constraint],
    part: (n) => `\\mathcal{L}_{n}^{[${n}]}`,
  };
  const { components } = derivation.geometry;
  const rows: Equation[] = components.map(({ name, latex }) => ({
    left: latex,
    terms: sumTex(viewer.sum(vector.components.get(name)!)),
  }));
  const [scalar] = vector.form.scalars;
  const along = scalar === undefined ? [] : [scalarTex(derivation, scalar)];
  const definitions = [
    fixedRow(EXPANSION_TEX, '\\mathring{\\nabla}_{\\mu} n^{\\mu}'),
    ...along.map((q) => fixedRow(alongTex(q).slice(1, -1), `n^{\\mu} \\partial_{\\mu} ${q}`)),
    {
      left: SPATIAL_CURVATURE_TEX,
      terms: [
        '\\mathring{R}',
        '2 \\mathring{R}_{\\mu\\nu} n^{\\mu} n^{\\nu}',
        `-${EXPANSION_TEX}^{2}`,
        '\\mathring{\\nabla}_{\\mu} n_{\\nu} \\mathring{\\nabla}^{\\nu} n^{\\mu}',
      ].map(
        (text): TexTerm => ({ negative: text.startsWith('-'), head: [text.replace(/^-/, '')], inner: [], tail: [] }),
      ),
    },
  ];
  const intro = prose`With a unit timelike vector ${math('n^{\\mu}')} besides the scalars, on a space-time without torsion, the equations of the background follow for every value of ${math(k(writer))} from`;
  return [
    passage('constraint-vector', 'Constraint-vector form', { text: [intro] }, rowDisplays([action])),
    passage(
      'constraint-vector-components',
      'What replaces the components',
      {
        text: [
          vector.inComponents
            ? prose`where the components of torsion and curvature stand for`
            : prose`The components of torsion and curvature became`,
        ],
      },
      rowDisplays(rows),
    ),
    passage(
      'constraint-vector-kinematics',
      'Kinematics of the vector',
      {
        text: [prose`and, with the metric connection,`],
        remarks: [
          prose`On the metric geometry ${math(`${EXPANSION_TEX} = 3 H`)} and ${math(`${SPATIAL_CURVATURE_TEX} = 6 ${k(writer)}/a^{2}`)}; both were computed from the coframe, and the form was compared with the reduced Lagrangian term by term.`,
        ],
      },
      rowDisplays(definitions),
    ),
  ];
}

/** Which rules were applied to the whole form, in words. */
export function formSteps({ steps }: MetricForm): Prose {
  const items = steps.map((s): Prose => [`${s.rule}`]);
  return items.length === 0
    ? prose`No rule had anything to do.`
    : prose`The rules applied were, in this order: ${enumerated(items)}.`;
}

/** Rules with their reasons, each once. */
export const reasonsFor = (ids: readonly string[]): Prose[] =>
  [...new Set(ids)].map((id): Prose => {
    const { statement, why, source } = ruleById(id);
    const said = statement === '' ? [] : prose`${math(statement)}, since `;
    return prose`Rule ${id}: ${said}${why} (${source}).`;
  });

function wayPassages(writer: Writer, everyK: EveryK, metric: MetricForm): Passage[] {
  const { passage, derivation } = writer;
  const viewer = vectorViewer(derivation, everyK.vector.form);
  const { stop, reached } = metric;
  const curvature = k(writer);
  const steps = formSteps(metric);
  const out: Passage[] = [];
  if (!stop) {
    const text = prose`They lead to the metric analogue without a remainder, so it holds for every ${math(curvature)}.`;
    const remarks = reasonsFor(metric.steps.map((s) => s.rule));
    out.push(passage('rules', 'From the vector to the metric analogue', { text: [[...steps, ' ', ...text]], remarks }));
  } else {
    const where = prose`The rule ${stop.rule} stops: ${withFormulas(stop.reason)}. ${reached ? prose`At ${math(`${SPATIAL_CURVATURE_TEX} = 0`)} the others go on and lead to the metric analogue. ` : []}The terms concerned are`;
    out.push(
      passage(
        'rules',
        'From the vector to the metric analogue',
        { text: [steps, ...reasonsFor([...metric.steps.map((s) => s.rule), stop.rule]), where] },
        fractionLines(viewer, '\\Delta', stop.offending),
      ),
    );
  }
  if (everyK.conditions && stop && reached)
    out.push(
      conditionsPassage(writer, 'every-k-conditions', 'When it holds for every curvature', everyK.conditions, {
        never: prose`No choice of the couplings makes the metric analogue hold for every ${math(curvature)}.`,
        when: prose`The metric analogue holds for every ${math(curvature)} when`,
        open: prose`and when these expressions vanish as well:`,
      }),
    );
  if (everyK.screening && everyK.screening.solved.size + everyK.screening.open.length > 0)
    out.push(
      conditionsPassage(writer, 'screening-solved', 'When the curvature drops out', everyK.screening, {
        never: prose`The spatial curvature drops out for no choice of the couplings.`,
        when: prose`Solved for couplings, the curvature ${math(curvature)} drops out of the gravitational part of all equations when`,
        open: prose`and when these expressions vanish as well:`,
      }),
    );
  return out;
}

interface ConditionTexts {
  readonly never: Prose;
  readonly when: Prose;
  readonly open: Prose;
}

function conditionsPassage(
  writer: Writer,
  id: string,
  title: string,
  { impossible, solved, open }: SolvedConditions,
  texts: ConditionTexts,
): Passage {
  const { passage, latex, derivation } = writer;
  if (impossible) return passage(id, title, { text: [texts.never] });
  const viewer = vectorViewer(derivation, derivation.everyK!.vector.form);
  const rows = polyRows(
    viewer,
    [...solved].map(([name, p]): [string, Poly] => [latex(name), p]),
  );
  const more = open.length === 0 ? [] : conditionRows(viewer, open);
  const text = solved.size === 0 ? [prose`${texts.when} these expressions vanish:`] : [texts.when];
  return passage(id, title, { text, remarks: [] }, [...rowDisplays(rows), ...rowDisplays(more)]);
}

function currentPassage(writer: Writer, { vector }: EveryK, { components, zeros, potential }: CurrentResult): Passage {
  const { derivation, passage } = writer;
  const viewer = vectorViewer(derivation, vector.form);
  const present = [...components].filter(([, j]) => !isZero(j.numerator)).map(([q]) => scalarTex(derivation, q));
  const flow = present.map((q) => `J_{${q}} ${alongTex(q).slice(1, -1)}`).join(' + ');
  const branch = prose`Varying ${math('n^{\\mu}')} aligns it with ${math('J^{\\mu}')}, and ${math('n^{\\mu} J_{\\mu} + \\lambda (n^{2} + 1)')} becomes ${math('\\pm \\sqrt{| J_{\\mu} J^{\\mu} |}')} wherever the current is timelike; the sign is that of ${math(flow)} with ${math('n^{\\mu}')} towards the future. Where ${math(`${flow} = 0`)} the current is not timelike and the form is singular.`;
  const surfaces =
    zeros.length === 0
      ? prose`For couplings in general the components of the current have no common zero among the values of the scalars.`
      : prose`For whatever velocities that happens where all components vanish: ${enumerated(zeros.map((z) => zeroText(writer, viewer, z)))}.`;
  const gradient = potential
    ? [
        prose`The current is the gradient ${math('J_{\\mu} = \\partial_{\\mu} F')}, so that the root is that of the single scalar`,
      ]
    : [];
  return passage(
    'current-domain',
    'Branch, domain and zeros of the current',
    { text: [branch, surfaces, ...gradient] },
    potential ? fractionLines(viewer, 'F', potential) : [],
  );
}

function zeroText(
  { derivation }: Writer,
  viewer: Viewer,
  { vanishing, conditions }: CurrentResult['zeros'][number],
): Prose {
  const parts = [
    ...vanishing.map((q) => `${scalarTex(derivation, q)} = 0`),
    ...conditions.map((c) => `${inlineTex(sumTex(viewer.sum(c)))} = 0`),
  ];
  return enumerated(parts.map(math));
}

/** The solutions of a branch, one below the other, in displays. */
export function solutionLines(d: Derivation, steps: readonly EliminationStep[]): Lines[] {
  return steps.flatMap((s): Lines[] => {
    const viewer = vectorViewer(d, { ...s.before, ...(s.root?.root ? { roots: [s.root.root] } : {}) });
    if (s.solved)
      return [...fractionLines(viewer, scalarTex(d, s.solved.field), s.solved.value), ...rootLines(viewer, s)];
    if (!s.constraint) return [];
    const value = viewer.sum(s.constraint.value.numerator);
    return sumDisplays(s.constraint.kind === 'zero' ? '0' : '\\mathcal{Q}', value);
  });
}

/** The equation that binds a root, and what its closed formula is made of. */
function rootLines(viewer: Viewer, { root }: EliminationStep): Lines[] {
  if (!root?.root) return [];
  const { name, coefficients } = root.root;
  const equation = sum(
    root.ring,
    coefficients.map((c, i) => multiply(c.numerator, generator(root.ring, name, i))),
  );
  const bound = rowDisplays(conditionRows(viewer, [equation]));
  if (!root.cubic) return bound;
  const { shift, p, w } = root.cubic;
  const radical = '\\sqrt{\\tfrac{1}{4} w^{2} + \\tfrac{1}{27} p^{3}}';
  const roots = ['+', '-'].map((sign) => `\\sqrt[3]{-\\tfrac{1}{2} w ${sign} ${radical}}`);
  const formula: Equation = {
    left: 'r',
    terms: [...roots, 's'].map((tex, i): TexTerm => ({ negative: i === 2, head: [tex], inner: [], tail: [] })),
  };
  return [
    ...bound,
    ...rowDisplays([formula]),
    ...fractionLines(viewer, 's', shift),
    ...fractionLines(viewer, 'p', p),
    ...fractionLines(viewer, 'w', w),
  ];
}

function integratedPassages(writer: Writer, { integrated, vector }: EveryK): Passage[] {
  const { derivation, passage } = writer;
  const { branch, metric } = integrated!;
  const last = metric.reached!.form;
  const viewer = vectorViewer(derivation, { scalars: vector.form.scalars });
  const rules = branch.steps.map((s) => s.rule);
  return [
    passage(
      'integrated-connection',
      'The connection integrated out',
      {
        text: [
          prose`The fields of the connection can be integrated out before the vector is, by the rules ${enumerated([...new Set(rules)].map((r): Prose => [r]))}. Their equations are solved by`,
        ],
      },
      solutionLines(derivation, branch.steps),
    ),
    passage(
      'integrated-form',
      'Metric form for every curvature',
      {
        text: [
          prose`and what is left holds for every ${math(k(writer))}; its equations were compared with those of the theory:`,
        ],
        remarks: reasonsFor(rules),
      },
      fractionLines(viewer, '\\frac{\\mathcal{L}}{\\sqrt{-g}}', last.value),
    ),
  ];
}
