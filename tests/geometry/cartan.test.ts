import { describe, expect, it } from 'vitest';
import { timeDerivative } from '../../src/algebra/calculus.js';
import {
  add,
  equals,
  generator,
  isZero,
  monomial,
  multiply,
  negate,
  type Poly,
  power,
  product,
  subtract,
  sum,
  zero,
} from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import {
  type Connection,
  curvatureForms,
  curvatureTensor,
  type FrameData,
  torsionForms,
  torsionFreeConnection,
  torsionTensor,
} from '../../src/geometry/cartan.js';
import { addForms, exteriorDerivative, type Form, maskOf, negateForm, wedge } from '../../src/geometry/forms.js';
import { packIndices } from '../../src/tensor/components.js';
import type { FrameMetric } from '../../src/tensor/contraction.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { type LieAlgebra, randomLieAlgebra, structureOf } from './lie-algebra.js';

const ring = makeRing([
  ...jetsOf('N', 2),
  ...['p', 'q', 'r'].flatMap((name) => jetsOf(name, 3)),
  ...constantsOf(['c', 'k']),
]);
const RANGE = [0, 1, 2, 3] as const;
const METRICS: readonly FrameMetric[] = [
  [-1, 1, 1, 1],
  [1, -1, -1, -1],
];

interface Case {
  readonly algebra: LieAlgebra;
  readonly frame: FrameData;
  readonly connection: Connection;
  readonly metric: FrameMetric;
}

/** A diagonal coframe on a random Lie algebra with any metric-compatible connection, dt components included. */
function randomCase(random: Random): Case {
  const algebra = randomLieAlgebra(random, random.pick(['A', 'B']));
  const coframe = ['N', 'p', 'q', 'r'].map((name) => generator(ring, name));
  const metric = random.pick(METRICS);
  const forms: Form[][] = RANGE.map(() => RANGE.map(() => new Map()));
  for (const a of RANGE)
    for (const b of RANGE) {
      if (a >= b) continue;
      const form = new Map<number, Poly>();
      for (const i of RANGE) {
        const p = randomPoly(random, ring, ['p', 'q', 'r', 'c'], { terms: 2 });
        if (!isZero(p) && random.chance(60)) form.set(maskOf([i]), p);
      }
      forms[a]![b] = form;
      forms[b]![a] = metric[a]! * metric[b]! > 0 ? negateForm(form) : form;
    }
  return { algebra, frame: { ring, structure: structureOf(algebra, ring), coframe }, connection: forms, metric };
}

const always = (statement: (c: Case, seed: number) => void): void => {
  for (let i = 0; i < runs(10); i++) {
    const seed = firstSeed(13 * i);
    statement(randomCase(new Random(seed)), seed);
  }
};

const coframeForm = (frame: FrameData, a: number): Form => new Map([[maskOf([a]), frame.coframe[a]!]]);

/** Torsion and curvature from commutators of the frame vectors instead of forms. */
function fromCommutators({ algebra, frame, connection }: Case) {
  const inverse = frame.coframe.map((c) => power(c, -1));
  const omega = (a: number, b: number, c: number): Poly =>
    multiply(connection[a]![b]!.get(maskOf([c])) ?? zero(ring), inverse[c]!);
  /** [E_b, E_c] = C^a_bc E_a. */
  const commutator = (a: number, b: number, c: number): Poly => {
    if (a === 0 || b === c) return zero(ring);
    if (b === 0 || c === 0) {
      const j = b === 0 ? c : b;
      if (j !== a) return zero(ring);
      const rate = product(ring, [timeDerivative(frame.coframe[a]!), inverse[0]!, inverse[a]!]);
      return b === 0 ? negate(rate) : rate;
    }
    const x = algebra.constants[a]![b]![c]!;
    // dθ^a = ½ C θ∧θ makes the dual vectors obey [X_b, X_c] = −C^a_bc X_a.
    return product(ring, [monomial(ring, rational(-x.n, x.d), []), frame.coframe[a]!, inverse[b]!, inverse[c]!]);
  };
  const along = (c: number, f: Poly): Poly => (c === 0 ? multiply(timeDerivative(f), inverse[0]!) : zero(ring));
  return {
    torsion: (a: number, b: number, c: number): Poly =>
      subtract(subtract(omega(a, c, b), omega(a, b, c)), commutator(a, b, c)),
    curvature: (a: number, b: number, c: number, d: number): Poly =>
      sum(ring, [
        along(c, omega(a, b, d)),
        negate(along(d, omega(a, b, c))),
        ...RANGE.flatMap((f) => [
          multiply(omega(a, f, c), omega(f, b, d)),
          negate(multiply(omega(a, f, d), omega(f, b, c))),
          negate(multiply(commutator(f, c, d), omega(a, b, f))),
        ]),
      ]),
  };
}

