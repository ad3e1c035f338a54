/** The last sections: the metric analogue with its domain, what the background sees of the couplings, the checks. */
import { symbolsOf } from '../algebra/collect.js';
import { isZero, type Poly } from '../algebra/poly.js';
import type { BiScalarForm } from '../derivation.js';
import {
  conditionRows,
  equationOf,
  fixedRow,
  type Passage,
  polyRows,
  type Section,
  type Writer,
} from './latex-display.js';
import { type Equation, type Lines, rowDisplays, SINGLE_LINE } from './latex-lines.js';
import { rateTex } from './latex-math.js';
import { enumerated, math, type Prose, prose, withFormulas } from './latex-text.js';
import { widthOf } from './latex-width.js';

const ON_THE_BACKGROUND: Prose = prose`The equivalence holds on the homogeneous and isotropic background. Signs in the kinetic matrix say nothing about the particle spectrum of the torsion theory.`;

/** Scalar-tensor form, or why there is none. */
export function analogueSection(writer: Writer): Section {
  const { derivation, passage, plain } = writer;
  const form = derivation.scalarTensor;
  const title = 'Metric analogue';
  if (form.form === 'bi-scalar') return { id: 'scalar-tensor', title, passages: biScalarPassages(writer, form) };
  const reason = prose`There is no bi-scalar form: ${withFormulas(form.reason)}.`;
  const terms = form.offending && !isZero(form.offending) ? form.offending : undefined;
  const more = terms ? [prose`The terms concerned, per volume, are`] : [];
  const lines = terms ? equationOf(plain, '\\Delta L', terms, { divide: false }) : [];
  return {
    id: 'scalar-tensor',
    title,
    passages: [passage('scalar-tensor', title, { text: [reason, ...more] }, lines)],
  };
}

/** The sum on the right of the action, over several lines when it is long. */
function actionLines(pieces: readonly string[]): Lines {
  const start = '\\frac{\\mathcal{L}_{\\mathrm{ST}}}{\\sqrt{-g}}';
  const flat = `${start} = ${pieces.join(' ')}`;
  if (widthOf(flat) <= SINGLE_LINE) return [flat];
  const lines: string[] = [];
  let current = `${start} &=`;
  for (const piece of pieces) {
    if (widthOf(`${current} ${piece}`) > SINGLE_LINE) {
      lines.push(current);
      current = `&\\quad {}${piece}`;
    } else current = `${current} ${piece}`;
  }
  return [...lines, current];
}

