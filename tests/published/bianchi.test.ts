/**
 * Vacuum Einstein–Cartan theory on Bianchi I: zero torsion and the Kasner conditions Σp = Σp² = 1.
 * Source: any textbook (memory).
 */
import { describe, expect, it } from 'vitest';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import { FIELDS, fieldJets, type Point } from '../oracle/geometry.js';
import { derived, equationsAt } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const AXES = ['x', 'y', 'z'];
const json = derived({ lagrangian: '1/2 M^2 R', geometry: 'bianchi-i' });

/** φ_i = H_i along the curve, ψ_i = 0. */
function torsionFree(point: Point): Point {
  const jets = fieldJets(point, { kSquared: E.ZERO }, -1);
  const fields: Record<string, readonly Q[]> = { ...point.fields };
  for (const axis of AXES) {
    const a = jets[`a_${axis}`]!;
    fields[`phi_${axis}`] = a.rate().over(a.times(jets.N!)).derivatives();
    fields[`psi_${axis}`] = point.fields[`psi_${axis}`]!.map(() => E.ZERO);
  }
  return { ...point, fields };
}

/** a_i = t^p_i near t = 1, N = 1. */
function powerLaw(exponents: readonly Q[], M: Q): Point {
  const fields: Record<string, Q[]> = {};
  for (const name of FIELDS['bianchi-i']) fields[name] = [E.ONE, E.ZERO, E.ZERO, E.ZERO];
  exponents.forEach((p, i) => {
    const jet = [E.ONE];
    for (let n = 0; n < 3; n++) jet.push(E.mul(jet[n]!, E.sub(p, E.q(n))));
    fields[`a_${AXES[i]!}`] = jet;
  });
  return torsionFree({ k: E.ZERO, fields, constants: { M } });
}

const vanish = (values: Readonly<Record<string, Q>>, names: readonly string[]): boolean =>
  names.every((name) => E.isZero(values[name]!));

describe('vacuum Einstein–Cartan theory on Bianchi I — textbook (memory)', () => {
  const connection = AXES.flatMap((x) => [`phi_${x}`, `psi_${x}`]);

  it('its connection equations are linear in the torsion, regular, and solved by none', () => {
    for (let run = 0; run < runs(3); run++) {
      const free = torsionFree(new Random(firstSeed(900) + run).point('bianchi-i', ['M'], 3));
      expect(vanish(equationsAt(json, free), connection)).toBe(true);
      const shifted = (amount: number): Q[][] =>
        connection.map((field) => {
          const jet = [...free.fields[field]!];
          jet[0] = E.add(jet[0]!, E.q(amount));
          const at = equationsAt(json, { ...free, fields: { ...free.fields, [field]: jet } });
          return connection.map((row) => at[row]!);
        });
      const once = shifted(1);
      expect(determinant(once)).not.toBe('0');
      const twice = shifted(2).map((row) => row.map(E.show));
      expect(twice).toEqual(once.map((row) => row.map((x) => E.show(E.mul(x, E.q(2))))));
    }
  });

  it('Kasner: t^p with p = (−s, 1+s, s(1+s))/(1+s+s²) solves all equations', () => {
    for (let run = 0; run < runs(4); run++) {
      const s = new Random(firstSeed(920) + run).rational(true);
      const norm = E.sum(E.ONE, s, E.mul(s, s));
      const p = [E.neg(s), E.add(E.ONE, s), E.mul(s, E.add(E.ONE, s))].map((x) => E.div(x, norm));
      expect(E.show(E.sum(...p))).toBe('1');
      expect(E.show(E.sum(...p.map((x) => E.mul(x, x))))).toBe('1');
      expect(vanish(equationsAt(json, powerLaw(p, E.q(2))), FIELDS['bianchi-i'])).toBe(true);
    }
  });

  it('Σp = Σp² = 1 is necessary', () => {
    const bad = [
      [E.q(1, 3), E.q(1, 3), E.q(1, 3)],
      [E.q(1), E.q(1), E.q(-1, 2)],
      [E.q(2, 3), E.q(2, 3), E.q(1, 3)],
    ];
    for (const p of bad) {
      const at = equationsAt(json, powerLaw(p, E.q(3)));
      expect(vanish(at, FIELDS['bianchi-i'])).toBe(false);
      expect(vanish(at, connection)).toBe(true);
    }
  });
});

function determinant(rows: readonly (readonly Q[])[]): string {
  const m = rows.map((row) => [...row]);
  let value = E.ONE;
  for (let i = 0; i < m.length; i++) {
    const pivot = m.findIndex((row, r) => r >= i && !E.isZero(row[i]!));
    if (pivot < 0) return '0';
    if (pivot !== i) {
      [m[i], m[pivot]] = [m[pivot]!, m[i]!];
      value = E.neg(value);
    }
    value = E.mul(value, m[i]![i]!);
    for (let r = i + 1; r < m.length; r++) {
      const ratio = E.div(m[r]![i]!, m[i]![i]!);
      for (let c = i; c < m.length; c++) m[r]![c] = E.sub(m[r]![c]!, E.mul(ratio, m[i]![c]!));
    }
  }
  return E.show(value);
}
