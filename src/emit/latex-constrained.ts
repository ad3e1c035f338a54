/** Sections on constraints by multipliers and on matter with spin. */
import type { Fraction } from '../algebra/fraction.js';
import { type Poly, power, product } from '../algebra/poly.js';
import type { ConstrainedBranch, Derivation } from '../derivation.js';
import { simpleCondition } from '../mechanics/branches.js';
import { latexTerms } from '../notation/print.js';
import type { TheorySymbol } from '../notation/theory.js';
import { type Viewer, viewerOf } from './display.js';
import { equationOf, type Passage, polyRows, type Section, typedTerms, type Writer } from './latex-display.js';
import { type Equation, equationDisplays, rowDisplays } from './latex-lines.js';
import { inlineTex, sumTex } from './latex-math.js';
import { enumerated, math, type Prose, prose } from './latex-text.js';

/** A viewer for expressions in the ring of a branch, whose roots are set as roots. */
export function branchViewer(d: Derivation, branch: ConstrainedBranch): Viewer {
  const symbols = [...d.theory.symbols];
  for (const { name, radicand } of branch.roots) {
    const inner = viewerOf({ ...d, ring: branch.ring, theory: { ...d.theory, symbols } });
    const latex = `\\sqrt{${inlineTex(sumTex(inner.sum(radicand, { divide: false })))}}`;
    const root: TheorySymbol = { name, role: 'scale', dimension: 0, latex };
    symbols.push(root);
  }
  return viewerOf({ ...d, ring: branch.ring, theory: { ...d.theory, symbols } });
}

/** Constraints, their multipliers, and the branches of their solutions. */
export function constraintsSection(writer: Writer): Section | undefined {
  const { derivation, passage, plain, symbols } = writer;
  const { constrained } = derivation;
  if (!constrained) return undefined;
  const passages = constrained.tensors.flatMap(({ constraint, independent, invariant, multipliers }, i): Passage[] => {
    const typed = latexTerms(constraint.terms, symbols);
    const count = prose`Of the ${String(independent)} independent components of its multiplier the symmetry leaves ${String(invariant)}; they are found by solving the conditions of invariance.`;
    const names = enumerated(multipliers.map((m) => math(m.latex)));
    const fields =
      multipliers.length === 0
        ? prose`None of them is needed: the constraint follows from the others.`
        : prose`The functions of time ${names} multiply, per volume,`;
    return [
      passage(
        `constraint-${i + 1}`,
        `Constraint ${i + 1}`,
        { text: [prose`A multiplier tensor sets to zero the expression`] },
        equationDisplays({ left: '', terms: typedTerms(typed), right: '= 0', part: (n) => `C^{[${n}]}` }),
      ),
      passage(
        `multipliers-${i + 1}`,
        `Multipliers of constraint ${i + 1}`,
        { text: [prose`${count} ${fields}`] },
        rowDisplays(
          polyRows(
            plain,
            multipliers.map((m) => [`C_{${m.name.slice('lambda_'.length)}}`, m.value] as const),
          ),
        ),
      ),
    ];
  });
  const branches = constrained.branches.flatMap((b, i) => branchPassages(writer, b, i));
  return { id: 'constraints', title: 'Constraints and their branches', passages: [...passages, ...branches] };
}

