/** Lines of the terminal summary on the scalars: classes, conformal frames, canonical fields, assumptions. */
import { splitUnit } from '../algebra/division.js';
import type { Fraction } from '../algebra/fraction.js';
import { fractionInFactors, type ProductForm } from '../algebra/known-factors.js';
import { equals, isZero, type Poly, termsOf } from '../algebra/poly.js';
import { divideRational, multiplyRational, powerRational, type Rational } from '../algebra/rational.js';
import { POSITIVE } from '../algebra/signs.js';
import type { BiScalarForm, Derivation } from '../derivation.js';
import { superscript, unicodeName } from '../notation/print.js';
import type { CanonicalResult, SolvedCase } from '../scalar-fields.js';
import type { FieldTerm } from '../scalartensor/canonical-terms.js';
import type { ScalarClass } from '../scalartensor/classification.js';
import { weightPowers } from '../scalartensor/current-weight.js';
import { type ConformalFrame, candidatesOf } from '../scalartensor/frames.js';
import { viewerOf } from './display.js';
import { elementaryText } from './elementary-text.js';
import { unicodeTerms } from './unicode.js';

/** A heading and its lines; each line is its left side and the terms after it. */
export interface SummarySection {
  readonly title: string;
  readonly lines: readonly (readonly [left: string, terms: readonly string[]])[];
}

const line = (text: string): readonly [string, readonly string[]] => [text, []];

class Texts {
  private readonly viewer;
  private readonly candidates: readonly Poly[];
  private readonly g4: Poly;

  constructor(d: Derivation, form: BiScalarForm) {
    this.viewer = viewerOf(d);
    this.candidates = candidatesOf(form);
    this.g4 = form.g4;
  }

  poly(p: Poly): string {
    return unicodeTerms(this.viewer.sum(p, { divide: false })).join(' ');
  }

  terms(p: Poly): string[] {
    return unicodeTerms(this.viewer.sum(p, { divide: false }));
  }

  fraction(f: Fraction): string {
    return this.product(fractionInFactors(f, this.candidates));
  }

  term(f: Fraction, more: readonly string[]): string {
    return this.product(fractionInFactors(f, this.candidates), more);
  }

  /** number · factors · more, powers of G4 by its name. */
  product({ number, factors }: ProductForm, more: readonly string[] = []): string {
    let coefficient = number;
    const top: string[] = [];
    const bottom: string[] = [];
    for (const { base, power } of factors) {
      const { text, unit } = this.base(base);
      const n = Math.abs(power);
      const scale = powerRational(unit, n);
      coefficient = power > 0 ? multiplyRational(coefficient, scale) : divideRational(coefficient, scale);
      (power > 0 ? top : bottom).push(n === 1 ? text : `${text}${superscript(n)}`);
    }
    const negative = coefficient.num < 0n;
    const num = negative ? -coefficient.num : coefficient.num;
    const above = [...(num === 1n && top.length + more.length > 0 ? [] : [`${num}`]), ...top];
    const below = [...(coefficient.den === 1n ? [] : [`${coefficient.den}`]), ...bottom];
    const quotient =
      below.length === 0
        ? above.join(' ')
        : `${above.length === 0 ? '1' : above.join(' ')}/${below.length === 1 ? below[0] : `(${below.join(' ')})`}`;
    return `${negative ? '−' : ''}${[quotient, ...more].filter((t) => t !== '').join(' ')}`;
  }

  private base(base: Poly): { readonly text: string; readonly unit: Rational } {
    const one = { num: 1n, den: 1n };
    if (base.size === 1) return { text: this.poly(base), unit: one };
    if (this.g4.size > 1 && equals(splitUnit(this.g4).reduced, base)) {
      const [term] = termsOf(splitUnit(this.g4).unit);
      if (term!.exponents.length === 0) return { text: 'G4', unit: divideRational(one, term!.coefficient) };
    }
    return { text: `(${this.poly(base)})`, unit: one };
  }
}

