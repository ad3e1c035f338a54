/** Sections on the scalars: assumptions, what each scalar is, conformal frames. */
import { isZero, type Poly } from '../algebra/poly.js';
import { POSITIVE } from '../algebra/signs.js';
import type { BiScalarForm } from '../derivation.js';
import type { ScalarFields } from '../scalar-fields.js';
import type { ScalarClass } from '../scalartensor/classification.js';
import { type ConformalFrame, candidatesOf, type FrameOutcome, type SignStatement } from '../scalartensor/frames.js';
import { type Passage, polyRows, type Section, type Writer } from './latex-display.js';
import { type Equation, type Lines, rowDisplays } from './latex-lines.js';
import { inlineTex, sumTex } from './latex-math.js';
import { type NamedPoly, ProductWriter } from './latex-products.js';
import { enumerated, math, type Prose, prose, withFormulas } from './latex-text.js';

const NO_SPECTRUM = prose`These signs are those of this form of the background equations; they say nothing about the particle spectrum of the torsion theory.`;

/** Names that stand in the products of a frame. */
export function namedIn(form: BiScalarForm, frame?: ConformalFrame): NamedPoly[] {
  const own: NamedPoly[] = form.g4.size > 1 ? [{ name: 'G_{4}', value: form.g4 }] : [];
  const omega2 = frame?.omega2;
  if (frame?.kind !== 'chosen' || !omega2 || omega2.numerator.size < 2) return own;
  return [...own, { name: '\\Omega', value: omega2.numerator, step: 2 }];
}

/** Definitions of the names that a product writer made up. */
export function definitionRows({ plain }: Writer, products: ProductWriter): Equation[] {
  return polyRows(plain, products.definitions());
}

const texOfScalar = ({ derivation }: Writer, q: string): string =>
  derivation.geometry.fields.find((f) => f.name === q)?.latex ?? q;

const texOfPair = (writer: Writer, key: string): string =>
  key
    .split(',')
    .map((q) => texOfScalar(writer, q))
    .join(' ');

/** `… > 0` as a formula, for a product of which the sign is open. */
const conditionTex = (products: ProductWriter, { sign }: SignStatement, relation: string): string =>
  `${inlineTex([products.product(sign.open)])} ${relation} 0`;

const usedText = (used: readonly string[]): Prose =>
  used.length === 0 ? [] : [` (from ${used.map((t) => t.replaceAll('*', ' ')).join(', ')})`];

/** The section on the scalars and the assumptions, when either is there. */
export function scalarsSection(writer: Writer): Section | undefined {
  const { derivation, passage, plain } = writer;
  const { scalarFields: fields, theory } = derivation;
  const passages: Passage[] = [];
  if (theory.assumptions) {
    const items = theory.assumptions.map((a): Prose => [a.text.replaceAll('*', ' ')]);
    const used = fields?.used ?? [];
    const listed =
      used.length === 0
        ? prose`None of them was needed.`
        : prose`Signs below were decided by ${enumerated(used.map((t): Prose => [t.replaceAll('*', ' ')]))}.`;
    passages.push(
      passage('assumptions', 'Assumptions', {
        text: [prose`It is assumed that ${enumerated(items)}. ${fields ? listed : []}`],
      }),
    );
  }
  const classes = fields?.classification;
  const form = derivation.scalarTensor;
  if (classes && form.form === 'bi-scalar') {
    const products = new ProductWriter(plain, namedIn(form), candidatesOf(form));
    const items = classes.scalars.map((c) => prose`${math(texOfScalar(writer, c.scalar))} ${kindText(products, c)}`);
    const judged =
      classes.frame === 'einstein'
        ? prose`Judged by the kinetic terms of the Einstein frame where ${math('G_{4} > 0')},`
        : prose`Judged by the kinetic terms of the form itself,`;
    const definitions = definitionRows(writer, products);
    const remark = definitions.length > 0 ? [prose`where the long brackets are named below.`] : [];
    passages.push(
      passage(
        'classes',
        'What the scalars are',
        { text: [[...judged, ' ', ...enumerated(items), '.'], NO_SPECTRUM, ...remark] },
        rowDisplays(definitions),
      ),
    );
    passages.push(potentialPassage(writer, fields!));
  }
  return passages.length === 0 ? undefined : { id: 'scalars', title: 'The scalars', passages };
}

function kindText(products: ProductWriter, { kind, sign, used }: ScalarClass): Prose {
  switch (kind) {
    case 'canonical':
      return prose`has a kinetic term of the usual sign${usedText(used)}`;
    case 'wrong-sign':
      return prose`has a kinetic term of the wrong sign${usedText(used)}`;
    case 'kinetic':
      return prose`has a kinetic term of the usual sign when ${math(conditionTex(products, sign!, '>'))} and of the wrong sign when ${math(conditionTex(products, sign!, '<'))}`;
    case 'mixed':
      return prose`has a kinetic term that mixes it with the other scalar`;
    case 'quadratic-cuscuton':
      return prose`is a quadratic cuscuton: its velocity occurs only under the root of the current, and the potential is at most quadratic in it`;
    case 'cuscuton':
      return prose`is a cuscuton: its velocity occurs only under the root of the current`;
    case 'auxiliary':
      return prose`is auxiliary: its velocity does not occur`;
    case 'absent':
      return prose`does not occur`;
  }
}

