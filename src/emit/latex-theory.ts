/** The first sections: the Lagrangian as it was understood, what was imposed on it, and its invariants on the geometry. */
import { isZero } from '../algebra/poly.js';
import { printRational } from '../algebra/rational.js';
import { latexTerms } from '../notation/print.js';
import { sumOf } from './display.js';
import { componentTable } from './display-symbols.js';
import {
  conditionRows,
  fixedRow,
  polyRows,
  type Section,
  tensorsTex,
  typedTerms,
  type Writer,
} from './latex-display.js';
import { type Equation, equationDisplays, rowDisplays } from './latex-lines.js';
import { pulledOutTex, sumTex, type TexTerm, termTex } from './latex-math.js';
import { enumerated, type Inline, math, type Prose, prose } from './latex-text.js';

/** Definitions that every other formula rests on. */
function conventions({ derivation, passage }: Writer): ReturnType<Writer['passage']> {
  const signs = derivation.geometry.tensors.metric.join(', ');
  const rows = [
    fixedRow(
      'T^{a}',
      '\\mathrm{d} e^{a} + \\Gamma^{a}{}_{b} \\wedge e^{b} = \\tfrac{1}{2} T^{a}{}_{bc} \\, e^{b} \\wedge e^{c}',
    ),
    fixedRow(
      'R^{a}{}_{b}',
      '\\mathrm{d} \\Gamma^{a}{}_{b} + \\Gamma^{a}{}_{c} \\wedge \\Gamma^{c}{}_{b} = \\tfrac{1}{2} R^{a}{}_{bcd} \\, e^{c} \\wedge e^{d}',
    ),
    fixedRow('R_{ab}', 'R^{c}{}_{acb}, \\quad R = \\eta^{ab} R_{ab}, \\quad T_{a} = T^{b}{}_{ab}'),
    fixedRow('A^{a}', '\\epsilon^{abcd} T_{bcd}, \\quad \\epsilon_{0123} = +1'),
  ];
  const text = prose`In an orthonormal coframe ${math('e^{a}')} with ${math(`\\eta_{ab} = \\mathrm{diag}(${signs})`)} a connection ${math('\\Gamma^{a}{}_{b}')} that is compatible with the metric, ${math('\\Gamma_{ab} = -\\Gamma_{ba}')}, has the torsion and the curvature`;
  const units = prose`Units are those in which ${math('c = \\hbar = 1')}; ${math('M')} is the reduced Planck mass, and general relativity has the Lagrangian ${math(`${signs.startsWith('1') ? '-' : ''}\\tfrac{1}{2} M^{2} R`)}.`;
  return passage('conventions', 'Conventions', { text: [text], remarks: [units] }, rowDisplays(rows));
}

/** Terms of the Lagrangian after the relations: coefficients grouped like those of an equation. */
function imposedTerms({ derivation, viewer }: Writer): TexTerm[] {
  return derivation.terms.flatMap(({ coefficient, factors }) => {
    const tensors = factors.length === 0 ? [] : [tensorsTex(factors)];
    return viewer.sum(coefficient, { divide: false }).terms.map((t) => {
      const term = termTex(t);
      const isOne = tensors.length > 0 && term.inner.length === 0 && term.head.join('') === '1';
      return { ...term, head: isOne ? [] : term.head, tail: [...term.tail, ...tensors] };
    });
  });
}

/** The Lagrangian, the relations and the matter. */
export function theorySection(writer: Writer): Section {
  const { derivation, passage, symbols, latex, viewer } = writer;
  const { theory, relations, fluids } = derivation;
  const passages = [conventions(writer)];
  const typed = typedTerms(latexTerms(theory.lagrangian, symbols));
  const part = (n: number): string => `\\mathcal{L}^{(${n})}`;
  const abbreviated = [...viewer.symbols.values()].filter((s) => s.isAbbreviated && s.order === 0);
  const names = abbreviated.flatMap((s, i): Inline[] => [i === 0 ? '' : ', ', math(s.latex), ' for ', s.name]);
  passages.push(
    passage(
      'lagrangian',
      'The Lagrangian',
      {
        text: [prose`The Lagrangian, as it was understood from the theory file, is`],
        remarks: abbreviated.length > 0 ? [prose`Long names are abbreviated: ${names}.`] : [],
      },
      equationDisplays({ left: '\\mathcal{L}', terms: typed, part }),
    ),
  );
  if (relations.eliminated.size > 0) {
    const rows = polyRows(
      viewer,
      [...relations.eliminated].map(([name, value]) => [latex(name), value] as const),
    );
    passages.push(
      passage(
        'relations',
        'Relations imposed',
        {
          text: [
            prose`Before anything is derived the symbols on the left are eliminated by the relations that the theory file imposes:`,
          ],
        },
        rowDisplays(rows),
      ),
      passage(
        'lagrangian-imposed',
        'The Lagrangian with the relations',
        { text: [prose`With these relations the Lagrangian is`] },
        equationDisplays({ left: '\\mathcal{L}', terms: imposedTerms(writer), part }),
      ),
    );
  }
  if (relations.conditions.length > 0) {
    const rows = conditionRows(
      viewer,
      relations.conditions.map((c) => c.value),
    );
    const text = prose`These relations could not be solved for a symbol. They are conditions on the couplings under which the results hold, and are not used for rewriting:`;
    passages.push(passage('conditions', 'Conditions', { text: [text] }, rowDisplays(rows)));
  }
  if (fluids.length > 0) passages.push(matterPassage(writer));
  return { id: 'theory', title: 'The theory', passages };
}

