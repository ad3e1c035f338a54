/**
 * Published background equations of several scalars minimally coupled to gravity, evaluated with the functions of an
 * Einstein frame on ã = Ωa, Ñ = Ω, against the Euler–Lagrange values of the torsion theory; flat space, N = 1, no matter.
 * Only Ω² and its logarithmic rate occur, so that everything stays rational.
 */
import type { Q } from './exact.js';
import * as E from './exact.js';
import { fieldJets, type Point } from './geometry.js';
import { along, atPoint } from './infix.js';
import type { BiScalarTexts } from './scalar-tensor.js';

export interface FrameTexts {
  readonly Omega2: string;
  readonly coupling: string;
  readonly kinetic: Readonly<Record<string, string>>;
}

/**
 * The equations of lapse and scale factor of the torsion theory, and what the frame says they are:
 * E_N = a³[3M²Ω²(H + ω̇)² − ½Ω²K̃ȦḂ − V], E_a = 3a²[M²Ω²(2(Ḣ + ω̈ − ω̇(H + ω̇)) + 3(H + ω̇)²) + ½Ω²K̃ȦḂ + JȦ − V].
 */
export function backgroundResiduals(
  frame: FrameTexts,
  json: { readonly equations: Readonly<Record<string, string>>; readonly scalarTensor: BiScalarTexts },
  generic: Point,
): { readonly residual: readonly Q[]; readonly expected: readonly Q[] } {
  const point: Point = { ...generic, k: E.ZERO, fields: { ...generic.fields, N: [E.ONE, E.ZERO, E.ZERO] } };
  const algebra = { kSquared: E.ZERO };
  const [a, velocity, acceleration] = point.fields.a as [Q, Q, Q];
  const H = E.div(velocity, a);
  const Hdot = E.sub(E.div(acceleration, a), E.mul(H, H));
  const factor = along(frame.Omega2, fieldJets(point, algebra, -1), point.constants, algebra);
  const [w, w1, w2] = [0, 1, 2].map((n) => factor.rationalAt(n)) as [Q, Q, Q];
  // The rate of ln Ω² is w1/w, and the rate of that is w2/w − (w1/w)².
  const first = E.div(w1, w);
  const rate = E.div(first, E.q(2));
  const second = E.div(E.sub(E.div(w2, w), E.mul(first, first)), E.q(2));
  const at = (text: string): Q => atPoint(text, point);
  const speed = (q: string): Q => point.fields[q]![1]!;
  const kinetic = Object.entries(frame.kinetic).reduce((sum, [pair, text]) => {
    const [x, y] = pair.split(',') as [string, string];
    return E.add(sum, E.div(E.product(at(text), speed(x), speed(y)), E.q(2)));
  }, E.ZERO);
  const linear = Object.entries(json.scalarTensor.current).reduce(
    (s, [q, text]) => E.add(s, E.mul(at(text), speed(q))),
    E.ZERO,
  );
  const V = at(json.scalarTensor.potential);
  const planck = E.mul(E.q(2), at(frame.coupling));
  const h = E.add(H, rate);
  const bending = E.add(E.mul(E.q(2), E.sub(E.add(Hdot, second), E.mul(rate, h))), E.product(E.q(3), h, h));
  const square = E.mul(E.pow(a, 2), E.q(3));
  return {
    expected: [at(json.equations.N!), at(json.equations.a!)],
    residual: [
      E.mul(E.pow(a, 3), E.sum(E.product(E.q(3), planck, w, h, h), E.neg(E.mul(w, kinetic)), E.neg(V))),
      E.mul(square, E.sum(E.product(planck, w, bending), E.mul(w, kinetic), linear, E.neg(V))),
    ],
  };
}
