/** Lines of the terminal summary on constraints, their branches and matter with spin. */
import type { Fraction } from '../algebra/fraction.js';
import type { Poly } from '../algebra/poly.js';
import type { ConstrainedBranch, Derivation } from '../derivation.js';
import { unicodeName } from '../notation/print.js';
import type { Viewer } from './display.js';
import { branchViewer } from './latex-constrained.js';
import { dividedText, unicodeTerms } from './unicode.js';

/** Breaks a list of terms into lines behind a left side. */
export type Wrap = (left: string, terms: readonly string[]) => string[];

const termsOf = (viewer: Viewer, p: Poly): string[] => unicodeTerms(viewer.sum(p, { divide: false }));

/** Constraints with their multipliers. */
export const constraintTensorLines = ({ constrained }: Derivation, viewer: Viewer, wrap: Wrap): string[] =>
  (constrained?.tensors ?? []).flatMap(({ constraint, independent, invariant, multipliers }) => [
    `${constraint.text} = 0: ${invariant} of ${independent} components of its multiplier are left by the symmetry`,
    ...multipliers.flatMap((m) => wrap(`  ${unicodeName(m.name)}: 0 = `, termsOf(viewer, m.value))),
  ]);

/** One block for each branch. */
export function branchLines(d: Derivation, wrap: Wrap): string[] {
  const { constrained } = d;
  if (!constrained) return [];
  const blocks = constrained.branches.flatMap((b) => oneBranch(d, b, wrap));
  const excluded = constrained.excluded.map(({ name, used }) => `ruled out by ${used.join(', ')}: ${name}`);
  if (constrained.branches.length === 0 && excluded.length === 0) return ['the constraints have no solution'];
  return [...blocks, ...excluded, ...(constrained.complete ? [] : ['there are more branches than were followed'])];
}

function oneBranch(d: Derivation, b: ConstrainedBranch, wrap: Wrap): string[] {
  const viewer = branchViewer(d, b);
  const equations = [...b.equations].flatMap(([q, p]) => {
    const sum = viewer.sum(p);
    return wrap(`  E_${unicodeName(q)}${dividedText(sum)} = `, unicodeTerms(sum));
  });
  const further = [...b.further].flatMap(([q, p]) => wrap(`  further: E_${unicodeName(q)} = `, termsOf(viewer, p)));
  const kept = b.remaining.length > 0 ? [`  ${b.remaining.length} of the constraints are not solved here`] : [];
  const roots = b.roots.length > 0 ? '; either sign of a root' : '';
  const free =
    b.undetermined.length > 0 ? [`  not fixed by the equations: ${b.undetermined.map(unicodeName).join(', ')}`] : [];
  const used = b.used.length > 0 ? `; by ${b.used.join(', ')}` : '';
  return [
    `${b.name}${roots}${used}`,
    ...kept,
    ...wrap('  L = ', termsOf(viewer, b.reduced)),
    ...equations,
    ...further,
    ...free,
  ];
}

/** A fraction; a denominator that is a sum stands behind the terms. */
function fractionLines(viewer: Viewer, left: string, { numerator, denominator }: Fraction, wrap: Wrap): string[] {
  const top = termsOf(viewer, numerator);
  if (denominator.length === 0) return wrap(left, top);
  const below = denominator.map(
    ({ base, power }) => `(${termsOf(viewer, base).join(' ')})${power === 1 ? '' : `^${power}`}`,
  );
  return wrap(`${left}[ `, [...top, `] / ${below.join(' ')}`]);
}

/** Interaction, averages, and the connection eliminated. */
export function spinLines({ spin }: Derivation, viewer: Viewer, wrap: Wrap): string[] {
  if (!spin) return [];
  const { interaction, averages, elimination } = spin;
  const fractions =
    typeof elimination === 'object'
      ? [
          ...[...elimination.solution].flatMap(([q, f]) => fractionLines(viewer, `${unicodeName(q)} = `, f, wrap)),
          ...fractionLines(viewer, 'effective density ', elimination.rho, wrap),
          ...(elimination.p ? fractionLines(viewer, 'effective pressure ', elimination.p, wrap) : []),
        ]
      : elimination === undefined
        ? []
        : [`the connection is not eliminated: ${elimination}`];
  return [
    ...(interaction.size > 0 ? wrap('volume times what it adds to L: ', termsOf(viewer, interaction)) : []),
    ...averages.flatMap((a) => wrap(`averaged spins ${unicodeName(a.name)}, p = ρ = `, termsOf(viewer, a.rho))),
    ...fractions,
  ];
}
