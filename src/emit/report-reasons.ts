/** What the margin of the report says beside each step: why the step is allowed, and the rule or source behind it. */
import type { Derivation } from '../derivation.js';
import { math, type Prose, prose } from './latex-text.js';

export interface Reasons {
  readonly allowed: readonly Prose[];
  readonly rule: readonly Prose[];
}

const NONE: Reasons = { allowed: [], rule: [] };

/** The reasons of a section of the derivation, by its id; empty for a section that is no step of reasoning. */
export function reasonsOf(sectionId: string, d: Derivation): Reasons {
  switch (sectionId) {
    case 'theory':
      return {
        allowed: [
          prose`Every index of every term occurs once up and once down, so each term is a scalar. Relations come first because they define the theory: putting them in later would vary what they fix.`,
        ],
        rule: [
          prose`Einstein's summation rule. A relation with one symbol alone on its left eliminates that symbol; otherwise the last constant that occurs linearly with a number as its coefficient goes.`,
        ],
      };
    case 'geometry':
      return {
        allowed: [
          prose`Torsion and curvature are computed from the coframe and the connection by exterior algebra, and ${math('\\mathrm{d}\\mathrm{d} = 0')} is checked on the cobasis. A product of tensors is the sum over its components, those that vanish left out.`,
        ],
        rule: [prose`Cartan's structure equations.`, prose`${d.geometry.source}.`],
      };
    case 'reduction':
      if (!d.geometry.traceless)
        return {
          allowed: [
            prose`The value of the Lagrangian is shown for information. The structure constants of the cobasis have a trace, so varying it would give wrong equations; they are taken from the covariant ones.`,
          ],
          rule: [prose`Symmetric criticality, Commun. Math. Phys. 69 (1979) 19, whose condition fails here.`],
        };
      return {
        allowed: [
          prose`A Lagrangian may be varied after the symmetry has been imposed when the structure constants of the cobasis have zero trace; this geometry was checked for it. A total derivative has identically vanishing Euler–Lagrange expressions.`,
        ],
        rule: [
          prose`Symmetric criticality, Commun. Math. Phys. 69 (1979) 19. The split is checked by differentiating the dropped expression and by varying what is left.`,
        ],
      };
    case 'equations':
      return {
        allowed: [
          prose`The lapse is varied like every other field and set to one afterwards, so the constraint is kept. By the Noether identity the equation of one field that varies follows from those of the others.`,
        ],
        rule: [
          prose`Euler–Lagrange equations. Invariance under changes of time makes the Noether identity hold for any functions, solutions or not.`,
        ],
      };
    case 'friedmann':
      return {
        allowed: [
          prose`This is a definition: terms are moved to the other side of two equations, nothing is solved or dropped. Conservation of the effective fluid is a result, checked on the equations of the connection.`,
        ],
        rule: [prose`Einstein's equations of a homogeneous and isotropic universe.`],
      };
    case 'covariant':
      return {
        allowed: [
          prose`Coframe and connection are varied independently, before any symmetry is imposed. The components of the result on every geometry of this program were compared with the reduced equations there, term by term and exactly.`,
        ],
        rule: [
          prose`Torsion and curvature are the field strengths of coframe and connection, so the variation passes through the field momenta and an integration by parts: ${math('\tfrac{1}{e}partial_{mu}(e V^{mu\nu}) = \nabla_{mu} V^{mu\nu} + T_{mu} V^{mu\nu} - \tfrac{1}{2} T^{\nu}{}_{mulambda} V^{mulambda}')}.`,
        ],
      };
    case 'constraints':
      return {
        allowed: [
          prose`A multiplier may be any tensor with the indices and slot symmetries of the constraint, but on a symmetric background only its invariant part meets something that does not vanish. On a branch the variation is restricted to solutions of the constraints, and its equations were compared with those of all fields by the chain rule.`,
        ],
        rule: [
          prose`The components are the solutions of the linear conditions of invariance, Phys. Lett. A 75 (1979) 27 for torsion and curvature. A product splits into its factors; a root of a constant stands for either sign.`,
        ],
      };
    case 'spin':
      return {
        allowed: [
          prose`Matter that couples to the connection changes its equation but not the reduced gravity, so the metric analogue stays that of gravity alone. A field whose equation is algebraic and linear may be eliminated from the Lagrangian itself.`,
        ],
        rule: [
          prose`Spin density falls with the volume, its square like the sixth power of the scale factor, Nature Phys. Sci. 242 (1973) 7, Rev. Mod. Phys. 48 (1976) 393.`,
        ],
      };
    case 'scalar-tensor':
      if (d.scalarTensor.form === 'none')
        return {
          allowed: [
            prose`The reduced Lagrangian is compared with everything that a form of this class can produce. What is left over has no counterpart, so none is given.`,
          ],
          rule: [],
        };
      return {
        allowed: [
          prose`The form is found by comparing coefficients in the reduced Lagrangian, then reduced again from its covariant form on the metric geometry; both must have the same Euler–Lagrange expressions.`,
        ],
        rule: [
          prose`A unit timelike vector ${math('n^{\\mu}')} in ${math('n^{\\mu} J_{\\mu} + \\lambda (n^{2} + 1)')} can be integrated out and leaves ${math('\\pm\\sqrt{-J^{2}}')}, a quadratic cuscuton in the simplest case, Phys. Rev. D 75 (2007) 083513.`,
        ],
      };
    case 'scalars':
      return {
        allowed: [
          prose`Assumptions are never used for rewriting, only to decide signs. A sign counts as decided when it is proved by the signs of the terms or by a combination of the assumptions with non-negative weights; otherwise the cases are stated.`,
        ],
        rule: [
          prose`The transposition theorem for linear inequalities, monomials taken as unknowns. Curvature times a function of a scalar gives that scalar a kinetic term, so kinetic terms are judged in the Einstein frame.`,
        ],
      };
    case 'frames':
      return {
        allowed: [
          prose`A change of the metric by a positive function of the scalars is a change of variables. The new form was reduced with ${math('\\tilde{a} = \\Omega a')} and ${math('\\tilde{N} = \\Omega N')}; both reduced Lagrangians differ by a total derivative, at every spatial curvature.`,
        ],
        rule: [
          prose`${math('R = \\Omega^{2} [ \\tilde{R} + 6 \\tilde{\\Box} \\ln\\Omega - 6 (\\tilde{\\partial} \\ln\\Omega)^{2} ]')} in four dimensions, Phys. Rev. D 81 (2010) 084044.`,
        ],
      };
    case 'canonical':
      return {
        allowed: [
          prose`An antiderivative is believed after it has been differentiated and the squares compared exactly. Functions in the new fields were expressed in the old ones again and agree.`,
        ],
        rule: [
          prose`For a conformally coupled scalar the fields are those of Ann. Phys. 82 (1974) 535: a hyperbolic tangent on one side, a cotangent on the other.`,
        ],
      };
    case 'every-k':
      return {
        allowed: [
          prose`A scalar of the background knows the metric only through the rate at which volumes grow and the curvature of space, and both are scalars of the vector normal to space. Each step back to the metric replaces terms by others with the same equations.`,
        ],
        rule: [
          prose`Gauss' equation and integration by parts, as stated in rules/auxiliary.`,
          prose`The root of the current is a cuscuton in the simplest case, Phys. Rev. D 75 (2007) 083513 and 123509.`,
        ],
      };
    case 'auxiliary':
      return {
        allowed: [
          prose`A field that enters without derivatives may be replaced by the solution of its own equation: the remaining equations do not change. Every solution was substituted into its equation, and every branch is kept.`,
        ],
        rule: [prose`The rules of rules/auxiliary, by the names given in the text.`],
      };
    case 'couplings':
      return {
        allowed: [
          prose`The coefficients of the field monomials in the reduced Lagrangian span a linear space; its dimension is the number of combinations that can matter.`,
        ],
        rule: [prose`Linear algebra over the rational numbers.`],
      };
    case 'checks':
      return {
        allowed: [
          prose`A statement holds when a difference is zero as an exact expression in all its symbols. One that failed would have stopped the derivation.`,
        ],
        rule: [],
      };
    default:
      return NONE;
  }
}