function biScalarPassages(writer: Writer, form: BiScalarForm): Passage[] {
  const { derivation, passage, latex, plain } = writer;
  const { geometry } = derivation;
  // The scalars are fields on space-time, so they keep their names whatever variables the equations are printed in.
  const scalars = geometry.isotropic!.scalars.map((q) => geometry.fields.find((f) => f.name === q)!);
  const texOf = new Map(scalars.map((s) => [s.name, s.latex]));
  const indices = (key: string): string =>
    key
      .split(',')
      .map((q) => texOf.get(q) ?? q)
      .join(' ');
  const kinetic = [...form.kinetic].filter(([, value]) => !isZero(value));
  const current = [...form.current].filter(([, value]) => !isZero(value));
  const pieces = [
    ...(isZero(form.g4) ? [] : ['G_{4} \\mathring{R}']),
    ...kinetic.map(([key]) => `+ K_{${indices(key)}} X^{${indices(key)}}`),
    ...(current.length > 0 ? ['+ \\sqrt{| J_{\\mu} J^{\\mu} |}'] : []),
    ...(isZero(form.potential) ? [] : ['- V']),
    ...(derivation.fluids.length > 0 ? ['+ \\mathcal{L}_{\\mathrm{m}}'] : []),
  ];
  if (pieces.length === 0) pieces.push('0');
  pieces[0] = pieces[0]!.replace(/^\+ /, '').replace(/^- /, '-');
  const names = enumerated(scalars.map((s) => math(s.latex)));
  const definitions: Equation[] = [];
  if (kinetic.length > 0)
    definitions.push(fixedRow('X^{AB}', '-\\tfrac{1}{2} \\partial_{\\mu} A \\, \\partial^{\\mu} B'));
  if (current.length > 0)
    definitions.push(
      fixedRow('J_{\\mu}', current.map(([q]) => `J_{${texOf.get(q)}} \\partial_{\\mu} ${texOf.get(q)}`).join(' + ')),
    );
  const rate = current.map(([q]) => `J_{${texOf.get(q)}} ${rateTex(texOf.get(q)!)}`).join(' + ');
  const branch = prose`On the background ${math('J_{\\mu}')} is timelike and the root is ${math(`| ${rate} |`)}; the theory corresponds to the branch on which it enters as ${math(rate)}, whatever its sign. Zeros of ${math('J_{\\mu}')}, where there are any, are singular surfaces.`;
  const domain =
    form.validFor === 'every k'
      ? prose`The form holds for every value of ${math(latex(geometry.isotropic!.curvature))}.`
      : prose`The form holds at ${math(`${latex(geometry.isotropic!.curvature)} = 0`)}; what it lacks otherwise is stated below.`;
  const functions = (rows: readonly (readonly [string, Poly])[]): Lines[] => rowDisplays(polyRows(plain, rows));
  const passages = [
    passage(
      'scalar-tensor',
      'Covariant form',
      {
        text: [
          prose`With the scalars ${names} on a space-time without torsion, with a metric of signature ${math('(-,+,+,+)')} and its curvature scalar ${math('\\mathring{R}')}, the same equations of the background follow from`,
        ],
      },
      [actionLines(pieces)],
    ),
  ];
  if (definitions.length > 0)
    passages.push(
      passage(
        'scalar-tensor-terms',
        'Its terms',
        { text: [prose`where`], remarks: current.length > 0 ? [branch] : [] },
        rowDisplays(definitions),
      ),
    );
  passages.push(
    passage(
      'G4',
      'Coupling to curvature',
      { text: [prose`The functions of the scalars are the coupling to curvature`] },
      functions([['G_{4}', form.g4]]),
    ),
  );
  if (form.kinetic.size > 0)
    passages.push(
      passage(
        'kinetic',
        'Kinetic matrix',
        { text: [prose`the kinetic matrix, each pair of scalars once,`] },
        functions([...form.kinetic].map(([key, value]) => [`K_{${indices(key)}}`, value] as const)),
      ),
    );
  passages.push(
    passage(
      'current',
      'Current',
      { text: [prose`the current`] },
      functions([...form.current].map(([q, value]) => [`J_{${texOf.get(q)}}`, value] as const)),
    ),
    passage('potential', 'Potential', { text: [prose`and the potential`] }, functions([['V', form.potential]])),
    passage('validity', 'Validity', { text: [[...domain, ' ', ...ON_THE_BACKGROUND]] }),
    passage(
      'curvature-obstruction',
      'Curvature obstruction',
      {
        text: [
          isZero(form.obstruction)
            ? prose`The torsion theory minus this form vanishes at every spatial curvature, up to total derivatives.`
            : prose`The torsion theory minus this form, per volume and up to total derivatives, is what the analogue gets wrong with spatial curvature:`,
        ],
      },
      isZero(form.obstruction) ? [] : equationOf(plain, '\\Delta', form.obstruction, { divide: false }),
    ),
  );
  return passages;
}

/** Combinations of couplings that the background sees, and when spatial curvature drops out. */
export function couplingsSection({ derivation, passage, plain, latex }: Writer): Section {
  const { combinations, screening, geometry } = derivation;
  const passages: Passage[] = [];
  if (combinations.length > 0) {
    const rows = combinations.map((value, i) => [`\\mathcal{C}_{${i + 1}}`, value] as const);
    const text = prose`Up to total derivatives the background depends on the couplings only through these combinations, each up to a factor and to powers of the scales:`;
    passages.push(
      passage('combinations', 'Combinations of couplings', { text: [text] }, rowDisplays(polyRows(plain, rows))),
    );
  }
  if (screening && geometry.isotropic) {
    const k = math(latex(geometry.isotropic.curvature));
    const never = screening.some((p) => symbolsOf(p).length === 0);
    const text = never
      ? prose`The spatial curvature ${k} does not drop out of the equations, whatever the couplings are.`
      : screening.length === 0
        ? prose`The spatial curvature ${k} drops out of all equations.`
        : prose`The spatial curvature ${k} drops out of the gravitational part of all equations exactly when`;
    const rows = conditionRows(plain, screening);
    passages.push(
      passage(
        'screening',
        'Spatial curvature',
        { text: [text] },
        screening.length === 0 || never ? [] : rowDisplays(rows),
      ),
    );
  }
  return { id: 'couplings', title: 'What the background sees of the couplings', passages };
}

/** `dd = 0` keeps its small letters. */
const sentenceCase = (text: string): string => text.replace(/^[a-z](?=[a-z]{2})/, (c) => c.toUpperCase());

/** The statements that were tested. */
export function checksSection({ derivation, passage }: Writer): Section {
  const text = derivation.checks.map(
    ({ name, detail, holds }): Prose => [`${sentenceCase(name)}: `, ...withFormulas(detail), holds ? '.' : ' (fails).'],
  );
  const intro = prose`Each of these statements was tested by exact algebra:`;
  return { id: 'checks', title: 'Checks', passages: [passage('checks', 'Checks', { text: [intro, ...text] })] };
}
