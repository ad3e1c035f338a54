/**
 * Einstein frames of random theories, even and odd, with matter left out: the published background equations in the frame
 * are the equations of the torsion theory; canonical fields and classes agree with the functions at random points.
 */
import { describe, expect, it } from 'vitest';
import { derivationObject, derive, readTheory } from '../../src/index.js';
import { withScalarFields } from '../../src/scalar-fields.js';
import { backgroundResiduals } from '../oracle/einstein-frame.js';
import * as E from '../oracle/exact.js';
import { atPoint } from '../oracle/infix.js';
import { circumstances, shown, theoryText } from '../oracle/pipeline.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomTheory, SYMBOLS } from './wanted.js';

// biome-ignore lint/suspicious/noExplicitAny: the JSON of a derivation as other programs see it
type Json = any;

async function framed(text: string, omega2?: string): Promise<Json> {
  const options = { einstein: true, omega2, canonical: true, order: 3 };
  return derivationObject(await withScalarFields(derive(readTheory(text, 'random.yaml')), options));
}

describe('the Einstein frame of a random theory', () => {
  it(
    'has the published background equations',
    async () => {
      let found = 0;
      for (let run = 0; run < runs(14); run++) {
        const seed = firstSeed(410_000) + run;
        const random = new Random(seed);
        const shape = { geometry: 'flrw', degree: [1, 2], terms: 5, matter: 0, liberty: 'brackets' } as const;
        const { wanted } = randomTheory(random, shape);
        const json = await framed(theoryText(wanted));
        const [frame] = json.frames;
        if (frame.frame !== 'einstein') {
          expect(json.scalarTensor.G4, `seed ${seed}`).toBe('0');
          continue;
        }
        const point = random.point('flrw', SYMBOLS);
        if (E.isZero(atPoint(json.scalarTensor.G4, point))) continue;
        found++;
        const { residual, expected } = backgroundResiduals(frame, json, point);
        expect(residual.map(E.show), circumstances(seed, wanted, point)).toEqual(expected.map(E.show));
      }
      expect(found).toBeGreaterThan(0);
    },
    runs(60_000),
  );

  it(
    'is undone by hand: Ω²F, Ω⁴V and Ω⁴J are the functions of the form, for any Ω² of the user',
    async () => {
      let found = 0;
      for (let run = 0; run < runs(8); run++) {
        const seed = firstSeed(420_000) + run;
        const random = new Random(seed);
        const { wanted } = randomTheory(random, { geometry: 'flrw', degree: [1, 2], terms: 4, matter: 0 });
        const json = await framed(theoryText(wanted), '1 + phi^2 psi^2 + 3 psi^4');
        const chosen = json.frames[1];
        if (json.scalarTensor.form === 'none') continue;
        found++;
        const point = random.point('flrw', SYMBOLS);
        const at = (text: string) => atPoint(text, point);
        const omega2 = at(chosen.Omega2);
        const four = E.mul(omega2, omega2);
        const form = json.scalarTensor;
        const back = {
          G4: E.mul(omega2, at(chosen.coupling)),
          V: E.mul(four, at(chosen.potential)),
          phi: E.mul(four, at(chosen.current.phi)),
          psi: E.mul(four, at(chosen.current.psi)),
        };
        const own = { G4: at(form.G4), V: at(form.potential), phi: at(form.current.phi), psi: at(form.current.psi) };
        expect(shown(back), `seed ${seed}`).toEqual(shown(own));
      }
      expect(found).toBeGreaterThan(0);
    },
    runs(60_000),
  );
});

describe('canonical fields of random P = 0 theories', () => {
  it(
    'have one Einstein-frame result for ψ, whose series and shape are those of its kinetic coefficient',
    async () => {
      for (let run = 0; run < runs(6); run++) {
        const random = new Random(firstSeed(430_000) + run);
        const n = (): number => random.below(9) - 4 || 1;
        const lagrangian = `${n()} M^2 R + s (${n()} R_{abcd} R^{abcd} - ${n()} R_{abcd} R^{acbd}) + M^2 (b1 T_{abc} T^{abc} + ${n()} T_{abc} T^{bac} + b3 T_a T^a)`;
        const file = (extra: string) =>
          `untwist: 1\nname: Random\nconstants: [s, e, b1, b3]\nscales: { M: mass }\nlagrangian: ${lagrangian} + e R_{abcd} R^{cdab}\n${extra}`;
        // e is chosen so that the coefficient of A1² vanishes: K_φφ = 0.
        const free = await framed(file(''));
        const at = (e: number) =>
          atPoint(free.scalarTensor.kinetic['phi,phi'], {
            k: E.ZERO,
            fields: { N: [E.ONE], a: [E.ONE], phi: [E.ONE], psi: [E.ONE] },
            constants: { s: E.ONE, e: E.q(e), b1: E.ONE, b3: E.ONE, M: E.ONE },
          });
        const slope = E.sub(at(1), at(0));
        const root = E.neg(E.div(at(0), slope));
        const json = await framed(file(`impose: ["e = ${E.show(root)} s"]\n`));
        expect(json.scalarTensor.kinetic['phi,phi']).toBe('0');
        const einstein = json.canonical.filter((c: Json) => c.frame === 'einstein');
        expect(einstein.map((c: Json) => c.field)).toEqual(['psi']);
        for (const c of einstein[0].cases) {
          expect(c.branches.length).toBeGreaterThan(0);
          expect(['artanh(x)', 'arctan(x)']).toContain(c.antiderivative);
        }
      }
    },
    runs(120_000),
  );
});
