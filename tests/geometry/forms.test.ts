import { describe, expect, it } from 'vitest';
import { timeDerivative } from '../../src/algebra/calculus.js';
import { equals, generator, isZero, negate, type Poly } from '../../src/algebra/poly.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import {
  addForms,
  bitsOf,
  equalForms,
  exteriorDerivative,
  type Form,
  maskOf,
  negateForm,
  TIME_FORM,
  twoFormComponent,
  wedge,
} from '../../src/geometry/forms.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { brokenLieAlgebra, randomLieAlgebra, structureOf } from './lie-algebra.js';

const ring = makeRing([...jetsOf('f', 4), ...jetsOf('g', 4), ...constantsOf(['c'])]);
const NAMES = ['f', 'g', 'D(f,1)', 'c'];
const masksOf = (degree: number): number[] =>
  Array.from({ length: 16 }, (_, m) => m).filter((m) => bitsOf(m).length === degree);

function randomForm(random: Random, degree: number): Form {
  const form = new Map<number, Poly>();
  for (const mask of masksOf(degree)) {
    const p = randomPoly(random, ring, NAMES, { terms: 2, exponents: [-1, 2] });
    if (!isZero(p) && random.chance(70)) form.set(mask, p);
  }
  return form;
}

const sign = (form: Form, s: number): Form => (s % 2 === 0 ? form : negateForm(form));

/** Runs a statement on random forms, algebras and degrees. */
function always(statement: (random: Random, seed: number) => void): void {
  for (let i = 0; i < runs(25); i++) {
    const seed = firstSeed(7 * i);
    statement(new Random(seed), seed);
  }
}

describe('masks', () => {
  it('name the factors of a form in ascending order', () => {
    expect(maskOf([0, 3])).toBe(9);
    expect(bitsOf(9)).toEqual([0, 3]);
    for (let m = 0; m < 16; m++) expect(maskOf(bitsOf(m))).toBe(m);
  });
});

describe('wedge', () => {
  it('is graded commutative: α∧β = (−1)^pq β∧α', () => {
    always((random, seed) => {
      const [p, q] = [random.below(4), random.below(4)];
      const [a, b] = [randomForm(random, p), randomForm(random, q)];
      expect(equalForms(wedge(a, b), sign(wedge(b, a), p * q)), `seed ${seed}`).toBe(true);
    });
  });

  it('is associative and distributes over sums', () => {
    always((random, seed) => {
      const [a, b, c, d] = [1, 1, 2, 2].map((n) => randomForm(random, n)) as [Form, Form, Form, Form];
      expect(equalForms(wedge(wedge(a, b), c), wedge(a, wedge(b, c))), `seed ${seed}`).toBe(true);
      const together = wedge(a, addForms(c, d));
      expect(equalForms(together, addForms(wedge(a, c), wedge(a, d))), `seed ${seed}`).toBe(true);
    });
  });

  it('of basis forms has the sign of the permutation', () => {
    const theta = (i: number): Form => new Map([[maskOf([i]), generator(ring, 'c')]]);
    const cubed = generator(ring, 'c', 3);
    const all = wedge(wedge(theta(3), theta(0)), theta(2));
    expect([...all.keys()]).toEqual([maskOf([0, 2, 3])]);
    expect(equals(all.get(maskOf([0, 2, 3]))!, cubed)).toBe(true);
    expect(equals(wedge(theta(2), theta(1)).get(6)!, negate(generator(ring, 'c', 2)))).toBe(true);
    expect(wedge(theta(1), theta(1)).size).toBe(0);
  });
});

describe('exteriorDerivative', () => {
  it('of a function of time is its rate times dt', () => {
    const f = generator(ring, 'f', 2);
    const d = exteriorDerivative(new Map([[0, f]]), structureOf(randomLieAlgebra(new Random(1), 'A'), ring));
    expect([...d.keys()]).toEqual([1 << TIME_FORM]);
    expect(equals(d.get(1)!, timeDerivative(f))).toBe(true);
  });

  it('vanishes when applied twice, on every Lie algebra', () => {
    always((random, seed) => {
      const structure = structureOf(randomLieAlgebra(random, random.pick(['A', 'B'])), ring);
      for (const degree of [0, 1, 2]) {
        const form = randomForm(random, degree);
        const twice = exteriorDerivative(exteriorDerivative(form, structure), structure);
        expect(twice.size, `seed ${seed}, degree ${degree}`).toBe(0);
      }
    });
  });

  it('does not vanish twice where the Jacobi identity fails', () => {
    always((random, seed) => {
      const structure = structureOf(brokenLieAlgebra(random), ring);
      const twice = structure.map((d) => exteriorDerivative(d, structure).size);
      expect(Math.max(...twice), `seed ${seed}`).toBeGreaterThan(0);
    });
  });

  it('obeys the graded Leibniz rule: d(α∧β) = dα∧β + (−1)^p α∧dβ', () => {
    always((random, seed) => {
      const structure = structureOf(randomLieAlgebra(random, random.pick(['A', 'B'])), ring);
      const [p, q] = [random.below(3), random.below(3)];
      const [a, b] = [randomForm(random, p), randomForm(random, q)];
      const left = exteriorDerivative(wedge(a, b), structure);
      const right = addForms(
        wedge(exteriorDerivative(a, structure), b),
        sign(wedge(a, exteriorDerivative(b, structure)), p),
      );
      expect(equalForms(left, right), `seed ${seed}, degrees ${p} and ${q}`).toBe(true);
    });
  });

  it('gives back the structure equations on the basis', () => {
    const structure = structureOf(randomLieAlgebra(new Random(4), 'A'), ring);
    const one = generator(ring, 'c', 0);
    for (const i of [0, 1, 2, 3])
      expect(equalForms(exteriorDerivative(new Map([[maskOf([i]), one]]), structure), structure[i]!)).toBe(true);
  });
});

describe('forms as values', () => {
  it('hold no zero coefficient', () => {
    always((random) => {
      const form = randomForm(random, 2);
      expect(addForms(form, negateForm(form)).size).toBe(0);
      expect(equalForms(form, form)).toBe(true);
      if (form.size > 0) expect(equalForms(form, negateForm(form))).toBe(false);
    });
  });

  it('give components of two-forms with the sign of their order', () => {
    const c = generator(ring, 'c');
    const form: Form = new Map([[maskOf([1, 3]), c]]);
    expect(twoFormComponent(form, 1, 3)).toBe(c);
    expect(equals(twoFormComponent(form, 3, 1)!, negate(c))).toBe(true);
    expect(twoFormComponent(form, 1, 2)).toBeUndefined();
    expect(twoFormComponent(form, 1, 1)).toBeUndefined();
  });
});
