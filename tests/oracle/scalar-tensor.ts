/**
 * Reduction of √−g [G4 R + Σ K_AB X^AB + √|J_μ J^μ| − V] on the metric geometry ds² = −N²dt² + a²dΣ_k, from the texts of
 * derivation.json. R is the metric scalar with its second derivatives, so that nothing is integrated by parts here.
 */

import type { Q } from './exact.js';
import * as E from './exact.js';
import type { Point } from './geometry.js';
import { along } from './infix.js';
import type { Algebra, Jet } from './jet.js';
import { eulerLagrange, type Values } from './variation.js';

export interface BiScalarTexts {
  readonly G4: string;
  readonly kinetic: Readonly<Record<string, string>>;
  readonly current: Readonly<Record<string, string>>;
  readonly potential: string;
  readonly curvatureObstruction: string;
}

/** a³N times the scalar-tensor Lagrangian; the obstruction is added when asked for, with D(q,1) read as D(q,1)/N. */
export function reduced(
  form: BiScalarTexts,
  withObstruction: boolean,
  constants: Readonly<Record<string, Q>>,
): (fields: Readonly<Record<string, Jet>>, algebra: Algebra) => Jet {
  return (fields, algebra) => {
    const { N, a } = fields as { N: Jet; a: Jet };
    const text = (t: string): Jet => along(t, fields, constants, algebra);
    const dot = (x: Jet): Jet => x.rate().over(N);
    const k = text('k');
    const h = dot(a).over(a);
    const ricci = dot(h)
      .plus(h.power(2).scaled(E.q(2)))
      .plus(k.over(a.power(2)))
      .scaled(E.q(6));
    let density = text(form.G4).times(ricci).minus(text(form.potential));
    for (const [pair, value] of Object.entries(form.kinetic)) {
      const [first, second] = pair.split(',') as [string, string];
      // X^AB = −½ ∂A·∂B is ½ ȦḂ/N² on this geometry.
      density = density.plus(text(value).times(dot(fields[first]!)).times(dot(fields[second]!)).scaled(E.q(1, 2)));
    }
    for (const [name, value] of Object.entries(form.current))
      density = density.plus(text(value).times(dot(fields[name]!)));
    if (withObstruction) {
      const perLapse = form.curvatureObstruction.replace(/D\(([A-Za-z0-9_]+),\s*1\)/g, '(D($1,1)/N)');
      density = density.plus(text(perLapse));
    }
    return density.times(a.power(3)).times(N);
  };
}

/** Euler–Lagrange values of the bi-scalar form, without matter. */
export function biScalarValues(form: BiScalarTexts, point: Point, withObstruction: boolean): Values {
  return eulerLagrange(point, 2, reduced(form, withObstruction, point.constants));
}
