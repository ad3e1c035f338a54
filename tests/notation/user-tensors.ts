// What a convention means, written from its definition with components: the tensors of a user on random numbers, all indices
// down, and naive sums over all values of all indices. Shares no code with the translation under test.
import type { Conventions } from '../../src/notation/conventions.js';
import type { LagrangianTerm, TensorFactor } from '../../src/notation/theory.js';
import { levi, RANGE } from '../oracle/geometry.js';
import { Random } from '../oracle/random.js';
import { factorsOf } from '../oracle/reading.js';

/** Formulas for the choices of `ricci`, in the order of indices that goes with them. */
const RICCI: Record<Conventions['curvature-indices'], Record<Conventions['ricci'], readonly string[]>> = {
  'frame-first': {
    'R^c_{acb}': ['R^c_{acb}', 'R_a^c_{bc}'],
    'R^c_{abc}': ['R^c_{abc}', 'R_a^c_{cb}'],
    'R^c_{bca}': ['R^c_{bca}', 'R_b^c_{ac}'],
    'R^c_{bac}': ['R^c_{bac}', 'R_b^c_{ca}'],
  },
  'form-first': {
    'R^c_{acb}': ['R_{cb}^c_a', 'R_{bc}_a^c'],
    'R^c_{abc}': ['R_{bc}^c_a', 'R_{cb}_a^c'],
    'R^c_{bca}': ['R_{ca}^c_b', 'R_{ac}_b^c'],
    'R^c_{bac}': ['R_{ac}^c_b', 'R_{ca}_b^c'],
  },
};
const TRACE: Record<Conventions['torsion-index'], Record<Conventions['torsion-trace'], string>> = {
  first: { 'T^b_{ab}': 'T^b_{ab}', 'T^b_{ba}': 'T^b_{ba}' },
  last: { 'T^b_{ab}': 'T_{ab}^b', 'T^b_{ba}': 'T_{ba}^b' },
};

export function randomConventions(random: Random): Conventions {
  const sign = (): '+1' | '-1' => random.pick(['+1', '-1'] as const);
  return {
    signature: random.pick(['-+++', '+---'] as const),
    torsion: random.pick(['full', 'half'] as const),
    'torsion-sign': sign(),
    'torsion-index': random.pick(['first', 'last'] as const),
    'torsion-trace': random.pick(['T^b_{ab}', 'T^b_{ba}'] as const),
    'curvature-sign': sign(),
    'curvature-indices': random.pick(['frame-first', 'form-first'] as const),
    ricci: random.pick(['R^c_{acb}', 'R^c_{abc}', 'R^c_{bca}', 'R^c_{bac}'] as const),
    epsilon: sign(),
    action: sign(),
    units: 'mass',
  };
}

const ricciFormula = (c: Conventions): string => RICCI[c['curvature-indices']][c.ricci][c.epsilon === '+1' ? 0 : 1]!;
const traceFormula = (c: Conventions): string => TRACE[c['torsion-index']][c['torsion-trace']];

/** The conventions as a user would write them. */
export const asYaml = (c: Conventions): string => {
  const written = { ...c, ricci: ricciFormula(c), 'torsion-trace': traceFormula(c) };
  return `{ ${Object.entries(written)
    .map(([key, value]) => `${key}: '${value}'`)
    .join(', ')} }`;
};

type Components = (...indices: readonly number[]) => number;
type Factors = readonly Pick<TensorFactor, 'head' | 'slots'>[];

export class UserTensors {
  private readonly eta: readonly number[];
  private readonly tensors = new Map<string, Components>();