const TERM_TITLES = {
  constant: 'constant',
  linear: 'linear term',
  mass: 'mass term',
  cubic: 'cubic term',
  quartic: 'quartic term',
  higher: 'higher term',
} as const;

function potentialPassage(writer: Writer, { classification }: ScalarFields): Passage {
  const { plain, passage } = writer;
  const { potential, bound } = classification!;
  const monomialTex = (powers: ReadonlyMap<string, number>): string =>
    [...powers].map(([q, n]) => (n === 1 ? texOfScalar(writer, q) : `${texOfScalar(writer, q)}^{${n}}`)).join(' ') ||
    '1';
  const items = potential.map((t) => prose`${TERM_TITLES[t.name]} ${math(monomialTex(t.powers))}`);
  const text =
    potential.length === 0
      ? prose`The potential vanishes.`
      : prose`The potential consists of: ${enumerated(items)}. ${boundText(bound.verdict)}${usedText(bound.used)}.`;
  const open = bound.open.filter((p) => !isZero(p));
  const more = open.length > 0 ? [prose`It would be decided by the signs of`] : [];
  const rows = open.map((p, i): [string, Poly] => [`B_{${i + 1}}`, p]);
  return passage(
    'potential-terms',
    'Terms of the potential',
    { text: [text, ...more] },
    rowDisplays(polyRows(plain, rows)),
  );
}

const BOUNDS: Readonly<Record<string, string>> = {
  zero: 'It is zero',
  positive: 'It is positive everywhere',
  'non-negative': 'It is nowhere negative',
  negative: 'It is negative everywhere',
  'non-positive': 'It is nowhere positive',
  'bounded below': 'It is bounded below',
  'bounded above': 'It is bounded above',
  unbounded: 'It is bounded neither below nor above',
  undecided: 'Whether it is bounded is not decided by what is assumed',
};
const boundText = (verdict: string): string => BOUNDS[verdict] ?? verdict;

/** The section of the frames that were asked for. */
export function framesSection(writer: Writer): Section | undefined {
  const { derivation, passage } = writer;
  const outcomes = derivation.scalarFields?.frames ?? [];
  const form = derivation.scalarTensor;
  if (outcomes.length === 0) return undefined;
  const passages = outcomes.flatMap((outcome, i): Passage[] => {
    const id = outcomeId(outcome);
    if (!outcome.found || form.form === 'none')
      return [passage(`${id}-${i}`, 'Conformal frame', { text: [sentence(outcome)] })];
    return framePassages(writer, form, outcome.frame);
  });
  return { id: 'frames', title: 'Conformal frames', passages };
}

const outcomeId = (o: FrameOutcome): string => (o.found ? o.frame.kind : 'no-frame');
const sentence = (o: FrameOutcome): Prose => {
  const text = o.found ? '' : `${o.reason[0]!.toUpperCase()}${o.reason.slice(1)}.`;
  return withFormulas(text);
};

