/** The covariant field equations and the Lagrangian in metric terms, as a section of the LaTeX files and the report. */
import type { CovariantTheory } from '../derivation.js';
import type { TensorSum } from '../tensor/expression.js';
import type { Section, Writer } from './latex-display.js';
import { equationDisplays, type Lines } from './latex-lines.js';
import { sumTex, type TexTerm } from './latex-math.js';
import { factorsTex } from './latex-tensors.js';
import { math, prose } from './latex-text.js';

/** coefficient · product of tensors, coefficients in couplings factored in front. */
function tensorTerms({ plain }: Writer, sum: TensorSum): TexTerm[] {
  return sum.map(({ coefficient, factors }): TexTerm => {
    const parts = sumTex(plain.sum(coefficient, { divide: false }));
    const tensors = factorsTex(factors);
    const [only] = parts;
    if (parts.length !== 1) return { negative: false, head: [], inner: parts, tail: tensors };
    // A coefficient of 1 is not written in front of tensors.
    const unit =
      only!.head.length === 1 && only!.head[0] === '1' && only!.inner.length === 0 && only!.tail.length === 0;
    if (unit && tensors.length > 0) return { negative: only!.negative, head: tensors, inner: [], tail: [] };
    return { ...only!, tail: [...only!.tail, ...tensors] };
  });
}

const rows = (writer: Writer, left: string, sum: TensorSum, right = ''): Lines[] =>
  sum.length === 0
    ? []
    : equationDisplays({ left, terms: tensorTerms(writer, sum), right, part: (n) => `${left}^{[${n}]}` });

/** The section, when the covariant equations were asked for. */
export function covariantSection(writer: Writer): Section | undefined {
  const { covariant } = writer.derivation;
  return covariant && { id: 'covariant', title: 'Covariant field equations', passages: passagesOf(writer, covariant) };
}

function passagesOf(writer: Writer, c: CovariantTheory): Section['passages'] {
  const { passage } = writer;
  const momenta = [...rows(writer, 'P_{abc}', c.momenta.torsion), ...rows(writer, 'Q_{abcd}', c.momenta.curvature)];
  const { coframe, connection } = c.keepMomenta ? c.withMomenta : c.equations;
  const vanishing = prose`An expression without terms vanishes identically.`;
  return [
    passage(
      'covariant-momenta',
      'Field momenta',
      {
        text: [
          prose`The Lagrangian varies as ${math('\\delta L = P_{abc}\\, \\delta T^{abc} + Q_{abcd}\\, \\delta R^{abcd}')} under changes of torsion and curvature at fixed frame, with the field momenta`,
        ],
        remarks: momenta.length === 0 ? [vanishing] : [],
      },
      momenta,
    ),
    passage(
      'covariant-coframe',
      'Equation of the coframe',
      {
        text: [
          prose`Varying the coframe, ${math('\\delta S = \\int e\\, E_{ab}\\, \\delta e^{ab}')} with the form index last and ${math('\\nabla')} the covariant derivative with torsion, gives for gravity`,
        ],
      },
      rows(writer, 'E_{ab}', coframe),
    ),
    passage(
      'covariant-connection',
      'Equation of the connection',
      {
        text: [
          prose`Varying the Lorentz connection, ${math('\\delta S = \\int e\\, E_{abc}\\, \\delta\\Gamma^{abc}')}, gives`,
        ],
      },
      rows(writer, 'E_{abc}', connection),
    ),
    passage(
      'metric-terms',
      'Lagrangian in terms of the metric connection',
      {
        text: [
          prose`With the connection split into that of the metric, whose quantities carry a ring, and contortion, the Lagrangian is`,
        ],
      },
      rows(writer, 'L', c.inMetricTerms),
    ),
  ];
}