describe('torsion and curvature', () => {
  it('are those of the commutators of the frame, on random Lie algebras', () => {
    always((c, seed) => {
      const expected = fromCommutators(c);
      const torsion = torsionTensor(c.frame, c.connection, c.metric).entries;
      const curvature = curvatureTensor(c.frame, c.connection, c.metric).entries;
      const lower = (a: number, p: Poly): Poly => (c.metric[a]! < 0 ? negate(p) : p);
      for (const a of RANGE)
        for (const b of RANGE)
          for (const x of RANGE) {
            const t = torsion.get(packIndices([a, b, x])) ?? zero(ring);
            expect(equals(t, lower(a, expected.torsion(a, b, x))), `seed ${seed}: T_${a}${b}${x}`).toBe(true);
            for (const y of RANGE) {
              const r = curvature.get(packIndices([a, b, x, y])) ?? zero(ring);
              const wanted = lower(a, expected.curvature(a, b, x, y));
              expect(equals(r, wanted), `seed ${seed}: R_${a}${b}${x}${y}`).toBe(true);
            }
          }
    });
  });

  it('obey the first Bianchi identity dT^a + Γ^a_b∧T^b = R^a_b∧e^b', () => {
    always(({ frame, connection }, seed) => {
      const torsion = torsionForms(frame, connection);
      const curvature = curvatureForms(frame, connection);
      for (const a of RANGE) {
        const left = addForms(
          exteriorDerivative(torsion[a]!, frame.structure),
          ...RANGE.map((b) => wedge(connection[a]![b]!, torsion[b]!)),
        );
        const right = addForms(...RANGE.map((b) => wedge(curvature[a]![b]!, coframeForm(frame, b))));
        expect(addForms(left, negateForm(right)).size, `seed ${seed}`).toBe(0);
      }
    });
  });

  it('obey the second Bianchi identity dR^a_b + Γ^a_c∧R^c_b − R^a_c∧Γ^c_b = 0', () => {
    always(({ frame, connection }, seed) => {
      const curvature = curvatureForms(frame, connection);
      for (const a of RANGE)
        for (const b of RANGE) {
          const total = addForms(
            exteriorDerivative(curvature[a]![b]!, frame.structure),
            ...RANGE.map((c) => wedge(connection[a]![c]!, curvature[c]![b]!)),
            ...RANGE.map((c) => negateForm(wedge(curvature[a]![c]!, connection[c]![b]!))),
          );
          expect(total.size, `seed ${seed}`).toBe(0);
        }
    });
  });

  it('give lowered curvature antisymmetric in both pairs', () => {
    always(({ frame, connection, metric }) => {
      const { entries } = curvatureTensor(frame, connection, metric);
      for (const [packed, value] of entries) {
        const [a, b, c, d] = [packed >> 6, (packed >> 4) & 3, (packed >> 2) & 3, packed & 3] as const;
        expect(equals(entries.get(packIndices([b, a, c, d]))!, negate(value))).toBe(true);
        expect(equals(entries.get(packIndices([a, b, d, c]))!, negate(value))).toBe(true);
      }
    });
  });
});

describe('torsionFreeConnection', () => {
  it('is metric-compatible and has no torsion', () => {
    always(({ frame, metric }, seed) => {
      const connection = torsionFreeConnection(frame, metric);
      expect(torsionTensor(frame, connection, metric).entries.size, `seed ${seed}`).toBe(0);
      for (const a of RANGE)
        for (const b of RANGE) {
          const other = metric[a]! * metric[b]! > 0 ? negateForm(connection[b]![a]!) : connection[b]![a]!;
          expect(addForms(connection[a]![b]!, negateForm(other)).size, `seed ${seed}`).toBe(0);
        }
    });
  });

  it('does not depend on the overall sign of the metric', () => {
    always(({ frame }) => {
      const [one, other] = METRICS.map((m) => torsionFreeConnection(frame, m)) as [Connection, Connection];
      for (const a of RANGE)
        for (const b of RANGE) expect(addForms(one[a]![b]!, negateForm(other[a]![b]!)).size).toBe(0);
    });
  });

  it('has the curvature of a round universe on the algebra of rotations', () => {
    // dθ^i = −κ ε θ∧θ with κ = 1: k = 1, coframe N dt, a θ^i.
    const minusTwo = monomial(ring, rational(-2), []);
    const structure: Form[] = [
      new Map(),
      new Map([[maskOf([2, 3]), minusTwo]]),
      new Map([[maskOf([1, 3]), negate(minusTwo)]]),
      new Map([[maskOf([1, 2]), minusTwo]]),
    ];
    const a = generator(ring, 'p');
    const frame: FrameData = { ring, structure, coframe: [generator(ring, 'N'), a, a, a] };
    const metric = METRICS[0]!;
    const { entries } = curvatureTensor(frame, torsionFreeConnection(frame, metric), metric);
    const hubble = product(ring, [timeDerivative(a), power(a, -1), generator(ring, 'N', -1)]);
    const acceleration = add(multiply(timeDerivative(hubble), generator(ring, 'N', -1)), power(hubble, 2));
    // R_1212 = H² + k/a², R_0101 = −ä/a.
    expect(equals(entries.get(packIndices([1, 2, 1, 2]))!, add(power(hubble, 2), power(a, -2)))).toBe(true);
    expect(equals(entries.get(packIndices([0, 1, 0, 1]))!, negate(acceleration))).toBe(true);
    expect(entries.size).toBe(6 * 4);
  });
});
