/** The section on powers made linear by auxiliary fields and on the fields that were integrated out. */
import { isZero } from '../algebra/poly.js';
import type { AuxiliaryRoute, RouteBranch } from '../derivation.js';
import type { Passage, Section, Writer } from './latex-display.js';
import { formSteps, reasonsFor, solutionLines } from './latex-every-k.js';
import { type Equation, rowDisplays } from './latex-lines.js';
import { sumTex } from './latex-math.js';
import { enumerated, math, type Prose, prose, withFormulas } from './latex-text.js';
import {
  fractionLines,
  functionLines,
  METRIC_ACTION_TEX,
  SPATIAL_CURVATURE_TEX,
  scalarTex,
  vectorViewer,
} from './vector-view.js';

/** The section, when the route was asked for. */
export function auxiliarySection(writer: Writer): Section | undefined {
  const { auxiliary } = writer.derivation;
  if (!auxiliary) return undefined;
  const passages = [
    ...(auxiliary.fields.length > 0 ? [linearisedPassage(writer, auxiliary)] : []),
    ...auxiliary.branches.flatMap((b, i) => branchPassages(writer, auxiliary, b, i)),
  ];
  return { id: 'auxiliary', title: 'Auxiliary fields', passages };
}

function linearisedPassage(writer: Writer, { fields, hessian, start }: AuxiliaryRoute): Passage {
  const { derivation, passage } = writer;
  const viewer = vectorViewer(derivation, start);
  const rows: Equation[] = fields.map(({ latex, value }) => ({ left: latex, terms: sumTex(viewer.sum(value)) }));
  const names = enumerated(fields.map((f) => math(f.latex)));
  const loss =
    hessian && isZero(hessian)
      ? prose`The second derivatives of the powers are singular, so only some combinations of the auxiliary fields matter.`
      : prose`Where the determinant of the second derivatives of the powers vanishes, the auxiliary fields are not determined.`;
  return passage(
    'auxiliary-fields',
    'Powers made linear',
    {
      text: [
        prose`Powers are made linear by ${math("F(X) = F(\\chi) + F'(\\chi) (X - \\chi)")} with the new scalars ${names}, whose equations say that`,
      ],
      remarks: [prose`${loss} With these values put back, the equations are those of the theory for every curvature.`],
    },
    rowDisplays(rows),
  );
}

const refusedText = ({ branch }: RouteBranch, texOf: (q: string) => string): Prose[] =>
  branch.refused.map(
    ({ field, reasons }) =>
      prose`${math(texOf(field))} stays, since no rule integrates it out: ${enumerated(reasons.map((r): Prose => [`${r.rule} (${r.reason})`]))}.`,
  );

function branchPassages(writer: Writer, route: AuxiliaryRoute, found: RouteBranch, i: number): Passage[] {
  const { derivation, passage } = writer;
  const { branch } = found;
  const texOf = (q: string): string => scalarTex(derivation, q);
  const tag = route.branches.length > 1 ? `-${i + 1}` : '';
  const title = route.branches.length > 1 ? `Branch ${i + 1}: fields integrated out` : 'Fields integrated out';
  const rules = branch.steps.map((s) => s.rule);
  const losses = branch.steps.flatMap((s) => s.loses.filter((l) => l.where));
  const viewer = vectorViewer(derivation, {
    scalars: route.start.scalars,
    ...(branch.form.roots ? { roots: branch.form.roots } : {}),
  });
  const lossRows: Equation[] = losses.map((l, n) => ({
    left: `\\ell_{${n + 1}}`,
    terms: sumTex(viewer.sum(l.where!.numerator)),
  }));
  const passages = [
    passage(
      `auxiliary-solutions${tag}`,
      title,
      {
        text: [
          rules.length === 0
            ? prose`Nothing was integrated out.`
            : prose`By the rules ${enumerated([...new Set(rules)].map((r): Prose => [r]))} one finds`,
        ],
        remarks: [...reasonsFor(rules), ...refusedText(found, texOf), ...rootText(found)],
      },
      solutionLines(derivation, branch.steps),
    ),
  ];
  if (lossRows.length > 0)
    passages.push(
      passage(
        `auxiliary-losses${tag}`,
        'What must not vanish',
        { text: [prose`Where one of these expressions vanishes, an equation does not determine its field:`] },
        rowDisplays(lossRows),
      ),
    );
  passages.push(resultPassage(writer, route, found, tag));
  return passages;
}

/** What is to be said about a root of an equation. */
const rootText = ({ branch }: RouteBranch): Prose[] =>
  branch.steps.some((s) => s.root?.root)
    ? [
        prose`Here ${math('r')} is a root of the equation given, verified by substitution: a branch for each of its real values, with cube roots whose product is ${math('-p/3')} where there are any.`,
      ]
    : [];

function resultPassage(
  writer: Writer,
  route: AuxiliaryRoute,
  { branch, metric, isCompared }: RouteBranch,
  tag: string,
): Passage {
  const { derivation, passage } = writer;
  const viewer = vectorViewer(derivation, {
    scalars: route.start.scalars,
    ...(branch.form.roots ? { roots: branch.form.roots } : {}),
  });
  const compared = isCompared
    ? prose` Its equations were compared with those of the theory, for every curvature, after the same fields were eliminated there.`
    : [];
  const reached = metric?.reached;
  if (!reached) {
    const why = metric?.stop
      ? prose`The rule ${metric.stop.rule} stops on the way to a metric form: ${withFormulas(metric.stop.reason)}. What is left is`
      : branch.steps.some((x) => x.constraint)
        ? prose`What is left, with the fields bound by the constraint or the conserved charge above, is`
        : prose`What is left is`;
    return passage(
      `auxiliary-result${tag}`,
      'What is left',
      { text: [[...why]], remarks: compared.length > 0 ? [compared] : [] },
      fractionLines(viewer, '\\frac{\\mathcal{L}_{n}}{\\sqrt{-g}}', branch.form.value),
    );
  }
  const everywhere = isZero(reached.remainder.numerator);
  const domain = everywhere
    ? prose`It holds for every curvature.`
    : prose`It holds at ${math(`${SPATIAL_CURVATURE_TEX} = 0`)}: ${withFormulas(metric.stop!.reason)}.`;
  return passage(
    `auxiliary-result${tag}`,
    'Metric form',
    {
      text: [prose`${formSteps(metric)} They lead to ${math(METRIC_ACTION_TEX)} per ${math('\\sqrt{-g}')} with`],
      remarks: [[...domain, ...compared]],
    },
    functionLines(derivation, viewer, reached.functions),
  );
}
