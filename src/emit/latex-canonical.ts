/** The section on canonical fields: case by case the field, its inverse, the rescaled current and the functions in them. */
import { type Fraction, fraction, multiplyFraction } from '../algebra/fraction.js';
import { fractionInFactors } from '../algebra/known-factors.js';
import { isZero, type Poly } from '../algebra/poly.js';
import { type Rational, rational } from '../algebra/rational.js';
import type { BiScalarForm } from '../derivation.js';
import type { BranchFunctions, CanonicalResult, SolvedCase } from '../scalar-fields.js';
import type { FieldTerm } from '../scalartensor/canonical-terms.js';
import { numberFraction } from '../scalartensor/conformal.js';
import { weightPowers } from '../scalartensor/current-weight.js';
import { candidatesOf } from '../scalartensor/frames.js';
import { elementaryTex } from './elementary-text.js';
import { fixedRow, type Passage, polyRows, type Section, type Writer } from './latex-display.js';
import { definitionRows, namedIn } from './latex-frames.js';
import { type Equation, type Lines, rowDisplays } from './latex-lines.js';
import { inlineTex, type TexTerm } from './latex-math.js';
import { ProductWriter } from './latex-products.js';
import { math, type Prose, prose } from './latex-text.js';

const FRAMES = { einstein: 'Einstein frame', chosen: 'chosen frame', jordan: 'frame of the form itself' } as const;
const FUNCTIONS: Readonly<Record<string, string>> = {
  artanh: '\\operatorname{artanh}',
  arcoth: '\\operatorname{arcoth}',
  arctan: '\\arctan',
  arsinh: '\\operatorname{arsinh}',
  arcsin: '\\arcsin',
  arcosh: '\\operatorname{arcosh}',
  log: '\\ln',
};
const INVERSES: Readonly<Record<string, string>> = { exp: '\\exp' };
const inverseTex = (name: string): string => INVERSES[name] ?? `\\${name}`;

/** What C and S stand for. */
const PAIRS: Readonly<Record<string, readonly [string, string]>> = {
  tanh: ['\\cosh', '\\sinh'],
  coth: ['\\cosh', '\\sinh'],
  sinh: ['\\cosh', '\\sinh'],
  cosh: ['\\cosh', '\\sinh'],
  tan: ['\\cos', '\\sin'],
  sin: ['\\cos', '\\sin'],
};
const DOMAINS: Readonly<Record<string, string>> = {
  'x^2 < 1': 'x^{2} < 1',
  'x^2 > 1': 'x^{2} > 1',
};

const powerTex = (base: string, n: number): string => (n === 1 ? base : `${base}^{${n}}`);
const rationalTex = ({ num, den }: Rational): string => (den === 1n ? `${num}` : `${num}/${den}`);

/** The section, when canonical fields were asked for. */
export function canonicalSection(writer: Writer): Section | undefined {
  const { derivation, passage } = writer;
  const fields = derivation.scalarFields;
  const form = derivation.scalarTensor;
  if (!fields?.wantsCanonical || form.form === 'none') return undefined;
  const title = 'Canonical fields';
  if (fields.canonical.length === 0) {
    const text = prose`No kinetic term decouples: in none of the frames is there a scalar whose kinetic coefficient stands alone in its row and depends on that scalar only.`;
    return { id: 'canonical', title, passages: [passage('canonical', title, { text: [text] })] };
  }
  return { id: 'canonical', title, passages: fields.canonical.flatMap((r, i) => resultPassages(writer, form, r, i)) };
}

interface Context {
  readonly writer: Writer;
  readonly form: BiScalarForm;
  readonly result: CanonicalResult;
  readonly products: ProductWriter;
  readonly field: string;
  readonly z: string;
  readonly id: string;
}

const texOf = ({ derivation }: Writer, q: string): string =>
  derivation.geometry.fields.find((f) => f.name === q)?.latex ?? q;

