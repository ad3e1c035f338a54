/** The sections of results: reduced Lagrangian, field equations, Friedmann form, metric analogue, couplings, checks. */
import { isZero } from '../algebra/poly.js';
import { divideRational, multiplyRational, rational } from '../algebra/rational.js';
import type { FriedmannForm } from '../derivation.js';
import { type DisplayTerm, pulledOut } from './display.js';
import { equationOf, fixedRow, type Passage, type Section, type Writer } from './latex-display.js';
import { type Lines, rowDisplays, SINGLE_LINE } from './latex-lines.js';
import { inlineTex, productTex, rateTex, sumTex } from './latex-math.js';
import { math, prose } from './latex-text.js';
import { widthOf } from './latex-width.js';

/** The exact Lagrangian on the geometry, and the same without total derivatives. */
export function reductionSection(writer: Writer): Section {
  const { derivation, passage, latex, viewer } = writer;
  const { geometry, lagrangian, reducedGravity, dropped, fluids } = derivation;
  const lapse = latex(geometry.lapse);
  const volume = productTex(viewer.sum(geometry.volume).divided);
  const over = [lapse];
  const passages = [
    passage(
      'reduced-lagrangian',
      'Reduced Lagrangian',
      {
        text: [
          prose`The Lagrangian times the volume ${math(`${lapse} ${volume}`)}, with the symmetry imposed${fluids.length > 0 ? ' and matter included' : ''}, is`,
        ],
        remarks: [
          prose`The lapse is in the volume and in every dot and rate; nothing else depends on it, as the invariance under changes of time demands. ${geometry.traceless ? 'Imposing the symmetry before the variation is allowed here because the structure constants of the cobasis have no trace.' : 'It must not be varied, because the structure constants of the cobasis have a trace.'}`,
        ],
      },
      equationOf(viewer, 'L', lagrangian, { over }),
    ),
  ];
  if (isZero(dropped)) {
    const text = prose`The gravitational part of it contains no total derivative that could be dropped.`;
    passages.push(passage('total-derivative', 'Total derivatives', { text: [text] }));
  } else {
    passages.push(
      passage(
        'reduced-gravity',
        'Without total derivatives',
        {
          text: [
            prose`Its gravitational part is ${math('L_{\\mathrm{red}} + \\mathrm{d} F / \\mathrm{d} t')}. The derivative contributes nothing to the equations and is dropped, which leaves`,
          ],
        },
        equationOf(viewer, 'L_{\\mathrm{red}}', reducedGravity, { over }),
      ),
      passage(
        'total-derivative',
        'Total derivative',
        { text: [prose`The function in the derivative is`] },
        equationOf(viewer, 'F', dropped),
      ),
    );
  }
  return { id: 'reduction', title: 'Reduced Lagrangian', passages };
}

/** E_q = 0 for every field. */
export function equationsSection(writer: Writer): Section {
  const { derivation, passage, viewer, latex } = writer;
  const { geometry, equations, fields } = derivation;
  const definition = fixedRow(
    'E_{q}',
    '\\frac{\\partial L}{\\partial q} - \\frac{\\mathrm{d}}{\\mathrm{d} t} \\frac{\\partial L}{\\partial \\dot{q}}',
  );
  const remark = prose`in which ${math(`${latex(geometry.lapse)} = 1`)} after the variation. The power of the scale factor on the left is divided out.${viewer.variables ? ' They are the equations of the original fields; only the variables in them are others.' : ''}`;
  const source = geometry.traceless
    ? prose`The equations of the Lagrangian with matter are the vanishing of`
    : prose`The equations are components of the covariant ones, written as if they were`;
  const intro = passage(
    'euler-lagrange',
    'Variation',
    { text: [source], remarks: [remark] },
    rowDisplays([definition]),
  );
  const each = [...equations].map(([q, value]) => {
    const field = fields.find((f) => f.name === q)!;
    const text = isZero(value)
      ? prose`The variation of ${math(field.latex)} (${field.meaning}) gives nothing: this expression vanishes identically.`
      : prose`Variation of ${math(field.latex)} (${field.meaning}):`;
    const lines = equationOf(viewer, `E_{${field.latex}}`, value, { right: isZero(value) ? '' : '= 0' });
    return passage(`equation-${q}`, `Equation of the ${field.meaning}`, { text: [text] }, lines);
  });
  const further = [...(derivation.constraints ?? [])].map(([name, value]) =>
    passage(
      `component-${name.slice(2)}`,
      `Component ${name.slice(2)}`,
      { text: [prose`A component of the field equations that is no equation of a field:`] },
      equationOf(viewer, `E_{${name.slice(2)}}`, value, { right: '= 0' }),
    ),
  );
  return { id: 'equations', title: 'Field equations', passages: [intro, ...each, ...further] };
}

