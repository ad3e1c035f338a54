/**
 * The constraint-vector form of random theories of any degree, with n free: its equations, the multiplier eliminated by the
 * equation of n, are those of the torsion theory at every k. And all routes to a scalar-tensor form agree.
 */

import { describe, expect, it } from 'vitest';
import { withAuxiliaryRoute } from '../../src/auxiliary-route.js';
import { withEveryK } from '../../src/every-k.js';
import { derivationObject, derive, readTheory } from '../../src/index.js';
import * as E from '../oracle/exact.js';
import type { Point } from '../oracle/geometry.js';
import { circumstances, shown, theoryText } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { eulerLagrange, torsionTheory } from '../oracle/variation.js';
import { vectorDensity, vectorScalar } from '../oracle/vector-form.js';
import { NAMED, type RandomTheory, randomTheory, SYMBOLS } from './wanted.js';

interface VectorJson {
  readonly everyK: {
    readonly lagrangian: string;
    readonly toMetric: {
      readonly stop?: { readonly rule: string; readonly reason: string };
      readonly validFor?: string;
      readonly remainder?: string;
      readonly G4?: string;
    };
    readonly integrated?: { readonly toMetric: { readonly G4: string; readonly potential: string } };
  };
  readonly scalarTensor: { readonly form: string; readonly validFor?: string };
}

const SCALARS = ['phi', 'psi'];
const derivationOf = (wanted: RandomTheory['wanted']) =>
  withEveryK(derive(readTheory(theoryText(wanted), 'outer-mole.yaml')));

/** The point with ν = 1/N: Σ C(m,j) N^(j) ν^(m−j) = 0 gives one derivative after the other. */
function withVector(point: Point): Point {
  const lapse = point.fields.N!;
  const nu: E.Q[] = [E.div(E.ONE, lapse[0]!)];
  for (let m = 1; m < lapse.length; m++) {
    let total = E.ZERO;
    for (let j = 1, choose = m; j <= m; choose = (choose * (m - j)) / (j + 1), j++)
      total = E.add(total, E.product(E.q(choose), lapse[j]!, nu[m - j]!));
    nu.push(E.neg(E.div(total, lapse[0]!)));
  }
  return { ...point, fields: { ...point.fields, nu } };
}

describe('constraint-vector form of a random theory', () => {
  it(
    'of degree up to four, both parities and signatures, k symbolic: its equations with λ(n² + 1) are those of the theory',
    () => {
      for (let run = 0; run < runs(14); run++) {
        const seed = firstSeed(610_000) + run;
        const random = new Random(seed);
        const { wanted, oracle } = randomTheory(random, { geometry: 'flrw', degree: [1, 4], terms: 3, matter: 0 });
        const json = derivationObject(derivationOf(wanted)) as unknown as VectorJson;
        const point = withVector(random.point('flrw', SYMBOLS, 4));
        const about = circumstances(seed, wanted, point);
        const { equations } = eulerLagrange(point, 2, vectorDensity(json.everyK.lagrangian, SCALARS, point.constants));
        // n varied: E_ν = 2 N² ν λ a³N; the lapse gets −2 a³ N² ν² λ besides, so that λ drops out of E_N − E_ν/N².
        const { nu, ...others } = equations as Record<string, E.Q>;
        const lapse = point.fields.N![0]!;
        const together = { ...others, N: E.sub(others.N!, E.div(nu!, E.mul(lapse, lapse))) };
        const { nu: _, ...fields } = point.fields;
        expect(shown(together), about).toEqual(shown(torsionTheory(oracle, { ...point, fields }).equations));
      }
    },
    runs(90_000),
  );

  it(
    'the rules reach the bi-scalar form exactly when comparing coefficients does, and for every k alike',
    () => {
      const seen = new Set<string>();
      for (let run = 0; run < runs(30); run++) {
        const seed = firstSeed(620_000) + run;
        const random = new Random(seed);
        const { wanted } = randomTheory(random, { geometry: 'flrw', degree: [1, 4], terms: 2, matter: 0 });
        const { everyK, scalarTensor } = derivationObject(derivationOf(wanted)) as unknown as VectorJson;
        const { toMetric } = everyK;
        expect(toMetric.G4 === undefined, `seed ${seed}`).toBe(scalarTensor.form === 'none');
        expect(toMetric.validFor, `seed ${seed}`).toBe(scalarTensor.validFor);
        if (toMetric.stop) expect(toMetric.stop.reason, `seed ${seed}`).not.toBe('');
        seen.add(toMetric.stop?.rule ?? 'none');
      }
      if (process.env.UNTWIST_RUNS === undefined) expect([...seen]).toContain('spatial-curvature');
    },
    runs(60_000),
  );
});