function resultPassages(writer: Writer, form: BiScalarForm, result: CanonicalResult, index: number): Passage[] {
  const alone = writer.derivation.scalarFields!.canonical.filter((c) => c.frame === result.frame).length === 1;
  const field = texOf(writer, result.scalar);
  const products = new ProductWriter(writer.plain, namedIn(form), candidatesOf(form), `\\mathcal{Z}`);
  const context: Context = {
    writer,
    form,
    result,
    products,
    field,
    z: alone ? 'z' : `z_{${field}}`,
    id: `canonical-${index + 1}`,
  };
  const { passage } = writer;
  const relation: Equation = {
    left: `\\Bigl( \\frac{\\mathrm{d} ${context.z}}{\\mathrm{d} ${field}} \\Bigr)^{2}`,
    terms: [term(absolute(products.fraction(result.slopeSquared)))],
  };
  const out: Passage[] = [
    passage(
      `${context.id}`,
      `The canonical field of ${result.scalar}`,
      {
        text: [
          prose`In the ${FRAMES[result.frame]} the kinetic term of ${math(field)} decouples and depends on ${math(field)} only. Its canonical field ${math(context.z)} obeys`,
        ],
      },
      rowDisplays([relation]),
    ),
  ];
  result.cases.forEach((c, i) => {
    out.push(casePassage(context, c, i));
    for (const f of c.functions) out.push(...functionPassages(context, f, i));
  });
  if (!result.isClosed) out.push(seriesPassage(context));
  const isFirst = writer.derivation.scalarFields!.canonical.find((c) => c.scalar === result.scalar) === result;
  if (result.weight && isFirst) out.push(weightPassage(context));
  const definitions = definitionRows(writer, products);
  if (definitions.length > 0)
    out.push(
      passage(`${context.id}-brackets`, 'Brackets', { text: [prose`The brackets are`] }, rowDisplays(definitions)),
    );
  return out;
}

/** |product|: a number needs no bars, only its sign goes. */
function absolute(of: TexTerm): string {
  const text = inlineTex([{ ...of, negative: false }]);
  return /^(?:\d+|\\tfrac\{\d+\}\{\d+\})$/.test(text) ? text : `\\bigl| ${text} \\bigr|`;
}

const term = (...head: readonly string[]): TexTerm => ({ negative: false, head, inner: [], tail: [] });

/** s² with its sign made positive. */
function scaleRow({ products }: Context, c: SolvedCase): Equation {
  const value = fractionInFactors(c.scale.value, []);
  const sized = c.kineticSign === -1 ? { ...value, number: { ...value.number, num: -value.number.num } } : value;
  const lambda = c.scale.extra === 0 ? [] : [powerTex('\\lambda', c.scale.extra)];
  const written = products.product(sized, lambda);
  return {
    left: 's^{2}',
    terms: [c.kineticSign === undefined ? term(absolute(written)) : written],
  };
}