const pairName = (key: string): string => key.split(',').map(unicodeName).join('');
/** A product without its overall sign. */
const size = (text: string): string => text.replace(/^−/, '');
const absolute = (text: string): string => (/^−?[\d/]+$/.test(text) ? size(text) : `|${size(text)}|`);
const usedText = (used: readonly string[]): string => (used.length === 0 ? '' : `, by ${used.join(', ')}`);

/** All sections that a derivation has. */
export function scalarFieldSections(d: Derivation): SummarySection[] {
  const fields = d.scalarFields;
  const out: SummarySection[] = [];
  if (d.theory.assumptions)
    out.push({
      title: 'Assumptions',
      lines: d.theory.assumptions.map(({ text }) => line(fields?.used.includes(text) ? `${text} (used below)` : text)),
    });
  const form = d.scalarTensor;
  if (!fields) return out;
  for (const outcome of fields.frames)
    if (!outcome.found) out.push({ title: 'Conformal frame', lines: [line(outcome.reason)] });
  if (form.form === 'none') return out;
  const texts = new Texts(d, form);
  for (const outcome of fields.frames) if (outcome.found) out.push(frameSection(d, texts, outcome.frame));
  const classes = fields.classification;
  if (classes) {
    const scalars = classes.scalars.map((c) => line(`${unicodeName(c.scalar)}: ${kindText(texts, c)}`));
    const powers = (of: ReadonlyMap<string, number>): string =>
      [...of].map(([q, n]) => `${unicodeName(q)}${n === 1 ? '' : superscript(n)}`).join(' ') || '1';
    const terms = classes.potential.map((t) => `${t.name} ${powers(t.powers)}`);
    const { bound } = classes;
    const open = [...new Set(bound.open.filter((p) => !isZero(p)).map((p) => texts.poly(p)))];
    out.push({
      title: 'The scalars',
      lines: [
        ...scalars,
        line(`potential: ${terms.length === 0 ? 'none' : terms.join(', ')}; ${bound.verdict}${usedText(bound.used)}`),
        ...(open.length > 0
          ? [line(`which depends on the sign${open.length > 1 ? 's' : ''} of ${open.join(', ')}`)]
          : []),
      ],
    });
  }
  if (fields.wantsCanonical)
    out.push({
      title: 'Canonical fields',
      lines:
        fields.canonical.length === 0
          ? [line('no kinetic term decouples')]
          : fields.canonical.flatMap((r) =>
              canonicalLines(texts, r, fields.canonical.find((c) => c.scalar === r.scalar) === r),
            ),
    });
  return out;
}

function frameSection(d: Derivation, texts: Texts, frame: ConformalFrame): SummarySection {
  const isEinstein = frame.kind === 'einstein';
  const kinetic = [...frame.functions.kinetic].filter(([, f]) => !isZero(f.numerator));
  const has = (values: Iterable<Fraction>): boolean => [...values].some((f) => !isZero(f.numerator));
  const action = [
    isEinstein ? `${frame.side === 1 ? '' : '−'}½ M² R̃` : 'G4/Ω² R̃',
    ...(kinetic.length > 0 ? ['Σ K̃_AB X̃^AB'] : []),
    ...(has(frame.functions.current.values()) ? ['√|J²|/Ω³'] : []),
  ].join(' + ');
  const omega2 = isEinstein ? `${frame.side === 1 ? '' : '−'}2 G4/M²` : texts.poly(frame.omega2.numerator);
  const matter = d.fluids.length > 0 ? '; matter couples to Ω⁻² g̃' : '';
  const where =
    frame.side === -1
      ? 'G4 is negative, gravity has the wrong sign'
      : frame.domain.signs === POSITIVE
        ? 'everywhere'
        : `where ${isEinstein ? 'G4' : 'Ω²'} > 0`;
  return {
    title: isEinstein ? 'Einstein frame' : 'Chosen conformal frame',
    lines: [
      line(
        `√−g̃ [ ${action}${has([frame.functions.potential]) ? ' − V/Ω⁴' : ''} ] with g̃ = Ω² g, Ω² = ${omega2}, ${where}${matter}`,
      ),
      ...kinetic.map(([key, f]) => line(`K̃_${pairName(key)} = ${texts.fraction(f)}`)),
      ...signatureLines(texts, frame),
    ],
  };
}

