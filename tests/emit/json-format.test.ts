/** The shape of derivation.json as docs/formats.md states it, by a general-purpose schema validator. */
import { readdirSync, readFileSync } from 'node:fs';
import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { withCovariant } from '../../src/covariant.js';
import { derive } from '../../src/derive.js';
import { derivationJson } from '../../src/emit/json.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { evaluate } from '../oracle/infix.js';

const names = new Set<string>();
/** An expression that the grammar of docs/formats.md reads; its names are remembered. */
const expression = v.pipe(
  v.string(),
  v.check((text) => {
    evaluate<number>(text, {
      integer: () => 1,
      name: (name) => {
        names.add(name);
        return 1;
      },
      add: () => 1,
      sub: () => 1,
      mul: () => 1,
      div: () => 1,
      pow: () => 1,
    });
    return true;
  }, 'not an expression of docs/formats.md'),
);
const expressions = v.record(v.string(), expression);
const tensors = v.array(v.strictObject({ coefficient: expression, tensors: v.string() }));

const rational = v.pipe(v.string(), v.regex(/^-?\d+(\/\d+)?$/));
const components = v.record(v.pipe(v.string(), v.regex(/^i[0-3]*$/)), rational);
/** Expressions of a branch may contain roots, which stand in brackets behind sqrt. */
const withRoots = v.pipe(
  v.string(),
  v.transform((text) => text.replace(/sqrt\([^()]*\)/g, '1')),
  expression,
);
const constrained = {
  multipliers: v.optional(
    v.array(
      v.strictObject({
        constraint: v.string(),
        understood: v.string(),
        independent: v.number(),
        invariant: v.number(),
        fields: v.array(v.strictObject({ name: v.string(), vanishes: expression, tensor: components })),
      }),
    ),
  ),
  branches: v.optional(
    v.array(
      v.looseObject({
        name: v.string(),
        solution: v.record(v.string(), withRoots),
        values: expressions,
        roots: expressions,
        conditions: v.array(v.string()),
        remaining: v.array(v.string()),
        lagrangian: withRoots,
        reduced: withRoots,
        equations: v.record(v.string(), withRoots),
        multiplierEquations: v.record(v.string(), withRoots),
        undetermined: v.array(v.string()),
        further: v.record(v.string(), withRoots),
        scalarTensor: v.looseObject({ form: v.string() }),
      }),
    ),
  ),
  branchesComplete: v.optional(v.boolean()),
  spin: v.optional(
    v.strictObject({
      densities: v.array(v.string()),
      tensors: v.array(
        v.strictObject({
          tensor: v.string(),
          independent: v.number(),
          components: v.array(v.strictObject({ name: v.string(), tensor: components })),
        }),
      ),
      interaction: expression,
      averages: v.record(v.string(), v.strictObject({ rho: expression, p: expression })),
      elimination: v.optional(
        v.variant('found', [
          v.strictObject({ found: v.literal(false), reason: v.string() }),
          v.strictObject({ found: v.literal(true), solution: expressions, rho: expression, p: v.optional(expression) }),
        ]),
      ),
    }),
  ),
};

const format = v.looseObject({
  ...constrained,
  untwist: v.literal(1),
  theory: v.string(),
  geometry: v.string(),
  variables: v.array(v.string()),
  parameters: v.array(v.string()),
  sources: v.array(v.string()),
  fluids: v.array(
    v.strictObject({ name: v.string(), density: v.string(), w: v.pipe(v.string(), v.regex(/^-?\d+(\/\d+)?$/)) }),
  ),
  eliminated: expressions,
  conditions: v.array(v.pipe(v.string(), v.endsWith(' = 0'))),
  lagrangian: expression,
  reduced: expression,
  dropped: expression,
  equations: expressions,
  combinations: v.array(expression),
  screening: v.optional(v.array(expression)),
  friedmann: v.optional(v.strictObject({ rho_T: expression, p_T: expression })),
  scalarTensor: v.variant('form', [
    v.looseObject({
      form: v.literal('bi-scalar'),
      validFor: v.picklist(['every k', 'k = 0']),
      G4: expression,
      kinetic: expressions,
      current: expressions,
      potential: expression,
      curvatureObstruction: expression,
    }),
    v.looseObject({ form: v.literal('none'), reason: v.string(), offending: v.optional(expression) }),
  ]),
  covariant: v.optional(v.looseObject({ lagrangian: tensors, E_ab: tensors, E_abc: tensors, metricTerms: tensors })),
  checks: v.pipe(
    v.array(v.strictObject({ name: v.string(), holds: v.literal(true), detail: v.string() })),
    v.minLength(5),
  ),
  warnings: v.array(v.string()),
});

const folder = new URL('../../rules/examples/', import.meta.url);

describe('derivation.json', () => {
  for (const file of readdirSync(folder).filter((f) => f.endsWith('.yaml')))
    it(`of ${file} has the documented shape, and lists every symbol`, () => {
      names.clear();
      const theory = readTheory(readFileSync(new URL(file, folder), 'utf8'), file);
      const plain = derive(theory);
      const isAlone = theory.constraints === undefined && theory.spins === undefined;
      const json: unknown = JSON.parse(derivationJson(isAlone ? withCovariant(plain, false) : plain));
      const { variables, parameters } = v.parse(format, json);
      expect([...names].filter((n) => !variables.includes(n) && !parameters.includes(n))).toEqual([]);
    });

  it('is refused by the validator when a key is wrong', () => {
    const theory = readTheory('untwist: 1\nname: x\nscales: { M: mass }\nlagrangian: M^2 R\n', 'x.yaml');
    const json = JSON.parse(derivationJson(derive(theory))) as Record<string, unknown>;
    expect(v.safeParse(format, json).success).toBe(true);
    expect(v.safeParse(format, { ...json, equations: 'none' }).success).toBe(false);
  });
});