interface RouteJson {
  readonly auxiliary: {
    readonly fields: readonly { readonly name: string; readonly value: string }[];
    readonly lagrangian: string;
    readonly branches: readonly {
      readonly steps: readonly { readonly solved?: { readonly field: string; readonly value: string } }[];
      readonly lagrangian: string;
      readonly toMetric?: { readonly validFor?: string };
      readonly equationsCompared: boolean;
    }[];
  };
}

/** Jets of an expression along a point: value, first derivative … as far as they are retained. */
function jetOf(text: string, scalars: readonly string[], point: Point): E.Q[] {
  const derivatives: E.Q[] = [];
  eulerLagrange(point, 0, (fields, algebra) => {
    let jet = vectorScalar(text, scalars, point.constants)(fields, algebra);
    while (jet.length > 0) {
      derivatives.push(jet.rationalAt(0));
      if (jet.length === 1) break;
      jet = jet.rate();
    }
    return vectorScalar(text, scalars, point.constants)(fields, algebra);
  });
  return derivatives;
}

describe('linearised curvature and the connection integrated out', () => {
  const PIECES = ['T_{abc} T^{abc}', 'T_{abc} T^{bac}', 'T_a T^a', 'T_a A^a', 'R', '\\epsilon^{abcd} R_{abcd}'];

  it(
    'agrees with the theory on the way in and on the way out, even and odd parity, at every k',
    async () => {
      for (let run = 0; run < runs(6); run++) {
        const seed = firstSeed(630_000) + run;
        const random = new Random(seed);
        const chosen = random.shuffled(PIECES).slice(0, 2 + random.below(3));
        const names = random.shuffled([...NAMED.constants]).slice(0, chosen.length + 1);
        const text = [`${names[0]} R^2`, ...chosen.map((p, i) => `${names[i + 1]} M^2 ${p}`)].join(' + ');
        const wanted = { lagrangian: text, ...NAMED };
        const d = await withAuxiliaryRoute(derivationOf(wanted), { linearise: ['R'], integrate: undefined });
        const { auxiliary } = derivationObject(d) as unknown as RouteJson;
        const [field] = auxiliary.fields;
        const point = random.point('flrw', SYMBOLS, 6);
        const about = circumstances(seed, wanted, point);
        const all = [...SCALARS, 'chi'];
        // In: on χ = R the Lagrangian with χ has the equations of the theory.
        const onValue = { ...point, fields: { ...point.fields, chi: jetOf(field!.value, SCALARS, point) } };
        const wide = eulerLagrange(trimmed(onValue), 2, vectorDensity(auxiliary.lagrangian, all, point.constants));
        const narrow = eulerLagrange(
          trimmed(point),
          2,
          vectorDensity((derivationObject(d) as unknown as VectorJson).everyK.lagrangian, SCALARS, point.constants),
        );
        expect(shown(wide.equations), about).toEqual({ ...shown(narrow.equations), chi: '0' });
        // Out: with the solutions of φ and ψ the equations are those of what is left.
        const [branch] = auxiliary.branches;
        expect(branch!.equationsCompared, about).toBe(true);
        expect(branch!.toMetric?.validFor, about).toBe('every k');
        let solved: Point = { ...point, fields: { ...point.fields, chi: point.fields.phi! } };
        for (const s of [...branch!.steps].reverse())
          if (s.solved) {
            const jet = jetOf(s.solved.value, all, solved);
            solved = { ...solved, fields: { ...solved.fields, [s.solved.field]: jet } };
          }
        const before = eulerLagrange(trimmed(solved), 2, vectorDensity(auxiliary.lagrangian, all, point.constants));
        const after = eulerLagrange(trimmed(solved), 2, vectorDensity(branch!.lagrangian, all, point.constants));
        expect(shown(before.equations), about).toEqual({ ...shown(after.equations), phi: '0', psi: '0' });
      }
    },
    runs(60_000),
  );
});

/** All jets as long as the shortest. */
function trimmed(point: Point): Point {
  const length = Math.min(...Object.values(point.fields).map((jet) => jet.length));
  const fields = Object.fromEntries(Object.entries(point.fields).map(([name, jet]) => [name, jet.slice(0, length)]));
  return { ...point, fields };
}