  /** The same numbers T^a_bc and R^a_bcd for one seed, whatever the conventions. */
  constructor(seed: number, conventions: Conventions) {
    const random = new Random(seed);
    this.eta = conventions.signature === '-+++' ? [-1, 1, 1, 1] : [1, -1, -1, -1];
    const torsion = new Map<string, number>();
    const curvature = new Map<string, number>();
    const draw = (): number => 2 * (random.below(7) - 3);
    for (const c of RANGE)
      for (const d of RANGE) {
        if (c >= d) continue;
        for (const a of RANGE) {
          const t = draw();
          torsion.set(`${a}${c}${d}`, t).set(`${a}${d}${c}`, -t);
          for (const b of RANGE) {
            if (a >= b) continue;
            // R_ab.. = −R_ba.. with the first index lowered; one sign of η makes R^0_i = R^i_0 in both signatures.
            const r = draw();
            const back = a === 0 ? r : -r;
            curvature.set(`${a}${b}${c}${d}`, r).set(`${a}${b}${d}${c}`, -r);
            curvature.set(`${b}${a}${c}${d}`, back).set(`${b}${a}${d}${c}`, -back);
          }
        }
      }
    const lowerT = (a: number, b: number, c: number): number => this.eta[a]! * (torsion.get(`${a}${b}${c}`) ?? 0);
    const lowerR = (a: number, b: number, c: number, d: number): number =>
      this.eta[a]! * (curvature.get(`${a}${b}${c}${d}`) ?? 0);
    const t = (conventions.torsion === 'half' ? 0.5 : 1) * (conventions['torsion-sign'] === '-1' ? -1 : 1);
    const r = conventions['curvature-sign'] === '-1' ? -1 : 1;
    const e = conventions.epsilon === '-1' ? -1 : 1;
    const last = conventions['torsion-index'] === 'last';
    const formFirst = conventions['curvature-indices'] === 'form-first';
    this.define('T3', (i, j, k) => t * (last ? lowerT(k!, i!, j!) : lowerT(i!, j!, k!)));
    this.define('R4', (i, j, k, l) => r * (formFirst ? lowerR(k!, l!, i!, j!) : lowerR(i!, j!, k!, l!)));
    this.define('epsilon4', (...i) => e * levi(...i));
    this.define('eta2', (a, b) => (a === b ? this.eta[a!]! : 0));
    this.define('delta2', (a, b) => (a === b ? this.eta[a!]! : 0));
    this.define('R2', (a, b) =>
      this.sum(
        factorsOf(ricciFormula(conventions)),
        new Map([
          ['a', a!],
          ['b', b!],
        ]),
      ),
    );
    this.define('T1', (a) => this.sum(factorsOf(traceFormula(conventions)), new Map([['a', a!]])));
    this.define('R0', () => this.sum(factorsOf('\\eta^{ab} R_{ab}'), new Map()));
    this.define('A1', (a) => this.sum(factorsOf('\\epsilon_a^{bcd} T_{bcd}'), new Map([['a', a!]])));
  }

  private define(kind: string, components: Components): void {
    const known = new Map<string, number>();
    this.tensors.set(kind, (...indices) => {
      const key = indices.join('');
      const value = known.get(key) ?? components(...indices);
      known.set(key, value);
      return value;
    });
  }

  /** Σ over every index that is not fixed; each pair brings one η. */
  private sum(factors: Factors, fixed: ReadonlyMap<string, number>): number {
    const names = [...new Set(factors.flatMap((f) => f.slots.map((s) => s.name)))].filter((name) => !fixed.has(name));
    let total = 0;
    for (let code = 0; code < 4 ** names.length; code++) {
      const at = new Map(fixed);
      let product = 1;
      names.forEach((name, n) => {
        const value = Math.floor(code / 4 ** n) % 4;
        at.set(name, value);
        product *= this.eta[value]!;
      });
      for (const { head, slots } of factors) {
        product *= this.tensors.get(`${head}${slots.length}`)!(...slots.map((s) => at.get(s.name)!));
        if (product === 0) break;
      }
      total += product;
    }
    return total;
  }

  value(factors: Factors): number {
    return this.sum(factors, new Map());
  }

  lagrangian(terms: readonly LagrangianTerm[]): number {
    return terms.reduce((sum, { scalar, factors }) => {
      const { num, den } = scalar.coefficient;
      return sum + (Number(num) / Number(den)) * this.value(factors);
    }, 0);
  }
}