function casePassage(context: Context, c: SolvedCase, index: number): Passage {
  const { writer, products, field, z, id } = context;
  const rows: Equation[] = [];
  if (c.unit) {
    const left = c.unit.degree === 1 ? '\\lambda' : `\\lambda^{${c.unit.degree}}`;
    rows.push({ left, terms: [products.fraction(c.unit.value)] });
  }
  rows.push(scaleRow(context, c));
  const x = c.unit ? `\\frac{${field}}{\\lambda}` : field;
  for (const b of c.branches) {
    const domain = DOMAINS[b.domain] ? ` \\quad (${DOMAINS[b.domain]})` : '';
    if (b.named === 'linear') rows.push(fixedRow(z, `s ${field}`));
    else if (b.named === 'power')
      rows.push(fixedRow(z, `\\frac{s}{${rationalTex(b.exponent!)}} ${field}^{${rationalTex(b.exponent!)}}`));
    else if (b.named === 'log') rows.push(fixedRow(z, `s \\ln | ${field} |`));
    else
      rows.push(
        fixedRow(
          z,
          `s ${FUNCTIONS[b.named]} ${x},`,
          `\\quad ${field} = \\lambda ${inverseTex(b.inverse)} \\frac{${z}}{s}${domain}`,
        ),
      );
  }
  if (c.branches.length === 0 && c.antiderivative)
    rows.push(fixedRow(z, `s \\, F(x),`, `\\quad F(x) = ${elementaryTex(c.antiderivative.tree, 'x')}`));
  const condition: Prose = c.condition
    ? c.condition.of.sign.open.factors.length === 0
      ? prose`With ${math(`x = ${field}/\\lambda`)},`
      : prose`When ${math(`${inlineTex([products.product(c.condition.of.sign.open)])} ${c.condition.sign === 1 ? '>' : '<'} 0`)}, with ${math(`x = ${field}/\\lambda`)},`
    : prose`Explicitly,`;
  const remarks: Prose[] = [];
  if (c.kineticSign === -1) remarks.push(prose`The kinetic term of ${math(z)} has the wrong sign in this case.`);
  if (c.kineticSign === undefined)
    remarks.push(
      prose`The kinetic term of ${math(z)} has the sign of ${math(inlineTex([products.product(c.kinetic.sign.open)]))}.`,
    );
  if (c.branches.some((b) => b.relativeSign === -1))
    remarks.push(prose`Where ${math('x^{2} > 1')} that sign is the opposite one.`);
  return writer.passage(
    `${id}-case-${index + 1}`,
    `Case ${index + 1}`,
    { text: [condition], remarks },
    rowDisplays(rows),
  );
}

/** A function of the frame as a sum of powers of hyperbolic or circular functions of z/s. */
function sumInFields(
  { writer, products, z }: Context,
  terms: readonly FieldTerm[],
  pair: readonly [string, string],
): TexTerm[] {
  const known = candidates(writer);
  const argument = `\\frac{${z}}{s}`;
  const call = (name: string, n: number): string[] => (n === 0 ? [] : [`${powerTex(name, n)} ${argument}`]);
  const letter = (name: string, n: number): string[] => (n === 0 ? [] : [powerTex(name, n)]);
  return terms.map((t) =>
    products.product(fractionInFactors(t.coefficient, known), [
      ...letter('\\eta', t.eta),
      ...letter('\\lambda', t.lambda),
      ...letter('w', t.root),
      ...letter('\\zeta', t.zeta),
      ...call(pair[0], t.c),
      ...call(pair[1], t.s),
    ]),
  );
}

function functionPassages(context: Context, f: BranchFunctions, index: number): Passage[] {
  const pair = PAIRS[f.branch.inverse];
  const { writer, id, result } = context;
  if (!pair || (!f.omega2 && !f.potential)) return [];
  const rows: Lines[] = [];
  if (f.omega2) rows.push(...rowDisplays([{ left: '\\Omega^{2}', terms: sumInFields(context, f.omega2, pair) }]));
  if (f.potential && f.potential.length > 0) {
    const left = result.frame === 'jordan' ? 'V' : '\\frac{V}{\\Omega^{4}}';
    rows.push(
      ...rowDisplays([{ left, terms: sumInFields(context, f.potential, pair), part: (n) => `\\tilde{V}^{[${n}]}` }]),
    );
  }
  if (rows.length === 0) return [];
  const domain = DOMAINS[f.branch.domain];
  const where = domain ? prose` where ${math(domain)}` : [];
  const remark = prose`Where the expression of ${math('\\Omega^{2}')} is negative, ${math('\\Omega^{2}')} is minus it and the terms with ${math('\\tilde{R}')} and ${math('\\tilde{X}')} change their sign.`;
  return [
    writer.passage(
      `${id}-case-${index + 1}-${f.branch.inverse}`,
      `Functions of the canonical field, ${f.branch.inverse}`,
      { text: [prose`In the new fields of case ${String(index + 1)}${where},`], remarks: f.omega2 ? [remark] : [] },
      rows,
    ),
  ];
}