function matterPassage(writer: Writer): ReturnType<Writer['passage']> {
  const { derivation, viewer, passage, latex } = writer;
  const { fluids, theory } = derivation;
  const total = (of: 'rho' | 'pressure'): TexTerm[] =>
    fluids.flatMap((f) => [...sumTex(viewer.sum(f[of], { divide: false }))]);
  const each = theory.matter.map((m): Prose => {
    const fluid = fluids.find((f) => f.name === m.name);
    const density = fluid?.isSource
      ? 'with the density '
      : m.kind === 'vacuum'
        ? 'with the constant density '
        : 'with, at unit scale factor, the density ';
    return [
      m.kind === 'vacuum' ? 'vacuum energy' : m.name,
      ' (',
      math(`w = ${printRational(m.w)}`),
      `, ${density}`,
      math(latex(m.density)),
      ')',
    ];
  });
  const list = each.flatMap((item, i): Inline[] => [i === 0 ? '' : i === each.length - 1 ? ' and ' : ', ', ...item]);
  const text = prose`Matter enters as minus its energy density per volume, conserved on its own: ${list}. In total`;
  const rows: Equation[] = [
    { left: '\\rho', terms: total('rho') },
    { left: 'p', terms: total('pressure') },
  ];
  return passage('matter', 'Matter', { text: [text] }, rowDisplays(rows));
}

/** Values of the invariants, in components of torsion and curvature. */
export function geometrySection(writer: Writer): Section {
  const { derivation, viewer, passage, latex } = writer;
  const { geometry, invariants } = derivation;
  const { lapse, rates, variables } = {
    lapse: latex(geometry.lapse),
    rates: geometry.rates,
    variables: viewer.variables,
  };
  const components = componentTable(derivation);
  const rateText = [...rates].map(([a]): Inline => {
    const rate = latex(`rate of ${a}`);
    return math(
      `${rate} = \\dot{${geometry.fields.find((f) => f.name === a)!.latex}}/${geometry.fields.find((f) => f.name === a)!.latex}`,
    );
  });
  const shown = viewer.fields.map((f): Prose => [math(f.latex), ` (${f.meaning})`]);
  const list = shown.flatMap((item, i): Inline[] => [i === 0 ? '' : i === shown.length - 1 ? ' and ' : ', ', ...item]);
  const passages = [
    passage('fields', 'Geometry', {
      text: [
        prose`The geometry is ${geometry.title} (${geometry.source}). ${geometry.why} Its functions of time are ${list}.`,
        prose`A dot is a derivative with respect to cosmic time, ${math(`${lapse} \\, \\mathrm{d} t`)}${rateText.length > 0 ? ', and ' : ''}${enumerated(rateText)}.`,
      ],
    }),
  ];
  if (variables) {
    const rows = [...viewer.replaced].map(
      ([name, sum]): Equation => ({ left: geometry.fields.find((f) => f.name === name)!.latex, terms: sumTex(sum) }),
    );
    const text = prose`All equations below are printed in other variables, which are put into them for`;
    passages.push(passage('variables', 'Variables', { text: [text] }, rowDisplays(rows)));
  }
  const definitions = polyRows(
    viewer,
    geometry.components.map((c) => [c.latex, c.value] as const),
  ).filter((row) => !(row.terms.length === 1 && row.terms[0]!.head.join(' ') === row.left));
  passages.push(
    passage(
      'components',
      'Components',
      { text: [prose`Cartan's structure equations leave these independent components to torsion and curvature:`] },
      rowDisplays(definitions),
    ),
  );
  const rows = invariants.map(
    ({ factors, value }): Equation => ({
      left: tensorsTex(factors),
      terms: isZero(value) ? [] : pulledOutTex(sumOf(value, components, false)),
    }),
  );
  if (rows.length > 0)
    passages.push(
      passage(
        'invariants',
        'Invariants',
        { text: [prose`In terms of them the products of tensors in the Lagrangian take the values`] },
        rowDisplays(rows),
      ),
    );
  return { id: 'geometry', title: 'Torsion and curvature on the geometry', passages };
}