function signatureLines(texts: Texts, { signature }: ConformalFrame): (readonly [string, readonly string[]])[] {
  const texts_: Readonly<Record<string, string>> = {
    positive: 'both kinetic terms have the usual sign',
    negative: 'both kinetic terms have the wrong sign',
    indefinite: 'one kinetic term has the usual sign and one the wrong sign',
    degenerate: 'the kinetic matrix is degenerate',
  };
  const known = texts_[signature.verdict];
  if (known) return [line(`${known}${usedText(signature.used)}`)];
  const [first] = signature.diagonal;
  return [
    line(`det K̃ has the sign of ${texts.product(signature.determinant.sign.open)}`),
    ...(first
      ? [
          line(
            `K̃_${unicodeName(first[0])}${unicodeName(first[0])} has the sign of ${texts.product(first[1].sign.open)}`,
          ),
        ]
      : []),
    line('both usual when both are positive, both wrong when only det K̃ is, one of each when det K̃ < 0'),
  ];
}

function kindText(texts: Texts, { kind, sign, used }: ScalarClass): string {
  switch (kind) {
    case 'kinetic':
      return `kinetic term, usual sign when ${texts.product(sign!.sign.open)} > 0, wrong sign when < 0`;
    case 'mixed':
      return 'kinetic term that mixes with the other scalar';
    case 'canonical':
    case 'wrong-sign':
      return `kinetic term of the ${kind === 'canonical' ? 'usual' : 'wrong'} sign${usedText(used)}`;
    case 'quadratic-cuscuton':
      return 'quadratic cuscuton';
    default:
      return kind;
  }
}

const PAIRS: Readonly<Record<string, readonly [string, string]>> = {
  tanh: ['cosh', 'sinh'],
  coth: ['cosh', 'sinh'],
  sinh: ['cosh', 'sinh'],
  cosh: ['cosh', 'sinh'],
  tan: ['cos', 'sin'],
  sin: ['cos', 'sin'],
};

function fieldTerms(texts: Texts, terms: readonly FieldTerm[], pair: readonly [string, string], z: string): string[] {
  const raised = (name: string, n: number): string[] => (n === 0 ? [] : [`${name}${n === 1 ? '' : superscript(n)}`]);
  const call = (name: string, n: number): string[] =>
    n === 0 ? [] : [`${name}${n === 1 ? '' : superscript(n)}(${z}/s)`];
  return terms.map((t, i) => {
    const text = texts.term(t.coefficient, [
      ...raised('η', t.eta),
      ...raised('λ', t.lambda),
      ...raised('w', t.root),
      ...raised('ζ', t.zeta),
      ...call(pair[0], t.c),
      ...call(pair[1], t.s),
    ]);
    if (i === 0) return text;
    return text.startsWith('−') ? `− ${text.slice(1)}` : `+ ${text}`;
  });
}