function branchPassages({ derivation, passage, latex }: Writer, branch: ConstrainedBranch, index: number): Passage[] {
  const viewer = branchViewer(derivation, branch);
  const id = `branch-${index + 1}`;
  const lapse = latex(derivation.geometry.lapse);
  const fieldLatex = (q: string): string => derivation.fields.find((f) => f.name === q)!.latex;
  const solved = [
    ...polyRows(
      viewer,
      [...branch.solution].map(([q, p]) => [fieldLatex(q), p] as const),
    ),
    ...polyRows(
      viewer,
      [...branch.values].map(([k, p]) => [latex(k), p] as const),
    ),
  ];
  const conditions = branch.conditions.filter((c) => c.relation !== '=');
  const where: Prose[] = conditions.map(simpleCondition).map((c) => {
    const side = inlineTex(sumTex(viewer.sum(c.value, { divide: false })));
    return [math(`${side} ${c.relation === '!=' ? '\\neq' : c.relation} 0`)];
  });
  const when = where.length > 0 ? [prose`This needs ${enumerated(where)}.`] : [];
  const signs = branch.roots.length > 0 ? [prose`Either sign of a root will do.`] : [];
  const left = branch.remaining.length;
  const used = branch.used.length > 0 ? [prose`Assumed was ${enumerated(branch.used)}.`] : [];
  const open =
    left > 0
      ? [prose`The number of constraints that are not solved here is ${String(left)}; their multipliers stay.`]
      : [];
  const further = [...branch.further].map(
    ([q, p]): Equation => ({
      left: `E_{${fieldLatex(q)}}`,
      terms: sumTex(viewer.sum(p)),
      right: '= 0',
    }),
  );
  const free =
    branch.undetermined.length > 0
      ? prose`The equations do not fix ${enumerated(branch.undetermined.map((n) => math(fieldLatex(n))))}.`
      : prose`All multipliers are fixed by the equations of the fields that were solved for.`;
  const lagrangian = passage(
    `${id}-lagrangian`,
    'Lagrangian of the branch',
    {
      text: [
        prose`With the solution put in, multipliers of solved constraints drop out, and up to total derivatives gravity has`,
      ],
    },
    equationOf(viewer, `L_{${index + 1}}`, branch.reduced, { over: [lapse] }),
  );
  const equations = [...branch.equations].flatMap(([q, p]) =>
    equationOf(viewer, `E_{${fieldLatex(q)}}`, p, { right: '= 0' }),
  );
  return [
    passage(
      id,
      `Branch ${index + 1}`,
      { text: [prose`The constraints are solved by`], remarks: [...when, ...used, ...signs, ...open] },
      rowDisplays(solved.length > 0 ? solved : [{ left: '0', terms: [] }]),
    ),
    lagrangian,
    passage(
      `${id}-equations`,
      'Equations of the branch',
      { text: [prose`With matter, the equations of the fields that are left are`], remarks: [free] },
      equations,
    ),
    ...(further.length > 0
      ? [
          passage(
            `${id}-further`,
            'Further conditions of the branch',
            { text: [prose`Equations of solved fields that contain no multiplier are conditions of their own:`] },
            rowDisplays(further),
          ),
        ]
      : []),
  ];
}

/** Spin: its interaction, averages, and the connection eliminated in its favour. */
export function spinSection(writer: Writer): Section | undefined {
  const { derivation, passage, plain, latex } = writer;
  const { spin, theory } = derivation;
  if (!spin) return undefined;
  const densities = theory.symbols.filter((s) => s.role === 'spin').map((s) => math(latex(s.name)));
  const passages: Passage[] = [];
  if (spin.interaction.size > 0)
    passages.push(
      passage(
        'spin-interaction',
        'Coupling to the connection',
        {
          text: [
            prose`Densities of spin dilute with the spatial volume; ${enumerated(densities)} are their values at unit volume. Volume times what they add to the Lagrangian is`,
          ],
        },
        equationOf(plain, 'L_{\\mathrm{s}}', spin.interaction, { over: [latex(derivation.geometry.lapse)] }),
      ),
    );
  if (spin.averages.length > 0)
    passages.push(
      passage(
        'spin-average',
        'Randomly oriented spins',
        {
          text: [
            prose`The torsion that one spin makes is algebraic here. Solved for and put back, it leaves for spins of all directions a fluid with ${math('p = \\rho')} and the density`,
          ],
        },
        rowDisplays(
          polyRows(
            plain,
            spin.averages.map((a) => [`\\rho_{${latex(a.name)}}`, a.rho] as const),
          ),
        ),
      ),
    );
  if (typeof spin.elimination === 'string')
    passages.push(
      passage('spin-elimination', 'Elimination of the connection', {
        text: [prose`The connection is not eliminated: ${spin.elimination}.`],
      }),
    );
  else if (spin.elimination) {
    const { solution, rho, p } = spin.elimination;
    const fieldLatex = (q: string): string => derivation.fields.find((f) => f.name === q)!.latex;
    passages.push(
      passage(
        'spin-elimination',
        'Elimination of the connection',
        { text: [prose`The equations of the connection are linear in it and solved by`] },
        [...solution].flatMap(([q, f]) => fractionDisplays(plain, fieldLatex(q), f)),
      ),
      passage(
        'spin-density',
        'Effective density of spin',
        { text: [prose`Put back, this adds to the energy density and pressure`] },
        [
          ...fractionDisplays(plain, '\\rho_{\\mathrm{s}}', rho),
          ...(p ? fractionDisplays(plain, 'p_{\\mathrm{s}}', p) : []),
        ],
      ),
    );
  }
  return { id: 'spin', title: 'Matter with spin', passages };
}

/** A fraction with its denominator on the left when it is no single term. */
function fractionDisplays(viewer: Viewer, name: string, { numerator, denominator }: Fraction) {
  if (denominator.length === 0) return equationOf(viewer, name, numerator, { divide: false });
  const below: Poly = product(
    numerator.ring,
    denominator.map((f) => power(f.base, f.power)),
  );
  const factor = inlineTex(sumTex(viewer.sum(below, { divide: false })));
  return equationOf(viewer, `\\bigl( ${factor} \\bigr) ${name}`, numerator, { divide: false });
}