/** Σ coefficient A^n. */
function seriesPassage({ writer, products, result, field, z, id }: Context): Passage {
  const { series, shape } = result;
  const half = (n: number): string => (n % 2 === 0 ? `${n / 2}` : `${n}/2`);
  const terms = series.slope.flatMap((coefficient, n): TexTerm[] => {
    if (isZero(coefficient.numerator)) return [];
    const twice = series.halves + 2 * n + 2;
    if (twice === 0)
      return [products.product(fractionInFactors(coefficient, candidates(writer)), [`\\ln | ${field} |`])];
    const own = multiplyFraction(coefficient, number(coefficient, rational(2, twice)));
    const exponent = half(twice);
    return [
      products.product(fractionInFactors(own, candidates(writer)), [
        exponent === '1' ? field : `${field}^{${exponent}}`,
      ]),
    ];
  });
  const rows: Equation[] = [
    { left: 's^{2}', terms: [term(absolute(products.fraction(shape.constant)))] },
    { left: `\\frac{${z}}{s}`, terms: [...terms, term('\\dots')], part: (n) => `S^{[${n}]}` },
  ];
  const text = prose`No closed form was found in every case. About ${math(`${field} = 0`)} the field is, to order ${String(result.order)} beyond the leading one,`;
  return writer.passage(`${id}-series`, 'Series', { text: [text] }, rowDisplays(rows));
}

const candidates = ({ derivation: { scalarTensor } }: Writer): Poly[] =>
  scalarTensor.form === 'none' ? [] : candidatesOf(scalarTensor);

const number = (like: Fraction, value: Rational): Fraction => numberFraction(like.numerator.ring, value);

function weightPassage({ writer, products, result, field, id }: Context): Passage {
  const w = result.weight!;
  const powers = weightPowers(w);
  const other = texOf(writer, w.field);
  const g = 'g';
  const raised = (base: string, n: Rational): string[] =>
    n.num === 0n ? [] : [n.num === n.den ? base : `${base}^{${rationalTex(n)}}`];
  const ratio = [...raised(`| ${field} |`, w.ofField), ...raised(`| ${g} |`, w.ofBracket)];
  const factor = absolute(products.product(fractionInFactors(fraction(powers.factor), candidates(writer))));
  const rows: Equation[] = [
    ...(w.g.size > 1 ? polyRows(writer.plain, [['g', w.g]]) : []),
    fixedRow(other, ['\\zeta', ...ratio].join(' ')),
    {
      left: '\\sqrt{| J_{\\mu} J^{\\mu} |}',
      terms: [
        term(
          ...(factor === '1' ? [] : [factor]),
          ...raised(`| ${field} |`, powers.ofField),
          ...raised(`| ${g} |`, powers.ofBracket),
          '\\sqrt{| \\partial_{\\mu} \\zeta \\, \\partial^{\\mu} \\zeta |}',
        ),
      ],
    },
  ];
  const sign = result.eta.sign;
  const divided =
    result.frame === 'jordan'
      ? []
      : prose`; in this frame it is divided by ${math('\\Omega^{3}')} and formed with ${math('\\tilde{g}')}`;
  const eta =
    w.g.size === 1
      ? []
      : sign === undefined
        ? prose` The sign of ${math(g)} is ${math('\\eta = \\pm 1')}.`
        : prose` Here ${math(g)} is ${sign === 1 ? 'positive' : 'negative'}.`;
  return writer.passage(
    `${id}-current`,
    'The rescaled current',
    {
      text: [
        prose`The field of the current is rescaled so that the current has one direction only and a weight that depends on ${math(field)} alone:`,
      ],
      remarks: [
        prose`a cuscuton in ${math('\\zeta')} whose weight depends on the canonical field only${divided}.${eta}`,
      ],
    },
    rowDisplays(rows),
  );
}