/** The rescaled current is the same in every frame, and is printed with the first. */
function canonicalLines(texts: Texts, r: CanonicalResult, isFirst: boolean): (readonly [string, readonly string[]])[] {
  const field = unicodeName(r.scalar);
  const z = 'z';
  const frame = { einstein: 'Einstein frame', chosen: 'chosen frame', jordan: 'frame of the form' }[r.frame];
  const out = [line(`${frame}: (dz/d${field})² = |${size(texts.fraction(r.slopeSquared))}|`)];
  for (const c of r.cases) out.push(...caseLines(texts, r, c, field, z));
  if (!r.isClosed) {
    const terms = r.series.slope.flatMap((coefficient, n) => {
      if (isZero(coefficient.numerator)) return [];
      const text = texts.term(coefficient, n === 0 ? [] : [`${field}${n === 1 ? '' : superscript(n)}`]);
      return [n === 0 ? text : text.startsWith('−') ? `− ${text.slice(1)}` : `+ ${text}`];
    });
    const front = r.series.halves === 0 ? '' : ` ${field}^(${r.series.halves}/2)`;
    out.push([
      `  no closed form; dz/d${field} = √|${size(texts.fraction(r.shape.constant))}|${front} times `,
      [...terms, '+ …'],
    ]);
  }
  if (r.weight && isFirst) {
    const powers = weightPowers(r.weight);
    const raised = (base: string, n: Rational): string =>
      n.num === 0n ? '' : n.num === n.den ? ` |${base}|` : ` |${base}|^(${n.num}${n.den === 1n ? '' : `/${n.den}`})`;
    const eta = r.eta.sign === undefined ? ', η = sign g' : '';
    out.push(
      line(
        `  ${unicodeName(r.weight.field)} = ζ${raised(field, r.weight.ofField)}${raised('g', r.weight.ofBracket)} with g = ${texts.poly(r.weight.g)}${eta}`,
      ),
      line(
        `  √|J²| = ${absolute(texts.poly(powers.factor))}${raised(field, powers.ofField)}${raised('g', powers.ofBracket)} √|(∂ζ)²|`,
      ),
    );
  }
  return out;
}

function caseLines(
  texts: Texts,
  r: CanonicalResult,
  c: SolvedCase,
  field: string,
  z: string,
): (readonly [string, readonly string[]])[] {
  const open = c.condition?.of.sign.open;
  const condition =
    open && open.factors.length > 0 ? `if ${texts.product(open)} ${c.condition!.sign === 1 ? '>' : '<'} 0: ` : '';
  const unit = c.unit
    ? `λ${c.unit.degree === 1 ? '' : superscript(c.unit.degree)} = ${texts.fraction(c.unit.value)}, `
    : '';
  const scale = texts.fraction(c.scale.value);
  const positive = c.kineticSign === -1 ? size(scale) : c.kineticSign === 1 ? scale : `|${size(scale)}|`;
  const sign =
    c.kineticSign === 1
      ? 'usual sign'
      : c.kineticSign === -1
        ? 'wrong sign'
        : `sign of ${texts.product(c.kinetic.sign.open)}`;
  const out = [line(`  ${condition}${unit}s² = ${positive}; ${sign}`)];
  for (const { branch: b, omega2, potential } of c.functions) {
    const domain = b.domain.startsWith('x^2') ? ` for ${field}² ${b.domain.includes('<') ? '<' : '>'} λ²` : '';
    if (b.named === 'linear') out.push(line(`    ${z} = s ${field}`));
    else if (b.named === 'log') out.push(line(`    ${z} = s ln|${field}|`));
    else if (b.named === 'power') {
      const n = `${b.exponent!.num}${b.exponent!.den === 1n ? '' : `/${b.exponent!.den}`}`;
      out.push(line(`    ${z} = s ${field}^(${n})/(${n})`));
    } else out.push(line(`    ${z} = s ${b.named}(${field}/λ), ${field} = λ ${b.inverse}(${z}/s)${domain}`));
    const pair = PAIRS[b.inverse];
    if (!pair) continue;
    if (omega2) out.push([`      Ω² = `, fieldTerms(texts, omega2, pair, z)]);
    if (potential && potential.length > 0)
      out.push([r.frame === 'jordan' ? '      V = ' : '      V/Ω⁴ = ', fieldTerms(texts, potential, pair, z)]);
  }
  if (c.branches.length === 0 && c.antiderivative)
    out.push(line(`    ${z} = s F(${field}/λ), F(x) = ${elementaryText(c.antiderivative.tree, 'x')}`));
  return out;
}
