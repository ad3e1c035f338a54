/** Functions of the scalar-tensor form in factors, as proposed by a computer algebra package and multiplied out here. */
import { infix } from './algebra/infix.js';
import { isZero, type Poly } from './algebra/poly.js';
import { factor } from './cas/factor.js';
import type { Derivation } from './derivation.js';

export interface FactoredFunction {
  readonly name: string;
  readonly text: string;
}

const TIME_LIMIT_MS = 5000;

/** The functions that have a factorisation worth printing; each one was verified. */
export async function factorFunctions(d: Derivation): Promise<FactoredFunction[]> {
  if (d.scalarTensor.form === 'none') return [];
  const { g4, kinetic, potential } = d.scalarTensor;
  const wanted: [string, Poly][] = [
    ['G4', g4],
    ...[...kinetic].map(([k, p]): [string, Poly] => [`K_${k}`, p]),
    ['V', potential],
  ];
  const out: FactoredFunction[] = [];
  for (const [name, p] of wanted) {
    if (isZero(p) || p.size < 2) continue;
    const found = await factor(p, { timeLimitMs: TIME_LIMIT_MS });
    // An irreducible function has nothing to show.
    if (!found || found.factors.reduce((n, f) => n + f.power, 0) < 2) continue;
    const factors = found.factors.map(({ base, power }) => `(${infix(base)})${power === 1 ? '' : `^${power}`}`);
    const unit = infix(found.unit);
    out.push({ name, text: [...(unit === '1' && factors.length > 0 ? [] : [unit]), ...factors].join('*') });
  }
  return out;
}
