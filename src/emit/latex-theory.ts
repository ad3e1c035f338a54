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
import { pulledOutTex, rateTex, sumTex, type TexTerm, termTex } from './latex-math.js';
import { enumerated, math, type Prose, prose, withNames } from './latex-text.js';
import { widthOf } from './latex-width.js';

/** Points beyond which a product of tensors gets a name, since it could not be a left side. */
const WIDE_PRODUCT = 150;

/** Definitions that every other formula rests on. */
function conventions({ derivation, passage }: Writer): ReturnType<Writer['passage']> {
  const signs = derivation.geometry.tensors.metric.join(', ');
  const rows = [
    fixedRow('\\eta_{ab}', `\\mathrm{diag}(${signs})`),
    fixedRow('\\Gamma_{ab}', '-\\Gamma_{ba}'),
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
  const text = prose`With a coframe ${math('e^{a}')} that is orthonormal with respect to ${math('\\eta_{ab}')} and a connection ${math('\\Gamma^{a}{}_{b}')} that is compatible with it, torsion and curvature are defined by`;
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
  const part = (n: number): string => `\\mathcal{L}^{[${n}]}`;
  const abbreviated = [...viewer.symbols.values()].filter((s) => s.isAbbreviated && s.order === 0);
  const names = abbreviated.map((s): Prose => [math(s.latex), ' for ', s.name]);
  passages.push(
    passage(
      'lagrangian',
      'The Lagrangian',
      {
        text: [prose`The Lagrangian, as it was understood from the theory file, is`],
        remarks: abbreviated.length > 0 ? [prose`Long names are abbreviated: ${enumerated(names)}.`] : [],
      },
      equationDisplays({ left: '\\mathcal{L}', terms: typed, part }),
    ),
  );
  (derivation.elsewhere ?? []).forEach(({ name, terms, symbols: theirs }, i) => {
    const lines = equationDisplays({ left: '\\mathcal{L}', terms: typedTerms(latexTerms(terms, theirs)), part });
    const text = prose`In the conventions of ${name} the same Lagrangian reads`;
    passages.push(
      passage(`lagrangian-in-${i + 1}`, `The Lagrangian in the conventions of ${name}`, { text: [text] }, lines),
    );
  });
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
    const isConstant = fluid?.isSource === true || m.kind === 'vacuum';
    const name = m.kind === 'vacuum' ? 'vacuum energy' : m.name;
    return prose`${name} (${math(`w = ${printRational(m.w)}`)}, density ${math(latex(m.density))}${isConstant ? '' : ' at unit scale factor'})`;
  });
  for (const { name } of derivation.spin?.averages ?? [])
    each.push(
      prose`randomly oriented spins (${math('w = 1')}, spin density ${math(latex(name))} at unit scale factor)`,
    );
  const text = prose`Matter enters as minus its energy density per volume and is conserved on its own: ${enumerated(each)}. In total`;
  const rows: Equation[] = [
    { left: '\\rho', terms: total('rho') },
    { left: 'p', terms: total('pressure') },
  ];
  return passage('matter', 'Matter', { text: [text] }, rowDisplays(rows));
}

/** Values of the invariants, in components of torsion and curvature. */
export function geometrySection(writer: Writer): Section {
  const { derivation, viewer, passage, latex, rate } = writer;
  const { geometry, invariants } = derivation;
  const { variables } = viewer;
  const components = componentTable(derivation);
  const rates = [...geometry.rates.keys()].map((a) => math(`${rate(a)} = ${rateTex(latex(a))}/${latex(a)}`));
  const fields = viewer.fields.map((f): Prose => prose`${math(f.latex)} (${f.meaning})`);
  const names = new Map([...derivation.fields, ...geometry.parameters].map((s) => [s.name, s.latex]));
  const passages = [
    passage('fields', 'Geometry', {
      text: [
        prose`The geometry is ${geometry.title} (${geometry.source}). ${withNames(geometry.why, names)} The functions of time are ${enumerated(fields)}.`,
        prose`A dot is a derivative with respect to cosmic time, ${math(`${latex(geometry.lapse)} \\, \\mathrm{d} t`)}${rates.length > 0 ? ', and ' : ''}${enumerated(rates)}.`,
      ],
    }),
  ];
  if (variables) {
    const rows = [...viewer.replaced].map(
      ([name, sum]): Equation => ({ left: names.get(name) ?? name, terms: sumTex(sum) }),
    );
    const text = prose`The equations are those of the original fields, with these expressions put in:`;
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
  const rows = invariants.flatMap(({ factors, value }, i): Equation[] => {
    const tensors = tensorsTex(factors);
    const terms = isZero(value) ? [] : pulledOutTex(sumOf(value, components, false));
    if (widthOf(tensors) <= WIDE_PRODUCT) return [{ left: tensors, terms }];
    const name = `\\mathcal{I}_{${i + 1}}`;
    return [
      { left: name, terms: typedTerms([tensors]) },
      { left: name, terms },
    ];
  });
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