function framePassages(writer: Writer, form: BiScalarForm, frame: ConformalFrame): Passage[] {
  const { passage, plain, derivation } = writer;
  const isEinstein = frame.kind === 'einstein';
  const tag = isEinstein ? 'einstein' : 'conformal';
  const products = new ProductWriter(plain, namedIn(form, frame), candidatesOf(form), '\\mathcal{K}');
  const sign = frame.side === 1 ? '' : '-';
  const definition: Equation = isEinstein
    ? {
        left: '\\Omega^{2}',
        terms: [
          { negative: frame.side === -1, head: [`\\frac{2 G_{4}}{${writer.latex('M')}^{2}}`], inner: [], tail: [] },
        ],
      }
    : { left: '\\Omega^{2}', terms: sumTex(plain.sum(frame.omega2.numerator, { divide: false })) };
  const coupling = isEinstein
    ? `${sign}\\tfrac{1}{2} ${writer.latex('M')}^{2} \\tilde{R}`
    : '\\frac{G_{4}}{\\Omega^{2}} \\tilde{R}';
  const kinetic = [...frame.functions.kinetic].filter(([, f]) => !isZero(f.numerator));
  const current = [...form.current].filter(([, p]) => !isZero(p));
  const action: Equation = {
    left: `\\frac{\\tilde{\\mathcal{L}}}{\\sqrt{-\\tilde{g}}}`,
    terms: [
      { negative: false, head: [coupling], inner: [], tail: [] },
      ...kinetic.map(([key]) => ({
        negative: false,
        head: [`\\tilde{K}_{${texOfPair(writer, key)}}`, `\\tilde{X}^{${texOfPair(writer, key)}}`],
        inner: [],
        tail: [],
      })),
      ...(current.length > 0
        ? [{ negative: false, head: ['\\frac{1}{\\Omega^{3}}', '\\sqrt{| J_{\\mu} J^{\\mu} |}'], inner: [], tail: [] }]
        : []),
      ...(isZero(form.potential) ? [] : [{ negative: true, head: ['\\frac{V}{\\Omega^{4}}'], inner: [], tail: [] }]),
    ],
  };
  const matter =
    derivation.fluids.length > 0 ? prose` Matter is coupled to ${math('\\Omega^{-2} \\tilde{g}_{\\mu\\nu}')}.` : [];
  const domain = domainText(frame);
  const functions: Equation[] = kinetic.map(([key, f]) => ({
    left: `\\tilde{K}_{${texOfPair(writer, key)}}`,
    terms: [products.fraction(f)],
  }));
  if (!isZero(frame.determinant.numerator))
    functions.push({ left: '\\det \\tilde{K}', terms: [products.fraction(frame.determinant)] });
  const rows: Lines[] = rowDisplays([definition, action]);
  const definitions = definitionRows(writer, products);
  const out = [
    passage(
      `${tag}-frame`,
      isEinstein ? 'Einstein frame' : 'Chosen frame',
      {
        text: [
          prose`In the metric ${math('\\tilde{g}_{\\mu\\nu} = \\Omega^{2} g_{\\mu\\nu}')} the form becomes, up to a total derivative,`,
        ],
        remarks: [
          prose`with ${math('J_{\\mu} J^{\\mu}')} formed with the new metric.${matter} ${domain} It was reduced again with ${math('\\tilde{a} = \\Omega a')} and ${math('\\tilde{N} = \\Omega N')} and agrees with the form exactly.`,
        ],
      },
      rows,
    ),
  ];
  if (functions.length > 0)
    out.push(
      passage(
        `${tag}-kinetic`,
        'Its kinetic matrix',
        {
          text: [
            prose`Its kinetic coefficients, and the determinant of the matrix in ${math('-\\tfrac{1}{2} \\tilde{K}_{AB} \\partial A \\cdot \\partial B')} where it does not vanish, are`,
          ],
          remarks: definitions.length > 0 ? [prose`in which`] : [],
        },
        [...rowDisplays(functions)],
      ),
    );
  if (definitions.length > 0)
    out.push(passage(`${tag}-brackets`, 'Brackets', { text: [prose`the brackets are`] }, rowDisplays(definitions)));
  out.push(signaturePassage(writer, form, frame, tag));
  return out;
}

function domainText(frame: ConformalFrame): Prose {
  if (frame.side === -1)
    return prose`Here ${math('G_{4}')} is negative, so that gravity has the wrong sign in this frame.`;
  if (frame.domain.signs === POSITIVE) return prose`The map exists everywhere${usedText(frame.domain.used)}.`;
  const condition = frame.kind === 'einstein' ? 'G_{4} > 0' : '\\Omega^{2} > 0';
  return frame.kind === 'einstein'
    ? prose`The map exists where ${math(condition)}; where ${math('G_{4} < 0')} one has ${math('\\Omega^{2} = -2 G_{4}/M^{2}')} instead, and the terms with ${math('\\tilde{R}')} and ${math('\\tilde{X}')} change their sign.`
    : prose`The map exists where ${math(condition)}.`;
}

function signaturePassage(writer: Writer, form: BiScalarForm, frame: ConformalFrame, tag: string): Passage {
  const { signature } = frame;
  const products = new ProductWriter(writer.plain, namedIn(form, frame), candidatesOf(form), '\\mathcal{S}');
  const [first] = signature.diagonal;
  const texts: Readonly<Record<string, Prose>> = {
    positive: prose`Both kinetic terms have the usual sign${usedText(signature.used)}.`,
    negative: prose`Both kinetic terms have the wrong sign${usedText(signature.used)}.`,
    indefinite: prose`One kinetic term has the usual sign and one the wrong sign${usedText(signature.used)}.`,
    degenerate: prose`The kinetic matrix is degenerate: at least one combination of the scalars has no kinetic term of its own.`,
    undecided: prose`The signs depend on`,
  };
  if (signature.verdict !== 'undecided')
    return writer.passage(`${tag}-signature`, 'Its signature', {
      text: [[...texts[signature.verdict]!, ' ', ...NO_SPECTRUM]],
    });
  const det = signature.determinant;
  const rows: Equation[] = [{ left: '\\Delta', terms: [products.product(det.sign.open)] }];
  if (first) rows.push({ left: '\\Delta_{1}', terms: [products.product(first[1].sign.open)] });
  const definitions = definitionRows(writer, products);
  return writer.passage(
    `${tag}-signature`,
    'Its signature',
    {
      text: [texts.undecided!],
      remarks: [
        prose`which have the signs of the determinant and of the first diagonal coefficient. Both kinetic terms have the usual sign when both are positive, both the wrong sign when only ${math('\\Delta')} is positive, and one each when ${math('\\Delta')} is negative. ${NO_SPECTRUM}`,
      ],
    },
    rowDisplays([...rows, ...definitions]),
  );
}
