/**
 * Vector forms from the texts of derivation.json, evaluated on ds² = −N²dt² + a²dΣ_k with the vector n^μ = (ν, 0, 0, 0) left
 * free: θ, n·∂q and ³R from their covariant definitions, with R_tt and R of the metric written out. Nothing is looked up.
 */
import type { Q } from './exact.js';
import * as E from './exact.js';
import { along } from './infix.js';
import type { Algebra, Jet } from './jet.js';

type Fields = Readonly<Record<string, Jet>>;

/** Names that a text of the program uses for what belongs to n, as names that the oracle can read. */
const readable = (text: string): string =>
  text
    .replaceAll('div(n)', 'expansion')
    .replaceAll('R3(n)', 'spatial')
    .replace(/D\(([A-Za-z0-9_]+),n\)/g, 'along_$1');

/** a³N times the Lagrangian; ν is 1/N where the fields have none. */
export function vectorDensity(
  text: string,
  scalars: readonly string[],
  constants: Readonly<Record<string, Q>>,
): (fields: Fields, algebra: Algebra) => Jet {
  return (fields, algebra) => {
    const { N, a } = fields as { N: Jet; a: Jet };
    const nu = fields.nu ?? N.power(-1);
    const own = along('k', fields, constants, algebra);
    const hubble = a.rate().over(a);
    const shrink = N.rate().over(N);
    // ∇_t n^t and ∇_i n^j = δ_i^j ν ȧ/a.
    const ahead = nu.rate().plus(nu.times(shrink));
    const aside = nu.times(hubble);
    const expansion = ahead.plus(aside.scaled(E.q(3)));
    const square = ahead.power(2).plus(aside.power(2).scaled(E.q(3)));
    // R_tt = −3 (ä/a − ȧ Ṅ/(a N)) and R = 6 [d/dt(ȧ/aN)/N + 2 (ȧ/aN)² + k/a²].
    const ricciTime = a.rate().rate().over(a).minus(hubble.times(shrink)).scaled(E.q(-3));
    const proper = hubble.over(N);
    const scalar = proper
      .rate()
      .over(N)
      .plus(proper.power(2).scaled(E.q(2)))
      .plus(own.over(a.power(2)))
      .scaled(E.q(6));
    const spatial = scalar
      .plus(ricciTime.times(nu.power(2)).scaled(E.q(2)))
      .minus(expansion.power(2))
      .plus(square);
    const names: Record<string, Jet> = { ...fields, expansion, spatial };
    for (const q of scalars) names[`along_${q}`] = fields[q]!.rate().times(nu);
    return along(readable(text), names, constants, algebra).times(a.power(3)).times(N);
  };
}

/** A scalar of n, without the volume, on the branch ν = 1/N. */
export function vectorScalar(
  text: string,
  scalars: readonly string[],
  constants: Readonly<Record<string, Q>>,
): (fields: Fields, algebra: Algebra) => Jet {
  const density = vectorDensity(text, scalars, constants);
  return (fields, algebra) => {
    const { N, a } = fields as { N: Jet; a: Jet };
    return density(fields, algebra).over(a.power(3).times(N));
  };
}