/** ρ_T, p_T, w_T. */
export function friedmannSection(writer: Writer): Section | undefined {
  const { derivation, passage, latex, rate, viewer } = writer;
  const { friedmann, geometry, fluids } = derivation;
  if (!friedmann || !geometry.isotropic) return undefined;
  const { scale, curvature } = geometry.isotropic;
  const h = rate(scale);
  const planck = `${latex('M')}^{2}`;
  const curved = `\\frac{${latex(curvature)}}{${latex(scale)}^{2}}`;
  const [density, pressure] = fluids.length > 0 ? ['\\rho + \\rho_{T}', 'p + p_{T}'] : ['\\rho_{T}', 'p_{T}'];
  const first: Lines = [
    `3 ${planck} \\Bigl( ${h}^{2} + ${curved} \\Bigr) &= ${density}`,
    `-${planck} \\Bigl( 2 ${rateTex(h)} + 3 ${h}^{2} + ${curved} \\Bigr) &= ${pressure}`,
  ];
  const passages = [
    passage(
      'friedmann',
      'Friedmann form',
      {
        text: [
          prose`Everything that differs from general relativity is moved to the right-hand side. The equations of the lapse and of the scale factor are then those of general relativity,`,
        ],
        remarks: [
          prose`with an effective energy density and pressure of torsion and curvature. On the equations of the connection they are conserved, ${math(`\\dot{\\rho}_{T} + 3 ${h} (\\rho_{T} + p_{T}) = 0`)}.`,
        ],
      },
      [first],
    ),
    passage(
      'rho-T',
      'Effective energy density',
      { text: [prose`The effective energy density is`] },
      equationOf(viewer, '\\rho_{T}', friedmann.rhoT, { divide: false }),
    ),
    passage(
      'p-T',
      'Effective pressure',
      { text: [prose`The effective pressure is`] },
      equationOf(viewer, 'p_{T}', friedmann.pT, { divide: false }),
    ),
  ];
  if (!isZero(friedmann.rhoT)) passages.push(equationOfState(writer, friedmann));
  return { id: 'friedmann', title: 'Friedmann form', passages };
}

/** Terms of numerator and denominator beyond which the quotient says no more than p_T/ρ_T. */
const LONG_QUOTIENT = 60;

function equationOfState(writer: Writer, friedmann: FriedmannForm): Passage {
  const name = 'w_{T} = \\frac{p_{T}}{\\rho_{T}}';
  const quotient = shortQuotient(writer, friedmann);
  const whole = `${name} = ${quotient}`;
  const shown = quotient !== undefined && widthOf(whole) <= SINGLE_LINE ? whole : name;
  return writer.passage('w-T', 'Effective equation of state', { text: [prose`Their ratio is`] }, [[shown]]);
}

/** p_T/ρ_T in lowest terms; undefined when it is long or powers of the scale factor would be left over. */
function shortQuotient({ viewer }: Writer, friedmann: FriedmannForm): string | undefined {
  if (friedmann.rhoT.size > LONG_QUOTIENT || friedmann.pT.size > LONG_QUOTIENT) return undefined;
  const ratio = friedmann.wT;
  if (!ratio || ratio.denominator.length > 1) return undefined;
  const top = viewer.sum(ratio.numerator);
  const [factor] = ratio.denominator;
  const bottom = factor ? viewer.sum(factor.base) : undefined;
  if (factor?.power !== undefined && factor.power > 1) return undefined;
  if (productTex(top.divided) !== productTex(bottom?.divided ?? [])) return undefined;
  if (!bottom) return inlineTex(sumTex(top));
  const { content, terms } = pulledOut(top);
  const below = pulledOut(bottom);
  const number = divideRational(content, below.content);
  return `\\frac{${multiplied(number.num, terms)}}{${multiplied(number.den, below.terms)}}`;
}

/** An integer times a sum. */
function multiplied(number: bigint, terms: readonly DisplayTerm[]): string {
  const sized = number < 0n ? -number : number;
  if (sized !== 1n && terms.length > 1) return `${number} (${inlineTex(sumTex({ divided: [], terms }))})`;
  const scaled = terms.map((t) => ({ ...t, content: multiplyRational(t.content, rational(number)) }));
  return inlineTex(sumTex({ divided: [], terms: scaled }));
}
